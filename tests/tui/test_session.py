"""The session: what a step of undo is, what counts as unsaved, which actuators there are."""

from __future__ import annotations

import random
from pathlib import Path

from actuator.project.document import parse
from tests.tui.bench import BORE, ONE, one
from tui.session import Place, Session, places, title

ROD = "machine.1.actuator.1.rod"


def test_keystrokes_in_one_field_are_one_step_until_the_focus_leaves() -> None:
    session = Session.begun(one())
    for text in ("5 mm", "55 mm", "555 mm"):
        session = session.edited(BORE, text)
    assert len(session.past) == 1
    assert session.undone().text(BORE) == "50 mm"
    session = session.left().edited(BORE, "60 mm")
    assert len(session.past) == 2
    assert session.undone().text(BORE) == "555 mm"


def test_another_field_is_another_step() -> None:
    session = Session.begun(one()).edited(BORE, "63 mm").edited(ROD, "16 mm")
    assert [step.path for step in session.past] == [BORE, ROD]
    back = session.undone()
    assert (back.text(BORE), back.text(ROD)) == ("63 mm", "20 mm")
    assert back.redone().text(ROD) == "16 mm"


def test_an_edit_after_undo_ends_the_way_forward() -> None:
    session = Session.begun(one()).edited(BORE, "63 mm").undone().edited(BORE, "80 mm")
    assert session.future == ()
    assert session.redone() is session


def test_the_same_text_is_no_edit() -> None:
    session = Session.begun(one())
    assert session.edited(BORE, "50 mm") is session
    assert session.undone() is session


def test_every_change_has_its_own_revision() -> None:
    session = Session.begun(one())
    revisions = [session.revision]
    for change in ("63 mm", "80 mm"):
        session = session.edited(BORE, change).left()
        revisions.append(session.revision)
    session = session.undone()
    revisions.append(session.revision)
    session = session.redone()
    revisions.append(session.revision)
    assert revisions == sorted(set(revisions))


def test_undo_to_the_end_gives_the_first_document_and_redo_the_last() -> None:
    rng = random.Random(7)
    session = start = Session.begun(one())
    for _ in range(200):
        session = session.edited(rng.choice([BORE, ROD]), f"{rng.randrange(30)} mm")
        if rng.random() < 0.3:
            session = session.left()
    last = session
    while session.past:
        session = session.undone()
    assert session.document == start.document
    assert not session.unsaved
    while session.future:
        session = session.redone()
    assert session.document == last.document


def test_invalid_text_stays_as_typed() -> None:
    session = Session.begun(one()).edited(BORE, "fifty, please")
    assert session.text(BORE) == "fifty, please"


def test_saving_keeps_the_way_back_and_undo_makes_it_unsaved_again(tmp_path: Path) -> None:
    session = Session.begun(one()).edited(BORE, "63 mm")
    assert session.unsaved
    session = session.kept(session.document.saved(tmp_path / "one.toml"))
    assert not session.unsaved
    assert session.undone().unsaved
    assert not session.undone().redone().unsaved


def test_a_document_back_from_a_draft_is_unsaved_and_undo_gives_the_saved_one() -> None:
    saved = one()
    session = Session.begun(saved.edited(BORE, "63 mm"), saved)
    assert session.unsaved
    assert session.undone().document is saved


def test_places_are_found_in_any_state_of_the_document() -> None:
    assert places(one()) == (Place(1, 1, "Press / Ram"),)
    assert places(parse("")) == (Place(1, 0, "no machine"),)
    assert places(parse("machine = 3")) == (Place(1, 0, "no machine"),)
    nameless = parse("[[machine]]\n[[machine.actuator]]\nname = 5\n[[machine]]\nname = 'B'\n")
    assert [place.name for place in places(nameless)] == ["machine 1 / actuator 1", "B / no actuator"]


def test_a_document_without_title_is_called_by_its_file() -> None:
    assert title(one()) == "One cylinder"
    assert title(parse("", Path("/somewhere/line.toml"))) == "line.toml"
    assert title(parse(ONE.replace("One cylinder", " "))) == "Without a title"
