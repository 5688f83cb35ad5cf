"""Reading and writing project files: the one door between bytes and a well-formed Project.

Reading tells all faults at once, each with its place, and gives back either a whole project or none.
"""

from __future__ import annotations

import hashlib
import os
from collections.abc import Mapping
from pathlib import Path

from msgspec import UNSET

from app import strict_json
from app.atomic import write_bytes
from app.decode import convert, project_type, shown
from app.encode import encode
from app.schema import schema
from solver import validation
from solver.faults import Fault
from solver.model import FORMAT, VERSION, Project

__all__ = ["ProjectFileError", "dump", "parse", "read", "schema", "sha256", "write"]


class ProjectFileError(Exception):
    """The bytes are no well-formed project; `faults` has every reason, in the order of the file's parts."""

    def __init__(self, faults: tuple[Fault, ...]) -> None:
        super().__init__("; ".join(f"{fault.place}: {fault.rule}" for fault in faults))
        self.faults = faults


def read(path: str | os.PathLike[str]) -> Project:
    """The project in a file; OSError where it cannot be read, ProjectFileError where not well formed."""
    return parse(Path(path).read_bytes())


def parse(data: bytes) -> Project:
    """The project in the bytes; ProjectFileError, with all faults, where they are not well formed."""
    value, faults = strict_json.loads(data)
    if not isinstance(value, Mapping):
        raise ProjectFileError(faults or (Fault("format", "not_a_project", {"found": None}),))
    foreign = _identity_faults(value)
    if foreign:
        raise ProjectFileError(foreign)
    return _project(value, faults)


def dump(project: Project) -> bytes:
    """The canonical bytes: the same for the same project, and read back as the same project."""
    return encode(project)


def write(project: Project, path: str | os.PathLike[str]) -> None:
    """Save in one step: OSError (a full disk, no permission) leaves the old file whole."""
    write_bytes(path, dump(project))


def sha256(project: Project) -> str:
    """The fingerprint of the canonical bytes, as it stands in results and sheets."""
    return hashlib.sha256(dump(project)).hexdigest()


def _identity_faults(value: Mapping[object, object]) -> tuple[Fault, ...]:
    """Another format or a newer version: said alone, since the rest of such a file means nothing to us."""
    found, version = value.get("format"), value.get("version")
    if found != FORMAT:
        return (Fault("format", "not_a_project", {"found": None if found is UNSET else shown(found)}),)
    if isinstance(version, float) and version > VERSION:
        return (Fault("version", "newer_version", {"value": shown(version), "known": VERSION}),)
    return ()


def _project(value: object, told: tuple[Fault, ...]) -> Project:
    faults = list(told)
    project: Project = convert(value, project_type(), (), faults)
    faults.extend(validation.faults(project))
    if faults:
        raise ProjectFileError(tuple(faults))
    return project
