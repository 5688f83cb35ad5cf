"""The cells of the companions' table: how each is read, and what a typed text makes of the project.

A row is a segment of a companion. Mark, joints and way of acting are the whole companion's and stand in each
of its rows. Loads are those of the load case that is edited, as in the table of segments.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from math import fsum

from msgspec import UNSET

from app import edits
from app.action_entry import REMARKS, WORDS, action_text, parse_action
from app.beside import Beside, beside, beside_at
from app.entry import parse_entry
from app.gui.tables.case_loads import loads_by_mark, loads_on
from app.gui.tables.column import Change, Offer, Put, Sight
from app.gui.tables.loads import needed_case
from app.gui.tables.numbers import parts_of_pair
from app.gui.tables.reasons import NotTaken
from app.gui.tables.segment_cells import guess, material_put
from app.section_entry import parse_section
from app.units import entry_text, format_value
from app.words import tr
from solver.faults import Place
from solver.model import CompanionSegment, Project, SegmentLoad


@dataclass(frozen=True, slots=True)
class CompanionRow:
    """A companion's segment with its loads in the edited case."""

    of: Beside
    loads: tuple[SegmentLoad, ...] | None  # None: no case is edited

    @property
    def segment(self) -> CompanionSegment:
        """The segment."""
        return self.of.segment


def rows(project: Project, sight: Sight) -> tuple[object, ...]:
    """A row for each segment of each companion."""
    if not project.companions:
        return ()
    loads = loads_by_mark(sight.load_case(project))
    return tuple(
        CompanionRow(of, None if loads is None else tuple(loads.get(of.segment.mark, ())))
        for of in beside(project)
    )


def one_row(project: Project, row: int, sight: Sight) -> object:
    """One of these rows."""
    of, case = beside_at(project, row), sight.load_case(project)
    return CompanionRow(of, None if case is None else loads_on(of.segment.mark, case))


_OF_COMPANION = {"companion": "mark", "start": "from", "end": "to", "acts": "acts"}  # columns, file keys


def place(project: Project, index: int, column: str) -> Place:
    """Where a cell's value stands; behind the last row that of the row that adds."""
    if index >= sum(len(companion.segments) for companion in project.companions):
        return ("companions", len(project.companions), column)
    of = beside_at(project, index)
    if column in _OF_COMPANION:
        return ("companions", of.at, _OF_COMPANION[column])
    return (*of.place, column)


def put_mark(project: Project, index: int, text: str, _sight: Sight) -> Change:
    """Name the whole companion."""
    return Change(edits.set_value(project, place(project, index, "companion"), text.strip()))


def put_joint(column: str) -> Put:
    """Sets the joint that a companion begins or ends at; "1 -> 3" sets both."""

    def put(project: Project, index: int, text: str, _sight: Sight) -> Change:
        marks = [part.strip() for part in parts_of_pair(text)]
        if len(marks) > 2:
            raise NotTaken(tr("type two joints' marks, such as 0 -> 2"))
        companion = beside_at(project, index).at
        if len(marks) == 2:
            fresh = edits.span_joints(project, companion, *marks)
        else:
            fresh = edits.set_value(project, place(project, index, column), marks[0])
        return Change(fresh, fit_words(fresh, companion))

    return put


def fit_words(project: Project, companion: int) -> str:
    """By how much a companion does not fit its span; empty where it does."""
    found = project.companions[companion]
    missing = edits.missing_length(project, found)
    if not edits.is_unfit(project, found):
        return ""
    words = tr("{mark} is {amount} too short") if missing > 0 else tr("{mark} is {amount} too long")
    system = project.display.unit_system
    amount = format_value(abs(missing), "length", system, strip=True, with_unit=True)
    return words.format(mark=found.mark, amount=amount)


def put_acts(project: Project, index: int, text: str, _sight: Sight) -> Change:
    """Sets how the whole companion acts; an empty text leaves it to act both ways."""
    return Change(edits.set_value(project, place(project, index, "acts"), parse_action(text)))


def offered_acts(_project: Project, _sight: Sight) -> tuple[Offer, ...]:
    """The ways of acting, each with what it is for."""
    return tuple(Offer(action_text(action), tr(REMARKS[action])) for action in WORDS)


def offered_marks(project: Project, _sight: Sight) -> tuple[Offer, ...]:
    """The companions that can be gone on with."""
    remark = tr("one more segment of it")
    return tuple(Offer(companion.mark, remark) for companion in project.companions)


