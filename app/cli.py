"""The command `barwright`: reads the command line and hands over to `app.commands`.

`barwright FILE` means `barwright open FILE`, because opening a member is what one does most; a file called
like a command is opened by `barwright open check` or `barwright ./check`.
"""

from __future__ import annotations

import argparse
import io
import os
import sys
from collections.abc import Callable, Sequence
from typing import TypeAlias

from app import commands
from app.version import PROGRAM
from app.words import tr

BROKEN_PIPE = 141  # what a shell reports of a program that SIGPIPE ended
INTERRUPTED = 130  # likewise of Ctrl+C


def main(arguments: Sequence[str] | None = None) -> int:
    """Run the command; gives its exit code."""
    speak_utf8()
    options = parser().parse_args(with_command(sys.argv[1:] if arguments is None else list(arguments)))
    try:
        code: int = options.run(options)
        sys.stdout.flush()
    except BrokenPipeError:
        hush()
        return BROKEN_PIPE
    except KeyboardInterrupt:
        return INTERRUPTED
    return code


def speak_utf8() -> None:
    """Write UTF-8 whatever the locale; what cannot be written is spelled out rather than fatal."""
    for stream in (sys.stdout, sys.stderr):
        if isinstance(stream, io.TextIOWrapper):
            stream.reconfigure(encoding="utf-8", errors="backslashreplace")


def hush() -> None:
    """Nobody reads our output any more: drop the rest, so that the exit does not complain about it."""
    os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())


def with_command(arguments: list[str]) -> list[str]:
    """The arguments with the command that `barwright FILE` and bare `barwright` leave out."""
    if not arguments:
        return ["open"]
    first = arguments[0]
    return arguments if first.startswith("-") or first in COMMANDS else ["open", *arguments]


def parser() -> argparse.ArgumentParser:
    """The grammar of the command line, with its help."""
    top = argparse.ArgumentParser(
        prog="barwright",
        description=tr(
            "Members under axial load: stepped shafts, tie rods, columns, piles. Opens a window, or checks "
            "project files and prints calc sheets in the terminal."
        ),
        epilog=main_examples(),
        formatter_class=argparse.RawDescriptionHelpFormatter,
    )
    top.add_argument("--version", action="version", version=PROGRAM, help=tr("print the version and end"))
    places = top.add_subparsers(metavar=tr("COMMAND"), required=True)
    for name, add in COMMANDS.items():
        add(places, name)
    return top


Places: TypeAlias = "argparse._SubParsersAction[argparse.ArgumentParser]"


def command(
    places: Places, name: str, run: Callable[[argparse.Namespace], int], words: str, more: str = ""
) -> argparse.ArgumentParser:
    """A command with its one-line help, which also opens its own help page."""
    added = places.add_parser(
        name,
        help=words,
        description=words[:1].upper() + words[1:] + ".",
        epilog=more,
        formatter_class=argparse.RawDescriptionHelpFormatter,
    )
    added.set_defaults(run=run)
    return added


def add_open(places: Places, name: str) -> None:
    """`barwright open [FILE …]`, also without the word."""
    added = command(places, name, commands.run_open, tr("open the window; the word may be left out"))
    added.add_argument("files", nargs="*", metavar=tr("FILE"), help=tr("project files, one window each"))
    added.add_argument("--sample", metavar=tr("NAME"), help=tr("open a packaged sample as a new project"))


def add_check(places: Places, name: str) -> None:
    """`barwright check FILE …`."""
    added = command(
        places, name, commands.run_check, tr("check members and print what governs"), exit_codes()
    )
    added.add_argument("files", nargs="+", metavar=tr("FILE"), help=tr("project files"))
    added.add_argument("--json", action="store_true", help=tr("print the results file, one line each"))


def add_sheet(places: Places, name: str) -> None:
    """`barwright sheet FILE …`."""
    added = command(places, name, commands.run_sheet, tr("write calc sheets as PDF"), sheet_examples())
    added.add_argument("files", nargs="+", metavar=tr("FILE"), help=tr("project files"))
    added.add_argument(
        "-o",
        "--out",
        metavar=tr("PDF-or-folder"),
        help=tr("where to write; without it, beside each project. A folder is made if there is none"),
    )


def add_schema(places: Places, name: str) -> None:
    """`barwright schema`."""
    command(places, name, commands.run_schema, tr("print the JSON Schema of the project file"))


def add_sample(places: Places, name: str) -> None:
    """`barwright sample [NAME]`."""
    added = command(places, name, commands.run_sample, tr("list the packaged samples, or copy one"))
    added.add_argument("name", nargs="?", metavar=tr("NAME"), help=tr("the sample to copy"))
    added.add_argument(
        "-o",
        "--out",
        default=".",
        metavar=tr("FILE-or-folder"),
        help=tr("where to, this folder if not given"),
    )


COMMANDS: dict[str, Callable[..., None]] = {
    "open": add_open,
    "check": add_check,
    "sheet": add_sheet,
    "schema": add_schema,
    "sample": add_sample,
}


def main_examples() -> str:
    """What the help page ends with."""
    return tr("""examples:
  barwright                                    open the window
  barwright gate.barwright.json                open a member in it
  barwright sample                             list the samples
  barwright sample tie_rod                     copy one into this folder
  barwright check *.barwright.json             check all members of this folder
  barwright check gate.barwright.json --json   the same for a program to read
  barwright sheet gate.barwright.json          write gate.pdf beside it

An aid to calculation: a competent engineer verifies; local codes and licensed practice govern.""")


def exit_codes() -> str:
    """What `check` answers to a script."""
    return tr("""exit codes:
  0  every check was made and passes
  1  a check fails
  3  no check fails, but one could not be made, or there is none
  2  a file cannot be used, or the member cannot be solved; nothing is printed for it but the reason
  4  a fault of Barwright itself
With several files: the first of 4, 2, 1, 3, 0 that came up.""")


def sheet_examples() -> str:
    """How `sheet` is used."""
    return tr("""examples:
  barwright sheet gate.barwright.json                    gate.pdf beside the project
  barwright sheet gate.barwright.json -o sheets/A4.pdf   that file
  barwright sheet *.barwright.json -o sheets             one PDF for each, in that folder

A PDF of that name is replaced, a project never. Exit code 0 once all are written, whatever their verdict.""")
