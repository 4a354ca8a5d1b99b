"""Files are written whole or not at all, and go back as they were."""

from __future__ import annotations

import os
from pathlib import Path

import pytest

from actuator.project.document import load
from tests.project.samples import SAMPLE, SHORT, short


def test_saving_is_whole_keeps_the_mode_and_leaves_nothing_else(tmp_path: Path) -> None:
    path = tmp_path / "line.toml"
    path.write_text(SAMPLE, encoding="utf-8")
    path.chmod(0o640)
    saved = load(path).edited("title", "Größe ✓").saved(path)
    assert path.read_text(encoding="utf-8") == saved.source
    assert saved.edits == {}
    assert saved.path == path
    assert load(path).text("title") == "Größe ✓"
    assert path.stat().st_mode & 0o777 == 0o640
    assert [each.name for each in tmp_path.iterdir()] == ["line.toml"]


def test_saving_through_a_link_writes_what_it_points_to(tmp_path: Path) -> None:
    path, link = tmp_path / "line.toml", tmp_path / "link.toml"
    path.write_text(SAMPLE, encoding="utf-8")
    link.symlink_to(path)
    load(link).edited("title", "Other").saved(link)
    assert link.is_symlink()
    assert load(path).text("title") == "Other"


def test_a_save_that_fails_leaves_the_old_file(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    path = tmp_path / "line.toml"
    path.write_text(SAMPLE, encoding="utf-8")

    def full(descriptor: int) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(os, "fsync", full)
    with pytest.raises(OSError, match="No space left"):
        load(path).edited("title", "Other").saved(path)
    assert path.read_text(encoding="utf-8") == SAMPLE
    assert [each.name for each in tmp_path.iterdir()] == ["line.toml"]


def test_line_ends_and_bytes_that_are_no_text_go_back_as_they_were(tmp_path: Path) -> None:
    path = tmp_path / "line.toml"
    windows = SHORT.replace("\n", "\r\n").encode()
    path.write_bytes(windows)
    load(path).edited("machine.actuator.1.bore", "63 mm").saved(path)
    assert path.read_bytes() == windows.replace(b"50 mm", b"63 mm")
    broken = b'format = 1\ntitle = "\xff"\n'
    path.write_bytes(broken)
    document = load(path)
    assert document.broken is not None
    assert (document.broken.line, document.broken.allowed) == (2, "must be UTF-8 text")
    document.saved(path)
    assert path.read_bytes() == broken


def test_a_mark_of_byte_order_is_read_over(tmp_path: Path) -> None:
    path = tmp_path / "line.toml"
    path.write_bytes(b"\xef\xbb\xbf" + SHORT.encode())
    assert load(path).tree() == short().tree()
