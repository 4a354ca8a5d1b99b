"""The compiled kernel comes by itself, never makes anyone wait, and is missed by nobody where it cannot come."""

from __future__ import annotations

import importlib.util
import subprocess
import sys
from collections.abc import Iterator
from pathlib import Path

import pytest

from actuator.stroke import batch, compiled, jit


@pytest.fixture(name="fresh")
def _fresh(monkeypatch: pytest.MonkeyPatch) -> Iterator[compiled._State]:
    """A process that knows nothing of the compiled kernel yet; a child it starts is ended."""
    state = compiled._State()
    monkeypatch.setattr(compiled, "_state", state)
    monkeypatch.delenv(compiled.OFF, raising=False)
    yield state
    if state.child is not None and state.child.poll() is None:
        state.child.kill()
        state.child.wait()


@pytest.fixture(name="cold")
def _cold(fresh: compiled._State, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> compiled._State:
    """The same with an empty cache."""
    monkeypatch.setenv("XDG_CACHE_HOME", str(tmp_path))
    folder = jit.cache_folder()
    assert folder is not None
    assert folder.is_relative_to(tmp_path)
    return fresh


def test_first_strokes_are_interpreted_and_start_nothing(cold: compiled._State) -> None:
    for _ in range(compiled.PATIENCE):
        assert compiled.engine() == (batch.batch, False)
    assert (cold.child, cold.loader, cold.remark) == (None, None, "")


def test_a_cold_cache_is_filled_by_a_child_and_nobody_waits(cold: compiled._State) -> None:
    compiled.prepare()
    assert cold.child is not None
    assert cold.child.poll() is None  # it compiles still: this process did not wait for it
    assert cold.loader is None
    compiled.prepare()
    cold.asked = compiled.PATIENCE
    assert compiled.engine() == (batch.batch, False)
    assert compiled.remark() == ""
    assert not compiled.loaded()


def test_one_process_at_a_time_compiles(cold: compiled._State, monkeypatch: pytest.MonkeyPatch) -> None:
    compiled.prepare()
    other = compiled._State()
    monkeypatch.setattr(compiled, "_state", other)
    compiled.prepare()
    assert other.child is None
    assert other.loader is None


def test_a_warm_cache_is_loaded_in_a_thread(fresh: compiled._State) -> None:
    jit.bind()
    compiled.prepare()
    assert fresh.loader is not None
    fresh.loader.join()
    kernel, is_compiled = compiled.engine()
    assert is_compiled
    assert kernel is fresh.kernel
    assert compiled.loaded()


def test_wanted_compiled_waits(fresh: compiled._State) -> None:
    assert compiled.engine("compiled") == (fresh.kernel, True)
    assert compiled.engine("interpreted") == (batch.batch, False)


def test_a_child_that_fails_is_a_remark(cold: compiled._State) -> None:
    cold.child = subprocess.Popen([sys.executable, "-c", "raise SystemExit(1)"])
    cold.child.wait()
    compiled.prepare()
    assert compiled.remark() == "the compiler failed; computed interpreted"
    assert compiled.engine() == (batch.batch, False)


@pytest.mark.usefixtures("fresh")
def test_numba_not_installed_is_a_remark(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(importlib.util, "find_spec", lambda name: None)
    compiled.prepare()
    assert compiled.remark() == "numba is not installed; computed interpreted"
    assert compiled.engine() == (batch.batch, False)
    with pytest.raises(RuntimeError, match="numba is not installed"):
        compiled.engine("compiled")


@pytest.mark.usefixtures("fresh")
def test_numba_that_cannot_be_imported_is_a_remark(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setitem(sys.modules, "numba", None)
    monkeypatch.setattr(importlib.util, "find_spec", lambda name: name)
    compiled.prepare(wait=True)
    assert compiled.remark().startswith("not compiled (ModuleNotFoundError: ")
    assert compiled.engine() == (batch.batch, False)


@pytest.mark.usefixtures("fresh")
def test_numba_that_fails_is_a_remark(monkeypatch: pytest.MonkeyPatch) -> None:
    def broken() -> jit.Kernel:
        raise SystemError("no such processor")

    monkeypatch.setattr(compiled, "bind", broken)
    compiled.prepare(wait=True)
    assert compiled.remark() == "not compiled (SystemError: no such processor); computed interpreted"
    assert compiled.engine() == (batch.batch, False)
    with pytest.raises(RuntimeError, match="no such processor"):
        compiled.engine("compiled")


@pytest.mark.usefixtures("fresh")
def test_no_folder_for_the_cache_is_a_remark(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(compiled, "cache_folder", lambda: None)
    compiled.prepare()
    assert compiled.remark() == "no folder for the compiled kernel can be written; computed interpreted"


def test_switched_off(fresh: compiled._State, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv(compiled.OFF, "1")
    for _ in range(compiled.PATIENCE + 2):
        assert compiled.engine() == (batch.batch, False)
    assert (fresh.child, fresh.loader, fresh.remark) == (None, None, "")
    with pytest.raises(RuntimeError, match="switched off"):
        compiled.engine("compiled")


def test_switched_off_although_it_is_there(fresh: compiled._State, monkeypatch: pytest.MonkeyPatch) -> None:
    fresh.kernel = batch.batch
    assert compiled.engine()[1]
    monkeypatch.setenv(compiled.OFF, "1")
    assert not compiled.engine()[1]
    assert not compiled.loaded()


def test_many_strokes_wait_for_a_warm_cache_only(cold: compiled._State, monkeypatch: pytest.MonkeyPatch) -> None:
    asked: list[bool] = []
    monkeypatch.setattr(compiled, "prepare", lambda wait=False: asked.append(wait))
    compiled.expect(compiled.PATIENCE)
    assert asked == []
    compiled.expect(compiled.PATIENCE + 1)
    folder = jit.cache_folder()
    assert folder is not None
    jit.ready_mark(folder).touch()
    compiled.expect(compiled.PATIENCE + 1)
    assert asked == [False, True]
