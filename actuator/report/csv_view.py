"""All figures as comma separated values, one row a figure."""

from __future__ import annotations

import csv
import io

from actuator.errors import Refusal
from actuator.report.bands_view import LEVELS, Scatters, csv_cells
from actuator.report.figures import si_unit
from actuator.report.names import all_figures
from actuator.results import Analysis

HEADER = ("machine", "actuator", "figure", "value", "unit", "refused")


def as_csv(analysis: Analysis, scatters: Scatters | None = None) -> str:
    """All figures, unrounded and in SI.

    Parameters
    ----------
    analysis : Analysis
    scatters : Scatters, optional
        Tolerance bands; three columns more, empty for figures without one.

    Returns
    -------
    str
        Header line first; where a figure is refused its value is empty and the reason stands in the last
        column. Rows of a machine or of the project leave the names below them empty.
    """
    out = io.StringIO()
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(HEADER if scatters is None else (*HEADER, *LEVELS))
    currency = analysis.project.money.currency
    for item in all_figures(analysis):
        machine, actuator = (*item.at.owner, "", "")[:2]
        value = item.figure.value(item.at)
        unit = si_unit(item.figure.kind, currency)
        band = () if scatters is None else csv_cells(item.at, item.figure.key, scatters)
        number, reason = ("", value.reason) if isinstance(value, Refusal) else (repr(value), "")
        writer.writerow((machine, actuator, item.figure.key, number, unit, reason, *band))
    return out.getvalue()
