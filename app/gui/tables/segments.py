"""The segment table: the job on one page, from mark to utilisation.

The row before the first holds the first joint's support; a segment's row holds the support at its far end.
Loads and temperatures are those of the load case that is edited; a cell that stands for several records shows
their sum and is edited in the Loads table.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from math import fsum
from typing import Any

from msgspec import UNSET

from app import edits
from app.entry import parse_entry
from app.gui.places import Place
from app.gui.tables.column import Adding, Change, Column, Figures, Sight, Table
from app.gui.tables.loads import case_place, needed_case
from app.gui.tables.materials import with_modulus
from app.gui.tables.numbers import pair_entry, pair_text, parse_pair
from app.section_entry import parse_section, section_label, section_text
from app.support_entry import parse_support, support_entry, support_text
from app.units import Quantity, entry_text, format_value, utilisation_text
from app.words import tr
from solver.checks import PASS_MARGIN
from solver.model import AreaSection, Joint, LoadCase, Project, Segment, SegmentLoad, end_of
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
    loads = _loads_by_mark(sight.load_case(project))
    found: list[object] = [StartRow(project.joints[0])]
    for segment, joint in zip(project.segments, project.joints[1:], strict=True):
        own = None if loads is None else tuple(loads.get(segment.mark, ()))
        found.append(SegmentRow(segment, joint, moduli.get(segment.material), own))
    return tuple(found)


def _loads_by_mark(case: LoadCase | None) -> dict[str, list[SegmentLoad]] | None:
    if case is None:
        return None
    found: dict[str, list[SegmentLoad]] = {}
    for load in case.segment_loads:
        found.setdefault(load.segment, []).append(load)
    return found


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


def _mark_show(row: object, _sight: Sight) -> str:
    return row.segment.mark if isinstance(row, SegmentRow) else tr("start")


def _put_mark(project: Project, index: int, text: str, _sight: Sight) -> Change:
    return Change(edits.set_value(project, ("segments", index, "mark"), text.strip()))


def _area_coefficients(row: SegmentRow) -> tuple[float, float]:
    first, _middle, last = area_coefficients(row.segment.section)
    return first, last


def _put_section(project: Project, index: int, text: str, sight: Sight) -> Change:
    """The old section settles what bare numbers are, and keeps second moments that no text shows."""
    section = parse_section(text, sight.system, project.segments[index].section)
    return Change(edits.set_value(project, ("segments", index, "section"), section))


def _with_second_moments(section: AreaSection, old: AreaSection) -> AreaSection:
    """Typed areas keep second moments that no cell shows."""
    return AreaSection(
        area=section.area,
        area_end=section.area_end,
        second_moment=old.second_moment,
        second_moment_end=old.second_moment_end,
    )


def _put_area(project: Project, index: int, text: str, sight: Sight) -> Change:
    """A typed area is known by its area alone from then on, which the note says."""
    start, end = parse_pair(text, "area", sight.system)
    old = project.segments[index].section
    section = AreaSection(area=start, area_end=end)
    note = ""
    if isinstance(old, AreaSection):
        section = _with_second_moments(section, old)
    else:
        note = tr("{mark} is now known by its area alone").format(mark=project.segments[index].mark)
    return Change(edits.set_value(project, ("segments", index, "section"), section), note)


def _put_modulus(project: Project, index: int, text: str, sight: Sight) -> Change:
    return with_modulus(project, index, parse_entry(text, "modulus", sight.system))


def _bedding_entry(row: SegmentRow, sight: Sight) -> str:
    return pair_entry(row.segment.bedding, row.segment.bedding_end, "bedding", sight.system)


def _bedding_show(row: SegmentRow, sight: Sight) -> str:
    return pair_text(row.segment.bedding, row.segment.bedding_end, "bedding", sight.system)


def _put_bedding(project: Project, index: int, text: str, sight: Sight) -> Change:
    start, end = parse_pair(text, "bedding", sight.system) if text.strip() else (UNSET, UNSET)
    bedded = edits.set_value(project, ("segments", index, "bedding"), start)
    return Change(edits.set_value(bedded, ("segments", index, "bedding_end"), end))


def _support_show(row: StartRow | SegmentRow, sight: Sight) -> str:
    return f"{row.joint.mark}: {support_text(row.joint.support, sight.system)}"


def _support_entry(row: StartRow | SegmentRow, sight: Sight) -> str:
    return support_entry(row.joint.support, sight.system)


def _put_support(project: Project, index: int, text: str, sight: Sight) -> Change:
    support = parse_support(text, sight.system)
    return Change(edits.set_value(project, ("joints", index + 1, "support"), support))


# Loads of the edited case


@dataclass(frozen=True, slots=True)
class Ends:
    """The two keys of a load that varies along the segment."""

    start: str
    end: str
    quantity: Quantity

    def of(self, load: SegmentLoad) -> tuple[float, float]:
        """The load at both ends."""
        start: float = getattr(load, self.start)
        return start, end_of(start, getattr(load, self.end))

    def total(self, row: SegmentRow) -> tuple[float, float] | None:
        """The sum of the segment's records; None where no case is edited."""
        if row.loads is None:
            return None
        pairs = [self.of(load) for load in row.loads]
        return fsum(start for start, _ in pairs), fsum(end for _, end in pairs)


