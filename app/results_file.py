"""Results as the plain values of a results file, its keys in its order; the terminal prints them as JSON.

Only what was checked is in it: the combinations, or the cases where there are none. A number that does not
exist (the reaction where nothing supports, a utilisation where no check was made) is null.
"""

from __future__ import annotations

import math
from typing import Any

import numpy as np

from app.phrases import reason_text
from app.project_file import sha256
from app.version import PROGRAM
from app.words import in_source_language
from solver.arrays import FloatArray
from solver.buckling_mode import Mode
from solver.checks import Check
from solver.model import StopSupport
from solver.outcomes import SupportOutcome, support_outcomes
from solver.results import PartResults, Results

FORMAT = "barwright-results"
VERSION = 1
MODE_PARTS = 8  # of every segment, at whose ends the mode of buckling is told

Values = dict[str, Any]

# of a check: the field, and the file's key where that differs
_CHECK_KEYS = {"start": "from", "end": "to"}
_CHECK_FIELDS = (
    "check", "combination", "segment", "part", "material", "joint", "start", "end", "position",
    "value", "limit", "utilisation", "status", "reason", "waiver",
    "factor", "nominal", "nominal_to", "amplitude", "mean", "ultimate",
)  # fmt: skip
# of a segment, all of them arrays by state and segment
_SEGMENT_FIELDS = (
    "force_start", "force_end", "force_max", "force_min",
    "stress_max", "stress_max_at", "stress_min", "stress_min_at",
    "utilisation", "utilisation_at", "force_bound",
)  # fmt: skip
# of a bonded part, likewise by state and part
_PART_FIELDS = (
    "stress_max", "stress_max_at", "stress_min", "stress_min_at", "utilisation", "utilisation_at",
)  # fmt: skip


def results_json(results: Results) -> Values:
    """The results file as dict, list, str, float and None, in SI units, ready for a strict JSON writer.

    It is the same whatever language is spoken.
    """
    with in_source_language():
        return _whole(results)


def _whole(results: Results) -> Values:
    governing = results.governing
    return {
        "format": FORMAT,
        "version": VERSION,
        "title": str(results.project.title),
        "program": PROGRAM,
        "project_sha256": sha256(results.project),
        "verdict": results.verdict,
        "governing": None if governing is None else _check(governing),
        "checks": [_check(check) for check in results.checks],
        "combinations": [_state(results, i) for i, state in enumerate(results.states) if state.checked],
    }


def _check(check: Check) -> Values:
    """Only the keys that apply to it; fatigue is of two combinations, `from` and `to`."""
    values = {_CHECK_KEYS.get(name, name): getattr(check, name) for name in _CHECK_FIELDS}
    if check.reason is not None:
        values["reason"] = reason_text(check.reason, check.ratio)
    if check.between is not None:
        values |= {"combination": None, "from": check.between[0], "to": check.between[1]}
    return {key: _plain(value) for key, value in values.items() if value is not None}


def _state(results: Results, state: int) -> Values:
    solution = results.solution
    return {
        "name": results.states[state].name,
        "joints": _joints(results, state),
        "segments": _segments(results, state),
        **_companions(results, state),
        "equilibrium": {
            "loads": _plain(solution.loads[state]),
            "reactions": _plain(math.fsum(r for r in solution.reaction[state] if not math.isnan(r))),
            "bedding": _plain(solution.bedding[state]),
            "residual": _plain(solution.residual[state]),
        },
        "energy": {
            "strain": _plain(solution.strain_energy[state]),
            "potential": _plain(solution.potential[state]),
        },
        "error_bound": _plain(solution.error_bound[state]),
        "stability": _stability(results, state),
    }


def _stability(results: Results, state: int) -> Values:
    """Status, factor and mode, or the reason why there are none; the mode is a shape, its largest value 1."""
    found = results.stability[state]
    if found is None or found.status == "no_compression":
        return {"status": "no_compression", "critical_factor": None, "mode": []}
    values: Values = {
        "status": found.status,
        "critical_factor": _plain(found.critical_factor),
        "mode": [] if found.mode is None else _mode(results, found.mode),
    }
    return values if found.reason is None else values | {"reason": reason_text(found.reason)}


