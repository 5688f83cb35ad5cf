"""The cells of the segment table: how each is read, and what a typed text makes of the project.

Loads and temperatures are those of the load case that is edited; a cell that stands for several records shows
their sum and is edited in the Loads table.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from msgspec import UNSET

from app import edits
from app.bonded_entry import parse_bonded
from app.entry import parse_entry
from app.gui.tables.case_loads import Functions, load_columns, loads_by_mark, loads_on
from app.gui.tables.column import Change, Sight
from app.gui.tables.materials import with_modulus
from app.gui.tables.numbers import pair_entry, pair_text, parse_pair
from app.gui.tables.supports import with_supports
from app.section_entry import parse_section, taken_as
from app.support_entry import parse_supports, supports_entry, supports_text
from app.typical_materials import not_in, typical_named, with_typical
from app.words import tr
from solver.faults import Place
from solver.model import (
    AnySection,
    AreaSection,
    Joint,
    Project,
    Segment,
    SegmentLoad,
    end_of,
    supports_of,
)
from solver.sections import area_coefficients


@dataclass(frozen=True, slots=True)
class StartRow:
    """Before the first segment: the member's first joint."""

    joint: Joint


@dataclass(frozen=True, slots=True)
class SegmentRow:
    """A segment, the joint at its far end, its material's modulus and its loads in the edited case."""

    segment: Segment
    joint: Joint
    modulus: float | None
    loads: tuple[SegmentLoad, ...] | None  # None: no case is edited


def rows(project: Project, sight: Sight) -> tuple[object, ...]:
    """The start row and a row for each segment."""
    moduli = {material.name: material.modulus for material in project.materials}
    loads = loads_by_mark(sight.load_case(project))
    found: list[object] = [StartRow(project.joints[0])]
    for segment, joint in zip(project.segments, project.joints[1:], strict=True):
        own = None if loads is None else tuple(loads.get(segment.mark, ()))
        found.append(SegmentRow(segment, joint, moduli.get(segment.material), own))
    return tuple(found)


def one_row(project: Project, row: int, sight: Sight) -> object:
    """One of these rows."""
    if row == 0:
        return StartRow(project.joints[0])
    segment, case = project.segments[row - 1], sight.load_case(project)
    modulus = next((m.modulus for m in reversed(project.materials) if m.name == segment.material), None)
    loads = None if case is None else loads_on(segment.mark, case)
    return SegmentRow(segment, project.joints[row], modulus, loads)


def in_segments(read: Callable[[SegmentRow, Sight], Any], otherwise: Any) -> Callable[[Any, Sight], Any]:
    """The reading of a segment's row; `otherwise` in the row before the first."""
    return lambda row, sight: read(row, sight) if isinstance(row, SegmentRow) else otherwise


def set_in_segment(
    key: str, read: Callable[[str, Sight], Any]
) -> Callable[[Project, int, str, Sight], Change]:
    """Sets one key of a segment to what `read` makes of the text."""
    return lambda project, index, text, sight: Change(
        edits.set_value(project, ("segments", index, key), read(text, sight))
    )


# One by one


def show_mark(row: object, _sight: Sight) -> str:
    """The mark; in the row before the first, a word for it."""
    return row.segment.mark if isinstance(row, SegmentRow) else tr("start")


def put_mark(project: Project, index: int, text: str, _sight: Sight) -> Change:
    """Rename the segment and every reference to it."""
    return Change(edits.set_value(project, ("segments", index, "mark"), text.strip()))


def end_areas(row: SegmentRow) -> tuple[float, float]:
    """The areas at start and end, m²."""
    return areas_of(row.segment.section)


def areas_of(section: AnySection) -> tuple[float, float]:
    """A section's areas at start and end, m²."""
    first, _middle, last = area_coefficients(section)
    return first, last


def put_section(project: Project, index: int, text: str, sight: Sight) -> Change:
    """The old section settles what bare numbers are, and keeps second moments that no text shows."""
    old = project.segments[index].section
    section = parse_section(text, sight.system, old)
    return Change(edits.set_value(project, ("segments", index, "section"), section), guess(text, old))


def guess(text: str, old: AnySection) -> str:
    """What a bare "60x5" was taken as, and how to type the other."""
    notes = {
        "tube": tr("“{text}” is taken as a tube, outside × wall; type r{text} for a rectangle"),
        "rectangle": tr("“{text}” is taken as a rectangle; type d{text} for a tube, outside × wall"),
        "": "",
    }
    return notes[taken_as(text, old)].format(text=text.strip())


