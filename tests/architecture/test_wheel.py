"""What is built is whole: an installed wheel holds all packages and opens its data."""

from __future__ import annotations

import subprocess
import sys
import zipfile
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parents[2]


@pytest.fixture(scope="module")
def installed(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Folder into which a freshly built wheel was unpacked."""
    folder = tmp_path_factory.mktemp("wheel")
    subprocess.run(
        [sys.executable, "-m", "hatchling", "build", "-t", "wheel", "-d", str(folder)],
        cwd=ROOT, check=True, capture_output=True,
    )  # fmt: skip
    (wheel,) = folder.glob("*.whl")
    with zipfile.ZipFile(wheel) as archive:
        archive.extractall(folder / "site")
    return folder / "site"


def _run(site: Path, code: str) -> str:
    """Output of ``code`` in an interpreter that sees the installed copy and not the checkout."""
    done = subprocess.run(
        [sys.executable, "-I", "-c", f"import sys; sys.path.insert(0, {str(site)!r})\n{code}"],
        cwd=site, check=True, capture_output=True, text=True,
    )  # fmt: skip
    return done.stdout.strip()


def test_the_wheel_holds_the_three_packages_and_no_tests(installed: Path) -> None:
    names = {path.name for path in installed.iterdir() if path.is_dir() and not path.name.endswith(".dist-info")}
    assert names == {"actuator", "tui", "catalog_demo"}
    assert (installed / "actuator" / "py.typed").exists()
    assert (installed / "tui" / "app.tcss").exists()


def test_the_installed_demo_plant_opens_and_is_valid(installed: Path) -> None:
    code = (
        "import actuator\n"
        "from actuator.project.document import demo\n"
        "from actuator.project.validate import validate\n"
        "from actuator.parts import Project\n"
        "assert actuator.__file__.startswith(sys.path[0]), actuator.__file__\n"
        "project = validate(demo())\n"
        "assert isinstance(project, Project), project\n"
        "print(len(project.machines))"
    )
    assert int(_run(installed, code)) >= 1


def test_the_console_command_is_declared(installed: Path) -> None:
    (entry,) = installed.glob("*.dist-info/entry_points.txt")
    assert "actuator = actuator.cli:main" in entry.read_text(encoding="utf-8")
