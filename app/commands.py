"""What the commands do, one function each; the arguments come from `app.cli`, the words from `app.phrases`.

Costly rooms (solver, Typst, the window) are imported by the command that needs them, so that `--help` and
`--version` answer at once.
"""

from __future__ import annotations

import json
import subprocess
import sys
import unicodedata
from argparse import Namespace
from functools import partial
from pathlib import Path
from typing import TYPE_CHECKING

from app.exit_codes import FAIL, INCOMPLETE, PASS, UNUSABLE, worst
from app.words import tr

if TYPE_CHECKING:
    from app.outcome import Outcome
    from solver.model import Project
    from solver.results import Results


def run_open(options: Namespace) -> int:
    """Open a window on each file, or on a new project."""
    from app.qt_libraries import DRAWING, has_display, missing_packages

    if not has_display():
        return refuse(tr("There is no display to open a window on. In a terminal: barwright check FILE"))
    packages = missing_packages(DRAWING)
    if packages:
        command = "apt install " + " ".join(packages)
        return refuse(tr("Qt misses system libraries (on Debian: {command}).").format(command=command))
    return open_windows(options)


def open_windows(options: Namespace) -> int:
    """One window a process, so that a fault in one leaves the others alone."""
    from app.gui.main import run

    asked = [f"--language={options.language}"] if options.language else []
    for file in options.files[1:]:
        subprocess.Popen([sys.executable, "-m", "app", "open", *asked, "--", file])  # noqa: S603 - ourselves
    code: int = run(Path(options.files[0]) if options.files else None, options.language)
    return code


def refuse(sentence: str) -> int:
    """Say on standard error what stands in the way; gives the exit code."""
    sys.stderr.write(sentence + "\n")
    return UNUSABLE


def run_check(options: Namespace) -> int:
    """Check every file and print what came out; gives the exit code of the results file's contract."""
    from app.outcome import outcome

    codes, printed = [], False
    for file in options.files:
        result = outcome(file, check_json if options.json else partial(check_text, cures=options.cures))
        if printed and result.out and not options.json:
            sys.stdout.write("\n")
        tell(result)
        codes.append(result.code)
        printed = printed or bool(result.out)
    return worst(codes)


def tell(result: Outcome) -> None:
    """Print an outcome, each part where it belongs and in order."""
    sys.stdout.write(result.out)
    sys.stdout.flush()
    sys.stderr.write(shown(result.err))
    sys.stderr.flush()


def shown(text: str) -> str:
    """The text without what a terminal would obey: control signs in a file's words are shown, not sent."""
    return "".join(
        "\N{REPLACEMENT CHARACTER}" if unicodedata.category(sign)[0] == "C" and sign != "\n" else sign
        for sign in text
    )


def solved(file: str) -> tuple[Project, Results]:
    """The project of a file and its results."""
    from app.outcome import Unusable
    from app.phrases import error_sentences
    from app.project_file import read
    from solver.errors import InputError
    from solver.solve import solve

    project = read(Path(file))
    try:
        return project, solve(project, cases=False)
    except InputError as error:  # worded here, where the project lends its marks
        raise Unusable(error_sentences(error, project=project)) from error


def verdict_code(results: Results) -> int:
    """The exit code of a verdict."""
    return {"pass": PASS, "fail": FAIL, "incomplete": INCOMPLETE}[results.verdict]


def check_json(file: str) -> Outcome:
    """The results file as one line."""
    from app.outcome import Outcome
    from app.results_file import results_json

    _, results = solved(file)
    line = json.dumps(results_json(results), ensure_ascii=False, allow_nan=False)
    return Outcome(verdict_code(results), line + "\n")


MOST_CURED = 8  # findings, the worst first; a member in which more fail wants another look than this


def check_text(file: str, *, cures: bool = True) -> Outcome:
    """The check as a table to read, with what would make the worst failing checks pass."""
    from app.cures import failing, is_small, seek
    from app.outcome import Outcome
    from app.phrases.cures import unsought_sentence
    from app.terminal import report

    project, results = solved(file)
    failed, small = failing(results) if cures else (), is_small(results)
    cured = [seek(results, subject) for subject in failed[:MOST_CURED] if small]
    unsought = unsought_sentence(len(failed), MOST_CURED, small=small) if failed else ""
    return Outcome(verdict_code(results), shown(report(project, results, file, cured, unsought)))


def run_sheet(options: Namespace) -> int:
    """Write a calc sheet for every file; 0 where all were written, whatever their verdict."""
    from app.outcome import outcome
    from app.sheet_paths import UnusableTarget, sheet_paths

    try:
        targets = sheet_paths([Path(file) for file in options.files], options.out)
    except UnusableTarget as reason:
        return refuse(str(reason))
    codes = []
    for file, target in zip(options.files, targets, strict=True):
        result = outcome(file, partial(write_sheet, target))
        tell(result)
        codes.append(result.code)
    return worst(codes)


def write_sheet(target: Path, file: str) -> Outcome:
    """Write one calc sheet and tell its verdict."""
    from app.atomic import write_bytes
    from app.outcome import Outcome, os_sentence, unwritten
    from app.phrases import verdict_line
    from app.sheet import build_sheet

    project, results = solved(file)
    data = build_sheet(project, results, file_name=Path(file).name)
    try:
        target.parent.mkdir(parents=True, exist_ok=True)
        write_bytes(target, data)
    except OSError as error:
        return unwritten(str(target), os_sentence(error))
    return Outcome(PASS, shown(f"{target}: {verdict_line(results)}\n"))


def run_schema(options: Namespace) -> int:  # noqa: ARG001 - every command takes its options
    """Print the JSON Schema of the project file."""
    from app.project_file import schema

    sys.stdout.write(json.dumps(schema(), indent=2, ensure_ascii=False) + "\n")
    return 0


def run_sample(options: Namespace) -> int:
    """List the packaged samples, or copy one of them; an existing file is never replaced."""
    from app.samples import SUFFIX, names, sample_path

    if options.name is None:
        sys.stdout.write(sample_list())
        return 0
    if options.name not in names():
        known = ", ".join(names())
        return refuse(
            tr("There is no sample {name}; there are: {known}").format(name=options.name, known=known)
        )
    target = Path(options.out)
    if target.is_dir():
        target /= f"{options.name}{SUFFIX}"
    return copy_new(sample_path(options.name), target)


def sample_list() -> str:
    """The samples, a line each: name and title."""
    from app.samples import names, read_sample

    return "".join(f"{name:<14}{read_sample(name).title}\n" for name in names())


def copy_new(source: Path, target: Path) -> int:
    """Copy a file to where there is none yet."""
    from app.outcome import os_sentence

    try:
        with target.open("xb") as file:
            file.write(source.read_bytes())
    except FileExistsError:
        return refuse(tr("{name} exists already; it is left as it is").format(name=target))
    except OSError as error:
        return refuse(tr("{name} cannot be written: {reason}").format(name=target, reason=os_sentence(error)))
    sys.stdout.write(f"{target}\n")
    return PASS
