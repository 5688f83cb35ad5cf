"""The segments of all companions as one list, in the order of the file: what tables and drawing count by."""

from __future__ import annotations

from dataclasses import dataclass

from solver.faults import Place
from solver.model import Companion, CompanionSegment, Project


@dataclass(frozen=True, slots=True)
class Beside:
    """A segment of a companion, and where both stand."""

    at: int  # of the companion
    number: int  # of the segment within it
    companion: Companion
    segment: CompanionSegment

    @property
    def place(self) -> Place:
        """The segment's place in the file."""
        return ("companions", self.at, "segments", self.number)


def beside(project: Project) -> tuple[Beside, ...]:
    """All of them."""
    return tuple(
        Beside(at, number, companion, segment)
        for at, companion in enumerate(project.companions)
        for number, segment in enumerate(companion.segments)
    )


def beside_at(project: Project, index: int) -> Beside:
    """One of them by its index among all; IndexError where there is none."""
    left = index
    for at, companion in enumerate(project.companions):
        if left < len(companion.segments):
            return Beside(at, left, companion, companion.segments[left])
        left -= len(companion.segments)
    raise IndexError(index)


def index_of(project: Project, at: int, number: int = 0) -> int:
    """The index among all of a companion's segment."""
    return sum(len(companion.segments) for companion in project.companions[:at]) + number


def index_of_mark(project: Project, mark: str) -> int | None:
    """The index among all of the segment with a mark; None where no companion has it."""
    marks = [segment.mark for companion in project.companions for segment in companion.segments]
    return marks.index(mark) if mark in marks else None
