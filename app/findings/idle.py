"""Loads that were entered and do nothing, because the material lacks what turns them into strain or weight.

A constant left at 0 is easily overlooked: the member then passes as if it were cold or weightless.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator

from app.beside import beside
from app.findings.listing import listed
from app.phrases.notes import NO_DENSITY, NO_DENSITY_IN_PART, NO_EXPANSION
from app.words import tr
from solver.model import CompanionSegment, LoadCase, Project, Segment, SegmentLoad, end_of, parts_of
from solver.results import Results


def idle_notes(results: Results) -> Iterator[str]:
    """One sentence for temperatures, one for gravity, where a checked state takes them with a factor."""
    project = results.project
    cases = [case for case in project.load_cases if _is_used(case, results)]
    rigid = _marks(project, {m.name for m in project.materials if not m.expansion})
    heated = [(case.name, load.segment) for case in cases for load in case.segment_loads if _heats(load)]
    yield from _note(NO_EXPANSION, [(name, mark) for name, mark in heated if mark in rigid], project)
    weightless = _marks(project, {m.name for m in project.materials if not m.density})
    pulled = [(case.name, mark) for case in cases if case.gravity for mark in weightless]
    yield from _note(NO_DENSITY, pulled, project)
    partly = _marks_in_part(project, {m.name for m in project.materials if not m.density}) - weightless
    lighter = [(case.name, mark) for case in cases if case.gravity for mark in partly]
    yield from _note(NO_DENSITY_IN_PART, lighter, project)


def _is_used(case: LoadCase, results: Results) -> bool:
    return any(state.factors.get(case.name) for state in results.states if state.checked)


def _heats(load: SegmentLoad) -> bool:
    return bool(load.temperature_start or end_of(load.temperature_start, load.temperature_end))


def _segments(project: Project) -> Iterator[Segment | CompanionSegment]:
    """All that can be loaded: of the member, then of its companions."""
    yield from project.segments
    yield from (of.segment for of in beside(project))


def _marks(project: Project, materials: set[str]) -> set[str]:
    """The segments in which every part is of these materials."""
    return {s.mark for s in _segments(project) if _materials(s) <= materials}


def _marks_in_part(project: Project, materials: set[str]) -> set[str]:
    """The segments in which any part is of these materials."""
    return {s.mark for s in _segments(project) if _materials(s) & materials}


def _materials(segment: Segment | CompanionSegment) -> set[str]:
    parts = parts_of(segment) if isinstance(segment, Segment) else (segment,)
    return {part.material for part in parts}


def _note(template: str, found: Iterable[tuple[str, str]], project: Project) -> Iterator[str]:
    """The sentence over pairs of case and segment, each named once and in the member's order."""
    pairs = list(found)
    cases, marks = {case for case, _ in pairs}, {mark for _, mark in pairs}
    if pairs:
        yield tr(template).format(
            cases=listed([case.name for case in project.load_cases if case.name in cases]),
            places=listed([segment.mark for segment in _segments(project) if segment.mark in marks]),
        )
