"""The segment table: the job on one page, from mark to utilisation.

The row before the first holds the first joint's support; a segment's row holds the support at its far end.
"""

from __future__ import annotations

from app import edits
from app.bonded_entry import SEPARATOR, bonded_label, bonded_text
from app.entry import parse_entry
from app.gui.tables import offers
from app.gui.tables.column import Adding, Change, Column, Sight, Table
from app.gui.tables.numbers import pair_entry, pair_text
from app.gui.tables.second_moments import put_second_moment, second_moment_entry, show_second_moment
from app.gui.tables.segment_cells import (
    LOAD_COLUMNS,
    SegmentRow,
    bedding_entry,
    end_areas,
    entry_of_support,
    in_segments,
    one_row,
    put_area,
    put_bedding,
    put_bonded,
    put_mark,
    put_material,
    put_modulus,
    put_section,
    put_support,
    rows,
    set_in_segment,
    show_bedding,
    show_mark,
    show_support,
)
from app.gui.tables.segment_figures import bar, between, mass, total_line, utilisation, why_no_utilisation
from app.section_entry import section_label, section_text
from app.units import entry_text, format_value
from app.words import later
from solver.model import Project


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
    Column("mark", later("Mark"), show_mark, in_segments(_mark_entry, None), put_mark, width=6),
    Column(
        "length",
        later("Length"),
        in_segments(lambda row, s: format_value(row.segment.length, "length", s.system, 6, strip=True), ""),
        in_segments(lambda row, s: entry_text(row.segment.length, "length", s.system), None),
        set_in_segment("length", lambda text, s: parse_entry(text, "length", s.system)),
        quantity="length",
    ),
    Column(
        "section",
        later("Section"),
        in_segments(lambda row, s: section_label(row.segment.section, s.system), ""),
        in_segments(lambda row, s: section_text(row.segment.section, s.system), None),
        put_section,
        quantity="size",
        width=15,
    ),
    Column(
        "area",
        later("Area"),
        in_segments(lambda row, s: pair_text(*end_areas(row), "area", s.system), ""),
        in_segments(lambda row, s: pair_entry(*end_areas(row), "area", s.system), None),
        put_area,
        quantity="area",
        settled_by="section",
        width=11,
    ),
    Column(
        "material",
        later("Material"),
        in_segments(lambda row, _s: row.segment.material, ""),
        in_segments(lambda row, _s: row.segment.material, None),
        put_material,
        width=11,
        offers=offers.materials,
    ),
    Column(
        "modulus",
        later("Modulus"),
        in_segments(
            lambda row, s: (
                "" if row.modulus is None else format_value(row.modulus, "modulus", s.system, strip=True)
            ),
            "",
        ),
        in_segments(
            lambda row, s: None if row.modulus is None else entry_text(row.modulus, "modulus", s.system), None
        ),
        put_modulus,
        quantity="modulus",
    ),
    Column(
        "bonded",
        later("Bonded parts"),
        in_segments(lambda row, s: bonded_label(row.segment.bonded, s.system), ""),
        in_segments(lambda row, s: bonded_text(row.segment.bonded, s.system), None),
        put_bonded,
        quantity="size",
        optional=True,
        width=18,
        offers=offers.materials,
        at_first=False,
        filled=lambda project: any(segment.bonded for segment in project.segments),
        separator=SEPARATOR,
    ),
    *LOAD_COLUMNS,
    Column(
        "bedding",
        later("Bedding"),
        in_segments(show_bedding, ""),
        in_segments(bedding_entry, None),
        put_bedding,
        quantity="bedding",
        optional=True,
    ),
    Column(
        "support",
        later("Support at far end"),
        show_support,
        entry_of_support,
        put_support,
        place=lambda index, _sight: ("joints", index + 1, "support"),
        optional=True,
        width=17,
        offers=offers.supports,
    ),
    Column(
        "second_moment",
        later("Second moment"),
        in_segments(show_second_moment, ""),
        in_segments(second_moment_entry, None),
        put_second_moment,
        quantity="second_moment",
        settled_by="section",
        width=13,
        at_first=False,
    ),
    Column("mass", later("Mass"), quantity="mass", figure=mass, width=7, at_first=False),
    Column(
        "force", later("Axial force"), quantity="force", figure=between("force"), width=13, at_first=False
    ),
    Column("stress", later("Stress"), quantity="stress", figure=between("stress"), width=13, at_first=False),
    Column(
        "utilisation", later("Utilisation"), figure=utilisation, bar=bar, width=6, why_none=why_no_utilisation
    ),
)

SEGMENTS = Table(
    key="segments",
    title=later("Segments"),
    rows=rows,
    columns=columns,
    row_name=lambda project, index, _sight: (
        project.segments[index].mark if index >= 0 else project.joints[0].mark
    ),
    records=lambda _sight: ("segments",),
    adding=Adding(
        later("type a length to add a segment"),
        add_segment,
        later("Add segment"),
        "length",
        unread=lambda project, _sight: edits.insert_segment(project, len(project.segments)),
    ),
    lead=1,
    total=total_line,
    delete=lambda project, indexes, _sight: edits.delete_segments(project, indexes),
    delete_name=later("Delete segments"),
    movable=True,
    one=one_row,
)
