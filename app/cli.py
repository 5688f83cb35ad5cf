"""The command `barwright`: reads the command line and hands over to `app.commands`.

`barwright FILE` means `barwright open FILE`, because opening a member is what one does most; a file called
like a command is opened by `barwright open check` or `barwright ./check`. The language is chosen before
anything else, because the help is worded in it too.
"""

from __future__ import annotations

import argparse
import io
import os
import sys
import textwrap
import traceback
from collections.abc import Callable, Sequence
from dataclasses import dataclass

from app import argparse_words, commands
from app.columns import one_line
from app.exit_codes import BROKEN_PIPE, INTERRUPTED, OUR_FAULT
from app.version import PROGRAM
from app.words import LANGUAGES, system_language, tr, use_language
from solver.nearest import nearest

HELP_WIDTH = 90
OPTION = "--language"


def main(arguments: Sequence[str] | None = None) -> int:
    """Run the command; gives its exit code."""
    speak_utf8()
    use_language(system_language())
    language, typed = with_language(sys.argv[1:] if arguments is None else list(arguments))
    if language and language not in LANGUAGES:
        return commands.refuse(no_language(language))
    use_language(language or system_language())
    argparse_words.install()
    if slip := misnamed(typed):
        return commands.refuse(slip)
    options = parser().parse_args(with_command(typed))
    options.language = language
    try:
        code: int = options.run(options)
        sys.stdout.flush()
    except BrokenPipeError:
        hush()
        return BROKEN_PIPE
    except KeyboardInterrupt:
        return INTERRUPTED
    except OSError as error:  # what concerns one file was told there; here the output itself fails
        hush()
        return commands.refuse(tr("The output cannot be written: {reason}").format(reason=error.strerror))
    except Exception:  # never Python's own exit code 1, which means that a check fails
        traceback.print_exc()
        return OUR_FAULT
    return code


def speak_utf8() -> None:
    """Write UTF-8 whatever the locale; what cannot be written is spelled out rather than fatal."""
    for stream in (sys.stdout, sys.stderr):
        if isinstance(stream, io.TextIOWrapper):
            stream.reconfigure(encoding="utf-8", errors="backslashreplace")


def hush() -> None:
    """Nobody reads our output any more: drop the rest, so that the exit does not complain about it."""
    os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())


def with_language(arguments: list[str]) -> tuple[str, list[str]]:
    """The language asked for by `--language`, empty for none, and the other arguments."""
    end = arguments.index("--") if "--" in arguments else len(arguments)
    ours, rest = [], []
    words = iter(arguments[:end])
    for word in words:
        if word == OPTION:
            ours.append(next(words, "?"))
        elif word.startswith(f"{OPTION}="):
            ours.append(word.partition("=")[2] or "?")
        else:
            rest.append(word)
    return (ours[-1] if ours else ""), rest + arguments[end:]


def no_language(wanted: str) -> str:
    """A sentence on a language that there is not."""
    known = ", ".join(f"{code} ({name})" for code, name in LANGUAGES.items())
    return tr("There is no language {wanted}; there are: {known}").format(
        wanted=commands.shown(one_line(wanted)), known=known
    )


def with_command(arguments: list[str]) -> list[str]:
    """The arguments with the command that `barwright FILE` and bare `barwright` leave out."""
    if not arguments:
        return ["open"]
    first = arguments[0]
    return arguments if first.startswith("-") or first in command_table() else ["open", *arguments]


def misnamed(arguments: list[str]) -> str:
    """A sentence on a first word that is neither a command nor a file that there is; else empty."""
    word = arguments[0] if arguments else "-"
    if word.startswith("-") or word in command_table() or os.path.lexists(word):
        return ""
    shown, meant = commands.shown(one_line(word)), nearest(word, command_table())
    if meant is None:
        return tr("There is no command or file {word}").format(word=shown)
    return tr("There is no command or file {word}; did you mean {meant}?").format(word=shown, meant=meant)


