"""Fatigue: stress swinging between two combinations, at every shoulder and along every segment.

With σ₁ and σ₂ the nominal stresses in the two combinations, amplitude and mean are σ_a = Kt |σ₁ − σ₂| / 2 and
σ_m = Kt (σ₁ + σ₂) / 2: the full notch effect on both. The utilisation is σ_a / S_a + σ_m / S_u where the mean
is tensile and σ_a / S_a where it is not; away from shoulders Kt is 1. Along a segment, of the member or of a
companion beside it, it is given at its worst place (`solver.swings`).
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass

import numpy as np
from msgspec import UnsetType
from msgspec.structs import replace

from solver.arrays import FloatArray, IntArray
from solver.checks import Check, Reason, status_of
from solver.model import Endurance, Project
from solver.part_results import every_part
from solver.results import State
from solver.shoulders import Notch
from solver.swings import Row


@dataclass(frozen=True, slots=True)
class _Swing:
    """One range of fatigue: the combinations' names and the indices of their states."""

    between: tuple[str, str]
    states: IntArray


@dataclass(frozen=True, slots=True)
class _Place:
    """Where a check is made: a fraction 0…1 of a part of a row, with its x and its factor."""

    row: Row
    part: int
    fraction: float
    x: float
    line: Endurance | None  # what is endured there; None where the material says nothing
    names: Mapping[str, object]  # of the segment, and which part of it or which joint
    factor: float = 1.0
    reason: Reason | None = None
    ratio: float | None = None


class FatigueChecker:
    """Makes the checks of fatigue of one solved project."""

    def __init__(
        self,
        project: Project,
        states: tuple[State, ...],
        member: Row,
        companions: Row | None,
        shoulders: Sequence[Notch],
    ) -> None:
        """`companions` are the segments of all of them, in the order of the file."""
        self.project, self.states, self.shoulders = project, states, shoulders
        self.member, self.companions = member, companions

    def checks(self) -> Iterator[Check]:
        """By range, then along the chain: the segments part by part, then the shoulders; then companions."""
        if not self.project.fatigue:
            return
        index = {state.name: i for i, state in enumerate(self.states) if state.kind == "combination"}
        self._parts, self._owner = every_part(self.project), self.member.owners()
        self._endurance = {
            m.name: None if isinstance(m.endurance, UnsetType) else m.endurance
            for m in self.project.materials
        }
        for span in self.project.fatigue:
            states = np.array([index[span.start], index[span.end]])
            swing = _Swing((span.start, span.end), states)
            for place in (*self._along(swing), *self._notched(), *self._beside(swing)):
                yield _check(swing, place)

    def _line(self, part: int) -> Endurance | None:
        return self._endurance[self._parts[part].material]

    def _along(self, swing: _Swing) -> Iterator[_Place]:
        """The worst place of every part, segment by segment, the segment's own part first."""
        lines = [self._line(part) for part in range(len(self._parts))]
        worst = _worst(self.member, swing, lines)
        for part in np.argsort(self._owner, kind="stable").tolist():
            share = _share(self.member, int(self._owner[part]), worst[part])
            yield _Place(self.member, part, share, worst[part], lines[part], self._names(part))

    def _names(self, part: int) -> Mapping[str, object]:
        """What a check is of; a part is named where its segment has others."""
        own, count = self.project.segments[self._owner[part]], len(self.project.segments)
        if not own.bonded:
            return {"segment": own.mark}
        first = int(np.searchsorted(self._owner[count:], self._owner[part]))
        number = max(0, part - count - first + 1)
        return {"segment": own.mark, "part": number, "material": self._parts[part].material}

    def _notched(self) -> Iterator[_Place]:
        for notch in self.shoulders:
            at = 0.0 if notch.at_start else 1.0
            edge = self.member.begins if notch.at_start else self.member.ends
            yield _Place(
                row=self.member,
                part=notch.segment,
                fraction=at,
                x=float(edge[notch.segment]),
                line=self._line(notch.segment),
                names={
                    "segment": self.project.segments[notch.segment].mark,
                    "joint": self.project.joints[notch.joint].mark,
                },
                factor=1.0 if notch.factor is None else notch.factor,
                reason=notch.reason,
                ratio=notch.ratio,
            )

    def _beside(self, swing: _Swing) -> Iterator[_Place]:
        """The worst place of every companion's segment; those that have parted carry nothing."""
        row = self.companions
        if row is None:
            return
        segments = [segment for companion in self.project.companions for segment in companion.segments]
        lines = [self._endurance[segment.material] for segment in segments]
        worst = _worst(row, swing, lines)
        for i, segment in enumerate(segments):
            yield _Place(row, i, _share(row, i, worst[i]), worst[i], lines[i], {"segment": segment.mark})


def _worst(row: Row, swing: _Swing, lines: Sequence[Endurance | None]) -> list[float]:
    """The x of the worst place of every part by its own line."""
    found: dict[Endurance | None, FloatArray] = {line: row.worst(swing.states, line) for line in set(lines)}
    return [float(found[line][part]) for part, line in enumerate(lines)]


def _share(row: Row, segment: int, x: float) -> float:
    """The fraction 0…1 of a segment that x is at."""
    share = (x - float(row.begins[segment])) / float(row.chain.length[segment])
    return min(1.0, max(0.0, share))


def _check(swing: _Swing, place: _Place) -> Check:
    line, bare = place.line, _unmade(swing, place)
    if place.reason is not None or line is None:
        return replace(bare, reason=place.reason or "no_endurance", ratio=place.ratio)
    first, second = place.row.stresses(swing.states, place.part, place.fraction)
    amplitude = 0.5 * place.factor * abs(first - second)
    mean = 0.5 * place.factor * (first + second)
    utilisation = amplitude / line.amplitude + max(mean, 0.0) / line.ultimate
    return replace(
        bare,
        status=status_of(utilisation),
        value=amplitude,
        limit=float(line.amplitude),
        utilisation=utilisation,
        factor=place.factor,
        nominal=first,
        nominal_to=second,
        amplitude=amplitude,
        mean=mean,
        ultimate=float(line.ultimate),
    )


def _unmade(swing: _Swing, place: _Place) -> Check:
    """What the check is of, before anything is compared."""
    bare = Check("fatigue", swing.between[1], "not_made", between=swing.between, position=place.x)
    return replace(bare, **place.names)
