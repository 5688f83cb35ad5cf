"""JSON text to plain values, refusing what the standard decoder lets pass: duplicate keys, NaN, 1e999.

Every number becomes a double at once, correctly rounded however many digits it has (and −0 stays −0).
Each fault carries its place; what it spoils is left as UNSET, so that reading can go on and find the rest.
"""

from __future__ import annotations

import json
import math
from collections.abc import Iterator, Mapping
from typing import Final, Literal, TypeAlias

from msgspec import UNSET

from solver.faults import Fault, Place, place_text, printable

MAX_DEPTH = 40  # a project nests six deep; beyond this it is no project, and recursion stays shallow
_SHOWN_DIGITS = 40


class _NotFinite(str):
    """A number that no double holds, as written."""

    __slots__ = ()


class _Pairs(list[tuple[str, object]]):
    """The members of one object in their order, duplicates included."""


class _TooDeep(Exception):  # noqa: N818 - ends the walk, never leaves this module
    pass


JsonSlip: TypeAlias = Literal[
    "empty", "ends_early", "trailing_comma", "no_value", "no_key", "no_colon", "no_comma",
    "text_open", "bad_escape", "control_sign", "goes_on", "other",
]  # fmt: skip

# How the decoder's messages begin; they are Python's, in English, and differ between its versions.
_SLIPS: Final[Mapping[str, JsonSlip]] = {
    "Illegal trailing comma": "trailing_comma",
    "Expecting value": "no_value",
    "Expecting property name": "no_key",
    "Expecting ':'": "no_colon",
    "Expecting ','": "no_comma",
    "Unterminated string": "text_open",
    "Invalid \\": "bad_escape",
    "Invalid control character": "control_sign",
    "Extra data": "goes_on",
}


def loads(data: bytes) -> tuple[object, tuple[Fault, ...]]:
    """The plain value of the text and its faults; the value is UNSET where the text is no JSON at all."""
    try:
        text = data.decode("utf-8-sig")
        tree = json.loads(
            text, object_pairs_hook=_Pairs, parse_float=_number, parse_int=_number, parse_constant=_NotFinite
        )
        faults: list[Fault] = []
        return _plain(tree, (), faults), tuple(faults)
    except UnicodeDecodeError as error:
        return UNSET, (Fault("", "not_utf8", {"byte": error.start}),)
    except json.JSONDecodeError as error:
        facts = {"reason": json_slip(error), "line": error.lineno, "column": error.colno}
        return UNSET, (Fault("", "not_json", facts),)
    except (RecursionError, _TooDeep):
        return UNSET, (Fault("", "too_deep"),)


def json_slip(error: json.JSONDecodeError) -> JsonSlip:
    """What is wrong with the text, by a name of our own, for `app.phrases` to word."""
    before, after = error.doc[: error.pos].rstrip(), error.doc[error.pos :].strip()
    slip: JsonSlip = next((slip for start, slip in _SLIPS.items() if error.msg.startswith(start)), "other")
    if not after:
        return "ends_early" if before else "empty"
    if slip in ("no_value", "no_key") and before.endswith(",") and after[0] in "]}":
        return "trailing_comma"
    return slip


def _number(text: str) -> float | _NotFinite:
    value = float(text)
    return value if math.isfinite(value) else _NotFinite(_shortened(text))


def _shortened(text: str) -> str:
    return text if len(text) <= _SHOWN_DIGITS else f"{text[:_SHOWN_DIGITS]}…"


def _plain(value: object, place: Place, faults: list[Fault]) -> object:
    if len(place) > MAX_DEPTH:
        raise _TooDeep
    if isinstance(value, _NotFinite):
        faults.append(Fault(place_text(place), "not_finite", {"value": str(value)}))
        return UNSET
    if isinstance(value, _Pairs):
        return dict(_members(value, place, faults))
    if isinstance(value, list):
        return [_plain(item, (*place, index), faults) for index, item in enumerate(value)]
    return value


def _members(pairs: _Pairs, place: Place, faults: list[Fault]) -> Iterator[tuple[str, object]]:
    seen: set[str] = set()
    for key, value in pairs:
        if key in seen:
            faults.append(Fault(place_text(place), "duplicate_key", {"key": printable(key)}))
            continue
        seen.add(key)
        yield key, _plain(value, (*place, key), faults)
