"""What the usual strips show of one state or of the envelope: plain values, made once per result.

No mechanics here: curves come from `solver.fields`, allowables from the materials times the state's factor.
Every strip includes 0, so that nothing looks larger than it is, and has a least range, so that round-off
(a heated free bar's stress of 1e-8 Pa) does not fill the strip: a strain of 1e-9 counts as nothing.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from app.allowable_lines import (
    NOTHING,
    allowable_lines,
    allowable_texts,
    over_least,
    unchecked_segments,
)
from app.gui.strips.company import (
    COMPRESSION,
    NONE,
    OVER,
    PLAIN,
    TENSION,
    Company,
    Earlier,
    Trace,
    Values,
    envelope_beside,
    of_envelope,
    of_state,
    singles_beside,
)
from app.point_marks import PointMark, point_marks
from app.strip_choice import USUAL, Kind, kind_symbols
from app.units import format_value, symbol, utilisation_text
from solver.arrays import FloatArray, IntArray
from solver.checks import PASS_MARGIN
from solver.fields import curves, envelope
from solver.model import UnitSystemName
from solver.results import Results


@dataclass(frozen=True, slots=True)
class Limit:
    """A limit from `first` to `last` (m), with its text and shorter ones for where room is short."""

    first: float
    last: float
    value: float
    texts: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Extreme:
    """A largest or smallest value, its place (m) and its text."""

    x: float
    value: float
    text: str


@dataclass(frozen=True, slots=True)
class StripContent:
    """One strip: traces over a range `low`…`high`, limits, extremes, and stretches that were not checked.

    `singles` are the states an envelope is of, `around` is the envelope around a state, `earlier` are the
    traces of a reference; `legend` says which is which, in the first of the shown strips.
    """

    kind: Kind
    title: str
    unit: str
    traces: tuple[Trace, ...]
    low: float
    high: float
    limits: tuple[Limit, ...] = ()
    beyond: tuple[Limit, ...] = ()  # limits too far to be drawn to scale
    extremes: tuple[Extreme, ...] = ()
    unchecked: tuple[tuple[float, float], ...] = ()
    filled: bool = True
    earlier: tuple[Trace, ...] = ()
    singles: tuple[Trace, ...] = ()
    around: tuple[Trace, ...] = ()
    legend: str = ""
    notes: tuple[str, ...] = ()  # what is to know of the whole strip, then the same in fewer words
    marks: tuple[PointMark, ...] = ()  # peak stresses and fatigue, at single places


def unit_of(kind: Kind, system: UnitSystemName) -> str:
    """The unit beside the symbol, empty for utilisation."""
    return "" if kind == "utilisation" else symbol(kind, system)


def number(kind: Kind, value: float, system: UnitSystemName) -> str:
    """A value as the strips write it."""
    if kind == "utilisation":
        return utilisation_text(value, "fail" if value > 1 + PASS_MARGIN else "pass")
    return format_value(value, kind, system)


def of_unit_strain(results: Results) -> dict[Kind, float]:
    """How much each quantity is at most where the strain is 1: what is small and what is not, SI."""
    modulus = float(results.chain.modulus.max())
    rigidity = float(results.chain.rigidity(slice(None)).max())
    return {
        "displacement": float(results.position[-1]),
        "force": rigidity,
        "stress": modulus,
        "utilisation": 1.0,
    }


def contents_of(
    results: Results,
    state: int | None,
    earlier: Earlier | None,
    *,
    together: bool,
    near: tuple[float, float] | None,
) -> tuple[StripContent, ...]:
    """The strips of one state, or of the envelope (None)."""
    if state is None:
        return envelope_contents(results, earlier, together=together, near=near)
    return state_contents(results, state, earlier, together=together, near=near)


def state_contents(
    results: Results,
    state: int,
    earlier: Earlier | None = None,
    *,
    together: bool = False,
    near: tuple[float, float] | None = None,
) -> tuple[StripContent, ...]:
    """The strips of one state; `together` with the envelope around it, `near` a window with more points."""
    shown = curves(results, state, near=near)
    company = Company(earlier, envelope_beside(results, near) if together else None)
    builder = _Builder(results, (state,), shown.x, shown.segment, shown.utilisation, shown.stress, company)
    return builder.build(of_state(shown))


def envelope_contents(
    results: Results,
    earlier: Earlier | None = None,
    *,
    together: bool = False,
    near: tuple[float, float] | None = None,
) -> tuple[StripContent, ...]:
    """The strips of the envelope of the checked states; `together` with each of these states."""
    shown = envelope(results, near=near)
    states = tuple(index for index, state in enumerate(results.states) if state.checked)
    company = Company(earlier, singles_beside(results, near) if together else None)
    builder = _Builder(results, states, shown.x, shown.segment, shown.utilisation, None, company)
    return builder.build(of_envelope(shown))


class _Builder:
    """Makes the four contents from curves that share x; `stress` None stands for the envelope."""

    def __init__(
        self,
        results: Results,
        states: tuple[int, ...],
        x: FloatArray,
        segment: IntArray,
        utilisation: FloatArray,
        stress: FloatArray | None,
        company: Company,
    ) -> None:
        self._results = results
        self._system = results.project.display.unit_system
        self._states = states
        self._x, self._segment = x, segment
        self._utilisation, self._stress = utilisation, stress
        self._company = company

    def build(self, values: Values) -> tuple[StripContent, ...]:
        symbols = kind_symbols()
        return tuple(self._content(kind, symbols[kind], values[kind]) for kind in USUAL)

    def _content(self, kind: Kind, title: str, columns: tuple[FloatArray, ...]) -> StripContent:
        least = self._nothing(kind)
        others = self._company.values(kind)
        drawn, beyond = self._limits(kind, columns + others)
        marks = point_marks(self._results, self._states, kind)
        low, high = _range(columns + others, drawn, least, marks)
        return StripContent(
            kind=kind,
            title=title,
            unit=unit_of(kind, self._system),
            traces=tuple(self._trace(kind, column) for column in columns),
            low=low,
            high=high,
            limits=drawn,
            beyond=beyond,
            extremes=self._extremes(kind, columns, least),
            unchecked=self._unchecked() if kind == "utilisation" else (),
            filled=kind != "displacement",
            earlier=self._company.of_earlier(kind),
            singles=self._company.singles(kind),
            around=self._company.around(kind),
            legend=self._company.legend,
            marks=marks,
        )

    def _nothing(self, kind: Kind) -> float:
        """The least range of a strip, from the member's own stiffness."""
        return NOTHING * of_unit_strain(self._results)[kind]

    def _trace(self, kind: Kind, value: FloatArray) -> Trace:
        """The curve with points put in where it changes sign or passes its limit."""
        sign = value if self._stress is None or kind == "force" else self._sign(kind, self._stress)
        columns = np.vstack([self._x, value, sign, self._over_measure(kind, value)])
        if kind != "displacement":
            columns = with_crossings(with_crossings(columns, 2, 0.0), 3, 1.0)
        return Trace(columns[0], columns[1], self._drawn(kind, columns))

    def _sign(self, kind: Kind, stress: FloatArray) -> FloatArray:
        """Whose sign colours the curve: of a utilisation that any of several parts may govern, none."""
        bonded = self._results.chain.bonded
        if kind != "utilisation" or bonded is None:
            return stress
        return np.where(bonded.several[self._segment], 0.0, stress)

    def _over_measure(self, kind: Kind, value: FloatArray) -> FloatArray:
        """What is above 1 where the limit is passed: of the envelope's stress, each side by itself."""
        own = kind == "stress" and self._stress is not None and self._results.parts is None
        if kind == "utilisation" or own:
            return self._utilisation
        if kind != "stress":
            return np.zeros_like(value)
        return over_least(self._results, self._states, self._segment, value, self._utilisation)

    def _drawn(self, kind: Kind, columns: FloatArray) -> IntArray:
        middle = 0.5 * (columns[:, 1:] + columns[:, :-1])
        if kind == "displacement" or (kind == "utilisation" and self._stress is None):
            drawn = np.full(middle.shape[1], PLAIN)
        else:
            none = self._nothing("force" if kind == "force" else "stress")  # round-off has no sign
            drawn = np.where(middle[2] < -none, COMPRESSION, np.where(middle[2] > none, TENSION, PLAIN))
        drawn = np.where(middle[3] > 1 + PASS_MARGIN, OVER, drawn)
        return np.where((np.diff(columns[0]) > 0) & np.isfinite(middle[1]), drawn, NONE)

    def _limits(self, kind: Kind, columns: tuple[FloatArray, ...]) -> tuple[tuple[Limit, ...], ...]:
        """The limits drawn to scale, and those too far for that."""
        if kind == "utilisation":
            return (Limit(0.0, float(self._results.position[-1]), 1.0, ("1",)),), ()
        if kind != "stress":
            return (), ()
        lines = allowable_lines(self._results, self._states, columns)
        limits = [
            (line.far, Limit(line.first, line.last, line.value, allowable_texts(line, self._system)))
            for line in lines
        ]
        return tuple(tuple(limit for far, limit in limits if far is wanted) for wanted in (False, True))

    def _extremes(self, kind: Kind, columns: tuple[FloatArray, ...], least: float) -> tuple[Extreme, ...]:
        if not np.isfinite(columns[0]).any():
            return ()
        high = self._extreme(kind, columns[0], np.nanargmax, least)
        low = self._extreme(kind, columns[-1], np.nanargmin, least)
        if kind == "utilisation" or low.text == high.text:
            return (high,)
        return tuple(e for e in (high, low) if e.value != 0.0) or (high,)

    def _extreme(
        self, kind: Kind, column: FloatArray, pick: Callable[[FloatArray], np.intp], least: float
    ) -> Extreme:
        at = int(pick(column))
        value = float(column[at]) if abs(column[at]) > least else 0.0
        return Extreme(float(self._x[at]), value, number(kind, value, self._system))

    def _unchecked(self) -> tuple[tuple[float, float], ...]:
        """Where a check of stress was not made, or there is no utilisation."""
        found = unchecked_segments(self._results, self._states, self._segment, self._utilisation)
        position = self._results.position
        return tuple((float(position[i]), float(position[i + 1])) for i in sorted(found))


