"""The stress checks by segment, the worst first, each with its little scale."""

from __future__ import annotations

import math
from collections.abc import Mapping

import numpy as np

from app.findings.records import Band, SegmentFinding
from app.findings.subjects import subject_of, utilisation_of, worst_first
from app.phrases.checks import check_sentence, short_sentence
from app.units import format_value, utilisation_text
from solver.checks import STRESSES, Check
from solver.model import UnitSystemName
from solver.results import Results


def segment_findings(
    results: Results, system: UnitSystemName, state: str | None = None
) -> tuple[SegmentFinding, ...]:
    """One finding for each segment with a made check of stress, in one checked state or in all of them."""
    checks = (check for check in results.checks if state in (None, check.combination))
    places = {segment.mark: index for index, segment in enumerate(results.project.segments)}
    bands = _Bands(results, system, state)
    worst = worst_first(check for check in checks if check.check in STRESSES)
    return tuple(_finding(check, places, bands, system) for check in worst)


def _finding(
    check: Check, places: Mapping[str, int], bands: _Bands, system: UnitSystemName
) -> SegmentFinding:
    utilisation = utilisation_of(check)
    mark = str(check.segment)
    return SegmentFinding(
        subject=subject_of(check),
        segment=places[mark],
        mark=mark,
        sentence=check_sentence(check, system),
        short=short_sentence(check, system),
        state=check.combination,
        utilisation=utilisation,
        utilisation_text=utilisation_text(utilisation, check.status),
        status=check.status,
        position=float(check.position or 0.0),
        band=bands.of(places[mark], check.part, check.combination),
    )


class _Bands:
    """The scales of all segments; stresses of checked states (or one) divided by their allowable factor."""

    def __init__(self, results: Results, system: UnitSystemName, only: str | None) -> None:
        self._results = results
        self._system = system
        states = [state for state in results.states if state.checked]
        self._factors = {state.name: state.allowable_factor for state in states}
        factors = np.array([state.allowable_factor for state in states])[:, np.newaxis]
        chosen = [index for index, state in enumerate(states) if only in (None, state.name)]
        found = results.segments if results.parts is None else results.parts
        self._limits = results.allowables if results.parts is None else results.parts.allowables
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
        parts = self._results.parts
        return segment if parts is None else int(parts.of_segment(segment)[part or 0])

    def _label(self, allowable: float | None, sign: float) -> str:
        if allowable is None:
            return ""
        return format_value(sign * allowable, "stress", self._system, 4, strip=True)


def _given(value: np.float64) -> float | None:
    """The allowable as a number, None where the material has none."""
    return None if math.isnan(value) else float(value)
