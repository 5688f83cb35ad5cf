"""Bonded parts in edits: what happens to a segment's section happens to the sections of its parts alike."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from fractions import Fraction

from msgspec import structs

from app.edits.linear import cut, turned, united
from app.edits.records import mapped
from solver.model import AnySection, BondedPart, Project, Segment, parts_of


def with_sections(segment: Segment, change: Callable[[AnySection], AnySection]) -> Segment:
    """The segment with the section of each of its parts changed."""

    def changed(part: BondedPart) -> BondedPart:
        return structs.replace(part, section=change(part.section))

    section, bonded = change(segment.section), mapped(segment.bonded, changed)
    return structs.replace(segment, section=section, bonded=bonded)


def sections_cut(segment: Segment, at: Fraction) -> tuple[Segment, Segment]:
    """The segment with its sections up to `at` (0…1), and from there on."""
    return (
        with_sections(segment, lambda section: cut(section, at)[0]),
        with_sections(segment, lambda section: cut(section, at)[1]),
    )


def sections_turned(segment: Segment) -> Segment:
    """The segment with its sections seen from its other end."""
    return with_sections(segment, turned)


def sections_united(first: Segment, second: Segment) -> Segment:
    """The first with its sections running on to the end of the second's, part by part."""
    others = iter(parts_of(second))
    return with_sections(first, lambda section: united(section, next(others).section))


def can_be_united(first: Segment, second: Segment) -> bool:
    """Whether each bonded part of the one goes on in the other: of the same material and shape, in order."""
    return [_kind(part) for part in first.bonded] == [_kind(part) for part in second.bonded]


def _kind(part: BondedPart) -> tuple[str, type]:
    return part.material, type(part.section)


def with_materials_named(segment: Segment, names: Mapping[str, str]) -> Segment:
    """The segment with the materials of its bonded parts under other names; those not named stay."""

    def named(part: BondedPart) -> BondedPart:
        name = names.get(part.material, part.material)
        return part if name == part.material else structs.replace(part, material=name)

    bonded = mapped(segment.bonded, named)
    return segment if bonded is segment.bonded else structs.replace(segment, bonded=bonded)


def uses_of_material(project: Project, name: str) -> int:
    """In how many parts of the member's segments a material is."""
    return sum(part.material == name for segment in project.segments for part in parts_of(segment))
