"""The screens in use: edits, answers, problems, undo, workspaces, actuators, windows."""

from __future__ import annotations

import pytest
from textual.widgets import Input

from actuator.project.document import parse
from actuator.report.figures import FIGURES
from actuator.settings import Settings
from tests.tui.bench import BORE, ONE, Quick, drain, field, one, plant, seen, settled, solved
from tui.actions import ACTIONS, key_text
from tui.app import Design
from tui.screens.dialogs import Ask, Pick, Reader
from tui.screens.stroke import Stroke
from tui.shown import View, cylinder_sections, ledger_sections, stroke_sections
from tui.widgets.field import Field
from tui.widgets.figures import Figures
from tui.widgets.page import Page
from tui.widgets.plot import Plot
from tui.widgets.problems import Problems


def shows(app: Design, *texts: str) -> bool:
    """Whether all texts are on the screen."""
    everything = "\n".join(seen(app))
    return all(text in everything for text in texts)


def at_desk(app: Design) -> bool:
    """Whether no window stands over the desk."""
    return app.screen is app.desk


async def test_typing_is_answered_by_the_real_worker_and_undo_brings_text_and_figures_back() -> None:
    app = Design(one(), Settings())
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        assert app.answer is not None
        first = [line for line in seen(app) if "Theoretical force" in line]
        assert field(app, BORE).has_focus
        await pilot.press("home", "delete", "8")  # 50 mm becomes 80 mm
        await settled(app, pilot)
        assert app.session.text(BORE) == "80 mm"
        assert app.answer.document.text(BORE) == "80 mm"
        assert [line for line in seen(app) if "Theoretical force" in line] != first
        await pilot.press("ctrl+z")
        await settled(app, pilot)
        assert field(app, BORE).value == "50 mm"
        assert [line for line in seen(app) if "Theoretical force" in line] == first
        await pilot.press("ctrl+y")
        await settled(app, pilot)
        assert field(app, BORE).value == "80 mm"


async def test_what_cannot_be_read_stays_as_typed_with_its_problem_below_and_the_figures_out_of_date() -> None:
    app = Quick(one())
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        assert shows(app, "up to date", "Theoretical force")
        await pilot.press(*"oops")
        await settled(app, pilot)
        assert app.session.text(BORE) == "50 mmoops"
        assert field(app, BORE).problem
        assert shows(app, "50 mmoops", "└", "OUT OF DATE: 1 problem", "Theoretical force")
        await pilot.press(*["backspace"] * 4)
        await settled(app, pilot)
        assert not field(app, BORE).problem
        assert shows(app, "up to date")
        assert app.desk.query_one(Problems).size.height == 0


async def test_a_document_that_never_was_valid_says_so_in_place_of_figures() -> None:
    app = Quick(one())
    app.known = solved(ONE)
    broken = Design(parse(ONE.replace('"50 mm"', '"50 furlongs"')), Settings())
    async with broken.run_test(size=(100, 30)) as pilot:
        await settled(broken, pilot)
        assert broken.answer is None
        assert shows(broken, "No figures until the problems above are put right.", "50 furlongs")


async def test_text_that_is_no_toml_opens_and_names_the_line() -> None:
    app = Design(parse(ONE + "\nthis is no TOML\n"), Settings())
    async with app.run_test(size=(100, 30), notifications=True) as pilot:
        await settled(app, pilot)
        assert shows(app, "line 26", "TOML")
        await pilot.press("x")
        await pilot.pause()
        assert field(app, BORE).value == ""
        assert app.session.revision == 0
        await pilot.pause(0.1)
        assert shows(app, "Not possible here")


async def test_a_failing_calculation_is_told_and_the_figures_stay(monkeypatch: pytest.MonkeyPatch) -> None:
    app = Design(one(), Settings())
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)

        def fails(*_: object) -> None:
            raise ZeroDivisionError("made to fail")

        monkeypatch.setattr("actuator.answer.work_out", fails)
        await pilot.press("1")
        await settled(app, pilot)
        assert shows(app, "OUT OF DATE", "made to fail", "Theoretical force")


async def test_an_answer_to_an_earlier_revision_is_not_shown() -> None:
    app = Quick(one())
    async with app.run_test(size=(100, 30)) as pilot:
        await settled(app, pilot)
        late = app.answer
        await pilot.press("1")
        await settled(app, pilot)
        current = app.answer
        app.post_message(app.Solved(0, late))
        await pilot.pause()
        assert app.answer is current


async def test_fast_typing_is_worked_out_once(monkeypatch: pytest.MonkeyPatch) -> None:
    asked: list[str] = []
    app = Design(one(), Settings())
    async with app.run_test(size=(100, 30)) as pilot:
        await settled(app, pilot)
        from actuator.answer import work_out

        def recording(document: object, *rest: object) -> object:
            asked.append(document.text(BORE))  # type: ignore[attr-defined]
            return work_out(document, *rest)  # type: ignore[arg-type]

        monkeypatch.setattr("actuator.answer.work_out", recording)
        for digit in "12345":
            app.session = app.session.edited(BORE, f"{digit}0 mm")
        await settled(app, pilot)
        assert asked == ["50 mm"]


