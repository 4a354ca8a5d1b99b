"""Tolerance bands in JSON, text and CSV."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from actuator.errors import Refusal
from actuator.report.figures import FIGURES, At
from actuator.report.scatter import Scatter
from actuator.report.shown import Shown
from actuator.report.tables import head, line, wrapped
from actuator.report.workings import title
from actuator.scatter.bands import Band
from actuator.scatter.points import SCRAMBLING
from actuator.sources import JCGM_101

Scatters = Mapping[tuple[int, int], Scatter]
"""Bands by 0-based place: machine, actuator."""
LEVELS = ("p05", "p50", "p95")
"""Names of the three numbers of a band."""
HOW = (
    "One sample in twenty lies below P5 and one in twenty above P95. Each field of the spread is drawn evenly between "
    f"its limits, apart from the others (scrambled Sobol points of scipy.stats.qmc, scrambling {SCRAMBLING}); mass and "
    f"the forces of the load move together, and so do all conductances. [{JCGM_101}]"
)


def _share(value: float | Refusal) -> float | dict[str, str]:
    return {"refused": value.reason} if isinstance(value, Refusal) else value


def as_tree(scatter: Scatter) -> dict[str, Any]:
    """Objects of an actuator in JSON: its bands, and how often all its requirements are met.

    Parameters
    ----------
    scatter : Scatter

    Returns
    -------
    dict
        ``bands`` by the figures' names, SI; ``scatter`` with samples, chance and its 95 % confidence interval.
    """
    bands: dict[str, Any] = {}
    for key, band in scatter.found.bands.items():
        if isinstance(band, Refusal):
            bands[key] = {"refused": band.reason}
            continue
        bands[key] = {name: getattr(band, name) for name in LEVELS}
        if band.missing:
            bands[key]["missing"] = band.missing
    found = scatter.found
    return {
        "bands": bands,
        "scatter": {
            "samples": found.samples,
            "scrambling": SCRAMBLING,
            "all_met": _share(found.met),
            "all_met_low": _share(found.met_low),
            "all_met_high": _share(found.met_high),
            "remarks": [HOW, *scatter.remarks],
        },
    }


def chance(scatter: Scatter) -> str:
    """How often all requirements are met, as a sentence.

    Parameters
    ----------
    scatter : Scatter

    Returns
    -------
    str
    """
    found = scatter.found
    if isinstance(found.met, Refusal) or isinstance(found.met_low, Refusal) or isinstance(found.met_high, Refusal):
        return f"Chance that all requirements are met: {found.met}."
    met, low, high = (f"{100.0 * share:.3g}" for share in (found.met, found.met_low, found.met_high))
    return (
        f"All requirements are met in {met} % of {found.samples} samples "
        f"(95 % confidence, as if drawn by chance: {low} to {high} %)."
    )


def table(shown: Shown, scatter: Scatter) -> list[str]:
    """Bands of an actuator as a table.

    Parameters
    ----------
    shown : Shown
    scatter : Scatter

    Returns
    -------
    list of str
        Lines, heading first; figures that have no band are left out, those that do not always have a value are told.
    """
    lines = head("Tolerance bands", ("P5", "P50", "P95"))
    told: dict[str, list[str]] = {}
    group = ""
    for key, band in scatter.found.bands.items():
        figure = FIGURES["actuator"][key]
        label = title(figure)
        if isinstance(band, Refusal):
            told.setdefault(f"refused: {band.reason}", []).append(label)
            continue
        if band.p05 == band.p95:
            told.setdefault("not moved by this spread", []).append(label)
            continue
        if figure.group != group:
            group = figure.group
            lines.append(group)
        cells = [shown.number(getattr(band, name), figure.kind) for name in LEVELS]
        lines.append(line(label, [number for number, _ in cells], cells[0][1]))
        if band.missing:
            told.setdefault(f"{band.missing} of {scatter.found.samples} samples have none", []).append(label)
    for reason, labels in told.items():
        lines += wrapped(f"{reason}: {', '.join(dict.fromkeys(labels))}")
    for text in (chance(scatter), HOW, *scatter.remarks):
        lines += wrapped(text)
    return lines


def csv_cells(at: At, key: str, scatters: Scatters) -> tuple[str, str, str]:
    """P5, P50 and P95 of a figure for its row; empty where it has no band.

    Parameters
    ----------
    at : At
        Its place.
    key : str
        Its key.
    scatters : Scatters

    Returns
    -------
    tuple of str
    """
    if at.machine_index is None or at.actuator_index is None:
        return ("", "", "")
    scatter = scatters.get((at.machine_index, at.actuator_index))
    band = scatter.found.bands.get(key) if scatter is not None else None
    if not isinstance(band, Band):
        return ("", "", "")
    return (repr(band.p05), repr(band.p50), repr(band.p95))