def _range(
    columns: tuple[FloatArray, ...],
    limits: tuple[Limit, ...],
    least: float,
    marks: tuple[PointMark, ...] = (),
) -> tuple[float, float]:
    """Low and high of a strip: always with 0, with a little air, never less than `least`."""
    ends = [0.0, *(limit.value for limit in limits), *(mark.value for mark in marks)]
    for column in columns:
        if np.isfinite(column).any():
            ends += [float(np.nanmin(column)), float(np.nanmax(column))]
    low, high = min(ends), max(ends)
    air = 0.07 * max(high - low, least)
    low, high = (low - air if low < 0 else low), (high + air if high > 0 else high)
    return (low, high) if high - low >= least else (low - least, high + least)


def with_crossings(columns: FloatArray, row: int, level: float) -> FloatArray:
    """Points (c, k) with one put in wherever row `row` passes `level` between two points, all rows linear."""
    values = columns[row] - level
    with np.errstate(invalid="ignore"):
        at = np.flatnonzero((values[:-1] * values[1:] < 0) & (np.diff(columns[0]) > 0))
    if not len(at):
        return columns
    share = values[at] / (values[at] - values[at + 1])
    between = columns[:, at] + share * (columns[:, at + 1] - columns[:, at])
    between[row] = level
    return np.insert(columns, at + 1, between, axis=1)
