"""What is looked at: workspaces, plots, figures with their workings and cautions, units, pin, windows."""

from __future__ import annotations

import pytest
from textual.widgets import Input

from actuator.report.figures import FIGURES
from actuator.settings import Settings
from tests.tui.bench import BORE, Quick, at_desk, drain, field, one, plant, seen, settled, shows, solved
from tui.actions import ACTIONS, key_text
from tui.app import Design
from tui.screens.dialogs import Ask, Reader
from tui.screens.stroke import Stroke
from tui.shown import View, cylinder_sections, ledger_sections, stroke_sections
from tui.widgets.figures import Figures
from tui.widgets.page import Page
from tui.widgets.plot import Plot


async def test_the_workspace_stroke_shows_plots_loops_ledger_and_half_strokes() -> None:
    app = Quick(one())
    async with app.run_test(size=(160, 50)) as pilot:
        await settled(app, pilot)
        assert not app.desk.query(Stroke)
        await pilot.press("f3")
        await pilot.pause()
        titles = ["Position", "Speed", "Pressures", "p-V, cap side", "p-V, rod side"]
        assert shows(app, *titles, "◇ ideal", "● simulated", "Exergy of a cycle", "Stroke time")
        assert shows(app, "[mm]", "[m/s]", "[bar gauge]", "cm3", "% ")
        app.action_do("view.glyphs")
        await pilot.pause()
        assert not any(0x2800 < ord(char) < 0x2900 for line in seen(app) for char in line)
        app.action_do("view.glyphs")
        await pilot.pause()
        assert shows(app, "I ideal", "C simulated")
        await pilot.press("f2")
        await pilot.pause()
        assert shows(app, "Theoretical force")
        assert not shows(app, "p-V, cap side")


async def test_the_reading_line_moves_in_all_plots_at_once() -> None:
    app = Quick(one())
    async with app.run_test(size=(160, 50)) as pilot:
        await settled(app, pilot)
        await pilot.press("f3", "f6", "right", "right")
        await pilot.pause()
        plots = list(app.desk.query(Plot))
        assert len({plot.at for plot in plots}) == 1
        assert plots[0].at is not None
        assert plots[0].at > 2.0
        assert sum("at 2.0" in line for line in seen(app)) >= 2
        await pilot.press("end")
        assert plots[0].at == pytest.approx(4.0)
        await pilot.press("right")
        assert plots[0].at == pytest.approx(4.0)
        await pilot.press("escape")
        assert {plot.at for plot in plots} == {None}


async def test_the_mouse_puts_the_reading_line_and_chooses_figures_and_workspaces() -> None:
    app = Quick(plant())
    async with app.run_test(size=(160, 50)) as pilot:
        await settled(app, pilot)
        await pilot.click("#head", offset=(156, 0))
        await pilot.pause()
        assert shows(app, "p-V, cap side")
        await pilot.click("#position", offset=(30, 4))
        assert app.desk.query_one("#speed", Plot).at is not None
        await pilot.click("#motion", offset=(4, 3))
        row = app.desk.chosen_row()
        assert row is not None
        assert row.name == app.desk.query_one("#motion", Figures).chosen == "actuator/settled_time"
        await pilot.click("#chooser", offset=(1, 0))
        assert app.place.name == "Lid press / Stopper"
        await pilot.click("#keys", offset=(1, 0))
        await pilot.pause()
        assert isinstance(app.screen, Reader)


async def test_the_working_of_the_chosen_figure_is_one_key_away() -> None:
    app = Quick(one())
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        await pilot.press("f6")
        figures = app.desk.query_one(Figures)
        figures.chosen = "actuator/static.theoretical"
        await pilot.press("f4")
        await pilot.pause()
        await pilot.pause()
        assert isinstance(app.screen, Reader)
        assert shows(app, "Formula", "π/4·D²", "Put in", "50", "typed", "Sources")
        await pilot.press("escape")
        assert at_desk(app)
        await pilot.press("enter")
        await pilot.pause()
        assert isinstance(app.screen, Reader)