FORCE = Ends("load_start", "load_end", "distributed")
HEAT = Ends("temperature_start", "temperature_end", "temperature")


def _one_end(ends: Ends, which: int) -> dict[str, Any]:
    def show(row: SegmentRow, sight: Sight) -> str:
        total = ends.total(row)
        return "" if total is None else format_value(total[which], ends.quantity, sight.system, strip=True)

    def entry(row: SegmentRow, sight: Sight) -> str | None:
        total = ends.total(row)
        editable = total is not None and row.loads is not None and len(row.loads) <= 1
        return entry_text(total[which], ends.quantity, sight.system) if editable and total else None

    def put(project: Project, index: int, text: str, sight: Sight) -> Change:
        value = parse_entry(text, ends.quantity, sight.system) if text.strip() else UNSET
        key = ends.start if which == 0 else ends.end
        case, mark = needed_case(project, sight).name, project.segments[index].mark
        return Change(edits.set_segment_load(project, case, mark, key, value))

    return {"show": in_segments(show, ""), "entry": in_segments(entry, None), "put": put}


def _heat_show(row: SegmentRow, sight: Sight) -> str:
    total = HEAT.total(row)
    return "" if total is None else pair_text(*total, HEAT.quantity, sight.system)


def _heat_entry(row: SegmentRow, sight: Sight) -> str | None:
    total = HEAT.total(row)
    if total is None or row.loads is None or len(row.loads) > 1:
        return None
    return pair_entry(*total, HEAT.quantity, sight.system)


def _put_heat(project: Project, index: int, text: str, sight: Sight) -> Change:
    start, end = parse_pair(text, HEAT.quantity, sight.system) if text.strip() else (UNSET, UNSET)
    case, mark = needed_case(project, sight).name, project.segments[index].mark
    heated = edits.set_segment_load(project, case, mark, HEAT.start, start)
    return Change(edits.set_segment_load(heated, case, mark, HEAT.end, end))


def _at_case(key: str) -> Callable[[int, Sight], Place]:
    return lambda index, sight: ("segments", index, key, *case_place(sight))


# Results


def _utilisation(index: int, figures: Figures, _sight: Sight) -> str:
    value = figures.value(figures.utilisation, index)
    return "" if value is None else utilisation_text(value, "pass" if value <= 1 + PASS_MARGIN else "fail")


def _bar(index: int, figures: Figures) -> tuple[float, float] | None:
    value = figures.value(figures.utilisation, index)
    return None if value is None else (value, float(figures.governs[index]))


def _total(project: Project, figures: Figures, sight: Sight) -> str:
    length = fsum(segment.length for segment in project.segments)
    text = format_value(length, "length", sight.system, with_unit=True, strip=True)
    if figures.mass is None:
        return tr("total {length}").format(length=text)
    mass = format_value(figures.mass, "mass", sight.system, 3, with_unit=True)
    return tr("total {length}, {mass}").format(length=text, mass=mass)


