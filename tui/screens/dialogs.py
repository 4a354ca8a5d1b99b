"""Small windows over the desk: a question, a list, one line of text, something to read."""

from __future__ import annotations

from collections.abc import Callable
from typing import ClassVar

from textual import on
from textual.app import ComposeResult
from textual.binding import Binding, BindingType
from textual.containers import Horizontal, Vertical, VerticalScroll
from textual.screen import ModalScreen
from textual.widgets import Button, Input, OptionList, Static
from textual.widgets.option_list import Option

from tui.widgets.page import Page


class Ask(ModalScreen[str]):
    """A question with a few answers; escape gives the last one."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("escape", "leave", "Back", show=False),
        Binding("left", "app.focus_previous", "Answer before", show=False),
        Binding("right", "app.focus_next", "Answer after", show=False),
    ]

    def __init__(self, title: str, text: str, answers: dict[str, str]) -> None:
        super().__init__()
        self._title, self._text, self._answers = title, text, answers

    def compose(self) -> ComposeResult:
        """Title, text, one button an answer."""
        with Vertical(classes="window"):
            yield Static(self._title, classes="window-title", markup=False)
            with VerticalScroll(classes="window-text", can_focus=False):
                yield Static(self._text, markup=False)
            with Horizontal(classes="window-answers"):
                for name, label in self._answers.items():
                    yield Button(label, id=name, compact=True)

    @on(Button.Pressed)
    def _answered(self, event: Button.Pressed) -> None:
        self.dismiss(event.button.id)

    def action_leave(self) -> None:
        """Give the last answer."""
        self.dismiss(list(self._answers)[-1])


class Pick(ModalScreen[int | None]):
    """One of a list; escape gives None."""

    BINDINGS: ClassVar[list[BindingType]] = [Binding("escape", "dismiss(None)", "Back", show=False)]

    def __init__(self, title: str, options: list[str], present: int | None) -> None:
        super().__init__()
        self._title, self._options, self._present = title, options, present

    def compose(self) -> ComposeResult:
        """Title and list."""
        with Vertical(classes="window"):
            yield Static(self._title, classes="window-title", markup=False)
            listed = OptionList(*[Option(text) for text in self._options], markup=False)
            listed.highlighted = self._present
            yield listed
            yield Static("enter take   esc back", classes="window-keys", markup=False)

    @on(OptionList.OptionSelected)
    def _taken(self, event: OptionList.OptionSelected) -> None:
        self.dismiss(event.option_index)


class Entry(ModalScreen[str | None]):
    """One line of text, checked when entered; escape gives None."""

    BINDINGS: ClassVar[list[BindingType]] = [Binding("escape", "dismiss(None)", "Back", show=False)]

    def __init__(self, title: str, text: str, check: Callable[[str], str]) -> None:
        super().__init__()
        self._title, self._text, self._check = title, text, check

    def compose(self) -> ComposeResult:
        """Title, text, what is wrong with it."""
        with Vertical(classes="window"):
            yield Static(self._title, classes="window-title", markup=False)
            yield Input(self._text, select_on_focus=False, compact=True)
            yield Static("", classes="window-problem", markup=False)
            yield Static("enter take   esc back", classes="window-keys", markup=False)

    @on(Input.Submitted)
    def _entered(self, event: Input.Submitted) -> None:
        fault = self._check(event.value)
        if fault:
            self.query_one(".window-problem", Static).update("! " + fault)
        else:
            self.dismiss(event.value)


class Reader(ModalScreen[None]):
    """Something to read: a working, the cautions, help."""

    BINDINGS: ClassVar[list[BindingType]] = [Binding("escape,q,enter,f1,f4,f5", "dismiss(None)", "Back", show=False)]

    def __init__(self, title: str, text: Callable[[int], str]) -> None:
        super().__init__()
        self._title, self._text = title, text

    def compose(self) -> ComposeResult:
        """Title and text; the text is asked for once the width is known."""
        with Vertical(classes="window -tall"):
            yield Static(self._title, classes="window-title", markup=False)
            yield Page(id="page")
            yield Static("↑ ↓ scroll   esc back", classes="window-keys", markup=False)

    def on_resize(self) -> None:
        """Wrap to the window."""
        self.call_after_refresh(self._fill)

    def _fill(self) -> None:
        page = self.query_one(Page)
        page.show(self._text(max(page.size.width - 2, 30)))
        page.focus()
