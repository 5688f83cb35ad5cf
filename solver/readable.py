"""What can be read of a project that may hold None where a part could not: for all rules of validation."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from typing import Any

from solver.faults import Fault, place_text


def records(value: object) -> Iterator[tuple[int, Any]]:
    """The records of a list with their index; nothing where the list could not be read."""
    return iter(enumerate(value)) if isinstance(value, tuple) else iter(())


def text(record: object, key: str) -> str | None:
    """The text under the key, None where there is none."""
    value = getattr(record, key, None)
    return value if isinstance(value, str) else None


def number(record: object, key: str) -> float | None:
    """The number under the key, None where there is none."""
    value = getattr(record, key, None)
    return value if isinstance(value, float) else None


def names(value: object, key: str) -> dict[str, None] | None:
    """The names in their order; None where one could not be read, since any reference may mean that one."""
    if not isinstance(value, tuple):
        return None
    found: list[Any] = [getattr(record, key, None) for record in value]
    return dict.fromkeys(found) if set(map(type, found)) <= {str} else None


def duplicates(named: Sequence[tuple[tuple[str | int, ...], str | None]]) -> Iterator[Fault]:
    """A fault for every name, given with its place, that has stood at an earlier place."""
    first: dict[str, tuple[str | int, ...]] = {}
    for place, name in named:
        if name is not None and first.setdefault(name, place) != place:
            facts = {"value": name, "first": place_text(first[name])}
            yield Fault(place_text(place), "duplicate_mark", facts)