def parser() -> argparse.ArgumentParser:
    """The grammar of the command line, with its help."""
    top = argparse.ArgumentParser(
        prog="barwright",
        description=filled(
            tr(
                "Members under axial load: stepped shafts, tie rods, columns, piles. Opens a window, or "
                "checks project files and prints calc sheets in the terminal."
            )
        ),
        epilog=main_examples(),
        formatter_class=argparse.RawDescriptionHelpFormatter,
    )
    top.add_argument("--version", action="version", version=PROGRAM, help=tr("print the version and end"))
    places = top.add_subparsers(metavar=tr("COMMAND"), required=True)
    for name, command in command_table().items():
        added = places.add_parser(
            name,
            help=command.words,
            description=filled(f"{command.words[:1].upper()}{command.words[1:]}."),
            epilog=command.more,
            formatter_class=argparse.RawDescriptionHelpFormatter,
        )
        added.set_defaults(run=command.run)
        command.take(added)
        take_language(added)
    take_language(top)
    return top


def take_language(command: argparse.ArgumentParser) -> None:
    """The option that every command has; it was taken off before, so this is for the help page."""
    command.add_argument(OPTION, metavar="|".join(LANGUAGES), help=tr("the language, not the system's"))


def filled(text: str) -> str:
    """Text in lines of a readable length; the examples below it keep theirs."""
    return textwrap.fill(text, HELP_WIDTH)


def take_open(command: argparse.ArgumentParser) -> None:
    """`barwright open [FILE …]`, also without the word."""
    command.add_argument("files", nargs="*", metavar=tr("FILE"), help=tr("project files, one window each"))


def take_check(command: argparse.ArgumentParser) -> None:
    """`barwright check FILE … [--json] [--no-cures]`."""
    without = tr("do not seek what would make a failing check pass")
    command.add_argument("files", nargs="+", metavar=tr("FILE"), help=tr("project files"))
    command.add_argument("--no-cures", dest="cures", action="store_false", help=without)
    command.add_argument("--json", action="store_true", help=tr("print the results file, one line each"))


def take_sheet(command: argparse.ArgumentParser) -> None:
    """`barwright sheet FILE … [--out PDF-or-folder]`."""
    where = tr("where to write; without it, beside each project. A folder is made if there is none")
    command.add_argument("files", nargs="+", metavar=tr("FILE"), help=tr("project files"))
    command.add_argument("-o", "--out", metavar=tr("PDF-or-folder"), help=where)


def take_nothing(command: argparse.ArgumentParser) -> None:
    """A command without arguments."""


def take_sample(command: argparse.ArgumentParser) -> None:
    """`barwright sample [NAME]`."""
    where = tr("where to, this folder if not given")
    command.add_argument("name", nargs="?", metavar=tr("NAME"), help=tr("the sample to copy"))
    command.add_argument("-o", "--out", default=".", metavar=tr("FILE-or-folder"), help=where)


@dataclass(frozen=True)
class Command:
    """A command: its help in one line, what it runs, what it takes, and how its help page ends."""

    words: str
    run: Callable[[argparse.Namespace], int]
    take: Callable[[argparse.ArgumentParser], None]
    more: str = ""


def command_table() -> dict[str, Command]:
    """The commands in the order of the help page, worded in the user's language."""
    return {
        "open": Command(tr("open the window; the word may be left out"), commands.run_open, take_open),
        "check": Command(
            tr("check members and print what governs"), commands.run_check, take_check, exit_codes()
        ),
        "sheet": Command(tr("write calc sheets as PDF"), commands.run_sheet, take_sheet, sheet_examples()),
        "schema": Command(tr("print the JSON Schema of the project file"), commands.run_schema, take_nothing),
        "sample": Command(tr("list the packaged samples, or copy one"), commands.run_sample, take_sample),
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

A PDF of that name is replaced, a project never. Exit code 0 once all are written, whatever their
verdict; 2 and 4 as for check.""")
