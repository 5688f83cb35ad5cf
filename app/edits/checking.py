"""The gate every edit passes: what is not well formed is refused with its faults, and nothing changes."""

from __future__ import annotations

from msgspec.inspect import VarTupleType

from app.decode import convert, project_type
from app.edits.soundness import changed, is_surely_sound, unchanged_before
from app.encode import plain
from solver import validation
from solver.faults import Fault, Place, Rule, place_text
from solver.model import Project


class EditError(Exception):
    """The edit would not give a well-formed project, or cannot be made; `faults` says why."""

    def __init__(self, faults: tuple[Fault, ...]) -> None:
        super().__init__("; ".join(f"{fault.place}: {fault.rule}" for fault in faults))
        self.faults = faults


def refused(place: Place, rule: Rule, **facts: object) -> EditError:
    """The error for one fault."""
    return EditError((Fault(place_text(place), rule, facts),))


def consistent(project: Project, since: Project | None = None) -> Project:
    """The project itself, its single values being right already; EditError for faults of records together.

    `since` is a well-formed project that it was made from: only what has changed is then looked at, where
    that is enough.
    """
    if since is not None and is_surely_sound(project, since):
        return project
    faults = validation.faults(project)
    if faults:
        raise EditError(faults)
    return project


def checked(project: Project, since: Project | None = None) -> Project:
    """The project itself, every value of it looked at again; EditError where it is not well formed.

    `since` is a well-formed project that it was made from: records that both hold are not looked at again, so
    that thousands of edits in a row stay quick.
    """
    faults: list[Fault] = []
    if since is None:
        convert(plain(project), project_type(), (), faults)
    else:
        _convert_new(project, since, faults)
    if faults:
        raise EditError(tuple(faults))
    return consistent(project, since)


def _convert_new(project: Project, since: Project, faults: list[Fault]) -> None:
    for field in project_type().fields:
        own, old = getattr(project, field.name), getattr(since, field.name)
        if own is old:
            continue
        if not (isinstance(field.type, VarTupleType) and isinstance(own, tuple) and isinstance(old, tuple)):
            convert(plain(project), project_type(), (), faults)
            return
        records, were = changed(own, old)
        first, known = unchanged_before(own, old), set(map(id, were))
        for index, record in enumerate(records, first):
            if id(record) not in known:
                convert(plain(record), field.type.item_type, (field.encode_name, index), faults)