async def test_each_field_and_figure_says_what_it_is_and_the_focus_goes_up_and_down() -> None:
    app = Quick(one())
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        fields = [item for item in app.desk.query(Field) if item.display]
        bore = fields.index(field(app, BORE))
        for key, place in (("down", bore + 1), ("up", bore), ("up", bore - 1)):
            await pilot.press(key)
            await pilot.pause()
            assert fields[place].has_focus
            assert shows(app, f"{fields[place].spec.label}: {fields[place].spec.help}"[:100])
        await pilot.press("f6")
        assert isinstance(app.focused, Figures)
        await pilot.press("f6")
        assert fields[bore - 1].has_focus


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


async def test_another_actuator_is_chosen_by_key_and_by_list_and_its_fields_are_its_own() -> None:
    app = Quick(plant())
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        assert shows(app, "Tray packer / Pusher", "1 of 4")
        await pilot.press("f8")
        assert shows(app, "Tray packer / Lift", "2 of 4")
        lift = BORE.replace("actuator.1", "actuator.2")
        assert field(app, lift).value == app.session.text(lift) == "63 mm"
        field(app, lift).focus()
        await pilot.press("end", "1")
        await settled(app, pilot)
        assert app.session.text(lift) == "63 mm1"
        assert app.session.text(BORE) == "40 mm"
        await pilot.press("f7")
        assert field(app, BORE).value == "40 mm"
        await pilot.press("ctrl+z")  # the change was made to the other actuator: go there
        await settled(app, pilot)
        assert app.place.actuator == 2
        assert field(app, lift).has_focus
        await pilot.press("ctrl+g")
        await pilot.pause()
        assert isinstance(app.screen, Pick)
        await pilot.press("down", "enter")
        await pilot.pause()
        assert app.place.name == "Lid press / Clamp"
        app.session = app.session.edited("machine.2.actuator.1.name", "Squeezer")
        await pilot.pause()
        assert shows(app, "Lid press / Squeezer", "3 of 4")


async def test_choices_are_picked_from_a_list_or_turned_through() -> None:
    app = Quick(one())
    mounting = BORE.replace("bore", "mounting")
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        field(app, mounting).focus()
        await pilot.press("enter")
        await pilot.pause()
        assert isinstance(app.screen, Pick)
        await pilot.press("down", "down", "enter")
        await settled(app, pilot)
        chosen = app.session.text(mounting)
        assert chosen in field(app, mounting).spec.choices
        await pilot.press("ctrl+down")
        await settled(app, pilot)
        choices = field(app, mounting).spec.choices
        assert app.session.text(mounting) == choices[(choices.index(chosen) + 1) % len(choices)]


async def test_problems_are_listed_and_lead_to_their_fields_even_of_another_actuator() -> None:
    app = Quick(plant())
    clamp = "machine.2.actuator.1.stroke"
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        app.session = app.session.edited(clamp, "-3 mm")
        await settled(app, pilot)
        listed = app.desk.query_one(Problems)
        assert listed.size.height
        assert shows(app, "machine.2.actuator.1.stroke", "-3 mm", "OUT OF DATE: 1 problem")
        listed.focus()
        await pilot.press("down", "enter")
        await pilot.pause()
        assert app.place.name == "Lid press / Clamp"
        assert field(app, clamp).has_focus
        assert field(app, clamp).problem
        await pilot.press("ctrl+n")
        assert field(app, clamp).has_focus


async def test_a_problem_inside_a_list_stands_beside_the_list() -> None:
    app = Quick(one())
    force = "machine.1.actuator.1.load.process_force"
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        app.session = app.session.edited(force, '[{ from = "1 mm", to = "900 mm", force = "5 N" }]')
        await settled(app, pilot)
        assert field(app, force).problem


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


async def test_other_ways_to_state_a_conductance_appear_when_they_are_needed() -> None:
    app = Quick(one())
    valve = "machine.1.actuator.1.valve."
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        assert field(app, valve + "supply_c").display
        assert not field(app, valve + "supply_cv").display
        app.session = app.session.edited(valve + "supply_c", "").edited(valve + "supply_cv", "0.5")
        await settled(app, pilot)
        assert field(app, valve + "supply_cv").display
        assert field(app, valve + "supply_cv").value == "0.5"
        app.action_do("view.entries")
        assert field(app, valve + "exhaust_kv").display


async def test_a_field_left_out_shows_the_value_that_holds() -> None:
    app = Quick(one())
    async with app.run_test(size=(120, 36)) as pilot:
        await settled(app, pilot)
        assert field(app, BORE.replace("bore", "kind")).placeholder == "double-acting"
        assert field(app, BORE.replace("bore", "closed_length")).placeholder == "50.00 mm"  # the bore
        assert field(app, BORE.replace("bore", "return_pressure")).placeholder.startswith("e.g. 4 bar")
        assert shows(app, "50.00 mm")
        assert app.session.text(BORE.replace("bore", "closed_length")) == ""


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