def set_in(key: str, read: Callable[[str, Sight], object]) -> Put:
    """Sets one key of a companion's segment to what `read` makes of the text."""
    return lambda project, index, text, sight: Change(
        edits.set_value(project, place(project, index, key), read(text, sight))
    )


def put_length(project: Project, index: int, text: str, sight: Sight) -> Change:
    """The length of a segment, with a line where all of the companion's do not add up."""
    length = parse_entry(text, "length", sight.system)
    fresh = edits.set_value(project, place(project, index, "length"), length)
    return Change(fresh, fit_words(fresh, beside_at(project, index).at))


def put_section(project: Project, index: int, text: str, sight: Sight) -> Change:
    """The old section settles what bare numbers are."""
    old = beside_at(project, index).segment.section
    section = parse_section(text, sight.system, old)
    return Change(edits.set_value(project, place(project, index, "section"), section), guess(text, old))


def put_material(project: Project, index: int, text: str, _sight: Sight) -> Change:
    """A material of the project, or a typical one, which is then added to it."""
    return material_put(project, place(project, index, "material"), text)


def mark_of(project: Project, index: int) -> str:
    """The mark that loads refer to."""
    return beside_at(project, index).segment.mark


def show_fit(row: CompanionRow, sight: Sight) -> str:
    """The lack of fit of the edited case."""
    if row.loads is None:
        return ""
    return format_value(_fit(row.loads), "displacement", sight.system, strip=True)


def fit_entry(row: CompanionRow, sight: Sight) -> str | None:
    """The lack of fit, all digits; None where several records stand for it."""
    if row.loads is None or len(row.loads) > 1:
        return None
    return entry_text(_fit(row.loads), "displacement", sight.system)


def _fit(loads: tuple[SegmentLoad, ...]) -> float:
    return fsum(load.lack_of_fit for load in loads)


def put_fit(project: Project, index: int, text: str, sight: Sight) -> Change:
    """The lack of fit in the edited case; an empty text takes it away."""
    value = parse_entry(text, "displacement", sight.system) if text.strip() else UNSET
    case = needed_case(project, sight).name
    return Change(edits.set_segment_load(project, case, mark_of(project, index), "lack_of_fit", value))


def add(project: Project, text: str, _sight: Sight) -> Change:
    """Goes on with a companion that is named, or begins one: "S", "S 1 -> 3" or "1 -> 3"."""
    known = [companion.mark for companion in project.companions]
    if text.strip() in known:
        at = known.index(text.strip())
        note = "" if edits.missing_length(project, project.companions[at]) > 0 else _halved(project, at)
        return Change(edits.extend_companion(project, at), note)
    mark, start, end = named_span(project, text)
    grown = edits.add_companion(project, start, end, mark)
    made = grown.companions[-1]
    note = tr(
        "{mark} lies beside joints {start} to {end}, one segment like the first there: type what differs"
    )
    return Change(grown, note.format(mark=made.mark, start=made.start, end=made.end))


def _halved(project: Project, at: int) -> str:
    halved = project.companions[at].segments[-1].mark
    return tr("{mark} gave half of its length, so that all still add up").format(mark=halved)


def named_span(project: Project, text: str) -> tuple[str, str, str]:
    """The mark (maybe empty) and the two joints that a text names; the whole member where it names none."""
    parts = [part.strip() for part in parts_of_pair(text)]
    if len(parts) == 1:
        return parts[0], project.joints[0].mark, project.joints[-1].mark
    if len(parts) > 2 or not all(parts):
        raise NotTaken(tr("type a mark, or a mark and two joints, such as S 0 -> 2"))
    head, end = parts
    if any(joint.mark == head for joint in project.joints):
        return "", head, end
    mark, _, start = head.rpartition(" ")
    return mark.strip(), start, end


def delete(project: Project, indexes: tuple[int, ...], _sight: Sight) -> Project:
    """The project without these segments; a companion goes with its last."""
    found = [beside_at(project, index) for index in indexes]
    return edits.remove_companion_segments(project, [(of.at, of.number) for of in found])


def total_line(project: Project, _figures: object, _sight: Sight) -> str:
    """Which companions do not fit, and by how much."""
    return "; ".join(filter(None, (fit_words(project, at) for at in range(len(project.companions)))))
