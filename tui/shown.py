"""An answer as rows of text, in the reader's units. Every number comes from the registry of figures."""

from __future__ import annotations

from dataclasses import dataclass, replace

from actuator.analysis import ActuatorResult, Criterion
from actuator.answer import Answer
from actuator.errors import Refusal
from actuator.report.fields import field_values
from actuator.report.figures import FIGURES, At, Figure, Level
from actuator.report.shown import Shown, shown_for
from actuator.report.verdicts import UPPER, kind_of_requirement, label_of_requirement
from actuator.unit_table import System
from actuator.units import Reading, scale
from tui.tables import Row, Section

LEDGER, SHARES, MONEY = "Exergy of a cycle", "Shares of the supplied exergy", "Money and carbon"
STROKE_GROUPS = ("Motion", "Worst-case pair", "Of which", "Exhaust loss")
"""Beginnings of the headings that stand in the workspace Stroke, in this order; all others in Cylinder."""


CYLINDER_GROUPS = ("Static force", "Rod", "Ideal indicator diagram", "Air of a cycle", "From the meter")
"""Beginnings of the headings that come first in Cylinder; the actuator's others come after the money."""
LEVELS: tuple[Level, ...] = ("actuator", "machine", "project")
SIGNS = {"met": "✓", "failed": "✗", "refused": "?"}
"""Signs of a verdict, so that no colour is needed."""


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class View:
    """What is looked at: one actuator of one answer, in one system of units, against a pinned answer.

    Attributes
    ----------
    answer : Answer
        With an analysis.
    machine, actuator : int
        0-based. [1]
    system : {"si", "us"}
    pin : Answer or None
        With an analysis.
    """

    answer: Answer
    machine: int
    actuator: int
    system: System = "si"
    pin: Answer | None = None

    @property
    def shown(self) -> Shown:
        """How numbers become text."""
        project = self.answer.project
        return Shown(Reading(), self.system) if project is None else shown_for(project, self.system)

    @property
    def result(self) -> ActuatorResult | None:
        """The actuator's results; None where the machine has no actuator."""
        return _result(self.answer, self.machine, self.actuator)

    def at(self, level: Level, answer: Answer | None = None) -> At | None:
        """Where figures of a level are read; None where the answer has no such place."""
        answer = answer or self.answer
        if answer.analysis is None:
            return None
        if level == "project":
            return At(answer.analysis)
        if self.machine >= len(answer.analysis.machines):
            return None
        if level == "machine":
            return At(answer.analysis, self.machine)
        if _result(answer, self.machine, self.actuator) is None:
            return None
        return At(answer.analysis, self.machine, self.actuator)


def _result(answer: Answer, machine: int, actuator: int) -> ActuatorResult | None:
    if answer.analysis is None or machine >= len(answer.analysis.machines):
        return None
    actuators = answer.analysis.machines[machine].actuators
    return actuators[actuator] if actuator < len(actuators) else None


def in_effect(view: View) -> dict[str, str]:
    """Values that hold for the fields of this actuator's sheet, typed or by default, by their paths."""
    if view.answer.project is None or view.result is None:
        return {}
    found: dict[str, str] = {}
    for path in ("site", "plant", "money", "machine", ""):
        for field in field_values(view.answer, path, view.shown, machine=view.machine, actuator=view.actuator):
            found[field.path] = field.value
    return found


def cylinder_sections(view: View) -> tuple[Section, ...]:
    """Sections of the Cylinder workspace: all groups of the registry that Stroke does not show."""
    elsewhere = {LEDGER, SHARES, MONEY, *_stroke_groups()}
    own, machine, project = (
        [_group(view, level, title) for title in _titles(level) if title not in elsewhere] for level in LEVELS
    )
    first = [item for begin in CYLINDER_GROUPS for item in own if item.title.startswith(begin)]
    rest = [item for item in own if item not in first]
    sections = [_requirements(view), *first, *machine, _money(view), *project, *rest, _remarks(view)]
    return tuple(section for section in sections if section.rows)


