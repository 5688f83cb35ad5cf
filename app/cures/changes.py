"""The numbers of a member that may be changed to cure a check, and what the member is with another one.

A section is written as text and read back (`app.section_entry`), so that what is proved is to the last digit
what a person would type. A taper keeps its proportions: its other end is scaled alike and rounded up. A tube
gets a thicker wall inwards, or a larger outside with the same wall; a rectangle width or depth.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from functools import partial
from typing import Final, Literal, TypeAlias

from msgspec import UnsetType

from app import edits
from app.beside import beside, beside_at
from app.cures.rounds import above, round_numbers
from app.section_entry import parse_section, section_text, wall_text
from app.units import Quantity, entry_text, format_value, symbol
from solver.faults import Place
from solver.model import (
    AnySection,
    AreaSection,
    CompanionSegment,
    Project,
    RectangleSection,
    RoundSection,
    Segment,
    SpringSupport,
    TubeSection,
    UnitSystemName,
    end_of,
    supports_of,
)

LARGEST: Final = 3.0  # times a dimension, and so nine times an area
SPRING: Final = 10.0  # times or by which a stiffness

_Pair: TypeAlias = tuple[float, float | UnsetType]
_Ends: TypeAlias = tuple[str, ...]  # a dimension's text at the start, and at the end where it has one


@dataclass(frozen=True, slots=True)
class Change:
    """Another section or spring at places of the project, with its text and unit as a person types it."""

    places: tuple[Place, ...]
    value: AnySection | SpringSupport
    text: str
    marks: tuple[str, ...]
    kind: Literal["section", "spring"]

    def applied(self, project: Project) -> Project:
        """The project with it; EditError where that is not well formed."""
        for place in self.places:
            project = edits.set_value(project, place, self.value)
        return project


@dataclass(frozen=True, slots=True)
class Knob:
    """One number that may be changed: the values to try, the nearest to what it is first, and the change."""

    values: tuple[float, ...]
    change: Callable[[float], Change]


def section_knobs(project: Project, *indices: int) -> tuple[Knob, ...]:
    """The dimensions of the one section that these segments have, each made larger by itself.

    They count over the member's segments and, behind those, the companions'. None where parts are bonded to
    one: which of them would have to give way is not for a search to say.
    """
    own = len(project.segments)
    if any(index < own and project.segments[index].bonded for index in indices):
        return ()
    every, system = every_segment(project), project.display.unit_system
    section_now = every[indices[0]].section
    places = tuple(_place(project, index) for index in indices)
    marks = tuple(every[index].mark for index in indices)

    def knob(dimension: _Dimension) -> Knob:
        def change(value: float) -> Change:
            section = parse_section(dimension.text(value), system, section_now)
            shown = f"{section_text(section, system)} {symbol(dimension.quantity, system)}"
            return Change(places, section, shown, marks, "section")

        reach = LARGEST**2 if dimension.quantity == "area" else LARGEST
        return Knob(round_numbers(dimension.start, reach, dimension.quantity, system), change)

    return tuple(map(knob, _dimensions(section_now, system)))


def every_segment(project: Project) -> tuple[Segment | CompanionSegment, ...]:
    """The member's segments, then those of its companions."""
    return (*project.segments, *(of.segment for of in beside(project)))


def _place(project: Project, index: int) -> Place:
    own = len(project.segments)
    return (
        ("segments", index, "section") if index < own else (*beside_at(project, index - own).place, "section")
    )


@dataclass(frozen=True, slots=True)
class _Dimension:
    """What a dimension is, and the section's text with another value of it."""

    start: float
    text: Callable[[float], str]
    quantity: Quantity = "size"


