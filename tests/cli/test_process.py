"""The command as a process: streams, signals, encodings, what is imported, no terminal."""

from __future__ import annotations

import json
import os
import signal
import subprocess
import sys
from pathlib import Path

import pytest

from actuator.project.document import template

ROOT = Path(__file__).parents[2]
HEAVY = ("numpy", "scipy", "pint", "textual", "numba", "pandas", "tomlkit", "rich")


def environment(**changes: str) -> dict[str, str]:
    return {**os.environ, "PYTHONPATH": str(ROOT), **changes}


def run(*arguments: str, **changes: str) -> subprocess.CompletedProcess[bytes]:
    return subprocess.run(
        [sys.executable, "-m", "actuator", *arguments],
        capture_output=True,
        stdin=subprocess.DEVNULL,
        env=environment(**changes),
        check=False,
    )


@pytest.fixture(name="plant", scope="module")
def _plant(tmp_path_factory: pytest.TempPathFactory) -> Path:
    path = tmp_path_factory.mktemp("plant") / "plant.toml"
    path.write_text(template("si"), encoding="utf-8")
    return path


@pytest.mark.parametrize("arguments", [["--help"], ["assess", "--help"], ["assess"]])
def test_help_and_usage_load_nothing_heavy(arguments: list[str]) -> None:
    code = (
        "import sys\nfrom actuator.cli import main\n"
        f"try:\n    main({arguments!r})\nexcept SystemExit as end:\n    print(end.code)\n"
        f"print([name for name in {HEAVY!r} if name in sys.modules])"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, env=environment(), check=True, text=True)
    assert done.stdout.splitlines()[-1] == "[]"
    assert done.stdout.splitlines()[-2] == ("2" if arguments == ["assess"] else "0")


def test_the_package_s_two_names_load_nothing_until_they_are_called() -> None:
    code = f"import sys\nfrom actuator import load, work_out\nprint([n for n in {HEAVY!r} if n in sys.modules])"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, env=environment(), check=True)
    assert done.stdout.strip() == b"[]"


def test_load_and_work_out_give_the_answer_that_the_command_shows(plant: Path) -> None:
    from actuator import load, work_out

    answer = work_out(load(str(plant)))
    assert answer.problems == ()
    assert answer.analysis is not None
    data = json.loads(run("assess", str(plant), "--json").stdout)
    static = answer.analysis.machines[0].actuators[0].static
    assert data["machines"][0]["actuators"][0]["static"]["theoretical_extend_N"] == static.theoretical_extend


@pytest.mark.parametrize("arguments", [[], ["open"], ["open", "none.toml"]])
@pytest.mark.parametrize("term", ["dumb", "xterm-256color"])
def test_without_a_terminal_the_screens_do_not_start(arguments: list[str], term: str) -> None:
    done = run(*arguments, TERM=term)
    assert done.returncode == 2
    assert done.stdout == b""
    assert b"not a terminal" in done.stderr
    assert b"Traceback" not in done.stderr


def test_a_dumb_terminal_gets_a_plain_message() -> None:
    main_end, worker_end = os.openpty()
    process = subprocess.Popen(
        [sys.executable, "-m", "actuator"],
        stdin=worker_end,
        stdout=worker_end,
        stderr=worker_end,
        env=environment(TERM="dumb"),
    )
    assert process.wait(timeout=60) == 2
    said = os.read(main_end, 10_000)
    os.close(worker_end)
    os.close(main_end)
    assert b'TERM="dumb"' in said
    assert b"\x1b" not in said


def test_a_closed_pipe_is_no_error(plant: Path) -> None:
    for arguments in (["assess", str(plant)], ["explain", str(plant)], ["--help"]):
        process = subprocess.Popen(
            [sys.executable, "-m", "actuator", *arguments],
            stdout=subprocess.PIPE,
            stderr=subprocess.PIPE,
            env=environment(),
        )
        assert process.stdout is not None
        process.stdout.close()
        assert process.stderr is not None
        err = process.stderr.read()
        assert process.wait(timeout=60) in (0, 3)
        assert err == b""
        process.stderr.close()


@pytest.mark.parametrize("colour", [{}, {"NO_COLOR": "1"}])
def test_output_has_no_colour(plant: Path, colour: dict[str, str]) -> None:
    assert b"\x1b" not in run("assess", str(plant), **colour).stdout


def test_a_stream_that_is_not_unicode_gets_ascii(plant: Path) -> None:
    narrow = {"PYTHONIOENCODING": "ascii", "PYTHONUTF8": "0", "LC_ALL": "C"}
    done = run("explain", str(plant), "Pusher.extend.stroke_time", "--units", "si", **narrow)
    assert done.returncode == 0
    assert done.stdout.isascii()
    assert b"p1*A1 - p2*A2" in done.stdout
    done = run("assess", str(plant), "--json", **narrow)
    assert done.stdout.isascii()
    assert json.loads(done.stdout)["problems"] == []


SLOW = """
import sys, time
import actuator.project.files as files
def slow(path, text):
    with files.tempfile.NamedTemporaryFile(dir=path.parent, delete=True) as file:
        file.write(text[:50].encode()); file.flush()
        print("writing", flush=True)
        time.sleep(60)
files.write_text = slow
from actuator.cli import main
sys.exit(main(["new", sys.argv[1], "--units", "si", "--force"]))
"""


@pytest.mark.parametrize(("number", "status"), [(signal.SIGINT, 130), (signal.SIGTERM, 143), (signal.SIGHUP, 129)])
def test_a_signal_ends_with_its_status_and_leaves_the_file_whole(
    tmp_path: Path, number: signal.Signals, status: int
) -> None:
    path = tmp_path / "line.toml"
    path.write_text("format = 1\n", encoding="utf-8")
    process = subprocess.Popen(
        [sys.executable, "-c", SLOW, str(path)],
        stdout=subprocess.PIPE,
        stderr=subprocess.PIPE,
        env=environment(),
    )
    assert process.stdout is not None
    assert process.stdout.readline() == b"writing\n"
    process.send_signal(number)
    _, err = process.communicate(timeout=60)
    assert process.returncode == status
    assert b"Traceback" not in err
    assert path.read_text(encoding="utf-8") == "format = 1\n"
    assert list(tmp_path.iterdir()) == [path]


def test_ctrl_c_while_computing_is_status_130(plant: Path) -> None:
    code = (
        "import sys, time, actuator.answer as answer\n"
        "def slow(document):\n    print('computing', flush=True)\n    time.sleep(60)\n"
        "answer.work_out = slow\n"
        "from actuator.cli import main\nsys.exit(main(['assess', sys.argv[1]]))"
    )
    process = subprocess.Popen(
        [sys.executable, "-c", code, str(plant)],
        stdout=subprocess.PIPE,
        stderr=subprocess.PIPE,
        env=environment(),
    )
    assert process.stdout is not None
    assert process.stdout.readline() == b"computing\n"
    process.send_signal(signal.SIGINT)
    _, err = process.communicate(timeout=60)
    assert process.returncode == 130
    assert err == b""