def stroke_sections(view: View) -> tuple[Section, ...]:
    """Sections of the Stroke workspace, without the ledger."""
    sections = [_group(view, "actuator", title) for title in _stroke_groups()]
    return tuple(section for section in sections if section.rows)


def _titles(level: Level) -> list[str]:
    """Headings of a level, in the order of the registry."""
    return list(dict.fromkeys(figure.group for figure in FIGURES[level].values()))


def _stroke_groups() -> list[str]:
    titles = _titles("actuator")
    return [title for begin in STROKE_GROUPS for title in titles if title.startswith(begin)]


def ledger_sections(view: View) -> tuple[Section, ...]:
    """The exergy ledger: energy with the same decimals throughout, share and a bar for each item."""
    at = view.at("actuator")
    if at is None:
        return ()
    figures = _of_group("actuator", LEDGER)
    values = [figure.value(at) for figure in figures]
    factor, _, unit = scale(figures[0].kind, view.system, view.shown.reading)
    largest = max((abs(value) * factor for value in values if not isinstance(value, Refusal)), default=0.0)
    decimals = max(0, 4 - len(f"{largest:.0f}")) if largest else 0
    rows = []
    for figure, value in zip(figures, values, strict=True):
        share_key = figure.key.replace("cycle.exergy.", "cycle.exergy_share.")
        share_figure = FIGURES["actuator"].get(share_key)
        share = share_figure.value(at) if share_figure else 1.0
        row = _row(view, (figure,))
        if row is None:
            continue
        if isinstance(value, Refusal) or isinstance(share, Refusal):
            rows.append(row)
            continue
        rows.append(
            replace(
                row,
                cells=(_fixed(value * factor, decimals), f"{_fixed(share * 100.0, 1)} %"),
                unit="",
                changes=(*row.changes, "") if row.changes else (),
                share=share,
                figures=(*row.figures, f"actuator/{share_key}") if share_figure else row.figures,
            )
        )
    return (Section(title=LEDGER, rows=tuple(rows), heads=(unit, "share")),)


def _fixed(value: float, decimals: int) -> str:
    """A number with so many decimals; what rounds to zero has no sign."""
    text = f"{value:.{decimals}f}"
    return text.lstrip("-") if float(text) == 0.0 else text.replace("-", "−")


def _signed(margin: float) -> str:
    """``"+49 %"``: positive is good."""
    return f"{margin * 100.0:+.0f} %".replace("-", "−")


def _of_group(level: Level, title: str) -> list[Figure]:
    return [figure for figure in FIGURES[level].values() if figure.group == title]


def _group(view: View, level: Level, title: str) -> Section:
    """All figures of one group; both directions of a figure in one row."""
    rows: dict[str, list[Figure]] = {}
    for figure in _of_group(level, title):
        rows.setdefault(figure.row, []).append(figure)
    made = [_row(view, tuple(figures)) for figures in rows.values()]
    both = any(len(figures) > 1 for figures in rows.values())
    return Section(
        title=title,
        rows=tuple(row for row in made if row is not None),
        heads=("extend", "retract") if both else (),
    )


def _row(view: View, figures: tuple[Figure, ...]) -> Row | None:
    """One row: numbers, unit, reasons of refusals, and changes against the pin."""
    cells, reasons, changes, unit = [], [], [], ""
    for figure in figures:
        at = view.at(figure.level)
        if at is None:
            return None
        value = figure.value(at)
        if isinstance(value, Refusal):
            cells.append("–")
            reason = f"{figure.direction}: {value}" if len(figures) > 1 else str(value)
            reasons.append(reason)
        else:
            text, unit = view.shown.number(value, figure.kind)
            cells.append(text.replace("-", "−"))
        changes.append(_change(view, figure, value))
    if len(reasons) == 2 and len({reason.split(": ", 1)[1] for reason in reasons}) == 1:
        reasons = [reasons[0].split(": ", 1)[1]]
    first = figures[0]
    return Row(
        name=f"{first.level}/{first.row}",
        label=first.label,
        cells=tuple(cells),
        unit=unit,
        reasons=tuple(reasons),
        changes=tuple(changes) if any(changes) else (),
        figures=tuple(f"{figure.level}/{figure.key}" for figure in figures),
    )