# The table


def add_segment(project: Project, text: str, sight: Sight) -> Change:
    """A segment behind the last one, of its end's section, with the typed length."""
    length = parse_entry(text, "length", sight.system)
    index = len(project.segments)
    grown = edits.insert_segment(project, index)
    return Change(edits.set_value(grown, ("segments", index, "length"), length))


def _mark_entry(row: SegmentRow, _sight: Sight) -> str:
    return row.segment.mark


def columns(_project: Project, _sight: Sight) -> tuple[Column, ...]:
    """The same for every project."""
    return COLUMNS


COLUMNS = (
    Column("mark", "Mark", _mark_show, in_segments(_mark_entry, None), _put_mark, width=6),
    Column(
        "length",
        "Length",
        in_segments(lambda row, s: format_value(row.segment.length, "length", s.system, 6, strip=True), ""),
        in_segments(lambda row, s: entry_text(row.segment.length, "length", s.system), None),
        set_in_segment("length", lambda text, s: parse_entry(text, "length", s.system)),
        quantity="length",
    ),
    Column(
        "section",
        "Section",
        in_segments(lambda row, s: section_label(row.segment.section, s.system), ""),
        in_segments(lambda row, s: section_text(row.segment.section, s.system), None),
        _put_section,
        quantity="size",
        width=15,
    ),
    Column(
        "area",
        "Area",
        in_segments(lambda row, s: pair_text(*_area_coefficients(row), "area", s.system), ""),
        in_segments(lambda row, s: pair_entry(*_area_coefficients(row), "area", s.system), None),
        _put_area,
        quantity="area",
        width=11,
    ),
    Column(
        "material",
        "Material",
        in_segments(lambda row, _s: row.segment.material, ""),
        in_segments(lambda row, _s: row.segment.material, None),
        set_in_segment("material", lambda text, _s: text.strip()),
        width=11,
    ),
    Column(
        "modulus",
        "Modulus",
        in_segments(
            lambda row, s: (
                "" if row.modulus is None else format_value(row.modulus, "modulus", s.system, strip=True)
            ),
            "",
        ),
        in_segments(
            lambda row, s: None if row.modulus is None else entry_text(row.modulus, "modulus", s.system), None
        ),
        _put_modulus,
        quantity="modulus",
    ),
    Column(
        "load_start",
        "Load at start",
        **_one_end(FORCE, 0),
        place=_at_case("load_start"),
        quantity="distributed",
        optional=True,
    ),
    Column(
        "load_end",
        "Load at end",
        **_one_end(FORCE, 1),
        place=_at_case("load_end"),
        quantity="distributed",
        optional=True,
    ),
    Column(
        "heat",
        "Heated by",
        in_segments(_heat_show, ""),
        in_segments(_heat_entry, None),
        _put_heat,
        place=_at_case("heat"),
        quantity="temperature",
        optional=True,
    ),
    Column(
        "bedding",
        "Bedding",
        in_segments(_bedding_show, ""),
        in_segments(_bedding_entry, None),
        _put_bedding,
        quantity="bedding",
        optional=True,
    ),
    Column(
        "support",
        "Far end held by",
        _support_show,
        _support_entry,
        _put_support,
        place=lambda index, _sight: ("joints", index + 1, "support"),
        optional=True,
        width=17,
    ),
    Column("utilisation", "Utilisation", figure=_utilisation, bar=_bar, width=6),
)

SEGMENTS = Table(
    key="segments",
    title="Segments",
    rows=rows,
    columns=columns,
    row_name=lambda project, index, _sight: (
        project.segments[index].mark if index >= 0 else project.joints[0].mark
    ),
    records=lambda _sight: ("segments",),
    adding=Adding("type a length to add a segment", add_segment, "Add segment", "length"),
    lead=1,
    total=_total,
    delete=lambda project, indexes, _sight: edits.delete_segments(project, indexes),
    delete_name="Delete segments",
)
