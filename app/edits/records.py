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


class FreshMarks:
    """Gives out marks that are not taken yet, each once; it remembers how far it has counted."""

    def __init__(self, taken: Iterable[str]) -> None:
        self._taken = set(taken)
        self._next: dict[str, int] = {}  # by the word before the number

    def like(self, mark: str) -> str:
        """A mark in the manner of one: the next letter after a letter, else the word with the next number."""
        fresh = self._letter(mark) or self._numbered(mark.rstrip("0123456789"))
        self._taken.add(fresh)
        return fresh

    def in_turn(self, count: int, mark: str) -> list[str]:
        """So many of them, each in the manner of the one before, the first of `mark`."""
        given = [mark]
        for _ in range(count):
            given.append(self.like(given[-1]))
        return given[1:]

    def _letter(self, mark: str) -> str | None:
        if not (len(mark) == 1 and mark.isascii() and mark.isalpha()):
            return None
        last = "Z" if mark.isupper() else "z"
        letters = (chr(code) for code in range(ord(mark) + 1, ord(last) + 1))
        return next((letter for letter in letters if letter not in self._taken), None)

    def _numbered(self, stem: str) -> str:
        number = self._next.get(stem, 2 if stem else 0)
        while f"{stem}{number}" in self._taken:
            number += 1
        self._next[stem] = number + 1
        return f"{stem}{number}"


def fresh_mark(taken: Iterable[str], like: str) -> str:
    """A mark not yet taken, in the manner of another."""
    return FreshMarks(taken).like(like)
