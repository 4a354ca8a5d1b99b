"""Drafts and saving: nothing that was typed is lost without being asked."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

import pytest

from actuator.project.document import Document, load, parse
from actuator.settings import drafts_folder
from tests.tui.bench import BORE, ONE, Quick, field, one, seen, settled
from tui.drafts import Drafts
from tui.screens.dialogs import Ask, Entry


def edited(document: Document) -> Document:
    """With another bore."""
    return document.edited(BORE, "63 mm, perhaps")


def drafts_of() -> list[Path]:
    """Draft files, locks left out."""
    folder = drafts_folder()
    return sorted(place for place in folder.iterdir() if place.suffix != ".lock") if folder.is_dir() else []


def left_by_another(document: Document) -> None:
    """A draft whose writer is gone."""
    writer = Drafts()
    writer.keep(document)
    writer.close()


def test_a_draft_holds_every_text_as_typed_and_is_offered_once_its_writer_is_gone(tmp_path: Path) -> None:
    document = edited(one(tmp_path / "one.toml"))
    writer, reader = Drafts(), Drafts()
    writer.keep(document)
    assert reader.left_behind(document) is None
    writer.close()
    found = reader.left_behind(document)
    assert found is not None
    assert parse(found.text).text(BORE) == "63 mm, perhaps"
    assert "# a comment" in found.text
    reader.discard(found)
    assert reader.left_behind(document) is None
    assert list(drafts_folder().iterdir()) == []


def test_a_writer_that_was_killed_has_let_go_of_its_lock(tmp_path: Path) -> None:
    document = edited(one(tmp_path / "one.toml"))
    code = (
        "import platformdirs, os, sys; from pathlib import Path\n"
        f"platformdirs.user_state_dir = lambda *a, **k: {str(tmp_path / 'state')!r}\n"
        "from tui.drafts import Drafts; from actuator.project.document import load\n"
        f"drafts = Drafts(); drafts.keep(load(Path({str(tmp_path / 'one.toml')!r})).edited({BORE!r}, '70 mm'))\n"
        "print('kept', flush=True); sys.stdin.read()\n"
    )
    with subprocess.Popen([sys.executable, "-c", code], stdin=subprocess.PIPE, stdout=subprocess.PIPE) as other:
        assert other.stdout is not None
        assert other.stdout.readline() == b"kept\n"
        assert Drafts().left_behind(document) is None
        other.kill()
    found = Drafts().left_behind(document)
    assert found is not None
    assert parse(found.text).text(BORE) == "70 mm"


def test_two_programs_on_one_document_keep_two_drafts(tmp_path: Path) -> None:
    document = one(tmp_path / "one.toml")
    first, second = Drafts(), Drafts()
    first.keep(document.edited(BORE, "1 mm"))
    second.keep(document.edited(BORE, "2 mm"))
    assert len(drafts_of()) == 2
    second.forget(document)
    assert [parse(place.read_text()).text(BORE) for place in drafts_of()] == ["1 mm"]


def test_drafts_of_documents_without_a_file_are_found_and_others_are_not(tmp_path: Path) -> None:
    left_by_another(edited(one()))
    assert Drafts().left_behind(one()) is not None
    assert Drafts().left_behind(one(tmp_path / "other.toml")) is None


def test_only_the_owner_may_read_the_folder() -> None:
    Drafts().keep(edited(one()))
    assert drafts_folder().stat().st_mode & 0o077 == 0


def test_files_that_are_no_drafts_are_left_alone() -> None:
    drafts_folder().mkdir(parents=True)
    (drafts_folder() / "notes.txt").write_text("mine")
    (drafts_folder() / "bytes").write_bytes(b"\xff\xfe")
    assert Drafts().left_behind(one()) is None
    assert len(drafts_of()) == 2


async def test_the_draft_is_written_after_a_pause_and_goes_when_nothing_is_unsaved(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    monkeypatch.setattr("tui.app.DRAFT", 0.05)
    app = Quick(one())
    async with app.run_test(size=(100, 30)) as pilot:
        await settled(app, pilot)
        await pilot.press("7")
        await pilot.pause(0.3)
        assert [parse(place.read_text()).text(BORE) for place in drafts_of()] == ["50 mm7"]
        await pilot.press("ctrl+z")
        await pilot.pause(0.3)
        assert drafts_of() == []
    app.drafts.close()


async def test_a_draft_found_is_taken_and_undo_brings_the_files_state_back(tmp_path: Path) -> None:
    document = one(tmp_path / "one.toml")
    left_by_another(edited(document))
    app = Quick(document)
    async with app.run_test(size=(100, 30)) as pilot:
        await settled(app, pilot)
        assert isinstance(app.screen, Ask)
        assert "Draft found" in "\n".join(seen(app))
        await pilot.press("enter")  # the first answer has the focus
        await settled(app, pilot)
        assert field(app, BORE).value == "63 mm, perhaps"
        assert app.session.unsaved
        assert app.session.document.path == document.path
        assert len(drafts_of()) == 1  # from here on it is this program's own
        await pilot.press("ctrl+z")
        await settled(app, pilot)
        assert field(app, BORE).value == "50 mm"
        assert not app.session.unsaved


@pytest.mark.parametrize(("answer", "kept"), [("throw", 0), ("later", 1)])
async def test_a_draft_found_is_thrown_away_or_kept_for_later(tmp_path: Path, answer: str, kept: int) -> None:
    document = one(tmp_path / "one.toml")
    left_by_another(edited(document))
    app = Quick(document)
    async with app.run_test(size=(100, 30)) as pilot:
        await settled(app, pilot)
        await pilot.click(f"#{answer}")
        await pilot.pause()
        assert len(drafts_of()) == kept
        assert field(app, BORE).value == "50 mm"


async def test_saving_writes_the_file_with_its_comments_and_marks_it_saved(tmp_path: Path) -> None:
    path = tmp_path / "one.toml"
    app = Quick(one(path))
    async with app.run_test(size=(100, 30)) as pilot:
        await settled(app, pilot)
        await pilot.press("home", "delete", "6")
        await settled(app, pilot)
        assert "* unsaved" in seen(app)[0]
        await pilot.press("ctrl+s")
        await pilot.pause()
        assert path.read_text() == ONE.replace('"50 mm" ', '"60 mm" ')
        assert "unsaved" not in seen(app)[0]
        await pilot.press("ctrl+z")
        await pilot.pause()
        assert app.session.text(BORE) == "50 mm"
        assert "* unsaved" in seen(app)[0]


async def test_a_document_without_a_file_asks_for_one_and_does_not_write_over_another(tmp_path: Path) -> None:
    taken, free = tmp_path / "taken.toml", tmp_path / "free.toml"
    taken.write_text("precious")
    app = Quick(one())
    async with app.run_test(size=(100, 30)) as pilot:
        await settled(app, pilot)
        await pilot.press("1", "ctrl+s")
        await pilot.pause()
        entry = app.screen
        assert isinstance(entry, Entry)
        box = entry.query_one("Input")
        for text, told in (
            (str(tmp_path), "this is a folder"),
            (str(tmp_path / "no" / "x"), "no folder"),
            ("", "name"),
        ):
            box.value = text  # type: ignore[attr-defined]
            await pilot.press("enter")
            await pilot.pause()
            assert told in "\n".join(seen(app))
        box.value = str(taken)  # type: ignore[attr-defined]
        await pilot.press("enter")
        await pilot.pause()
        assert isinstance(app.screen, Ask)
        await pilot.press("escape")
        await pilot.pause()
        assert taken.read_text() == "precious"
        assert app.session.unsaved
        await pilot.press("f12")
        await pilot.pause()
        app.screen.query_one("Input").value = str(free)  # type: ignore[attr-defined]
        await pilot.press("enter")
        await pilot.pause()
        assert load(free).text(BORE) == "50 mm1"
        assert app.session.document.path == free
        assert not app.session.unsaved


async def test_a_file_that_cannot_be_written_is_told_and_everything_stays(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    app = Quick(one(tmp_path / "one.toml"))
    async with app.run_test(size=(100, 30), notifications=True) as pilot:
        await settled(app, pilot)
        await pilot.press("1")

        def fails(*_: object) -> None:
            raise OSError("disk full")

        monkeypatch.setattr("actuator.project.document.write_text", fails)
        await pilot.press("ctrl+s")
        await pilot.pause(0.1)
        assert "disk full" in "\n".join(seen(app))
        assert app.session.unsaved
        assert field(app, BORE).value == "50 mm1"


async def test_quitting_asks_while_something_is_unsaved(tmp_path: Path) -> None:
    path = tmp_path / "one.toml"
    app = Quick(one(path))
    async with app.run_test(size=(100, 30)) as pilot:
        await settled(app, pilot)
        await pilot.press("2", "ctrl+q")
        await pilot.pause()
        assert isinstance(app.screen, Ask)
        await pilot.press("escape")
        await pilot.pause()
        assert app.is_running
        await pilot.press("ctrl+q")
        await pilot.pause()
        await pilot.press("enter")  # save
        await pilot.pause()
    assert app.return_code == 0
    assert load(path).text(BORE) == "50 mm2"


async def test_quitting_without_saving_leaves_the_file_and_no_draft(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr("tui.app.DRAFT", 0.01)
    path = tmp_path / "one.toml"
    app = Quick(one(path))
    async with app.run_test(size=(100, 30)) as pilot:
        await settled(app, pilot)
        await pilot.press("2")
        await pilot.pause(0.2)
        assert drafts_of()
        await pilot.press("ctrl+q")
        await pilot.pause()
        await pilot.click("#lose")
        await pilot.pause()
    assert app.return_code == 0
    assert path.read_text() == ONE
    assert drafts_of() == []


async def test_quitting_when_all_is_saved_asks_nothing() -> None:
    app = Quick(one())
    async with app.run_test(size=(100, 30)) as pilot:
        await settled(app, pilot)
        await pilot.press("ctrl+q")
        await pilot.pause()
    assert app.return_code == 0


async def test_another_document_is_opened_and_late_answers_of_the_first_are_not_taken(tmp_path: Path) -> None:
    other = tmp_path / "other.toml"
    other.write_text(ONE.replace('"Ram"', '"Other ram"').replace('"50 mm"', '"32 mm"'))
    app = Quick(one())
    async with app.run_test(size=(100, 30)) as pilot:
        await settled(app, pilot)
        await pilot.press("ctrl+o")
        await pilot.pause()
        box = app.screen.query_one("Input")
        box.value = str(tmp_path / "missing.toml")  # type: ignore[attr-defined]
        await pilot.press("enter")
        await pilot.pause()
        assert "No such file" in "\n".join(seen(app))
        box.value = str(other)  # type: ignore[attr-defined]
        before = app.session.revision
        await pilot.press("enter")
        await settled(app, pilot)
        assert app.session.revision > before
        assert field(app, BORE).value == "32 mm"
        assert app.place.name == "Press / Other ram"
        assert not app.session.unsaved
