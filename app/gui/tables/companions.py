"""The companions' table: second chains beside the member, a row for each of their segments."""

from __future__ import annotations

from collections.abc import Callable

from app.action_entry import action_text
from app.beside import beside_at
from app.gui.tables import companion_cells as cells
from app.gui.tables import offers
from app.gui.tables.case_loads import load_columns
from app.gui.tables.column import Adding, Column, Figures, Sight, Table
from app.gui.tables.segment_figures import bar, between, utilisation, why_no_utilisation
from app.section_entry import section_label, section_text
from app.units import entry_text, format_value
from app.words import later

Shown = Callable[[int, Figures, Sight], str]


def _beside(figure: Shown) -> Shown:
    """A figure of the companions' segments."""
    return lambda index, figures, sight: figure(index, figures.beside or Figures(), sight)


COLUMNS = (
    Column(
        "companion",
        later("Companion"),
        lambda row, _s: row.of.companion.mark,
        lambda row, _s: row.of.companion.mark,
        cells.put_mark,
        width=10,
    ),
    Column(
        "start",
        later("From joint"),
        lambda row, _s: row.of.companion.start,
        lambda row, _s: row.of.companion.start,
        cells.put_joint("start"),
        width=7,
        offers=offers.joints,
    ),
    Column(
        "end",
        later("To joint"),
        lambda row, _s: row.of.companion.end,
        lambda row, _s: row.of.companion.end,
        cells.put_joint("end"),
        width=7,
        offers=offers.joints,
    ),
    Column(
        "acts",
        later("Acts"),
        lambda row, _s: action_text(row.of.companion.action),
        lambda row, _s: action_text(row.of.companion.action),
        cells.put_acts,
        optional=True,
        width=15,
        offers=cells.offered_acts,
    ),
    Column(
        "mark",
        later("Mark"),
        lambda row, _s: row.segment.mark,
        lambda row, _s: row.segment.mark,
        cells.set_in("mark", lambda text, _s: text.strip()),
        width=6,
    ),
    Column(
        "length",
        later("Length"),
        lambda row, s: format_value(row.segment.length, "length", s.system, 6, strip=True),
        lambda row, s: entry_text(row.segment.length, "length", s.system),
        cells.put_length,
        quantity="length",
    ),
    Column(
        "section",
        later("Section"),
        lambda row, s: section_label(row.segment.section, s.system),
        lambda row, s: section_text(row.segment.section, s.system),
        cells.put_section,
        quantity="size",
        width=15,
    ),
    Column(
        "material",
        later("Material"),
        lambda row, _s: row.segment.material,
        lambda row, _s: row.segment.material,
        cells.put_material,
        width=11,
        offers=offers.materials,
    ),
    *load_columns(cells.mark_of),
    Column(
        "lack_of_fit",
        later("Lack of fit"),
        cells.show_fit,
        cells.fit_entry,
        cells.put_fit,
        of_case=True,
        quantity="displacement",
        optional=True,
    ),
    Column("force", later("Axial force"), quantity="force", figure=_beside(between("force")), width=13),
    Column(
        "stress",
        later("Stress"),
        quantity="stress",
        figure=_beside(between("stress")),
        width=13,
        at_first=False,
    ),
    Column(
        "utilisation",
        later("Utilisation"),
        figure=_beside(utilisation),
        bar=lambda index, figures: bar(index, figures.beside or Figures()),
        width=6,
        why_none=lambda index, figures: why_no_utilisation(index, figures.beside or Figures()),
    ),
)

COMPANIONS = Table(
    key="companions",
    title=later("Companions"),
    rows=cells.rows,
    columns=lambda _project, _sight: COLUMNS,
    row_name=lambda project, index, _sight: beside_at(project, index).segment.mark,
    records=lambda _sight: ("companions",),
    place=cells.place,
    adding=Adding(
        later("type a mark and two joints, S 0 -> 2, or a companion's mark to go on with it"),
        cells.add,
        later("Add companion segment"),
        "companion",
        cells.offered_marks,
    ),
    total=cells.total_line,
    delete=cells.delete,
    delete_name=later("Delete companion segments"),
    one=cells.one_row,
)
