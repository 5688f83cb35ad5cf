"""The strips' curves as numbers for spreadsheets: places, segments, values, units in the head.

A joint stands in two rows, one for each side, told apart by the segment. The points are those of the drawn
curve, exact extremes included. Numbers have no thin spaces and a plain minus, so that they can be computed
with, and the decimal sign of the user's language, as spreadsheets in that language read it. Rows of joints
and of extremes have every digit; between them, where a curve is only drawn, numbers are rounded.
"""

from __future__ import annotations

import csv
import io
import math
from collections.abc import Sequence
from typing import TYPE_CHECKING

import numpy as np

from app.numerals import localised
from app.phrases.states import state_words
from app.strip_choice import USUAL, Kind, kind_symbols
from app.units import Quantity, symbol, to_display
from app.words import decimal_sign, tr
from solver.arrays import FloatArray, IntArray
from solver.fields import curves, envelope
from solver.mode_fields import mode_along, mode_in, peak_of
from solver.model import UnitSystemName

if TYPE_CHECKING:
    from solver.buckling_mode import Mode
    from solver.results import Results

Rows = list[list[str]]
_DIGITS = 15  # all that survive a change of units
_BETWEEN = 7  # digits between joints and extremes


def number_rows(results: Results, state: int | None, kinds: Sequence[Kind] = USUAL) -> Rows:
    """Head and rows of one state, or of the envelope where `state` is None."""
    units = results.project.display.unit_system
    mode = mode_in(results, state) if "mode" in kinds else None
    made = _envelope_columns(results) if state is None else _state_columns(results, state, mode)
    x, segment, columns = made
    columns["mode"] = [(tr("w, shape only"), _shape(results, mode, x, segment))]
    shown = [(head, kind, values) for kind in kinds for head, values in columns[kind]]
    heads = [_head("x", "length", units), tr("Segment")]
    of = _state_words(results, state)
    heads += [_head(f"{head}, {of}", quantity_of(kind), units) for head, kind, _values in shown]
    marks = [results.project.segments[index].mark for index in segment.tolist()]
    values = [to_display(x, "length", units)]
    values += [to_display(column, quantity_of(kind), units) for _head, kind, column in shown]
    first, *others = map(_written, _rounded_between(values, segment))
    return [heads, *map(list, zip(first, marks, *others, strict=True))]


def _rounded_between(columns: list[FloatArray], segment: IntArray) -> list[FloatArray]:
    """The columns, x first, rounded where no joint and no extreme is; nothing leaves its segment's range."""
    begins = np.flatnonzero(np.diff(segment, prepend=-1))
    counts = np.diff(begins, append=len(segment))
    ranges = [
        tuple(np.repeat(end.reduceat(values, begins), counts) for end in (np.fmin, np.fmax))
        for values in columns
    ]
    exact = np.zeros(len(segment), dtype=bool)
    for values, (low, high) in zip(columns, ranges, strict=True):
        exact |= ((values == low) | (values == high)) & (low < high)
    rounded = []
    for values, (low, high) in zip(columns, ranges, strict=True):
        short = np.array([float(f"{value:.{_BETWEEN}g}") for value in values.tolist()])
        rounded.append(np.where(exact | (short < low) | (short > high), values, short))
    in_order = bool(np.all(np.diff(rounded[0]) >= 0.0))
    return rounded if in_order else [columns[0], *rounded[1:]]


def _state_words(results: Results, state: int | None) -> str:
    """Which state the numbers are of, for the heads: a spreadsheet outlives what the window showed."""
    if state is None:
        return tr("Envelope")
    shown = results.states[state]
    return tr("Case {name}").format(name=shown.name) if shown.kind == "case" else state_words(shown.name)


def csv_text(rows: Rows) -> str:
    """The rows as a file: separated by commas, by semicolons where the comma is the decimal sign."""
    out = io.StringIO()
    between = ";" if decimal_sign() == "," else ","
    csv.writer(out, delimiter=between, lineterminator="\r\n").writerows(rows)
    return out.getvalue()


def quantity_of(kind: Kind) -> Quantity:
    """What a strip is measured in."""
    return "factor" if kind == "utilisation" or kind == "mode" else kind


_Columns = dict[Kind, list[tuple[str, FloatArray]]]


def _state_columns(results: Results, state: int, mode: Mode | None) -> tuple[FloatArray, IntArray, _Columns]:
    also = () if mode is None else (peak_of(results, mode),)
    shown, symbols = curves(results, state, also=also), kind_symbols()
    columns: _Columns = {kind: [(symbols[kind], getattr(shown, kind))] for kind in USUAL}
    return shown.x, shown.segment, columns


def _envelope_columns(results: Results) -> tuple[FloatArray, IntArray, _Columns]:
    """Largest and smallest; of utilisation the largest."""
    shown, columns = envelope(results), _Columns()
    names = kind_symbols()
    for kind in USUAL[:-1]:
        ends = (f"{kind}_max", f"{kind}_min")
        heads = (f"{names[kind]} max", f"{names[kind]} min")
        columns[kind] = [(head, getattr(shown, end)) for head, end in zip(heads, ends, strict=True)]
    columns["utilisation"] = [(names["utilisation"], shown.utilisation)]
    return shown.x, shown.segment, columns


def _shape(results: Results, mode: Mode | None, x: FloatArray, segment: IntArray) -> FloatArray:
    """The mode shape; no numbers where there is none."""
    return np.full(len(x), np.nan) if mode is None else mode_along(results, mode, segment, x)


def _head(name: str, quantity: Quantity, units: UnitSystemName) -> str:
    unit = symbol(quantity, units)
    return f"{name} ({unit})" if unit else name


def _written(shown: FloatArray) -> list[str]:
    """Numbers in display units; empty where there is none, as where nothing was checked."""
    return ["" if math.isnan(value) else localised(f"{value + 0.0:.{_DIGITS}g}") for value in shown.tolist()]
