"""Settings and drafts: own folders, a broken file is a remark."""

from __future__ import annotations

from pathlib import Path

import pytest

from actuator.settings import Settings, draft_path, load_settings, save_settings, settings_path


@pytest.fixture(autouse=True)
def own_folders(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("XDG_CONFIG_HOME", str(tmp_path / "config"))
    monkeypatch.setenv("XDG_STATE_HOME", str(tmp_path / "state"))


def written(text: str) -> Settings:
    settings_path().parent.mkdir(parents=True, exist_ok=True)
    settings_path().write_text(text, encoding="utf-8")
    return load_settings()


def test_without_a_file_the_defaults_hold() -> None:
    assert load_settings() == Settings(units="si", theme="", remarks=())


def test_settings_come_back() -> None:
    chosen = Settings(units="us", theme="textual-light", keys={"edit.undo": "ctrl+u"})
    save_settings(chosen)
    assert load_settings() == chosen
    save_settings(Settings())
    assert load_settings() == Settings()


def test_comments_of_the_file_are_kept() -> None:
    written('# mine\nunits = "si" # metric\n')
    save_settings(Settings(units="us"))
    assert settings_path().read_text(encoding="utf-8") == '# mine\nunits = "us" # metric\n'


@pytest.mark.parametrize(
    ("text", "remark"),
    [
        ("units = ", "cannot be read (Invalid value"),
        ('units = "metric"\n', 'units = "metric" is not known; write "si" or "us"'),
        ("units = 3\n", 'units = "3" is not known'),
        ("theme = 3\n", "theme must be text in quotes"),
        ("keys = 3\n", "keys must be a table of text"),
        ('colour = "red"\n', '"colour" is no setting; known are units, theme, keys'),
    ],
)
def test_what_cannot_be_used_is_a_remark(text: str, remark: str) -> None:
    settings = written(text)
    assert (settings.units, settings.theme, settings.keys) == ("si", "", {})
    assert len(settings.remarks) == 1
    assert remark in settings.remarks[0]
    assert str(settings_path()) in settings.remarks[0]


def test_bytes_that_are_no_text_are_a_remark() -> None:
    settings_path().parent.mkdir(parents=True)
    settings_path().write_bytes(b'units = "\xff"')
    assert "cannot be read" in load_settings().remarks[0]


def test_a_broken_file_is_replaced_when_settings_are_saved() -> None:
    written("units = ")
    save_settings(Settings(units="us"))
    assert load_settings() == Settings(units="us")


def test_drafts_are_told_apart_by_the_path_of_their_document(tmp_path: Path) -> None:
    one, other = draft_path(tmp_path / "a" / "line.toml"), draft_path(tmp_path / "b" / "line.toml")
    assert one != other
    assert one.parent == other.parent
    assert tmp_path / "state" in one.parents
    assert one.name.startswith("line-")
    assert draft_path(tmp_path / "a" / "line.toml") == one
    assert draft_path(None).name.startswith("untitled-")
    assert len(draft_path(tmp_path / ("x" * 250 + ".toml")).name) < 100
