"""Which table cell holds what a part of the drawing shows, and which part shows a cell.

The drawing is typed into through the tables' own cells, so that a value has one way in: the same reading of
what is typed, the same reasons, drafts and undo steps. A label that stands for neighbours alike holds the
cells of all of them. Loads are those of the case that is edited, whatever state is shown.
"""

from __future__ import annotations

from collections.abc import Callable, Hashable, Sequence
from dataclasses import dataclass
from itertools import takewhile
from typing import Final

from app.beside import beside_at, index_of, index_of_mark
from app.drawing.shapes import LOADS, Part, PartKind
from app.shown import Shown
from solver.model import Project, SegmentLoad, end_of


@dataclass(frozen=True, slots=True)
class Cell:
    """A cell: the table's key, the index of the record (not of the row), the column's key."""

    table: str
    record: int
    column: str


_SEGMENT_COLUMNS: Final[dict[PartKind, str]] = {
    "length": "length",
    "segment": "section",
    "section": "section",
    "mark": "mark",
    "distributed": "load_start",
    "distributed_end": "load_end",
    "warmth": "heat",
    "bedding": "bedding",
    "bonded": "bonded",
}
_JOINT_COLUMNS: Final[dict[PartKind, str]] = {
    "joint": "support",
    "support": "support",
    "shoulder": "shoulder",
    "lateral": "lateral_translation",
    "turning": "lateral_rotation",
    "force": "force",
    "movement": "movement",
}
_COMPANION_COLUMNS: Final[dict[PartKind, str]] = {
    "companion": "section",
    "companion_mark": "mark",
    "companion_length": "length",
    "companion_section": "section",
    "companion_name": "acts",
}
# The order in which Tab goes from cell to cell of one segment or joint
ORDER: Final[dict[str, tuple[str, ...]]] = {
    "segments": (
        "length",
        "section",
        "material",
        "bonded",
        "load_start",
        "load_end",
        "heat",
        "bedding",
        "mark",
    ),
    "joints": (
        "support",
        "shoulder",
        "lateral_translation",
        "lateral_rotation",
        "force",
        "movement",
        "mark",
    ),
    "companions": (
        "length",
        "section",
        "material",
        "acts",
        "load_start",
        "load_end",
        "heat",
        "lack_of_fit",
        "mark",
        "companion",
        "start",
        "end",
    ),
}


def cell_of(part: Part, project: Project, case: int | None) -> Cell | None:
    """The cell that holds what a part shows; None where no single one does.

    `case` is the index of the case whose loads are edited, None where there is none. A lack of fit has its
    cell in the loads on segments: None where no record, or several, hold one.
    """
    if part.kind in _SEGMENT_COLUMNS:
        return Cell("segments", part.index, _SEGMENT_COLUMNS[part.kind])
    if part.kind in _JOINT_COLUMNS:
        return Cell("joints", part.index, _JOINT_COLUMNS[part.kind])
    if part.kind in _COMPANION_COLUMNS:
        return Cell("companions", part.index, _COMPANION_COLUMNS[part.kind])
    if case is None:
        return None
    if part.kind == "companion_load":
        return Cell("companions", part.index, _load_column(project, part.index, case))
    if part.kind == "gravity":
        return Cell("load_cases", case, "gravity")
    records = loads_behind(part, project, case) if part.kind == "fit" else ()
    return Cell("segment_loads", records[0], "lack_of_fit") if len(records) == 1 else None


def _load_column(project: Project, index: int, case: int) -> str:
    """The column of what acts on a companion's segment in the case; of temperatures where nothing does."""
    mark = beside_at(project, index).segment.mark
    loads = [load for load in project.load_cases[case].segment_loads if load.segment == mark]
    if any(load.load_start or end_of(load.load_start, load.load_end) for load in loads):
        return "load_start"
    heated = any(load.temperature_start or load.temperature_end for load in loads)
    return "heat" if heated or not any(load.lack_of_fit for load in loads) else "lack_of_fit"


def cells_of(part: Part, project: Project, case: int | None) -> tuple[Cell, ...]:
    """The cells of all neighbours that a label stands for; those of one part alone otherwise."""
    marks = (Part(part.kind, index) for index in neighbours_alike(part, project, case))
    found = (cell_of(one, project, case) for one in marks)
    return tuple(cell for cell in found if cell is not None)


def neighbours_alike(part: Part, project: Project, case: int | None) -> range:
    """The segments from the part's own on that say the same as it; its own index alone for other parts."""
    says = _SAYINGS.get(part.kind)
    if says is None:
        return range(part.index, part.index + 1)
    told = [says(project, case, index) for index in range(part.index, len(project.segments))]
    alike = len(list(takewhile(lambda other: other == told[0], told)))
    return range(part.index, part.index + alike)


def _section(project: Project, _case: int | None, index: int) -> Hashable:
    return project.segments[index].section


def _bedding(project: Project, _case: int | None, index: int) -> Hashable:
    segment = project.segments[index]
    return segment.bedding, end_of(segment.bedding, segment.bedding_end)


def _bonded(project: Project, _case: int | None, index: int) -> Hashable:
    return project.segments[index].bonded


def _warmth(project: Project, case: int | None, index: int) -> Hashable:
    return tuple(
        (load.temperature_start, end_of(load.temperature_start, load.temperature_end))
        for load in _loads_on(project, case, index)
    )


def _fit(project: Project, case: int | None, index: int) -> Hashable:
    return tuple(load.lack_of_fit for load in _loads_on(project, case, index))


