"""An answer as plain text: requirements, figures, ledger, cautions; fit for a pipe, 100 columns wide."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence

from actuator.answer import Answer
from actuator.cautions import DECIDE
from actuator.errors import Problem, Refusal
from actuator.report import bands_view, holding_view
from actuator.report.bands_view import Scatters
from actuator.report.figures import FIGURES, At, Figure, completed, flow
from actuator.report.names import all_figures
from actuator.report.scatter import Scatter
from actuator.report.shown import Shown, shown_for
from actuator.report.tables import WIDTH, cell, groups, line, share_table, table, wrapped
from actuator.report.verdicts import verdict_line
from actuator.results import Analysis
from actuator.unit_table import System

ESTIMATE = "These figures are an engineering estimate from the model that `actuator explain` shows. " + DECIDE


def problem_lines(problems: Iterable[Problem], file: str) -> list[str]:
    """Problems of a document, one line each, the file in front."""
    return [f"{file}: {problem}" for problem in problems]


def _heading(text: str, rule: str) -> list[str]:
    lines = wrapped(text, "", "")
    return ["", *lines, rule * min(max(len(item) for item in lines), WIDTH)]


def _actuator_heading(at: At, shown: Shown) -> list[str]:
    part, machine = at.actuator.part, at.machine.part
    sizes = ", ".join(
        f"{name} {shown.text(value, kind)}"
        for name, value, kind in (
            ("bore", part.bore, FIGURES["actuator"]["static.required_bore"].kind),
            ("rod", part.rod, FIGURES["actuator"]["static.required_bore"].kind),
            ("stroke", part.stroke, FIGURES["actuator"]["static.required_bore"].kind),
            ("cycle", machine.cycle_time, FIGURES["actuator"]["extend.stroke_time"].kind),
        )
        if value > 0.0
    )
    many = f"{part.count} in parallel, each " if part.count > 1 else ""
    return [*_heading(f"{machine.name}: {part.name}", "="), *wrapped(f"{many}{part.kind}, {sizes}", "", "")]


def _requirements(at: At, shown: Shown) -> list[str]:
    lines = ["", "Requirements", "------------"]
    for criterion in at.actuator.criteria:
        lines += wrapped(verdict_line(criterion, shown))
    return lines if at.actuator.criteria else [*lines, "  none asked, nothing judged"]


def _motion(figures: Sequence[Figure], at: At, shown: Shown) -> list[str]:
    lines = table("Motion", figures, at, shown)
    words = ["yes" if completed(at, way) else "no" for way in ("extend", "retract")]
    return [*lines[:3], line("Stroke completed", words), *lines[3:]]


def _ledger(at: At, shown: Shown) -> list[str]:
    known = FIGURES["actuator"]
    items = [
        (figure, known.get(figure.key.replace("exergy.", "exergy_share.")))
        for figure in groups(at)["Exergy of a cycle"]
    ]
    lines = share_table("Exergy of a cycle", items, at, shown, "of supplied")
    loss = [(known["cycle.exhaust_loss"], known["cycle.exhaust_loss_share"])]
    if not isinstance(loss[0][0].value(at), Refusal):
        lines += share_table("", loss, at, shown, "")[3:]
    return lines


def _upstream(at: At, shown: Shown) -> list[str]:
    known = FIGURES["actuator"]
    share = "cycle.upstream_share."
    items: list[tuple[Figure, Figure | None]] = [
        (known["cycle.upstream.electricity"], None),
        (known["cycle.upstream.compression"], known[share + "compression"]),
        (known["cycle.exergy.supplied"], known[share + "port"]),
        (known["cycle.exergy.load"], known[share + "load"]),
    ]
    return share_table("From the meter to the load", items, at, shown, "of the meter")


def _paths(at: At, shown: Shown) -> list[str]:
    names = ("conductance", "critical_ratio", "subsonic_index", "fit_error")
    known = FIGURES["actuator"]
    unit = shown.number(0.0, known["paths.cap_filling.conductance"].kind)[1]
    title = "Flow paths, valve and throttle"
    lines = ["", f"{title:<34}{'C':>14}{'b':>12}{'m':>12}{'fit error':>12}  unit of C"]
    lines.append("-" * len(lines[1]))
    for path in (found.name for found in at.actuator.paths):
        cells = [cell(known[f"paths.{flow.slug(path)}.{name}"], at, shown) for name in names]
        c, b, m, error = (item.number for item in cells)
        lines.append(f"  {path:<32}{c:>14}{b:>12}{m:>12}{f'{error} {cells[3].unit}':>12}  {unit}")
    return lines


def _words(title: str, texts: Iterable[str]) -> list[str]:
    found = list(dict.fromkeys(texts))
    if not found:
        return []
    lines = ["", title, "-" * len(title)]
    for text in found:
        lines += wrapped(text, "  - ", "    ")
    return lines


def _actuator(at: At, shown: Shown, scatter: Scatter | None) -> list[str]:
    result = at.actuator
    lines = _actuator_heading(at, shown) + _requirements(at, shown)
    special: dict[str, Callable[[Sequence[Figure]], list[str]]] = {
        "Motion": lambda figures: _motion(figures, at, shown),
        "Exergy of a cycle": lambda _: _ledger(at, shown),
        "From the meter to the port": lambda _: _upstream(at, shown),
        "Shares of the supplied exergy": lambda _: [],
        "Exhaust loss": lambda _: [],
        "Flow paths": lambda _: _paths(at, shown),
        "Holding, supply lost": lambda _: holding_view.table(at, shown),
        "Holding, signal lost": lambda _: [],
        "Holding, both lost": lambda _: [],
    }
    for title, figures in groups(at).items():
        show = special.get(title)
        lines += show(figures) if show is not None else table(title, figures, at, shown)
        if title == "Air of a cycle" and not isinstance(result.air, Refusal):
            lines += wrapped(result.air.difference)
        if title == "Rod" and result.rod.rule:
            lines += wrapped(f"Rule used: {result.rod.rule}.")
    lines += bands_view.table(shown, scatter) if scatter is not None else []
    remarks = list(result.remarks) + list(result.indicator.remarks)
    if not isinstance(result.stroke, Refusal):
        remarks += result.stroke.remarks
    lines += _words("Remarks", remarks)
    lines += _words(
        "Cautions",
        (f"{item.text.removesuffix(DECIDE).rstrip()} [{item.source}]" for item in result.cautions),
    )
    return lines


def _level(title: str, at: At, shown: Shown) -> list[str]:
    lines = _heading(title, "=")
    for name, figures in groups(at).items():
        lines += table(name, figures, at, shown)
    return lines


def _supply_words(analysis: Analysis) -> list[str]:
    if isinstance(analysis.supply, Refusal):
        return []
    compressor = analysis.project.plant.compressors[0]
    return wrapped(f"Electricity for the air: {compressor.name}, by {analysis.supply.how}.")


def as_text(answer: Answer, system: System = "si", scatters: Scatters | None = None) -> str:
    """Everything about an answer, as tables.

    Parameters
    ----------
    answer : Answer
        With an analysis.
    system : {"si", "us"}, optional
        Units to show in.
    scatters : Scatters, optional
        Tolerance bands, of the actuators that have some.

    Returns
    -------
    str
        Ends with a newline.

    Raises
    ------
    LookupError
        Where the document has problems.
    """
    analysis, project = answer.analysis, answer.project
    if analysis is None or project is None:
        raise LookupError("the document has problems")
    shown = shown_for(project, system)
    lines = wrapped(project.title, "", "") if project.title else []
    for number, machine in enumerate(analysis.machines):
        for index in range(len(machine.actuators)):
            lines += _actuator(At(analysis, number, index), shown, (scatters or {}).get((number, index)))
        count = machine.part.quantity
        title = f"{machine.part.name}: the machine" + (f" ({count} of them)" if count > 1 else "")
        lines += _level(title, At(analysis, number), shown)
    lines += _level("Site", At(analysis), shown)
    lines += _supply_words(analysis)
    lines += _words("Remarks", analysis.remarks)
    lines += ["", *wrapped(ESTIMATE, "", "")]
    return "\n".join(lines).lstrip("\n") + "\n"


def figure_list(answer: Answer, system: System = "si") -> str:
    """Names of all figures with their values: what can be explained.

    Parameters
    ----------
    answer : Answer
        With an analysis.
    system : {"si", "us"}, optional
        Units to show in.

    Returns
    -------
    str
        One figure a line, ends with a newline.
    """
    if answer.analysis is None or answer.project is None:
        raise LookupError("the document has problems")
    shown = shown_for(answer.project, system)
    rows = [(item.name, shown.figure(item.figure, item.at)) for item in all_figures(answer.analysis)]
    width = max(len(name) for name, _ in rows)
    return "".join(f"{name:<{width}}  {value}\n" for name, value in rows)
