"""The compiled kernel's cache: named by all that is bound, in a folder that can be written and is ours."""

from __future__ import annotations

import ast
import os
import shutil
import subprocess
import sys
import tempfile
import types
from pathlib import Path

import platformdirs
import pytest

from actuator.air import gas
from actuator.stroke import batch, jit

HASHED = (*jit._MODULES, gas, jit)


@pytest.mark.parametrize("module", HASHED, ids=lambda module: module.__name__)
def test_folder_is_named_by_every_source(
    module: types.ModuleType, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    before = jit.source_hash()
    assert module.__file__ is not None
    copy = tmp_path / "copy.py"
    shutil.copy2(module.__file__, copy)
    monkeypatch.setattr(module, "__file__", str(copy))
    assert jit.source_hash() == before
    stamp = copy.stat().st_mtime_ns
    copy.write_text(copy.read_text(encoding="utf-8") + "# edited\n", encoding="utf-8")
    os.utime(copy, ns=(stamp, stamp))
    assert jit.source_hash() != before


def test_nothing_that_the_kernel_imports_is_left_out() -> None:
    names = {module.__name__ for module in HASHED}
    for module in jit._MODULES:
        assert module.__file__ is not None
        for node in ast.walk(ast.parse(Path(module.__file__).read_text(encoding="utf-8"))):
            if isinstance(node, ast.ImportFrom) and (node.module or "").startswith("actuator."):
                for item in node.names:
                    submodule = f"{node.module}.{item.name}"
                    used = submodule if submodule in sys.modules else node.module
                    assert used in names, f"{module.__name__} imports {used}"


def test_no_two_functions_share_a_name() -> None:
    names = [
        name
        for module in jit._MODULES
        for name, value in vars(module).items()
        if isinstance(value, types.FunctionType) and value.__module__ == module.__name__
    ]
    assert len(names) == len(set(names))


def test_folder_falls_back_to_a_temporary_one(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    (tmp_path / "file").write_text("in the way")
    monkeypatch.setattr(platformdirs, "user_cache_dir", lambda *_, **__: str(tmp_path / "file" / "cache"))
    monkeypatch.setattr(tempfile, "gettempdir", lambda: str(tmp_path))
    folder = jit.cache_folder()
    assert folder is not None
    assert folder.parent.parent == tmp_path
    assert folder.name == f"kernel-{jit.source_hash()}"
    assert folder.stat().st_mode & 0o077 == 0
    assert list(folder.iterdir()) == []


def test_no_folder_that_can_be_written(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    (tmp_path / "file").write_text("in the way")
    monkeypatch.setattr(platformdirs, "user_cache_dir", lambda *_, **__: str(tmp_path / "file" / "cache"))
    monkeypatch.setattr(tempfile, "gettempdir", lambda: str(tmp_path / "file"))
    assert jit.cache_folder() is None


def test_a_folder_of_somebody_else_is_not_used(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(platformdirs, "user_cache_dir", lambda *_, **__: str(tmp_path / "cache"))
    monkeypatch.setattr(tempfile, "gettempdir", lambda: str(tmp_path))
    assert jit.cache_folder() is not None
    monkeypatch.setattr(os, "getuid", lambda: os.geteuid() + 1)
    assert jit.cache_folder() is None


def test_a_process_that_binds_leaves_the_mark() -> None:
    """What the child does; from the cache it takes a second, else as long as the compiler."""
    command = (
        "from actuator.stroke.jit import bind, cache_folder, ready_mark; bind(); print(ready_mark(cache_folder()))"
    )
    done = subprocess.run([sys.executable, "-c", command], capture_output=True, text=True, check=True)
    assert Path(done.stdout.strip()).exists()


def test_the_entry_is_the_only_thing_compiled_for_python() -> None:
    twin = jit.bind()
    assert twin.__name__ == batch.batch.__name__
    with pytest.raises(TypeError):
        twin(1, 2, 3)
