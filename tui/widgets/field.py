"""One entry of the document in one row: label, text as typed, and what is wrong with it below."""

from __future__ import annotations

from dataclasses import dataclass
from textwrap import wrap
from typing import TYPE_CHECKING, ClassVar

from rich.cells import cell_len, set_cell_size
from rich.segment import Segment
from textual import events
from textual.binding import Binding, BindingType
from textual.geometry import Region, Size, Spacing
from textual.message import Message
from textual.reactive import reactive
from textual.strip import Strip
from textual.widgets import Input

if TYPE_CHECKING:
    from actuator.project.schema import SheetField


_EDITING = {
    key: binding.action
    for binding in Input.BINDINGS
    if isinstance(binding, Binding) and binding.action.startswith(("cursor_", "delete_", "home", "end"))
    for key in binding.key.split(",")
}
"""Keys that move the cursor or delete, and what they do."""


class Field(Input):
    """A field of the sheet. Its text is the document's; it is never corrected or held back."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("up", "step(-1)", "Field above", show=False),
        Binding("down", "step(1)", "Field below", show=False),
        Binding("ctrl+up", "turn(-1)", "Choice before", show=False),
        Binding("ctrl+down", "turn(1)", "Choice after", show=False),
        Binding("enter", "choose", "Choices", show=False),
    ]
    COMPONENT_CLASSES: ClassVar[set[str]] = {"field--label", "field--problem"}
    DEFAULT_CSS = """
    Field, Field:focus, Field.-invalid {
        height: 1;
        border: none;
        padding: 0 2 0 24;
        background: transparent;
    }
    Field:focus { background: $boost; }
    Field > .field--label { color: $foreground 75%; }
    Field:focus > .field--label { color: $foreground; text-style: bold; }
    Field > .field--problem { color: $text-error; }
    """

    virtual_size: reactive[Size] = reactive(Size(0, 0), layout=False)  # text of any length keeps its row
    label_width: reactive[int] = reactive(22, init=False)
    problem: reactive[str] = reactive("", init=False)

    @dataclass
    class Choose(Message):
        """The user wants to see the choices of a field."""

        field: Field

        @property
        def control(self) -> Field:
            """The field."""
            return self.field

    def __init__(self, spec: SheetField, text: str) -> None:
        super().__init__(text, select_on_focus=False)
        self.spec = spec
        self.taken = text
        self._holds = ""
        self._state: tuple[object, ...] | None = None
        self._rows: list[Strip] = []

    async def _on_key(self, event: events.Key) -> None:
        """Edit at once and in order: a bound key would go round by the app, and what is typed next overtake it."""
        action = _EDITING.get(event.key)
        if action is None:
            await super()._on_key(event)
            return
        event.stop()
        event.prevent_default()
        await self.run_action(action)

    def on_mount(self) -> None:
        """Lay out for the first time."""
        self._fit()

    def address(self, spec: SheetField, text: str) -> None:
        """Stand for another path of the same shape, without being built anew."""
        self.spec = spec
        self.taken = self.value
        self._holds = ""
        self.put(text)
        self._fit()
        self.refresh()

    def put(self, text: str) -> None:
        """Show the document's text without reporting it as typed.

        What is typed and not yet taken into the document stays: its report is on the way, and puts it there.
        """
        if self.value != self.taken:
            return
        self.taken = text
        if self.value != text:
            with self.prevent(Input.Changed):
                self.value = text

    def hint(self, value: str) -> None:
        """Show in grey the value that holds while the field is left out."""
        if value != self._holds:
            self._holds = value
            self._fit()

    def watch_label_width(self) -> None:
        """Move the text to the right of the label."""
        self._fit()

    def watch_problem(self) -> None:
        """Grow by the lines of the problem."""
        self._fit()
        self.refresh()

    def on_resize(self, event: events.Resize) -> None:  # noqa: ARG002
        """Wrap the problem and cut the hint to the width."""
        self._fit()

    def _fit(self) -> None:
        """Set padding, height and hint to what there is room for."""
        padding, height = Spacing(0, 2, 0, self.label_width + 2), 1 + len(self._told())
        if self.styles.padding != padding:
            self.styles.padding = padding
        if self.styles.height is None or self.styles.height.value != height:
            self.styles.height = height
        room = max(self.outer_size.width - self.label_width - 4, 8)
        otherwise = self.spec.default or (f"e.g. {self.spec.example}" if self.spec.example else "left out")
        hint = self._holds or otherwise
        self.placeholder = hint if len(hint) <= room else hint[: room - 1] + "…"

    def _told(self) -> list[str]:
        """The problem in lines of the field's width."""
        if not self.problem:
            return []
        return wrap(self.problem, max(self.outer_size.width - 5, 16), break_on_hyphens=False)

    def render_lines(self, crop: Region) -> list[Strip]:
        """Label, the input's own line, a mark for choices, then the problem."""
        state = (
            (self.value, self.placeholder, self.selection, self.scroll_offset.x, self._cursor_visible),
            (self.has_focus, self.mouse_hover, self.problem, self.label_width, self.outer_size, self.spec),
        )
        if state != self._state:
            width, left = self.outer_size.width, self.label_width + 2
            if self.has_focus:
                text = super().render_lines(Region(0, 0, width, 1))[0].crop(left, width - 2)
            else:
                text = self._at_rest(max(width - left - 2, 0))
            self._state, self._rows = state, self._drawn(text)
        blank = crop.bottom - len(self._rows)
        rows = self._rows + [Strip.blank(self.outer_size.width, self.rich_style)] * blank if blank > 0 else self._rows
        whole = crop.x <= 0 and crop.right >= self.outer_size.width
        rows = rows[crop.y : crop.bottom]
        return rows if whole else [row.crop(crop.x, crop.right) for row in rows]

    def _at_rest(self, room: int) -> Strip:
        """The text from its start, without a cursor; that it goes on is said by a sign."""
        style = self.rich_style if self.value else self.get_component_rich_style("input--placeholder")
        text = self.value or self.placeholder
        if cell_len(text) > room > 0:
            text = set_cell_size(text, room - 1) + "…"
        return Strip([Segment(text, style)]).adjust_cell_length(room, self.rich_style)

    def _drawn(self, text: Strip) -> list[Strip]:
        """All rows, whole."""
        width = self.outer_size.width
        plain = self.get_component_rich_style("field--label")
        bad = self.get_component_rich_style("field--problem")
        sign = "!" if self.problem else "›" if self.has_focus else " "
        label = self.spec.label
        if len(label) > self.label_width:
            label = label[: self.label_width - 1] + "…"
        head = [Segment(sign, bad if self.problem else plain), Segment(label.ljust(self.label_width) + " ", plain)]
        tail = [Segment(" ▾" if self.spec.choices else "  ", plain)]
        rows = [Strip.join([Strip(head), text, Strip(tail)])]
        for number, line in enumerate(self._told()):
            start = "  └ " if number == 0 else "    "
            rows.append(Strip([Segment((start + line)[:width].ljust(width), bad)]))
        return rows

    def notify_style_update(self) -> None:
        """Take the colours of another theme."""
        super().notify_style_update()
        self._state = None

    def action_step(self, by: int) -> None:
        """Go to the field above or below."""
        if by < 0:
            self.screen.focus_previous(Field)
        else:
            self.screen.focus_next(Field)

    def action_turn(self, by: int) -> None:
        """Take the choice before or after, as if it were typed."""
        choices = self.spec.choices
        if choices:
            place = choices.index(self.value) + by if self.value in choices else 0
            self.value = choices[place % len(choices)]

    def action_choose(self) -> None:
        """Ask for the list of choices; go on to the next field where there is none."""
        if self.spec.choices:
            self.post_message(self.Choose(self))
        else:
            self.action_step(1)

    def on_click(self, event: events.Click) -> None:
        """Open the list where its mark is clicked."""
        if self.spec.choices and event.x >= self.outer_size.width - 2:
            self.post_message(self.Choose(self))
