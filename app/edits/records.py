"""Lists of records changed as a whole, in such a way that a list that was never written stays so."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from typing import TypeVar

from msgspec import Struct, structs

from solver.model import LoadCase, Project

_R = TypeVar("_R", bound=Struct)


def expanded(records: tuple[_R, ...], change: Callable[[_R], Iterable[_R]]) -> tuple[_R, ...]:
    """Each record replaced by what `change` gives for it; the very same list where nothing changes."""
    fresh = tuple(new for record in records for new in change(record))
    unchanged = len(fresh) == len(records) and all(a is b for a, b in zip(fresh, records, strict=True))
    return records if unchanged else fresh


def mapped(records: tuple[_R, ...], change: Callable[[_R], _R]) -> tuple[_R, ...]:
    """Each record changed; the very same list where nothing changes."""
    return expanded(records, lambda record: (change(record),))


def kept(records: tuple[_R, ...], keep: Callable[[_R], bool]) -> tuple[_R, ...]:
    """The records to keep; the very same list where all are."""
    return expanded(records, lambda record: (record,) if keep(record) else ())


def with_cases(project: Project, change: Callable[[LoadCase], LoadCase]) -> Project:
    """The project with each load case changed."""
    return structs.replace(project, load_cases=mapped(project.load_cases, change))


def fresh_mark(taken: Iterable[str], like: str) -> str:
    """A mark not yet taken: the next letter after a letter, else the same word with the next free number."""
    used = set(taken)
    if len(like) == 1 and like.isascii() and like.isalpha():
        last = "Z" if like.isupper() else "z"
        letters = (chr(code) for code in range(ord(like) + 1, ord(last) + 1))
        free = next((letter for letter in letters if letter not in used), None)
        if free is not None:
            return free
    stem = like.rstrip("0123456789")
    number = 2 if stem else 0
    while f"{stem}{number}" in used:
        number += 1
    return f"{stem}{number}"