def _mode(results: Results, mode: Mode) -> list[Values]:
    """The shape at the joints and at even places within every segment."""
    count = len(results.chain.length)
    segment = np.repeat(np.arange(count), MODE_PARTS)
    fraction = np.tile(np.arange(MODE_PARTS) / MODE_PARTS, count)
    segment, fraction = np.append(segment, count - 1), np.append(fraction, 1.0)
    position = results.position[segment] + fraction * results.chain.length[segment]
    return _rows({"position": _column(position), "value": _column(mode.at(segment, fraction))})


def _joints(results: Results, state: int) -> list[Values]:
    """One row a joint; where there is a stop or more than one support, what each of them does as well."""
    columns = {
        "mark": [joint.mark for joint in results.project.joints],
        "position": _column(results.position),
        "displacement": _column(results.solution.joint_displacement[state]),
        "reaction": _column(results.solution.reaction[state]),
    }
    rows = _rows(columns)
    for index, joint in enumerate(results.project.joints):
        if joint.supports or isinstance(joint.support, StopSupport):
            rows[index] |= _contacts(support_outcomes(results, state, index), several=bool(joint.supports))
    return rows


def _contacts(outcomes: tuple[SupportOutcome, ...], *, several: bool) -> Values:
    """Whether a stop is open or closed, and what clearance it has left; lists where the file has a list.

    In a list, what is no stop is null, and there is the force of each support on the member as well.
    """
    values: Values = {
        "contact": [one.contact for one in outcomes],
        "clearance": [_plain(one.clearance) for one in outcomes],
    }
    if not several:
        return {key: found[0] for key, found in values.items()}
    return values | {"support_forces": [_plain(one.force) for one in outcomes]}


def _segments(results: Results, state: int) -> list[Values]:
    marks: Values = {"mark": [segment.mark for segment in results.project.segments]}
    columns = {name: _column(getattr(results.segments, name)[state]) for name in _SEGMENT_FIELDS}
    rows = _rows(marks | columns)
    if results.parts is not None:
        _add_parts(rows, results.parts, state)
    return rows


def _add_parts(rows: list[Values], parts: PartResults, state: int) -> None:
    """Every part of the segments with bonded ones, the segment's own first; the others have no such key."""
    columns = {name: _column(getattr(parts, name)[state]) for name in _PART_FIELDS}
    of_parts = _rows({"material": parts.material} | columns)
    for part in np.argsort(parts.segment, kind="stable").tolist():
        row = rows[parts.segment[part]]
        if parts.number[part] or len(parts.of_segment(int(parts.segment[part]))) > 1:
            row.setdefault("parts", []).append(of_parts[part])


def _companions(results: Results, state: int) -> Values:
    """What companions do, where there are any; whether one has parted only where it can."""
    found = results.companions
    if found is None:
        return {}
    rows = []
    for index, companion in enumerate(results.project.companions):
        first, last = found.companions.first[index : index + 2].tolist()
        row: Values = {
            "mark": companion.mark,
            "force_from": _plain(float(found.force_from[state, index])),
            "force_to": _plain(float(found.force_to[state, index])),
        }
        if companion.action != "both":
            row["separated"] = bool(found.separated[state, index])
            row["gap"] = _plain(float(found.gap[state, index]))
        marks: Values = {"mark": [segment.mark for segment in companion.segments]}
        columns = {n: _column(getattr(found.segments, n)[state, first:last]) for n in _SEGMENT_FIELDS}
        rows.append(row | {"segments": _rows(marks | columns)})
    return {"companions": rows}


def _rows(columns: Values) -> list[Values]:
    """Columns of equal length as one dict a row."""
    return [dict(zip(columns, row, strict=True)) for row in zip(*columns.values(), strict=True)]


def _column(array: FloatArray) -> list[float | None]:
    return [_plain(value) for value in array.tolist()]


def _plain(value: Any) -> Any:
    """A number as a plain float, without the sign of a zero, None where it does not exist."""
    if not isinstance(value, float):
        return value
    return None if math.isnan(value) else float(value) + 0.0
