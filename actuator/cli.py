"""The command line: open, new, check, assess, explain, schema.

Nothing but the standard library is imported until a command needs it, so that ``--help`` is at once there.
"""

from __future__ import annotations

import argparse
import sys
from collections.abc import Sequence
from pathlib import Path
from typing import TYPE_CHECKING

from actuator.errors import InputError, Problem
from actuator.report.streams import emit, ending_cleanly, is_unicode, silence

if TYPE_CHECKING:
    from actuator.answer import Answer
    from actuator.project.document import Document
    from actuator.report.bands_view import Scatters
    from actuator.unit_table import System

DONE, PROBLEMS, USAGE, FAILED, INTERRUPTED = 0, 1, 2, 3, 130

EPILOG = """\
exit status
  0  done
  1  the document has problems or cannot be read
  2  wrong usage, no terminal, or the file exists
  3  a requirement fails or cannot be judged
"""


class Parser(argparse.ArgumentParser):
    """A parser that prints through a stream that may be closed."""

    def _print_message(self, message: str, file: object = None) -> None:
        emit(message, sys.stderr if file is None else file)  # type: ignore[arg-type]


def _out(text: str) -> None:
    emit(text, sys.stdout)


def _note(text: str) -> None:
    emit(text + "\n", sys.stderr)


def _opened(file: str, sets: Sequence[str] = ()) -> Document | tuple[Problem, ...]:
    """Document of a file with the ``--set`` edits in it, or what is wrong with either."""
    from actuator.project.document import load

    try:
        document = load(Path(file))
    except (OSError, ValueError) as fault:
        reason = getattr(fault, "strerror", None) or str(fault)
        return (Problem(path="document", given="", allowed=f"cannot be read: {reason}"),)
    problems: list[Problem] = []
    for item in sets:
        path, _, text = item.partition("=")
        try:
            document = document.edited(path.strip(), text.strip())
        except InputError as fault:
            problems += fault.problems
    return tuple(problems) if problems else document


def _answer(arguments: argparse.Namespace) -> Answer | tuple[Problem, ...]:
    from actuator.answer import work_out

    document = _opened(arguments.file, arguments.set)
    if isinstance(document, tuple):
        return document
    answer = work_out(document)
    return answer.problems or answer


def _system(arguments: argparse.Namespace) -> System:
    """Units asked for, else those of the user's settings."""
    if arguments.units:
        system: System = arguments.units
        return system
    from actuator.settings import load_settings

    return load_settings().units


def _refuse(problems: Sequence[Problem], file: str) -> int:
    from actuator.report.text import problem_lines

    _note("\n".join(problem_lines(problems, file)))
    return PROBLEMS


def run_open(arguments: argparse.Namespace) -> int:
    """Start the terminal UI."""
    from tui.terminal import unfit

    reason = unfit()
    if reason:
        _note(f"actuator: {reason}; `actuator assess FILE` and the other commands work without (see --help)")
        return USAGE
    if arguments.file is None:
        from actuator.project.document import demo

        document = demo()
    else:
        found = _opened(arguments.file)
        if isinstance(found, tuple):
            return _refuse(found, arguments.file)
        document = found
    from tui.app import run

    return run(document)


def run_new(arguments: argparse.Namespace) -> int:
    """Write a commented starting document."""
    from actuator.project.document import template
    from actuator.project.files import write_text

    path = Path(arguments.file)
    if path.exists() and not arguments.force:
        _note(f"actuator: {arguments.file} exists; --force writes over it")
        return USAGE
    try:
        write_text(path, template(_system(arguments)))
    except OSError as fault:
        _note(f"actuator: {arguments.file} cannot be written: {fault.strerror}")
        return USAGE
    _note(f"{arguments.file} written; next: actuator open {arguments.file}")
    return DONE


def run_check(arguments: argparse.Namespace) -> int:
    """Name every problem of a document."""
    from actuator.project.validate import validate
    from actuator.report.text import problem_lines

    found = _opened(arguments.file)
    checked = found if isinstance(found, tuple) else validate(found)
    if isinstance(checked, tuple):
        _out("\n".join(problem_lines(checked, arguments.file)) + "\n")
        return PROBLEMS
    _note(f"{arguments.file}: no problems")
    return DONE


def run_assess(arguments: argparse.Namespace) -> int:
    """Compute everything and show it."""
    from actuator.report.verdicts import all_met

    answer = _answer(arguments)
    problems = answer if isinstance(answer, tuple) else ()
    scatters = None if isinstance(answer, tuple) or not arguments.bands else _scatters(answer)
    if arguments.json:
        from actuator.report.json_view import as_data, as_json, problems_as_data

        data = (
            problems_as_data(answer)
            if isinstance(answer, tuple)
            else as_data(answer, histories=arguments.histories, scatters=scatters)
        )
        _out(as_json(data, ascii_only=not is_unicode(sys.stdout)))
        if problems:
            return PROBLEMS
    if isinstance(answer, tuple):
        return _refuse(answer, arguments.file)
    assert answer.analysis is not None
    if arguments.csv:
        from actuator.report.csv_view import as_csv

        _out(as_csv(answer.analysis, scatters))
    elif not arguments.json:
        from actuator.report.text import as_text

        _out(as_text(answer, _system(arguments), scatters))
    return DONE if all_met(answer.analysis) else FAILED


def _scatters(answer: Answer) -> Scatters:
    """Tolerance bands of every actuator, the exergy ledger's too; compiles the kernel first."""
    from actuator.report.scatter import bands_of

    assert answer.analysis is not None
    places = [
        (number, index) for number, item in enumerate(answer.analysis.machines) for index in range(len(item.actuators))
    ]
    return {place: bands_of(answer, *place, ledger=True, wait=True) for place in places}