def _dimensions(section: AnySection, system: UnitSystemName) -> Iterator[_Dimension]:
    match section:
        case AreaSection(area=area, area_end=area_end):
            scaled = partial(_scaled, (area, area_end), "area", system)
            yield _Dimension(area, lambda value: f"A {_joined(scaled(value))}", "area")
        case RoundSection(diameter=diameter, diameter_end=diameter_end):
            round_ends = partial(_scaled, (diameter, diameter_end), "size", system)
            yield _Dimension(diameter, lambda value: f"d{_joined(round_ends(value))}")
        case TubeSection():
            yield from _of_tube(section, system)
        case RectangleSection():
            yield from _of_rectangle(section, system)


def _of_tube(section: TubeSection, system: UnitSystemName) -> Iterator[_Dimension]:
    outer, varies = (section.outer, section.outer_end), _varies(section.outer_end, section.inner_end)
    first = (section.outer, section.inner)
    last = end_of(section.outer, section.outer_end), end_of(section.inner, section.inner_end)
    ends = [first, last] if varies else [first]
    outers = tuple(entry_text(outside, "size", system) for outside, _ in ends)
    thickness = [(outside - inside) / 2 for outside, inside in ends]
    walls = tuple(
        wall_text(*end, system) or entry_text(wall, "size", system)
        for end, wall in zip(ends, thickness, strict=True)
    )
    thick: _Pair = (thickness[0], thickness[1]) if varies else (thickness[0], outer[1])
    wide: _Pair = (first[0], last[0]) if varies else outer
    scaled_wall, scaled_outside = (partial(_scaled, pair, "size", system) for pair in (thick, wide))
    yield _Dimension(thickness[0], lambda value: f"d{_paired(outers, scaled_wall(value))}")
    yield _Dimension(section.outer, lambda value: f"d{_paired(scaled_outside(value), walls)}")


def _of_rectangle(section: RectangleSection, system: UnitSystemName) -> Iterator[_Dimension]:
    varies = _varies(section.width_end, section.depth_end)
    pairs: list[_Pair] = [(section.width, section.width_end), (section.depth, section.depth_end)]
    wide, deep = ((start, end_of(start, end) if varies else end) for start, end in pairs)
    widths, depths = (_scaled(pair, "size", system, None) for pair in (wide, deep))
    scaled_width, scaled_depth = (partial(_scaled, pair, "size", system) for pair in (wide, deep))
    yield _Dimension(section.width, lambda value: f"r{_paired(scaled_width(value), depths)}")
    yield _Dimension(section.depth, lambda value: f"r{_paired(widths, scaled_depth(value))}")


def _varies(*ends: float | UnsetType) -> bool:
    return any(not isinstance(end, UnsetType) for end in ends)


def _scaled(pair: _Pair, quantity: Quantity, system: UnitSystemName, value: float | None) -> _Ends:
    """A dimension as text with another start and its end in proportion; as it is where there is no value."""
    start, end = pair
    sizes = [start if value is None else value]
    if not isinstance(end, UnsetType):
        sizes.append(end if value is None else above(end * value / start, quantity, system))
    return tuple(entry_text(size, quantity, system) for size in sizes)


def _joined(ends: _Ends) -> str:
    return "->".join(ends)


def _paired(first: _Ends, second: _Ends) -> str:
    return _joined(tuple(f"{one}x{other}" for one, other in zip(first, second, strict=True)))


def spring_knobs(project: Project, index: int) -> tuple[Knob, ...]:
    """The stiffness of a joint's spring, stiffer and softer; none where it has no spring, or several."""
    joint, system = project.joints[index], project.display.unit_system
    springs = [(n, s) for n, s in enumerate(supports_of(joint)) if isinstance(s, SpringSupport)]
    if len(springs) != 1:
        return ()
    number, spring = springs[0]
    place: Place = ("joints", index, "supports", number) if joint.supports else ("joints", index, "support")

    def change(value: float) -> Change:
        text = format_value(value, "spring", system, 6, strip=True, with_unit=True)
        support = SpringSupport(stiffness=value)
        return Change((place,), support, text, (joint.mark,), "spring")

    reaches = (SPRING, 1.0 / SPRING)
    return tuple(Knob(round_numbers(spring.stiffness, reach, "spring", system), change) for reach in reaches)
