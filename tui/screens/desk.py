"""The desk: title, chooser of the actuator, sheet, workspace, verdict line. It shows; the app decides."""

from __future__ import annotations

from typing import TYPE_CHECKING

from textual import events, on
from textual.app import ComposeResult
from textual.containers import Horizontal, Vertical
from textual.screen import Screen
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

    def __init__(self, session: Session, place: Place, keys: list[tuple[str, str, str]]) -> None:
        super().__init__()
        self._keys = keys
        self._session, self._place = session, place
        self._view: View | None = None
        self._glyphs: Glyphs = "braille"
        self._waiting = ""

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

    def show_state(self, state: str, sound: bool) -> None:
        """Say whether the figures are those of the document as it stands."""
        self.query_one(Chooser).say(state, sound)

    def show_working(self) -> None:
        """Say that an answer is on its way; out of date stays out of date until it comes."""
        self.query_one(Chooser).work()

    def show_problems(self, problems: tuple[Problem, ...]) -> None:
        """Put problems beside their fields, and all of them above the workspace."""
        self.query_one(Sheet).mark(problems)
        self.query_one(Problems).show(problems)

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

    def show_view(self, view: View | None, glyphs: Glyphs) -> None:
        """Show the figures of one actuator."""
        self._view, self._glyphs = view, glyphs
        if view is not None:
            self._fill()
            self.query_one(Verdict).show(view, glyphs == "ascii")

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

    def chosen_row(self, name: str) -> Row | None:
        """The row of a name among the tables of this workspace, or the one chosen in its first table."""
        tables = list(self._workspace().query(Figures))
        found = [row for figures in tables if (row := figures.row(name)) is not None]
        return found[0] if found else next((figures.row(figures.chosen) for figures in tables), None)

    def about(self, text: str) -> None:
        """Two lines about what is under the hands."""
        self.query_one(About).say(text)
