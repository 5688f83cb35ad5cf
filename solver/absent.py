"""Values that know they were never written: they compute as their defaults, and only the writer asks.

See `solver.model` for why. Factories rather than shared default objects, because msgspec's JSON Schema cannot
show a default of our own type.
"""

from __future__ import annotations

from collections.abc import Mapping


class AbsentNumber(float):
    """A number the file does not hold; computes and compares as its default."""

    __slots__ = ()


class AbsentText(str):
    """A text the file does not hold; reads as its default."""

    __slots__ = ()


class AbsentList(tuple[()]):
    """A list the file does not hold; empty."""

    __slots__ = ()


class AbsentTable(dict[str, float]):
    """A table of numbers the file does not hold; empty."""

    __slots__ = ()


def absent_zero() -> float:
    """A 0 that was never written."""
    return AbsentNumber(0.0)


def absent_one() -> float:
    """A 1 that was never written."""
    return AbsentNumber(1.0)


def absent_text() -> str:
    """An empty text that was never written."""
    return AbsentText("")


def absent_list() -> tuple[()]:
    """An empty list that was never written."""
    return AbsentList()


def absent_table() -> Mapping[str, float]:
    """An empty table that was never written."""
    return AbsentTable()