def _change(view: View, figure: Figure, value: float | Refusal) -> str:
    """Difference to the pinned state, signed; empty where there is none to show."""
    at = view.at(figure.level, view.pin) if view.pin is not None else None
    if at is None or isinstance(value, Refusal):
        return ""
    before = figure.value(at)
    if isinstance(before, Refusal):
        return ""
    if value == before:
        return "="
    text = view.shown.number(abs(value - before), figure.kind)[0]
    return ("+" if value > before else "−") + text


def _money(view: View) -> Section:
    """Energy, money and carbon a year: of this actuator, of the machines of its kind, of all."""
    rows = []
    for figure in _of_group("actuator", MONEY):
        same = [FIGURES[level][figure.key] for level in LEVELS if figure.key in FIGURES[level]]
        made = [row for row in (_row(view, (item,)) for item in same) if row is not None]
        if len(made) != len(same):
            continue
        rows.append(
            Row(
                name=f"actuator/{figure.key}",
                label=figure.label,
                cells=tuple(row.cells[0] for row in made),
                unit=next((row.unit for row in made if row.unit), ""),
                reasons=tuple(dict.fromkeys(reason for row in made for reason in row.reasons)),
                changes=tuple(row.changes[0] for row in made if row.changes),
                figures=tuple(item for row in made for item in row.figures),
            )
        )
    return Section(title=MONEY, rows=tuple(rows), heads=("this", "machines", "all"))


def _requirements(view: View) -> Section:
    """What the job asks, each with its verdict and margin."""
    result = view.result
    if result is None:
        return Section(title="Requirements", rows=())
    rows = []
    for item in result.criteria:
        figure = criterion_figure(item)
        wanted, got = shown_criterion(item, view)
        rows.append(
            Row(
                name=f"criterion/{item.name}/{item.direction}",
                label=f"{SIGNS[item.verdict]} {label_of_requirement(item.name)}"
                + (f", {item.direction}" if item.direction else ""),
                cells=(got, wanted, "–" if isinstance(item.margin, Refusal) else _signed(item.margin)),
                reasons=(str(item.got),) if isinstance(item.got, Refusal) else (),
                figures=(f"actuator/{figure.key}",) if figure else (),
            )
        )
    return Section(title="Requirements", rows=tuple(rows), heads=("got", "wanted", "margin"))


def criterion_figure(item: Criterion) -> Figure | None:
    """The figure that a requirement is judged by."""
    for figure in FIGURES["actuator"].values():
        name = figure.key.split(".")[-1].removesuffix("_" + figure.direction if figure.direction else "")
        if name == item.name and figure.direction == item.direction:
            return figure
    return None


def shown_criterion(item: Criterion, view: View) -> tuple[str, str]:
    """Wanted as typed, and got: ``("≤ 1.2 s", "0.6140 s")``."""
    kind = kind_of_requirement(item.name)
    sign = "≤" if item.name in UPPER else "≥"
    got = "–" if isinstance(item.got, Refusal) else view.shown.text(item.got, kind).replace("-", "−")
    path = f"machine.{view.machine + 1}.actuator.{view.actuator + 1}.require.{item.name}"
    wanted = view.answer.document.text(path) or view.shown.text(item.wanted, kind)
    return f"{sign} {wanted}", got


def _remarks(view: View) -> Section:
    """What the reader should know, in words."""
    result = view.result
    if result is None or view.answer.analysis is None:
        return Section(title="Remarks", rows=())
    texts = [] if isinstance(result.air, Refusal) else [result.air.difference]
    texts += [*result.remarks, *result.indicator.remarks]
    if not isinstance(result.stroke, Refusal):
        texts += result.stroke.remarks
    texts += view.answer.analysis.remarks
    rows = tuple(
        Row(name=f"remark/{number}", label="", cells=(), reasons=(text,))
        for number, text in enumerate(dict.fromkeys(text for text in texts if text))
    )
    return Section(title="Remarks", rows=rows)
