"""The program as a process: first paint, signals, a closed window, terminals that will not do."""

from __future__ import annotations

import fcntl
import os
import pty
import select
import signal
import struct
import subprocess
import sys
import termios
import time
from pathlib import Path
from types import SimpleNamespace

import pytest

from actuator.project.document import parse
from tests.tui.bench import BORE, ONE
from tui.terminal import console, unfit

ROOT = Path(__file__).resolve().parents[2]
START = """
import os, sys, platformdirs
if os.isatty(0):
    os.close(os.open(os.ttyname(0), os.O_RDWR))  # the first terminal that a session opens is its own
from pathlib import Path
platformdirs.user_state_dir = lambda *a, **k: {state!r}
platformdirs.user_config_dir = lambda *a, **k: {state!r}
import tui.app
from actuator.project.document import load
tui.app.Design.solve = lambda *a: None
sys.exit(tui.app.run(load(Path({path!r}))))
"""


class Terminal:
    """The program in a terminal of its own."""

    def __init__(self, folder: Path) -> None:
        self.path = folder / "one.toml"
        self.path.write_text(ONE)
        self.state = folder / "state"
        self.master, slave = pty.openpty()
        fcntl.ioctl(slave, termios.TIOCSWINSZ, struct.pack("HHHH", 24, 80, 0, 0))
        self.screen = b""
        code = START.format(state=str(self.state), path=str(self.path))
        environment = {**os.environ, "TERM": "xterm-256color", "LC_ALL": "C.UTF-8", "PYTHONPATH": str(ROOT)}
        self.process = subprocess.Popen(
            [sys.executable, "-c", code],
            stdin=slave,
            stdout=slave,
            stderr=slave,
            env=environment,
            start_new_session=True,
        )
        os.close(slave)

    def until(self, text: bytes, limit: float = 60.0) -> None:
        """Read until a text was written."""
        end = time.monotonic() + limit
        while text not in self.screen:
            assert time.monotonic() < end, self.screen[-2000:]
            self.read(0.2)

    def read(self, wait: float) -> bool:
        """Read what there is; whether the terminal still has a writer."""
        if not select.select([self.master], [], [], wait)[0]:
            return True
        try:
            found = os.read(self.master, 65536)
        except OSError:
            return False
        self.screen += found
        return bool(found)

    def typed(self, text: str) -> None:
        """Type in the field of the bore, and wait until it is seen."""
        self.until(b"Bore")
        self.until("›".encode())
        os.write(self.master, text.encode())
        self.until(text.encode())

    def ended(self) -> int:
        """Read to the end and give the exit status."""
        while self.process.poll() is None and self.read(0.2):
            pass
        while self.read(0.1) and select.select([self.master], [], [], 0.1)[0]:
            pass
        return self.process.wait(60)

    def drafts(self) -> list[str]:
        """Bores of all drafts."""
        folder = self.state / "drafts"
        files = [place for place in folder.iterdir() if place.suffix != ".lock"] if folder.is_dir() else []
        return [parse(place.read_text()).text(BORE) for place in files]


@pytest.mark.parametrize("number", [signal.SIGTERM, signal.SIGHUP])
def test_a_signal_leaves_a_draft_and_a_whole_terminal(tmp_path: Path, number: signal.Signals) -> None:
    terminal = Terminal(tmp_path)
    terminal.typed("Z")
    terminal.process.send_signal(number)
    assert terminal.ended() == 128 + number
    assert terminal.drafts() == ["50 mmZ"]
    assert terminal.screen.rfind(b"\x1b[?1049l") > terminal.screen.rfind(b"\x1b[?1049h")
    assert terminal.screen.rfind(b"\x1b[?25h") > terminal.screen.rfind(b"\x1b[?25l")
    assert terminal.screen.rfind(b"\x1b[?1000l") > terminal.screen.rfind(b"\x1b[?1000h")
    os.close(terminal.master)


def test_a_closed_window_leaves_a_draft(tmp_path: Path) -> None:
    terminal = Terminal(tmp_path)
    terminal.typed("Z")
    os.close(terminal.master)
    assert terminal.process.wait(60) == 128 + signal.SIGHUP
    assert terminal.drafts() == ["50 mmZ"]


def test_a_killed_program_loses_no_more_than_the_last_second(tmp_path: Path) -> None:
    terminal = Terminal(tmp_path)
    terminal.typed("Z")
    end = time.monotonic() + 60.0
    while not terminal.drafts():
        assert time.monotonic() < end
        terminal.read(0.1)
    terminal.process.kill()
    terminal.process.wait(60)
    assert terminal.drafts() == ["50 mmZ"]
    os.close(terminal.master)


