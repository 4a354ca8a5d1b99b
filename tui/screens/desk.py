"""The desk: title, chooser of the actuator, sheet, workspace, verdict line. It shows; the app decides."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING, Any

from textual import events, on
from textual.app import ComposeResult
from textual.containers import Horizontal, Vertical
from textual.message import Message
from textual.reactive import Reactive
from textual.screen import Screen
from textual.widget import Widget
from textual.widgets import ContentSwitcher, Static

from actuator.errors import Problem
from tui.screens.cylinder import Cylinder
from tui.screens.stroke import Stroke
from tui.widgets.about import About
from tui.widgets.field import Field
from tui.widgets.figures import Figures
from tui.widgets.head import Chooser, Head
from tui.widgets.keys import Keys
from tui.widgets.plot import Plot
from tui.widgets.problems import Problems
from tui.widgets.sheet import Sheet
from tui.widgets.verdict import Verdict

if TYPE_CHECKING:
    from actuator.answer import Answer
    from actuator.unit_table import System
    from tui.session import Place, Session
    from tui.shown import View
    from tui.tables import Row
    from tui.widgets.raster import Glyphs

WORKSPACES: dict[str, tuple[str, type[Cylinder] | type[Stroke]]] = {
    "cylinder": ("Cylinder", Cylinder),
    "stroke": ("Stroke", Stroke),
}


class Desk(Screen[None]):
    """One screen; workspaces are built when they are first visited."""

    AUTO_FOCUS = ""
    HORIZONTAL_BREAKPOINTS = [  # noqa: RUF012  (an instance's attribute in Textual)
        (0, "-narrow"),
        (100, "-middle"),
        (140, "-wide"),
    ]

    focused: Reactive[Widget | None] = Reactive(None, repaint=False)
    """As Textual has it, but what gets or loses the focus repaints itself, not the whole screen."""

    @dataclass
    class Wanted(Message):
        """Something of the table of actions was asked for with the mouse, or by a widget."""

        name: str
        arguments: tuple[Any, ...] = ()

    def __init__(self, session: Session, place: Place, keys: list[tuple[str, str, str]]) -> None:
        super().__init__()
        self._keys = keys
        self._session, self._place = session, place
        self._view: View | None = None
        self._glyphs: Glyphs = "braille"
        self._waiting = ""
        self._table: Figures | None = None

    def compose(self) -> ComposeResult:
        """All that is always there."""
        yield Head({key: name for key, (name, _) in WORKSPACES.items()}, id="head")
        yield Chooser(id="chooser")
        with Horizontal(id="body"):
            yield Sheet(self._session, (self._place.machine, max(self._place.actuator, 1)), id="sheet")
            with Vertical(id="side"):
                yield Problems(id="problems")
                yield Static("", id="waiting", markup=False)
                yield ContentSwitcher(id="view")
        yield About(id="about")
        yield Verdict(id="verdict")
        yield Keys(self._keys, id="keys")

    async def on_mount(self) -> None:
        """Open the first workspace, and type where it matters."""
        await self.go("cylinder")
        self.call_after_refresh(self._ready)

    def _ready(self) -> None:
        sheet = self.query_one(Sheet)
        sheet.complete()
        bore = sheet.field(f"machine.{self._place.machine}.actuator.{max(self._place.actuator, 1)}.bore")
        if bore is not None and self.focused is None:
            bore.focus(scroll_visible=False)

    # --- what is shown -------------------------------------------------------------------------------

    def show_session(self, session: Session, place: Place, index: int, count: int) -> None:
        """Show the document as it stands."""
        self._session, self._place = session, place
        self.query_one(Head).show(session)
        self.query_one(Chooser).show(place.name, index, count)
        self.query_one(Sheet).show(session, (place.machine, max(place.actuator, 1)))

    def show_outcome(self, problems: tuple[Problem, ...], *, figures: bool, pinned: bool) -> None:
        """Say whether the figures are those of the document as it stands, and what is wrong with it."""
        self.query_one(Sheet).mark(problems)
        self.query_one(Problems).show(problems)
        count = f"{len(problems)} problem{'' if len(problems) == 1 else 's'}"
        if problems:
            self.query_one(Chooser).say(f"! OUT OF DATE: {count}" if figures else f"! {count}", sound=False)
        else:
            self.query_one(Chooser).say("up to date, pinned" if pinned else "up to date", sound=True)
        self.show_waiting("" if figures else "No figures until the problems above are put right.")

    def show_working(self) -> None:
        """Say that an answer is on its way; out of date stays out of date until it comes."""
        self.query_one(Chooser).work()

    @property
    def problems(self) -> tuple[Problem, ...]:
        """Those that are listed."""
        return self.query_one(Problems).problems

    def show_waiting(self, text: str) -> None:
        """Say why there are no figures yet; empty once there are some."""
        waiting = self.query_one("#waiting", Static)
        if text != self._waiting:
            self._waiting = text
            waiting.update(text)
            waiting.display = bool(text)
            self.query_one("#view").display = not text

    def show_view(self, answer: Answer, place: Place, system: System, pin: Answer | None, glyphs: Glyphs) -> None:
        """Show the figures of one actuator of an answer."""
        from tui.shown import View

        machine, actuator = place.machine - 1, max(place.actuator, 1) - 1
        self._view = View(answer=answer, machine=machine, actuator=actuator, system=system, pin=pin)
        self._glyphs = glyphs
        self._fill()
        self.query_one(Verdict).show(self._view, glyphs == "ascii")
        self.call_later(self._hint, self._view)

    def _hint(self, view: View) -> None:
        """Show the values that hold where fields are left out; not together with all else, to be quick."""
        from tui.shown import in_effect

        if view is self._view:
            self.query_one(Sheet).hint(in_effect(view))

    def _fill(self) -> None:
        if self._view is not None:
            self._workspace().show(self._view, self._glyphs)

    def _workspace(self) -> Cylinder | Stroke:
        """The workspace that is seen."""
        switcher = self.query_one("#view", ContentSwitcher)
        shown = switcher.get_child_by_id(switcher.current or "")
        assert isinstance(shown, Cylinder | Stroke)
        return shown

    # --- where one is --------------------------------------------------------------------------------

    async def go(self, key: str) -> None:
        """Go to a workspace; it is built at the first visit."""
        switcher = self.query_one("#view", ContentSwitcher)
        if switcher.current == key:
            return
        if self.focused is not None and switcher in self.focused.ancestors:
            self.set_focus(None)  # a hidden widget would keep the keys
        if not switcher.query_children(f"#{key}"):
            await switcher.add_content(WORKSPACES[key][1](id=key), id=key)
        switcher.current = key
        self.query_one(Head).choose(key)
        self._fill()

    def other_side(self) -> None:
        """Take the focus from the sheet to the workspace, or back."""
        if isinstance(self.focused, Field):
            self.set_focus(next(iter(self._workspace().query("Plot, Figures")), None))
        elif self.query_one("#sheet").display:
            self._last_field().focus()

    def _last_field(self) -> Field:
        fields = list(self.query_one(Sheet).fields())
        return next((field for field in fields if field.has_class("-last")), fields[0])

    def turn_sheet(self) -> None:
        """Hide the sheet, so that the workspace has the whole width, or show it again."""
        sheet = self.query_one("#sheet")
        sheet.display = not sheet.display
        if not sheet.display and isinstance(self.focused, Field):
            self.set_focus(next(iter(self._workspace().query("Plot, Figures")), None))

    def go_to(self, path: str) -> bool:
        """Take the focus to the field of a path (or of what it belongs to); whether there is one."""
        sheet = self.query_one(Sheet)
        while path:
            field = sheet.field(path)
            if field is not None:
                sheet.display = True
                field.display = True
                field.focus()
                return True
            path = path.rpartition(".")[0]
        return False

    @on(events.DescendantFocus)
    def _tell(self, event: events.DescendantFocus) -> None:
        """Say what the focused thing is."""
        widget = event.widget
        if isinstance(widget, Field):
            for field in self.query(".-last"):
                field.remove_class("-last")
            widget.add_class("-last")
            spec = widget.spec
            default = f" Left out: {spec.default}." if spec.default else ""
            example = f" E.g. {spec.example}" if spec.example else ""
            choices = f" One of {', '.join(spec.choices)} (enter)." if spec.choices else ""
            self.about(f"{spec.label}: {spec.help}{choices}{default}{example}")
        elif isinstance(widget, Plot):
            self.about("← → move the reading line, shift for far, home and end, esc takes it away")
        elif isinstance(widget, Figures):
            self.about("↑ ↓ choose a figure, enter shows its working, F5 its cautions")

    def chosen_row(self) -> Row | None:
        """The figure that was chosen last in this workspace, or the first one."""
        tables = list(self._workspace().query(Figures))
        table = next((table for table in tables if table is self._table), tables[0])
        return table.row(table.chosen)

    @on(Figures.Chosen)
    def _take_choice(self, event: Figures.Chosen) -> None:
        """Working and cautions are asked for in this table from here on."""
        self._table = event.figures

    @on(Figures.Opened)
    def _take_opened(self) -> None:
        self.post_message(self.Wanted("figure.working"))

    @on(Keys.Pressed)
    def _take_key(self, event: Keys.Pressed) -> None:
        self.post_message(self.Wanted(event.name))

    @on(Head.Go)
    def _take_go(self, event: Head.Go) -> None:
        self.post_message(self.Wanted(f"go.{event.key}"))

    @on(Chooser.Step)
    def _take_step(self, event: Chooser.Step) -> None:
        self.post_message(self.Wanted({-1: "go.before", 1: "go.after", 0: "go.list"}[event.by]))

    @on(Field.Choose)
    def _take_choose(self, event: Field.Choose) -> None:
        self.post_message(self.Wanted("field.choose", (event.field,)))

    @on(Problems.Picked)
    def _take_problem(self, event: Problems.Picked) -> None:
        self.post_message(self.Wanted("go.problem", (event.number,)))

    def about(self, text: str) -> None:
        """Two lines about what is under the hands."""
        self.query_one(About).say(text)
