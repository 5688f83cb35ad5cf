"""A fault in an input, as data: where, which rule, and the facts; the words are made in `app.phrases`."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal, TypeAlias

Rule: TypeAlias = Literal[
    # of the file's text
    "not_utf8",
    "not_json",  # facts: reason, line, column
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
    "empty_text",
    # of records together
    "too_few_segments",
    "joint_count",  # facts: joints, segments
    "duplicate_mark",  # facts: value, first (place)
    "unknown_reference",  # facts: kind (segment, joint, material, load case), value, nearest (or None)
    "inner_not_below_outer",  # facts: inner, outer, end (start or end)
    "duplicate_limit",  # facts: joint, first
    "same_joint",  # facts: joint
    # of solvability (place is the part of the model; facts name the combination where it matters)
    "not_held",
    "stop_not_yet",  # facts: joint
    "movement_without_support",  # facts: joint, case
]


@dataclass(frozen=True, slots=True)
class Fault:
    """One fault: `place` in the file's own path (`segments[2].section.diameter`), the rule and its facts."""

    place: str
    rule: Rule
    facts: Mapping[str, object] = field(default_factory=dict)