def test_a_fault_of_the_program_itself_leaves_a_draft(tmp_path: Path) -> None:
    code = (
        START.format(state=str(tmp_path / "state"), path=str(tmp_path / "one.toml"))
        .replace("sys.exit(", "result = (")
        .replace(
            "tui.app.Design.solve = lambda *a: None",
            "def falls(self, session, previous):\n"
            f"    if session.revision == 0: self.session = session.edited({BORE!r}, '51 mm')\n"
            "    else: raise ZeroDivisionError('planted')\n"
            "tui.app.Design.solve = falls\n"
            "run = tui.app.Design.run\n"
            "tui.app.Design.run = lambda self: run(self, headless=True)",
        )
        + "\nsys.exit(result)"
    )
    (tmp_path / "one.toml").write_text(ONE)
    environment = {**os.environ, "PYTHONPATH": str(ROOT)}
    ended = subprocess.run([sys.executable, "-c", code], env=environment, capture_output=True, check=False)
    assert ended.returncode == 1
    assert b"planted" in ended.stderr + ended.stdout
    folder = tmp_path / "state" / "drafts"
    drafts = [place for place in folder.iterdir() if place.suffix != ".lock"]
    assert [parse(place.read_text()).text(BORE) for place in drafts] == ["51 mm"]


def test_the_first_picture_stands_before_anything_heavy_is_loaded(tmp_path: Path) -> None:
    code = f"""
import asyncio, sys, platformdirs
platformdirs.user_state_dir = platformdirs.user_config_dir = lambda *a, **k: {str(tmp_path)!r}
import tui.terminal
assert "textual" not in sys.modules
from actuator.project.document import parse
from actuator.settings import Settings
from tui.app import Design

HEAVY = ("scipy", "numba", "pint", "pandas", "numpy", "tomlkit", "actuator.analysis", "actuator.catalog")
seen = []

class Watched(Design):
    def solve(self, *arguments):
        rows = ["".join(part.text for part in strip) for strip in self.screen._compositor.render_strips()]
        seen.append((any("50 mm" in row for row in rows), [name for name in HEAVY if name in sys.modules]))

async def main():
    app = Watched(parse({ONE!r}), Settings())
    async with app.run_test(size=(80, 24)) as pilot:
        await pilot.pause()
        await pilot.pause()

asyncio.run(main())
print(seen)
"""
    environment = {**os.environ, "PYTHONPATH": str(ROOT)}
    ended = subprocess.run([sys.executable, "-c", code], env=environment, capture_output=True, text=True, check=False)
    assert ended.stdout == "[(True, [])]\n", ended.stderr


def streams(monkeypatch: pytest.MonkeyPatch, *, tty: bool = True, encoding: str = "utf-8") -> None:
    """Standard streams of a kind."""
    stream = SimpleNamespace(isatty=lambda: tty, encoding=encoding)
    for name in ("__stdin__", "__stdout__", "__stderr__"):
        monkeypatch.setattr(sys, name, stream)


def test_a_terminal_that_will_do_is_fit(monkeypatch: pytest.MonkeyPatch) -> None:
    streams(monkeypatch)
    monkeypatch.setenv("TERM", "xterm-256color")
    assert unfit() == ""


@pytest.mark.parametrize("term", ["dumb", "", "unknown"])
def test_a_dumb_terminal_is_unfit(monkeypatch: pytest.MonkeyPatch, term: str) -> None:
    streams(monkeypatch)
    monkeypatch.setenv("TERM", term)
    assert "cannot place text" in unfit()


def test_a_pipe_is_unfit(monkeypatch: pytest.MonkeyPatch) -> None:
    streams(monkeypatch, tty=False)
    monkeypatch.setenv("TERM", "xterm-256color")
    assert "not a terminal" in unfit()


def test_a_terminal_without_utf_8_is_unfit_and_told_what_to_set(monkeypatch: pytest.MonkeyPatch) -> None:
    streams(monkeypatch, encoding="ANSI_X3.4-1968")
    monkeypatch.setenv("TERM", "xterm-256color")
    assert "UTF-8" in unfit()
    assert "LC_ALL" in unfit()


def test_a_bare_console_is_known(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("TERM", "linux")
    assert console()
    monkeypatch.setenv("TERM", "tmux-256color")
    assert not console()
