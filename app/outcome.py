"""What one file came to in the terminal: an exit code, and what to print where.

Two families of errors are told apart here, at the outer edge, and nowhere else: an input that cannot be used
or solved becomes sentences (2), anything unforeseen is our own fault and keeps its traceback (4).
"""

from __future__ import annotations

import traceback
from collections.abc import Callable, Iterable
from dataclasses import dataclass

from app.columns import one_line
from app.exit_codes import OUR_FAULT, UNUSABLE
from app.phrases import error_sentences
from app.project_file import ProjectFileError
from app.words import tr


@dataclass(frozen=True, slots=True)
class Outcome:
    """The exit code of one file, its text for standard output and its text for standard error."""

    code: int
    out: str = ""
    err: str = ""


class Unusable(Exception):  # noqa: N818 - read by a person, worded as one would say it
    """An input that cannot be used, for reasons that are in words already."""

    def __init__(self, sentences: tuple[str, ...]) -> None:
        super().__init__(*sentences)
        self.sentences = sentences


def outcome(file: str, work: Callable[[str], Outcome]) -> Outcome:
    """Do the work on one file; whatever goes wrong becomes words on standard error and a code."""
    try:
        return work(file)
    except Unusable as error:
        return unusable(file, error.sentences)
    except ProjectFileError as error:
        return unusable(file, error_sentences(error))
    except OSError as error:
        return unusable(file, (os_sentence(error),))
    except Exception:  # the outer edge: reported with its traceback, and the next file goes on
        return Outcome(OUR_FAULT, err=our_fault(file))


def unusable(file: str, sentences: Iterable[str]) -> Outcome:
    """An input that cannot be used, with its reasons."""
    head = tr("{file} cannot be used:").format(file=file)
    return Outcome(
        UNUSABLE, err="\n".join([head, *(f"  {one_line(sentence)}" for sentence in sentences)]) + "\n"
    )


def unwritten(target: str, reason: str) -> Outcome:
    """A file that cannot be written."""
    return Outcome(
        UNUSABLE, err=tr("{name} cannot be written: {reason}").format(name=target, reason=reason) + "\n"
    )


def our_fault(file: str) -> str:
    """The words and the traceback of an exception that nobody foresaw."""
    line = tr(
        "{file}: Barwright itself has failed here; this is not a fault of the file. Please report this:"
    )
    return f"{line.format(file=file)}\n{traceback.format_exc()}"


def os_sentence(error: OSError) -> str:
    """What the system refused, in plain words, with the file it was about."""
    sentences: dict[type[OSError], str] = {
        FileNotFoundError: tr("there is no such file or folder: {name}"),
        IsADirectoryError: tr("this is a folder, a file is needed: {name}"),
        NotADirectoryError: tr("a part of the path is not a folder: {name}"),
        PermissionError: tr("the system does not permit it: {name}"),
    }
    words = sentences.get(type(error))
    if words is None:
        return ": ".join(str(part) for part in (error.strerror, error.filename) if part)
    return words.format(name=error.filename)
