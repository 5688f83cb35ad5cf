"""A fault in an input, as data: where, which rule, and the facts; the words are made in `app.phrases`."""

from __future__ import annotations

import json
import re
from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal, TypeAlias

Rule: TypeAlias = Literal[
    # of the file's text
    "not_utf8",
    "not_json",  # facts: reason (a JsonSlip of app.strict_json), line, column
    "too_deep",
    "duplicate_key",  # facts: key
    "not_finite",  # facts: value (text as written)
    "not_a_project",  # facts: found (the format named in the file, or None)
    "newer_version",  # facts: value, known
    # of one record
    "unknown_key",  # facts: key, nearest (or None)
    "missing_key",  # facts: key
    "wrong_type",  # facts: expected, value
    "not_greater_than",  # facts: bound, value
    "below_least",  # facts: bound, value
    "not_a_choice",  # facts: value, choices, nearest (or None)
    "no_word_or_number",  # facts: value, choices, nearest (or None)
    "empty_text",
    "no_reason",  # of a waiver
    # of records together
    "too_few_segments",
    "joint_count",  # facts: joints, segments
    "duplicate_mark",  # facts: value, first (place)
    "unknown_reference",  # facts: kind (segment, joint, material, …), value, nearest (or None)
    "inner_not_below_outer",  # facts: inner, outer, end (start or end)
    "duplicate_limit",  # facts: joint, first
    "same_joint",  # facts: joint
    "both_keys",  # facts: key, other: only one of the two may stand there
    "neither_key",  # facts: key, other: one of the two must
    "no_companion_segments",
    "companion_order",  # facts: from, to (joints)
    "same_combination",  # facts: combination
    # of an edit that cannot be made
    "not_inside",  # facts: length, value: a split must lie inside the segment
    "parts_differ",  # facts: kind (material, section, bonded): segments to be joined are unlike in it
    "joint_carries",  # facts: joint, kind (support, load, shoulder …): joining would lose it
    "companion_full",  # facts: companion: its other segments alone are too long
    "repeats",  # facts: count, most: how often segments can be repeated at once
    "several_records",  # facts: count: the cell stands for more than one load record
    # of solvability (place is the part of the model; facts name the combination where it matters)
    "not_held",
    "not_pressed",
    "movement_without_support",  # facts: joint, case
    "companion_length",  # facts: companion, length, span, difference, kind (too_long, too_short)
]


@dataclass(frozen=True, slots=True)
class Fault:
    """One fault: `place` in the file's own path (`segments[2].section.diameter`), the rule and its facts."""

    place: str
    rule: Rule
    facts: Mapping[str, object] = field(default_factory=dict)


Place: TypeAlias = tuple[str | int, ...]

_PLAIN_KEY = re.compile(r"[^\W\d]\w*")


def place_text(place: Place) -> str:
    """The place as a path: `segments[2].section.diameter`; keys that are no plain words stand in ["…"]."""
    parts = [_step_text(step) for step in place]
    return "".join(parts).removeprefix(".")


def _step_text(step: str | int) -> str:
    if isinstance(step, int):
        return f"[{step}]"
    if _PLAIN_KEY.fullmatch(step):
        return f".{step}"
    return f"[{json.dumps(printable(step), ensure_ascii=False)}]"


def printable(text: str) -> str:
    """The text with lone surrogates, which no UTF-8 can hold, spelled out."""
    return text.encode("utf-8", "backslashreplace").decode("utf-8")
