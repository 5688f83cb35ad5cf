"""Fatigue: stress swinging between two combinations, at every shoulder and along every segment.

With σ₁ and σ₂ the nominal stresses in the two combinations, amplitude and mean are σ_a = Kt |σ₁ − σ₂| / 2 and
σ_m = Kt (σ₁ + σ₂) / 2: the full notch effect on both. The utilisation is σ_a / S_a + σ_m / S_u where the mean
is tensile and σ_a / S_a where it is not; away from shoulders Kt is 1.

Along a segment the utilisation is the largest of four sums c₁ σ₁ + c₂ σ₂ with constant c, for
|a| = max(a, −a) and the tensile mean is max(m, 0). Each sum is the stress of a state of its own, which has
that sum of the forces and of the temperatures, and whose extremes `ExtremeFinder` finds exactly, in bonded
parts as well; so the largest of them is exact too. Companions stand beside the chain: their fatigue is listed
as not checked.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, replace

import numpy as np
from msgspec import UnsetType
from numpy.polynomial import legendre

from solver.arrays import FloatArray, IntArray
from solver.bonded import constraint_at
from solver.chain import Chain, Loads
from solver.checks import Check, Reason, status_of
from solver.extremes import SAME, ExtremeFinder
from solver.model import Endurance, Project
from solver.part_results import every_part
from solver.results import State
from solver.sections import area_at
from solver.shoulders import Notch
from solver.solution import Solution


@dataclass(frozen=True, slots=True)
class _Swing:
    """One range of fatigue: the combinations' names and the indices of their states."""

    between: tuple[str, str]
    states: IntArray


@dataclass(frozen=True, slots=True)
class _Place:
    """Where a check is made: a fraction 0…1 of a part, with its x, the joint of a shoulder, its factor."""

    part: int
    fraction: float
    x: float
    joint: str | None = None
    factor: float = 1.0
    reason: Reason | None = None
    ratio: float | None = None