_SAYINGS: Final[dict[PartKind, Callable[[Project, int | None, int], Hashable]]] = {
    "section": _section,
    "bedding": _bedding,
    "bonded": _bonded,
    "warmth": _warmth,
    "fit": _fit,
}


def _loads_on(project: Project, case: int | None, segment: int) -> tuple[SegmentLoad, ...]:
    if case is None:
        return ()
    mark = project.segments[segment].mark
    return tuple(load for load in project.load_cases[case].segment_loads if load.segment == mark)


def loads_behind(part: Part, project: Project, case: int | None) -> tuple[int, ...]:
    """The records of the edited case behind a load on the drawing, by their index in its list."""
    if case is None or part.kind not in LOADS or part.kind == "gravity":
        return ()
    loads = project.load_cases[case]
    if part.kind in _JOINT_COLUMNS:
        mark = project.joints[part.index].mark
        return tuple(i for i, load in enumerate(loads.joint_loads) if load.joint == mark)
    if part.kind == "companion_load":
        mark = beside_at(project, part.index).segment.mark
    else:
        mark = project.segments[part.index].mark
    own = [i for i, load in enumerate(loads.segment_loads) if load.segment == mark]
    if part.kind == "fit":
        return tuple(i for i in own if loads.segment_loads[i].lack_of_fit)
    return tuple(own)


def case_share(project: Project, shown: Shown, case: int | None) -> float:
    """How much of the edited case is in what is shown: its factor there, 0 where it takes no part."""
    if case is None:
        return 0.0
    name = project.load_cases[case].name
    if shown.kind == "case":
        return 1.0 if shown.name == name else 0.0
    together = (c for c in project.combinations if shown.kind == "combination" and c.name == shown.name)
    return next((float(c.factors.get(name, 0.0)) for c in together), 0.0)


_SEGMENT_PARTS: Final[dict[str, PartKind]] = {
    "length": "length",
    "section": "section",
    "mark": "mark",
    "load_start": "distributed",
    "load_end": "distributed_end",
    "heat": "warmth",
    "bonded": "bonded",
    "bedding": "bedding",
    "lack_of_fit": "fit",
}
_COMPANION_PARTS: Final[dict[str, PartKind]] = {
    "length": "companion_length",
    "section": "companion_section",
    "mark": "companion_mark",
    "acts": "companion_name",
    "companion": "companion_name",
    **dict.fromkeys(("load_start", "load_end", "heat", "lack_of_fit"), "companion_load"),
}
_JOINT_PARTS: Final[dict[str, PartKind]] = {
    "support": "support",
    "shoulder": "shoulder",
    "lateral_translation": "lateral",
    "lateral_rotation": "turning",
    "force": "force",
    "movement": "movement",
}


def part_of(cell: Cell, project: Project, case: int | None) -> Part | None:
    """The part that shows a cell, in its plainest place; None for a cell that the drawing does not show."""
    if cell.table == "segments":
        return Part(_SEGMENT_PARTS.get(cell.column, "segment"), cell.record)
    if cell.table == "joints":
        return Part(_JOINT_PARTS.get(cell.column, "joint"), cell.record)
    if cell.table == "companions":
        return Part(_COMPANION_PARTS.get(cell.column, "companion"), cell.record)
    if cell.table == "load_cases":
        return Part("gravity", 0) if cell.column == "gravity" and cell.record == case else None
    return _part_of_load(cell, project, case)


def _part_of_load(cell: Cell, project: Project, case: int | None) -> Part | None:
    if case is None or cell.table not in ("segment_loads", "joint_loads"):
        return None
    records = getattr(project.load_cases[case], cell.table)
    if not 0 <= cell.record < len(records):
        return None
    if cell.table == "joint_loads":
        return _marked(project.joints, records[cell.record].joint, _JOINT_PARTS.get(cell.column, "joint"))
    kind = _SEGMENT_PARTS.get(cell.column, "segment")
    found = _marked(project.segments, records[cell.record].segment, kind)
    index = index_of_mark(project, records[cell.record].segment) if found is None else None
    return found if index is None else Part("companion_load", index)


def _marked(records: tuple[object, ...], mark: str, kind: PartKind) -> Part | None:
    found = (i for i, record in enumerate(records) if getattr(record, "mark", None) == mark)
    index = next(found, None)
    return None if index is None else Part(kind, index)


def _part_of_companion(project: Project, at: int, rest: Sequence[str | int]) -> Part | None:
    """The part that shows a cell of a companion or of one of its segments, by the rest of its place."""
    match rest:
        case ("segments", int(number), str(column), *_):
            return part_of(Cell("companions", index_of(project, at, number), column), project, None)
        case (str(key),):
            column = "companion" if key == "mark" else key
            return part_of(Cell("companions", index_of(project, at), column), project, None)
    return None


def _part_of_case(project: Project, case: int, rest: Sequence[str | int]) -> Part | None:
    """The part that shows a cell of a load case or of one of its loads, by the rest of its place."""
    match rest:
        case (str(column),):
            return part_of(Cell("load_cases", case, column), project, case)
        case (str(table), int(record), str(column)):
            return part_of(Cell(table, record, column), project, case)
    return None


def part_at(place: Sequence[str | int], project: Project) -> Part | None:
    """The part that shows the cell at a place of the project (of a draft); None where none does."""
    match place:
        case ("segments" | "joints" as table, int(record), str(column), *_):
            return part_of(Cell(table, record, column), project, None)
        case ("companions", int(at), *rest) if at < len(project.companions):
            return _part_of_companion(project, at, rest)
        case ("load_cases", int(case), *rest) if 0 <= case < len(project.load_cases):
            return _part_of_case(project, case, rest)
    return None
