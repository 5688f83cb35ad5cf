"""Companions put on and taken off by hand: beside each run of chosen segments, and from beside them."""

from __future__ import annotations

from collections.abc import Iterable
from itertools import groupby

from app import edits
from app.beside import index_of
from app.hand.cells import Cell
from app.words import tr
from solver.model import Project


def lay_beside(project: Project, segments: Iterable[int]) -> tuple[Project, tuple[Cell, ...], str]:
    """The project with a companion beside each run of neighbours, the cells that say how each acts, a line.

    They begin as one segment like the first beside them, which fits.
    """
    before, marks = len(project.companions), []
    for first, last in _runs(segments):
        start, end = project.joints[first].mark, project.joints[last + 1].mark
        project = edits.add_companion(project, start, end)
        marks.append(project.companions[-1].mark)
    made = range(before, len(project.companions))
    cells = tuple(Cell("companions", index_of(project, at), "acts") for at in made)
    note = tr("{marks}: one segment like the first beside it; say how it acts, then type what differs")
    return project, cells, note.format(marks=", ".join(marks))


def _runs(segments: Iterable[int]) -> Iterable[tuple[int, int]]:
    """First and last of each run of neighbours."""
    for _, run in groupby(enumerate(sorted(set(segments))), key=lambda pair: pair[1] - pair[0]):
        indexes = [index for _, index in run]
        yield indexes[0], indexes[-1]


def companions_beside(project: Project, segments: Iterable[int]) -> tuple[int, ...]:
    """The companions that lie beside any of the segments."""
    places = {joint.mark: index for index, joint in enumerate(project.joints)}
    chosen = set(segments)
    return tuple(
        at
        for at, companion in enumerate(project.companions)
        if chosen & set(range(places[companion.start], places[companion.end]))
    )


def companions_of(project: Project, pieces: Iterable[int]) -> tuple[int, ...]:
    """The companions that have any of these segments, by their index among all."""
    chosen = set(pieces)
    firsts = [index_of(project, at) for at in range(len(project.companions))]
    return tuple(
        at
        for at, companion in enumerate(project.companions)
        if chosen & set(range(firsts[at], firsts[at] + len(companion.segments)))
    )
