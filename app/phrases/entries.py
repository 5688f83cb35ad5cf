"""What is said about a typed entry that cannot be read: why, and what to type instead."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Final, Literal, TypeAlias

from app.words import later, tr

EntryRule: TypeAlias = Literal[
    "empty", "too_long", "too_deep", "not_a_number", "two_decimal_signs", "two_numbers", "number_missing",
    "bracket_open", "bracket_stray", "zero_divisor", "too_large", "too_small", "unknown_unit", "near_unit",
    "no_unit", "section_unknown", "section_flat", "section_dimensions", "section_units",
    "wall_too_thick", "bore_too_wide", "size_not_positive", "section_change", "second_moment",
    "part_unknown", "part_near", "part_section", "part_shape",
]  # fmt: skip

ENTRIES: Final[Mapping[EntryRule, str]] = {
    "empty": later("Nothing entered; type a number such as {example}"),
    "too_long": later("Too long to be a number: {length} characters, at most {most}"),
    "too_deep": later("Brackets in brackets go at most {most} deep"),
    "not_a_number": later("“{found}” is not a number; type one such as {example}"),
    "two_decimal_signs": later(
        "“{found}” has more than one decimal sign; type thousands without a sign between"
    ),
    "two_numbers": later("“{found}” follows a number with no sign between; type thousands without a gap"),
    "number_missing": later("A number is missing before “{found}”"),
    "bracket_open": later("A closing bracket is missing"),
    "bracket_stray": later("A closing bracket without an opening one"),
    "zero_divisor": later("Division by zero"),
    "too_large": later("Too large to compute with"),
    "too_small": later("Too small to tell from 0; type 0 if that is meant"),
    "unknown_unit": later("“{found}” is no unit that can stand here; use one such as {example}"),
    "near_unit": later("“{found}” is no unit that can stand here; did you mean “{nearest}”?"),
    "no_unit": later("“{found}”: a plain number without a unit is wanted here"),
    "section_unknown": later(
        "“{found}” is no section; type one such as d40, d60x5 (a tube), r20x30 or A 1200"
    ),
    "section_flat": later(
        "“{found}” is taken as outside × wall of a tube, and the wall is thicker than half of it;"
        " type r{found} for a rectangle"
    ),
    "section_dimensions": later("“{found}” needs {wanted} dimensions, such as {example}"),
    "section_units": later("Give the unit once, at the end, or with every dimension"),
    "wall_too_thick": later("The wall is thicker than half the outside diameter"),
    "bore_too_wide": later("The bore must be smaller than the outside diameter"),
    "size_not_positive": later("Every dimension must be greater than 0"),
    "part_unknown": later(
        "“{found}” is no material; a bonded part is a material and its section, such as Steel d20"
    ),
    "part_near": later("“{found}” is no material; did you mean “{nearest}”?"),
    "part_section": later("The section of the part of {name} is missing; type it behind, such as {name} d20"),
    "part_shape": later("Say the shape of “{found}”: d20 (round), d60x5 (a tube), r20x30 or A 1200"),
    "second_moment": later(
        "A second moment I stands behind an area, at the start of the segment first, as in {example}"
    ),
    "section_change": later("Start and end of a segment have the same shape; “{found}” is another"),
}


def entry_sentence(rule: EntryRule, facts: Mapping[str, object]) -> str:
    """The sentence to show beside the field."""
    return tr(ENTRIES[rule]).format(**facts)
