"""The second moment in the table of segments: computed where the dimensions are known, typed for bare areas.

What is shown is the smaller one at each end; of what is bonded to the segment it knows nothing.
"""

from __future__ import annotations

from msgspec import UNSET, UnsetType

from app import edits
from app.gui.tables.column import Change, Sight
from app.gui.tables.numbers import pair_entry, pair_text, parse_pair
from app.gui.tables.reasons import NotTaken
from app.gui.tables.segment_cells import SegmentRow
from app.words import tr
from solver.model import AreaSection, Project
from solver.second_moments import second_moment


def show_second_moment(row: SegmentRow, sight: Sight) -> str:
    """Both ends, for reading; nothing where it is not known."""
    start, end = second_moment(row.segment.section, 0.0), second_moment(row.segment.section, 1.0)
    if start is None or end is None:
        return ""
    return pair_text(float(start[0]), float(end[-1]), "second_moment", sight.system)


def second_moment_entry(row: SegmentRow, sight: Sight) -> str | None:
    """Both ends of a bare area's, all digits; None where it is computed."""
    section = row.segment.section
    if not isinstance(section, AreaSection):
        return None
    if isinstance(section.second_moment, UnsetType):
        return ""
    return pair_entry(section.second_moment, section.second_moment_end, "second_moment", sight.system)


def put_second_moment(project: Project, index: int, text: str, sight: Sight) -> Change:
    """Another second moment of a bare area; an empty text takes it away."""
    section = project.segments[index].section
    if not isinstance(section, AreaSection):
        raise NotTaken(tr("the second moment follows from the dimensions of the section"))
    start, end = parse_pair(text, "second_moment", sight.system) if text.strip() else (UNSET, UNSET)
    place = ("segments", index, "section")
    if isinstance(start, UnsetType):
        project = edits.set_value(project, (*place, "second_moment_end"), UNSET)
        return Change(edits.set_value(project, (*place, "second_moment"), UNSET))
    project = edits.set_value(project, (*place, "second_moment"), start)
    return Change(edits.set_value(project, (*place, "second_moment_end"), end))