def test_every_figure_of_the_registry_is_on_a_screen_and_every_row_leads_to_its_working() -> None:
    view = View(answer=solved(plant().source), machine=0, actuator=0)
    sections = (*cylinder_sections(view), *stroke_sections(view), *ledger_sections(view))
    rows = [row for section in sections for row in section.rows if row.label]
    assert all(row.figures for row in rows)
    shown = {figure for row in rows for figure in row.figures}
    assert shown == {f"{level}/{key}" for level, figures in FIGURES.items() for key in figures}


async def test_cautions_are_one_key_away_and_defer_to_local_codes() -> None:
    app = Quick(plant())
    async with app.run_test(size=(120, 40)) as pilot:
        await settled(app, pilot)
        await pilot.press("f8", "f5")
        await pilot.pause()
        await pilot.pause()
        assert isinstance(app.screen, Reader)
        body = "\n".join(app.screen.query_one(Page).lines)
        assert "local codes" in body
        assert "licensed practitioner" in body
        assert "!" in body


async def test_help_names_every_action_and_its_key() -> None:
    app = Quick(one())
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        await pilot.press("f1")
        await pilot.pause()
        await pilot.pause()
        body = " ".join("\n".join(app.screen.query_one(Page).lines).split())
        for action in ACTIONS.values():
            assert action.title in body
            assert key_text(action.keys) in body


async def test_the_palette_reaches_every_action() -> None:
    app = Quick(one())
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        offered = {command.title for command in app.get_system_commands(app.screen)}
        assert offered == {action.title for action in ACTIONS.values()}
        await pilot.press("ctrl+p")
        await pilot.pause()
        await pilot.press(*"units", "enter")
        await pilot.pause(0.3)
        await drain(app)
        assert app.system == "us"


async def test_units_turn_and_what_was_typed_stays() -> None:
    app = Quick(one())
    async with app.run_test(size=(160, 50)) as pilot:
        await settled(app, pilot)
        assert shows(app, "Theoretical force")
        assert not shows(app, "lbf")
        await pilot.press("ctrl+t")
        await pilot.pause()
        assert shows(app, "lbf")
        assert field(app, BORE).value == "50 mm"
        await pilot.press("f3")
        await pilot.pause()
        assert shows(app, "[psi gauge]", "[in]")


async def test_settings_give_units_and_keys() -> None:
    app = Quick(one(), Settings(units="us", keys={"edit.undo": "ctrl+u"}))
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        assert shows(app, "lbf")
        app.desk.set_focus(None)
        app.session = app.session.edited(BORE, "63 mm")
        await pilot.press("ctrl+u")
        await pilot.pause()
        assert app.session.text(BORE) == "50 mm"


async def test_a_pin_shows_differences_and_can_be_taken_away() -> None:
    app = Design(one(), Settings())
    async with app.run_test(size=(160, 50)) as pilot:
        await settled(app, pilot)
        await pilot.press("ctrl+r")
        await pilot.pause()
        assert shows(app, "pinned", "from the pin")
        before = app.answer
        await pilot.press("home", "delete", "6")
        await settled(app, pilot)
        assert before is not None
        assert app.answer is not None
        assert app.pin is before
        now, then = (
            item.analysis.machines[0].actuators[0].static.theoretical_extend
            for item in (app.answer, before)
            if item.analysis is not None
        )
        rows = seen(app)
        place = next(number for number, line in enumerate(rows) if "Theoretical force" in line)
        assert f"+{now - then:.1f}" in rows[place + 1]
        await pilot.press("ctrl+r")
        await pilot.pause()
        assert not shows(app, "from the pin")


async def test_windows_keep_their_keys_to_themselves_and_quitting_twice_asks_once() -> None:
    app = Quick(one())
    async with app.run_test(size=(100, 30)) as pilot:
        await settled(app, pilot)
        await pilot.press("f12")
        await pilot.pause()
        entry = app.screen.query_one(Input)
        await pilot.press(*"abc")
        assert entry.value.endswith("abc")
        assert app.session.revision == 0
        await pilot.press("escape")
        assert at_desk(app)
        await pilot.press("1", "ctrl+q", "ctrl+q")
        await pilot.pause()
        assert isinstance(app.screen, Ask)
        await pilot.press("escape")
        await pilot.pause()
        assert at_desk(app)
