"""Setting, adding and removing single values and records, at a place in the file's own path.

A place is a tuple of the file's keys and of indices, ("segments", 2, "section", "diameter"); `place_text` of
it is the place that faults name.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable
from functools import cache
from typing import Any

from msgspec import NODEFAULT, UNSET, Struct, inspect, structs

from app.decode import convert, project_type
from app.edits.checking import EditError, consistent, refused
from app.edits.renaming import is_of_a_name, rename
from app.encode import plain
from solver.faults import Fault, Place
from solver.model import Project

_Change = Callable[[Any, inspect.Type], Any]


def set_value(project: Project, place: Place, value: object) -> Project:
    """The project with `value` (plain, or a record) at `place`; UNSET takes an optional key away.

    A mark or name takes everything that refers to it along. EditError where the result is not well formed,
    KeyError or IndexError where there is no such place.
    """
    if is_of_a_name(place) and isinstance(value, str):
        return rename(project, place, value)
    return consistent(_changed(project, project_type(), place, _setter(place, value)), project)


def value_at(project: Project, place: Place) -> Any:
    """What stands at the place: a value, a record, an `Absent…` value, or UNSET."""
    found: Any = project
    described: inspect.Type = project_type()
    for step in place:
        found, described = _child(found, described, step)
    return found


def add_record(project: Project, place: Place, record: object, index: int | None = None) -> Project:
    """The project with a record put into the list at `place`, before `index` or at its end."""

    def grown(records: tuple[Any, ...], described: inspect.Type) -> tuple[Any, ...]:
        assert isinstance(described, inspect.VarTupleType)  # noqa: S101 - for the type checker
        at = len(records) if index is None else index
        fresh = _setter((*place, at), record)(None, described.item_type)
        return (*records[:at], fresh, *records[at:])

    return consistent(_changed(project, project_type(), place, grown), project)


def remove_records(project: Project, place: Place, indices: Iterable[int]) -> Project:
    """The project without the records at `indices` of the list at `place`."""
    gone = set(indices)

    def kept(records: tuple[Any, ...], _described: inspect.Type) -> tuple[Any, ...]:
        return tuple(record for index, record in enumerate(records) if index not in gone)

    return consistent(_changed(project, project_type(), place, kept), project)


def _setter(place: Place, value: object) -> _Change:
    def change(_old: object, described: inspect.Type) -> object:
        faults: list[Fault] = []
        converted = convert(plain(value), described, place, faults)
        if faults:
            raise EditError(tuple(faults))
        return converted

    return (lambda _old, _described: UNSET) if value is UNSET else change


def _changed(holder: Any, described: inspect.Type, place: Place, change: _Change, done: Place = ()) -> Any:
    """The holder, itself at the place `done`, with what lies at `place` below it changed."""
    if not place:
        return change(holder, described)
    step, rest = place[0], place[1:]
    child, child_type = _child(holder, described, step)
    fresh = _changed(child, child_type, rest, change, (*done, step))
    if isinstance(holder, Struct):
        return _with_field(holder, str(step), fresh, done)
    if isinstance(holder, dict):
        return {key: item for key, item in {**holder, step: fresh}.items() if item is not UNSET}
    items = list(holder)
    items[int(step)] = fresh
    return tuple(items)


def _child(holder: Any, described: inspect.Type, step: str | int) -> tuple[Any, inspect.Type]:
    """What lies one step below, and its type."""
    if isinstance(holder, Struct):
        field = _field(holder, str(step))
        return getattr(holder, field.name), field.type
    if isinstance(described, inspect.DictType):
        return holder.get(step), described.value_type
    if isinstance(described, inspect.VarTupleType):
        return holder[step], described.item_type
    raise KeyError(step)


def _field(record: Struct, key: str) -> inspect.Field:
    return _fields(type(record))[key]


@cache
def _fields(record: type[Struct]) -> dict[str, inspect.Field]:
    described = inspect.type_info(record)
    assert isinstance(described, inspect.StructType)  # noqa: S101 - for the type checker
    return {field.encode_name: field for field in described.fields}


def _with_field(record: Struct, key: str, value: object, place: Place) -> Struct:
    field = _field(record, key)
    if value is UNSET and field.required:
        raise refused(place, "missing_key", key=key)
    if value is UNSET and field.default_factory is not NODEFAULT:
        value = field.default_factory()
    return structs.replace(record, **{field.name: value})
