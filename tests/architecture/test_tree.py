"""The tree keeps its shape: top level, floors, sizes, and what an import may bring along."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parents[2]
TOP = {
    "README.md", "DEVELOPERS.md", "pyproject.toml", "LICENSE", "actuator", "tui", "tests", "catalog_demo",
}  # fmt: skip
HEAVY = ("numpy", "scipy", "numba", "pint", "pandas", "textual", "tomlkit")


def _tracked() -> list[Path]:
    """Files of the project, caches left out."""
    return [
        path
        for path in ROOT.rglob("*")
        if path.is_file()
        and not any(part.startswith(".") or part == "__pycache__" for part in path.relative_to(ROOT).parts)
    ]  # fmt: skip


def test_nothing_else_stands_at_the_top() -> None:
    assert {path.relative_to(ROOT).parts[0] for path in _tracked()} == TOP


def test_floors_are_kept() -> None:
    done = subprocess.run(
        [str(Path(sys.executable).with_name("lint-imports"))], cwd=ROOT, capture_output=True, text=True, check=False
    )
    assert done.returncode == 0, done.stdout + done.stderr


def test_no_module_is_longer_than_400_lines() -> None:
    long = {
        str(path.relative_to(ROOT)): count
        for path in _tracked()
        if path.suffix == ".py" and (count := len(path.read_text(encoding="utf-8").splitlines())) > 400
    }
    assert long == {}


def _imported(statement: str) -> set[str]:
    """Heavy packages that a fresh interpreter holds after ``statement``."""
    code = f"{statement}\nimport sys\nprint('heavy', *(name for name in {HEAVY!r} if name in sys.modules))"
    done = subprocess.run([sys.executable, "-c", code], cwd=ROOT, capture_output=True, text=True, check=True)
    return set(done.stdout.splitlines()[-1].split()[1:])


@pytest.mark.parametrize(
    ("statement", "allowed"),
    [
        ("import actuator", set()),
        ("import actuator.cli", set()),
        ("from actuator.parts import Project", set()),
        ("import actuator.units", set()),
        ("import actuator.analysis", {"numpy", "scipy"}),
        ("import actuator.stroke.compiled", {"numpy"}),
    ],
)
def test_an_import_brings_no_more_than_it_needs(statement: str, allowed: set[str]) -> None:
    assert _imported(statement) <= allowed


def test_help_needs_nothing_heavy() -> None:
    statement = (
        "import contextlib\nfrom actuator.cli import main\nwith contextlib.suppress(SystemExit):\n    main(['--help'])"
    )
    assert _imported(statement) == set()