def run_explain(arguments: argparse.Namespace) -> int:
    """Show the working of one figure, or the names of all."""
    from actuator.report.names import NotFound, find
    from actuator.report.text import figure_list
    from actuator.report.workings import render, working

    answer = _answer(arguments)
    if isinstance(answer, tuple):
        return _refuse(answer, arguments.file)
    assert answer.analysis is not None
    system = _system(arguments)
    if arguments.figure is None:
        _out(figure_list(answer, system))
        return DONE
    found = find(answer.analysis, arguments.figure)
    if isinstance(found, NotFound):
        said = f"actuator: {arguments.figure} names " + ("several figures" if found.ambiguous else "no figure")
        hint = "write one of" if found.ambiguous else "nearest" if found.names else "actuator explain lists all"
        _note(f"{said}; {hint}" + "".join(f"\n  {name}" for name in found.names))
        return USAGE
    at = found.at
    _out(render(working(answer, at.machine_index, at.actuator_index, found.figure.key, system)))
    return DONE


def run_schema(_: argparse.Namespace) -> int:
    """Print the JSON Schema of the document."""
    import json

    from actuator.project.schema import json_schema

    _out(json.dumps(json_schema(), indent=2, ensure_ascii=not is_unicode(sys.stdout)) + "\n")
    return DONE


def _setting(text: str) -> str:
    if not text.partition("=")[1] or not text.partition("=")[0].strip():
        raise argparse.ArgumentTypeError(f'"{text}" given; write path=text, e.g. machine.cycle_time="4 s"')
    return text


def _parser() -> argparse.ArgumentParser:
    top = Parser(
        prog="actuator",
        description="Design air cylinders: stroke times, forces, air, where its energy goes, and what it costs.",
        epilog="Without a command the terminal UI opens on an invented demo plant.\n\n"
        "example\n  actuator new line.toml && actuator assess line.toml\n\n" + EPILOG,
        formatter_class=argparse.RawDescriptionHelpFormatter,
        allow_abbrev=False,
    )
    top.set_defaults(run=run_open, file=None)
    commands = top.add_subparsers(title="commands", metavar="COMMAND")

    def command(name: str, run: object, does: str, example: str) -> argparse.ArgumentParser:
        made = commands.add_parser(
            name,
            help=does,
            description=does[0].upper() + does[1:] + ".",
            epilog=f"example\n  {example}",
            formatter_class=argparse.RawDescriptionHelpFormatter,
            allow_abbrev=False,
        )
        made.set_defaults(run=run)
        return made

    def units(made: argparse.ArgumentParser) -> None:
        made.add_argument("--units", choices=("si", "us"), help="units of the text; else those of the settings")

    def settings(made: argparse.ArgumentParser) -> None:
        made.add_argument(
            "--set",
            action="append",
            default=[],
            type=_setting,
            metavar="PATH=TEXT",
            help="change a field first, as typed in it; may be repeated",
        )

    made = command("open", run_open, "open the terminal UI on a document", "actuator open line.toml")
    made.add_argument("file", nargs="?", metavar="FILE", help="document; left out: the invented demo plant")

    made = command("new", run_new, "write a commented starting document", "actuator new line.toml --units si")
    made.add_argument("file", metavar="FILE", help="document to write")
    made.add_argument("--force", action="store_true", help="write over a file that exists")
    units(made)

    made = command("check", run_check, "name every problem of a document", "actuator check line.toml")
    made.add_argument("file", metavar="FILE", help="document")

    made = command(
        "assess",
        run_assess,
        "compute everything that a document describes",
        'actuator assess line.toml --set machine.actuator.bore="63 mm" --json',
    )
    made.add_argument("file", metavar="FILE", help="document")
    form = made.add_mutually_exclusive_group()
    form.add_argument("--json", action="store_true", help="JSON, numbers in SI")
    form.add_argument("--csv", action="store_true", help="one row a figure, numbers in SI")
    made.add_argument("--bands", action="store_true", help="with tolerance bands P5, P50, P95 under the stated spread")
    made.add_argument("--histories", action="store_true", help="with --json: time histories and p-V points")
    settings(made)
    units(made)

    made = command(
        "explain",
        run_explain,
        "show the working of one figure: formula, numbers put in, sources",
        "actuator explain line.toml extend.stroke_time",
    )
    made.add_argument("file", metavar="FILE", help="document")
    made.add_argument("figure", nargs="?", metavar="FIGURE", help="name or tail of it; left out: all names")
    settings(made)
    units(made)

    command("schema", run_schema, "print the JSON Schema of the document", "actuator schema > actuator.json")
    return top


def main(argv: Sequence[str] | None = None) -> int:
    """Run one command.

    Parameters
    ----------
    argv : sequence of str, optional
        Arguments; those of the process where left out.

    Returns
    -------
    int
        Exit status: 0 done, 1 problems in the document, 2 usage, 3 a requirement fails, 130 interrupted.

    Raises
    ------
    SystemExit
        From the parser: 0 for ``--help``, 2 for wrong usage; 128 + n on a signal.
    """
    parser = _parser()
    arguments = parser.parse_args(argv)
    if getattr(arguments, "histories", False) and not arguments.json:
        parser.error("--histories needs --json")
    try:
        with ending_cleanly():
            status: int = arguments.run(arguments)
    except KeyboardInterrupt:
        return INTERRUPTED
    except BrokenPipeError:
        silence(sys.stdout)
        return DONE
    return status
