"""The exit codes of the terminal, as the contract of the results file has them."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Final

PASS: Final = 0
FAIL: Final = 1
UNUSABLE: Final = 2
INCOMPLETE: Final = 3
OUR_FAULT: Final = 4
WORST_FIRST: Final = (OUR_FAULT, UNUSABLE, FAIL, INCOMPLETE, PASS)

INTERRUPTED: Final = 130  # what a shell reports of a program that Ctrl+C ended
BROKEN_PIPE: Final = 141  # likewise of SIGPIPE


def worst(codes: Iterable[int]) -> int:
    """The exit code of a run over several files."""
    present = set(codes) or {PASS}
    return next(code for code in WORST_FIRST if code in present)
