"""Plain values to the model's records, collecting every fault instead of stopping at the first.

msgspec's own decoder stops at its first fault, so this walks the same type descriptions (`msgspec.inspect`)
record by record and field by field. What could not be read is None in the record that is built: the checks of
records together then go on with what was readable. Null is never a value, a bool is never a number.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping, Sequence
from functools import cache
from typing import Any

from msgspec import UNSET, inspect

from solver.faults import Fault, Place, Rule, place_text, printable
from solver.model import Project
from solver.nearest import nearest

Faults = list[Fault]
_SHOWN_LENGTH = 60
_LARGEST_WHOLE = 1e15


@cache
def project_type() -> inspect.StructType:
    """The description of a whole project."""
    described = inspect.type_info(Project)
    assert isinstance(described, inspect.StructType)  # noqa: S101 - for the type checker
    return described


def convert(value: object, described: inspect.Type, place: Place, faults: Faults) -> Any:
    """The value as the type described, or None with its faults added; UNSET had its fault told before."""
    if value is UNSET:
        return None
    return _CONVERTERS[type(described)](value, described, place, faults)


def _fault(faults: Faults, place: Place, rule: Rule, **facts: object) -> None:
    faults.append(Fault(place_text(place), rule, facts))


def _wrong_type(faults: Faults, place: Place, expected: str, value: object) -> None:
    _fault(faults, place, "wrong_type", expected=expected, value=shown(value))


def shown(value: object) -> object:
    """The value as a message may show it: short, printable, whole numbers without a point."""
    if isinstance(value, str):
        text = printable(value)
        return text if len(text) <= _SHOWN_LENGTH else f"{text[:_SHOWN_LENGTH]}…"
    if isinstance(value, Mapping):
        return "{…}" if value else "{}"
    if isinstance(value, list | tuple):
        return "[…]" if value else "[]"
    if isinstance(value, float) and value.is_integer() and abs(value) < _LARGEST_WHOLE:
        return int(value)
    return value


def _number(value: object, described: inspect.FloatType, place: Place, faults: Faults) -> Any:
    if isinstance(value, bool) or not isinstance(value, int | float):
        return _wrong_type(faults, place, "number", value)
    number = _double(value)
    if not math.isfinite(number):
        return _fault(faults, place, "not_finite", value=str(number))
    if described.gt is not None and not number > described.gt:
        return _fault(faults, place, "not_greater_than", bound=described.gt, value=number)
    if described.ge is not None and not number >= described.ge:
        return _fault(faults, place, "below_least", bound=described.ge, value=number)
    return number


def _double(value: float) -> float:
    try:
        return float(value)
    except OverflowError:  # an int beyond the doubles
        return math.copysign(math.inf, value)


def _text(value: object, described: inspect.StrType, place: Place, faults: Faults) -> Any:
    if not isinstance(value, str):
        return _wrong_type(faults, place, "text", value)
    if len(value) < (described.min_length or 0):
        return _fault(faults, place, "empty_text")
    return str(value) if _encodable(value) else _fault(faults, place, "not_utf8")


def _encodable(text: str) -> bool:
    try:
        text.encode("utf-8")
    except UnicodeEncodeError:  # a lone surrogate, which JSON can spell but no file can hold
        return False
    return True


def _choice(value: object, described: inspect.LiteralType, place: Place, faults: Faults) -> Any:
    for choice in described.values:
        if value == choice and isinstance(value, bool) == isinstance(choice, bool):
            return choice
    kind = str if isinstance(described.values[0], str) else int | float
    if isinstance(value, bool) or not isinstance(value, kind):
        return _wrong_type(faults, place, "text" if kind is str else "number", value)
    return _not_a_choice(value, described.values, place, faults)


def _not_a_choice(
    value: object, choices: Sequence[object], place: Place, faults: Faults, rule: Rule = "not_a_choice"
) -> None:
    close = nearest(value, map(str, choices)) if isinstance(value, str) else None
    _fault(faults, place, rule, value=shown(value), choices=tuple(choices), nearest=close)


def _list(value: object, described: inspect.VarTupleType, place: Place, faults: Faults) -> Any:
    if not isinstance(value, list | tuple):
        return _wrong_type(faults, place, "list", value)
    kind = described.item_type
    return tuple(convert(item, kind, (*place, index), faults) for index, item in enumerate(value))


def _table(value: object, described: inspect.DictType, place: Place, faults: Faults) -> Any:
    if not isinstance(value, Mapping):
        return _wrong_type(faults, place, "object", value)
    key_type, value_type = described.key_type, described.value_type
    return {
        convert(key, key_type, (*place, key), faults): convert(item, value_type, (*place, key), faults)
        for key, item in value.items()
    }


def _record(value: object, described: inspect.StructType, place: Place, faults: Faults) -> Any:
    if not isinstance(value, Mapping):
        return _wrong_type(faults, place, "object", value)
    known = {field.encode_name: field for field in described.fields}
    names = (*known, *([described.tag_field] if described.tag_field else []))
    for key in value:
        if key not in names:
            _fault(faults, place, "unknown_key", key=shown(key), nearest=nearest(key, names))
    read: dict[str, object] = {}
    for key, field in known.items():
        if key in value:
            read[field.name] = convert(value[key], field.type, (*place, key), faults)
        elif field.required:
            read[field.name] = None
            _fault(faults, place, "missing_key", key=key)
    return described.cls(**read)


def _one_of(value: object, described: inspect.UnionType, place: Place, faults: Faults) -> Any:
    """One of several records, told apart by their tag (`shape`, `kind`), or a word or a number."""
    if not any(isinstance(kind, inspect.StructType) for kind in described.types):
        return _word_or_number(value, described, place, faults)
    kinds = {kind.tag: kind for kind in described.types if isinstance(kind, inspect.StructType)}
    key = next(iter(kinds.values())).tag_field or ""
    if not isinstance(value, Mapping):
        return _wrong_type(faults, place, "object", value)
    if key not in value:
        return _fault(faults, place, "missing_key", key=key)
    tag = value[key]
    if isinstance(tag, str) and tag in kinds:
        return _record(value, kinds[tag], place, faults)
    if tag is UNSET:
        return None
    if not isinstance(tag, str):
        return _wrong_type(faults, (*place, key), "text", tag)
    return _not_a_choice(tag, tuple(kinds), (*place, key), faults)


def _word_or_number(value: object, described: inspect.UnionType, place: Place, faults: Faults) -> Any:
    by_type = {type(kind): kind for kind in described.types}
    if isinstance(value, int | float) and not isinstance(value, bool):
        return convert(value, by_type[inspect.FloatType], place, faults)
    words = [
        word for kind in described.types if isinstance(kind, inspect.LiteralType) for word in kind.values
    ]
    if isinstance(value, str) and value in words:
        return value
    return _not_a_choice(value, words, place, faults, "no_word_or_number")


_CONVERTERS: Mapping[type[inspect.Type], Callable[[Any, Any, Place, Faults], Any]] = {
    inspect.FloatType: _number,
    inspect.StrType: _text,
    inspect.LiteralType: _choice,
    inspect.VarTupleType: _list,
    inspect.DictType: _table,
    inspect.StructType: _record,
    inspect.UnionType: _one_of,
}