class FatigueChecker:
    """Makes the checks of fatigue of one solved project."""

    def __init__(
        self,
        project: Project,
        chain: Chain,
        loads: Loads,
        states: tuple[State, ...],
        solution: Solution,
        position: FloatArray,
        shoulders: Sequence[Notch],
    ) -> None:
        self.project, self.chain, self.loads, self.states = project, chain, loads, states
        self.solution, self.position, self.shoulders = solution, position, shoulders

    def checks(self) -> Iterator[Check]:
        """By range, then along the chain: the segments part by part, then the shoulders."""
        if not self.project.fatigue:
            return
        index = {state.name: i for i, state in enumerate(self.states) if state.kind == "combination"}
        self._parts, self._owner = every_part(self.project), self._owners()
        lines = self._lines()
        for span in self.project.fatigue:
            states = np.array([index[span.start], index[span.end]])
            swing = _Swing((span.start, span.end), states)
            for place in (*self._along(swing, lines), *self._notched()):
                yield self._check(swing, place, lines[place.part])
            yield from self._beside(swing)

    def _lines(self) -> list[Endurance | None]:
        """What every part endures; None where its material says nothing."""
        by_name = {m.name: m.endurance for m in self.project.materials}
        found = (by_name[part.material] for part in self._parts)
        return [None if isinstance(line, UnsetType) else line for line in found]

    def _owners(self) -> IntArray:
        """The segment of every part."""
        bonded = self.chain.bonded
        return np.arange(len(self.chain.length)) if bonded is None else bonded.segment

    def _along(self, swing: _Swing, lines: Sequence[Endurance | None]) -> Iterator[_Place]:
        """The worst place of every part, segment by segment, the segment's own part first."""
        worst = {line: self._worst(swing, line) for line in set(lines)}
        for part in np.argsort(self._owner, kind="stable").tolist():
            x = float(worst[lines[part]][part])
            segment = int(self._owner[part])
            share = (x - float(self.position[segment])) / float(self.chain.length[segment])
            yield _Place(part, min(1.0, max(0.0, share)), x)

    def _worst(self, swing: _Swing, line: Endurance | None) -> FloatArray:
        """The x of the largest utilisation in each part if it endures so much, the smallest of equals."""
        amplitude, mean = (0.5 / line.amplitude, 0.5 / line.ultimate) if line is not None else (0.5, 0.0)
        half = np.array([amplitude, -amplitude])
        sums = np.stack([half, half + mean, mean - half])
        finder = ExtremeFinder(self.chain, *self._summed(swing, sums), self.position[:-1], self.position[1:])
        stress = finder.stress()
        sizes = np.concatenate([stress.largest, -stress.smallest[:1]])
        places = np.concatenate([stress.largest_at, stress.smallest_at[:1]])
        largest = sizes.max(axis=0)
        equal = sizes >= largest - SAME * np.abs(largest)
        return np.asarray(np.min(np.where(equal, places, np.inf), axis=0))

    def _summed(self, swing: _Swing, sums: FloatArray) -> tuple[Solution, Loads]:
        """A state for each row of factors on the swing's two; only force and temperature are of use."""
        force = np.einsum("rs,seq->req", sums, self.solution.force[swing.states])
        temperature = np.einsum("rs,snk->rnk", sums, self.loads.temperature[swing.states])
        return replace(self.solution, force=force), replace(self.loads, temperature=temperature)

    def _notched(self) -> Iterator[_Place]:
        for notch in self.shoulders:
            mark, x = self.project.joints[notch.joint].mark, float(self.position[notch.joint])
            at = 0.0 if notch.at_start else 1.0
            factor = 1.0 if notch.factor is None else notch.factor
            yield _Place(notch.segment, at, x, mark, factor, notch.reason, notch.ratio)

    def _beside(self, swing: _Swing) -> Iterator[Check]:
        for companion in self.project.companions:
            for segment in companion.segments:
                yield Check(
                    "fatigue",
                    swing.between[1],
                    "not_made",
                    segment=segment.mark,
                    between=swing.between,
                    reason="fatigue_companion",
                )

    def _names(self, swing: _Swing, place: _Place) -> Mapping[str, object]:
        """What a check is of; a part is named where its segment has others."""
        own = self.project.segments[self._owner[place.part]]
        named: dict[str, object] = {}
        if own.bonded and place.joint is None:
            first = int(np.searchsorted(self._owner[len(self.chain.length) :], self._owner[place.part]))
            number = max(0, place.part - len(self.chain.length) - first + 1)
            named = {"part": number, "material": self._parts[place.part].material}
        return named | {
            "check": "fatigue",
            "combination": swing.between[1],
            "segment": own.mark,
            "joint": place.joint,
            "between": swing.between,
            "position": place.x,
        }

    def _check(self, swing: _Swing, place: _Place, line: Endurance | None) -> Check:
        names = self._names(swing, place)
        if place.reason is not None or line is None:
            reason = place.reason or "no_endurance"
            return Check(status="not_made", reason=reason, ratio=place.ratio, **names)  # type: ignore[arg-type]
        first, second = self._stresses(swing, place)
        amplitude = 0.5 * place.factor * abs(first - second)
        mean = 0.5 * place.factor * (first + second)
        utilisation = utilisation_of(amplitude, mean, line)
        return Check(
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
            **names,  # type: ignore[arg-type]
        )

    def _stresses(self, swing: _Swing, place: _Place) -> tuple[float, float]:
        """The nominal stresses of both combinations at a place."""
        s, bonded = np.array([place.fraction]), self.chain.bonded
        segment = int(self._owner[place.part])
        force = force_at(self.solution, swing.states, segment, place.fraction)
        area = self.chain.area[place.part] if bonded is None else bonded.transformed[place.part]
        if bonded is not None:
            held = self.loads.temperature[swing.states]
            force = force + constraint_at(bonded, np.array([place.part]), held, s)[:, 0]
        first, second = (force / area_at(area, s)[0]).tolist()
        return first, second


def utilisation_of(amplitude: float, mean: float, endurance: Endurance) -> float:
    """σ_a / S_a, and σ_m / S_u on top of it where the mean is tensile."""
    return amplitude / endurance.amplitude + max(mean, 0.0) / endurance.ultimate


def force_at(solution: Solution, states: IntArray, segment: int, fraction: float) -> FloatArray:
    """The axial force (s,) of some states at a fraction 0…1 of a segment."""
    first, last = (int(np.searchsorted(solution.segment, segment, side)) for side in ("left", "right"))
    element = first + max(0, int(np.searchsorted(solution.start[first:last], fraction, "right")) - 1)
    start, end = float(solution.start[element]), float(solution.end[element])
    t = min(1.0, max(-1.0, (2.0 * fraction - start - end) / (end - start)))
    coefficients = solution.force[states, element]
    basis = legendre.legvander(np.array([t]), coefficients.shape[-1] - 1)[0]
    force: FloatArray = coefficients @ basis
    return force
