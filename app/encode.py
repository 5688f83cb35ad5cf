"""The model's records to the canonical text of a project file: same project, same bytes.

Keys in the order of the records, a tag first; what was never written stays unwritten (see `solver.model`);
numbers as the shortest digits that read back to the same double, always with a point or an exponent.
"""

from __future__ import annotations

import json
from collections.abc import Mapping
from functools import cache
from typing import Any

from msgspec import UNSET, Struct, structs

from solver.absent import AbsentList, AbsentNumber, AbsentTable, AbsentText
from solver.model import ABSENT_DISPLAY, ABSENT_LIMITS, ABSENT_SHEET, Project

_ABSENT_KINDS = (AbsentNumber, AbsentText, AbsentList, AbsentTable)
_ABSENT_RECORDS = (ABSENT_SHEET, ABSENT_DISPLAY, ABSENT_LIMITS)


def is_absent(value: object) -> bool:
    """Whether the file does not hold this value."""
    if isinstance(value, Struct):
        return any(value is absent for absent in _ABSENT_RECORDS)
    return value is UNSET or isinstance(value, _ABSENT_KINDS)


def encode(project: Project) -> bytes:
    """The canonical UTF-8 text, with a final newline."""
    text = json.dumps(plain(project), ensure_ascii=False, allow_nan=False, indent=2)
    return f"{text}\n".encode()


def plain(value: object) -> Any:
    """The value as dict, list, str or float, the file's keys in the file's order."""
    if isinstance(value, Struct):
        return _plain_record(value)
    if isinstance(value, Mapping):
        return {str(key): plain(item) for key, item in value.items()}
    if isinstance(value, tuple | list):
        return [plain(item) for item in value]
    if isinstance(value, int | float) and not isinstance(value, bool):
        return float(value)  # an int given by code is written as the double that it is read back as
    return value


def _plain_record(record: Struct) -> dict[str, object]:
    tag, keys = _keys(type(record))
    values = ((key, getattr(record, name)) for name, key in keys)
    present = {key: plain(value) for key, value in values if not is_absent(value)}
    if isinstance(record, Project):
        present["version"] = record.version  # the one whole number of the format
    return tag | present


@cache
def _keys(record: type[Struct]) -> tuple[dict[str, object], tuple[tuple[str, str], ...]]:
    """The tag's key and value, and field names with the file's keys."""
    config = record.__struct_config__
    tag: dict[str, object] = {config.tag_field: config.tag} if config.tag_field else {}
    return tag, tuple((field.name, field.encode_name) for field in structs.fields(record))
