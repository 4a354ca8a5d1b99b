"""The sheet in use: edits, answers, problems, undo, actuators, choices."""

from __future__ import annotations

import pytest

from actuator.project.document import parse
from actuator.settings import Settings
from tests.tui.bench import BORE, ONE, Quick, field, one, plant, seen, settled, shows, solved
from tui.app import Design
from tui.screens.dialogs import Pick
from tui.widgets.field import Field
from tui.widgets.figures import Figures
from tui.widgets.problems import Problems


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
