"""The stress checks by segment, the worst first, each with its little scale."""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass

import numpy as np

from app.beside import beside
from app.findings.records import Band, SegmentFinding
from app.findings.subjects import subject_of, utilisation_of, worst_first
from app.phrases.checks import check_sentence, short_sentence
from app.units import format_value, utilisation_text
from solver.checks import STRESSES, Check
from solver.model import UnitSystemName
from solver.results import Allowables, CompanionResults, PartResults, Results, SegmentResults


def segment_findings(
    results: Results, system: UnitSystemName, state: str | None = None
) -> tuple[SegmentFinding, ...]:
    """One finding for each segment with a made check of stress, in one checked state or in all of them."""
    checks = (check for check in results.checks if state in (None, check.combination))
    rows = [_Row.of_member(results, system, state)]
    rows += [] if results.companions is None else [_Row.beside_it(results, results.companions, system, state)]
    worst = worst_first(check for check in checks if check.check in STRESSES)
    return tuple(_finding(check, _row_of(check, rows), system) for check in worst)


@dataclass(frozen=True, slots=True)
class _Row:
    """Segments that follow one another in the results: the member's, or those of all companions."""

    places: Mapping[str, int]
    bands: _Bands
    beside: bool

    @classmethod
    def of_member(cls, results: Results, system: UnitSystemName, state: str | None) -> _Row:
        marks = (segment.mark for segment in results.project.segments)
        parts = results.parts
        found, limits = (results.segments, results.allowables) if parts is None else (parts, parts.allowables)
        bands = _Bands(results, found, limits, parts, system, state)
        return cls(_places(marks), bands, beside=False)

    @classmethod
    def beside_it(
        cls, results: Results, companions: CompanionResults, system: UnitSystemName, state: str | None
    ) -> _Row:
        marks = (of.segment.mark for of in beside(results.project))
        bands = _Bands(results, companions.segments, companions.allowables, None, system, state)
        return cls(_places(marks), bands, beside=True)


def _places(marks: Iterable[str]) -> Mapping[str, int]:
    return {mark: index for index, mark in enumerate(marks)}


def _row_of(check: Check, rows: Sequence[_Row]) -> _Row:
    return next(row for row in rows if check.segment in row.places)


def _finding(check: Check, row: _Row, system: UnitSystemName) -> SegmentFinding:
    utilisation = utilisation_of(check)
    mark = str(check.segment)
    return SegmentFinding(
        subject=subject_of(check),
        segment=row.places[mark],
        mark=mark,
        sentence=check_sentence(check, system),
        short=short_sentence(check, system),
        state=check.combination,
        utilisation=utilisation,
        utilisation_text=utilisation_text(utilisation, check.status),
        status=check.status,
        position=float(check.position or 0.0),
        band=row.bands.of(row.places[mark], check.part, check.combination),
        beside=row.beside,
    )


class _Bands:
    """The scales of all segments; stresses of checked states (or one) divided by their allowable factor."""

    def __init__(
        self,
        results: Results,
        found: SegmentResults | PartResults,
        limits: Allowables,
        parts: PartResults | None,
        system: UnitSystemName,
        only: str | None,
    ) -> None:
        self._results = results
        self._limits = limits
        self._parts = parts
        self._system = system
        states = [state for state in results.states if state.checked]
        self._factors = {state.name: state.allowable_factor for state in states}
        factors = np.array([state.allowable_factor for state in states])[:, np.newaxis]
        chosen = [index for index, state in enumerate(states) if only in (None, state.name)]
        high, low = found.stress_max, found.stress_min  # the checked states come first
        self._high = np.max(high[chosen] / factors[chosen], axis=0)
        self._low = np.min(low[chosen] / factors[chosen], axis=0)

    def of(self, segment: int, part: int | None, state: str) -> Band:
        """The scale of a segment, or of one of its bonded parts, at the allowable factor of a state."""
        factor = self._factors[state]
        row, column = self._results.state_index(state), self._column(segment, part)
        tension = _given(self._limits.tension[row, column])
        compression = _given(self._limits.compression[row, column])
        return Band(
            low=float(self._low[column]) * factor,
            high=float(self._high[column]) * factor,
            compression=None if compression is None else -compression,
            tension=tension,
            compression_text=self._label(compression, -1.0),
            tension_text=self._label(tension, 1.0),
        )

    def _column(self, segment: int, part: int | None) -> int:
        return segment if self._parts is None else int(self._parts.of_segment(segment)[part or 0])

    def _label(self, allowable: float | None, sign: float) -> str:
        if allowable is None:
            return ""
        return format_value(sign * allowable, "stress", self._system, 4, strip=True)


def _given(value: np.float64) -> float | None:
    """The allowable as a number, None where the material has none."""
    return None if math.isnan(value) else float(value)
