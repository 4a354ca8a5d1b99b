"""All figures as comma separated values, one row a figure."""

from __future__ import annotations

import csv
import io

from actuator.errors import Refusal
from actuator.report.figures import si_unit
from actuator.report.names import all_figures
from actuator.results import Analysis

HEADER = ("machine", "actuator", "figure", "value", "unit", "refused")


def as_csv(analysis: Analysis) -> str:
    """All figures, unrounded and in SI.

    Parameters
    ----------
    analysis : Analysis

    Returns
    -------
    str
        Header line first; where a figure is refused its value is empty and the reason stands in the last
        column. Rows of a machine or of the project leave the names below them empty.
    """
    out = io.StringIO()
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(HEADER)
    currency = analysis.project.money.currency
    for item in all_figures(analysis):
        machine, actuator = (*item.at.owner, "", "")[:2]
        value = item.figure.value(item.at)
        unit = si_unit(item.figure.kind, currency)
        if isinstance(value, Refusal):
            writer.writerow((machine, actuator, item.figure.key, "", unit, value.reason))
        else:
            writer.writerow((machine, actuator, item.figure.key, repr(value), unit, ""))
    return out.getvalue()
