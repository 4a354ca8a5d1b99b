"""Every test of the screens keeps its settings and drafts in its own folder, without animation."""

from __future__ import annotations

import os

os.environ["TEXTUAL_ANIMATIONS"] = "none"  # read when textual is imported

from collections.abc import Callable
from pathlib import Path

import platformdirs
import pytest
from textual.widgets import Input


@pytest.fixture(autouse=True)
def own_folders(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """State and settings below ``tmp_path``; no blinking cursor, no compiler."""

    def below(kind: str) -> Callable[..., str]:
        return lambda *_, **__: str(tmp_path / kind)

    monkeypatch.setattr(platformdirs, "user_state_dir", below("state"))
    monkeypatch.setattr(platformdirs, "user_config_dir", below("config"))
    monkeypatch.setattr(Input, "cursor_blink", False)
    monkeypatch.setenv("ACTUATOR_INTERPRETED", "1")  # no compiler beside the tests; the screens do not care
    return tmp_path