def _with_second_moments(section: AreaSection, old: AreaSection) -> AreaSection:
    """Typed areas keep second moments that no cell shows."""
    return AreaSection(
        area=section.area,
        area_end=section.area_end,
        second_moment=old.second_moment,
        second_moment_end=old.second_moment_end,
    )


def put_area(project: Project, index: int, text: str, sight: Sight) -> Change:
    """A typed area is known by its area alone from then on, which the note says."""
    start, end = parse_pair(text, "area", sight.system)
    old = project.segments[index].section
    if (start, end_of(start, end)) == areas_of(old):
        return Change(project)
    section = AreaSection(area=start, area_end=end)
    note = ""
    if isinstance(old, AreaSection):
        section = _with_second_moments(section, old)
    else:
        note = tr("{mark} is now known by its area alone").format(mark=project.segments[index].mark)
    return Change(edits.set_value(project, ("segments", index, "section"), section), note)


def put_material(project: Project, index: int, text: str, _sight: Sight) -> Change:
    """A material of the project, or a typical one, which is then added to it."""
    return material_put(project, ("segments", index, "material"), text)


def material_put(project: Project, place: Place, text: str) -> Change:
    """The same at any place of a material's name."""
    name, note = text.strip(), ""
    typical = None if any(own.name == name for own in project.materials) else typical_named(name)
    if typical is not None:
        project, note = with_typical(project, typical)
        name = typical.name
    return Change(edits.set_value(project, place, name), note)


def put_bonded(project: Project, index: int, text: str, sight: Sight) -> Change:
    """Other bonded parts; a typical material among them is added to the project, an empty text has none."""
    typical = {material.name: material for material in not_in(project)}
    names = (*(material.name for material in project.materials), *typical)
    parts = parse_bonded(text, sight.system, names, project.segments[index].bonded)
    notes = []
    for name in dict.fromkeys(part.material for part in parts):
        if name in typical:
            project, note = with_typical(project, typical[name])
            notes.append(note)
    place = ("segments", index, "bonded")
    return Change(edits.set_value(project, place, parts or UNSET), "; ".join(notes))


def put_modulus(project: Project, index: int, text: str, sight: Sight) -> Change:
    """The modulus, by changing or copying the material."""
    return with_modulus(project, index, parse_entry(text, "modulus", sight.system))


def bedding_entry(row: SegmentRow, sight: Sight) -> str:
    """Both ends of the bedding, all digits."""
    return pair_entry(row.segment.bedding, row.segment.bedding_end, "bedding", sight.system)


def show_bedding(row: SegmentRow, sight: Sight) -> str:
    """Both ends of the bedding, for reading."""
    return pair_text(row.segment.bedding, row.segment.bedding_end, "bedding", sight.system)


def put_bedding(project: Project, index: int, text: str, sight: Sight) -> Change:
    """Both ends of the bedding; an empty text takes it away."""
    start, end = parse_pair(text, "bedding", sight.system) if text.strip() else (UNSET, UNSET)
    bedded = edits.set_value(project, ("segments", index, "bedding"), start)
    return Change(edits.set_value(bedded, ("segments", index, "bedding_end"), end))


def show_support(row: StartRow | SegmentRow, sight: Sight) -> str:
    """The joint's mark and all that holds it."""
    return f"{row.joint.mark}: {supports_text(supports_of(row.joint), sight.system)}"


def entry_of_support(row: StartRow | SegmentRow, sight: Sight) -> str:
    """What holds the joint, as it is typed."""
    return supports_entry(supports_of(row.joint), sight.system)


def put_support(project: Project, index: int, text: str, sight: Sight) -> Change:
    """Other supports at the segment's far joint."""
    held = supports_of(project.joints[index + 1])
    return with_supports(project, index + 1, parse_supports(text, sight.system, held))


# Loads of the edited case


def _mark_of(project: Project, index: int) -> str:
    return project.segments[index].mark


def in_segment_rows(functions: Functions) -> Functions:
    """A column's functions for segments, with nothing in the row before the first."""
    show, entry = functions["show"], functions["entry"]
    return functions | {"show": in_segments(show, ""), "entry": in_segments(entry, None)}


LOAD_COLUMNS = load_columns(_mark_of, in_segment_rows)
