"""Results of every checked state: the strips, segments, joints, equilibrium, energy, numerical error."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from app.beside import beside
from app.findings.books import state_books
from app.findings.records import StateBooks
from app.sheet.blocks import Block, column, facts, heading, paragraph, picture, table
from app.sheet.bonded import part_table
from app.sheet.companions import clamp_blocks, companion_forces
from app.sheet.contacts import contact_blocks
from app.sheet.fatigue import fatigue_blocks
from app.sheet.figures import envelope_figure, state_figure
from app.sheet.inputs import factors_text
from app.sheet.readings import NOTHING, Readings
from app.sheet.shoulders import peak_tables
from app.sheet.verdicts import check_table, status_word
from app.units import utilisation_text
from app.words import tr
from solver.arrays import FloatArray
from solver.checks import STRESSES, Check
from solver.results import Results, SegmentResults, State


def outcome_blocks(results: Results, say: Readings) -> Iterator[Block]:
    """The chapter of results, one part for each checked state, then the envelope."""
    yield heading(tr("Results"))
    checked = [(index, state) for index, state in enumerate(results.states) if state.checked]
    books = state_books(results, say.units)
    for (index, state), book in zip(checked, books, strict=True):
        yield from _state_blocks(results, index, state, say)
        yield _balance(book)
    if len(checked) > 1:
        yield from _envelope_blocks(results, say)
    yield from clamp_blocks(results, say)
    yield from fatigue_blocks(results, say)


def _state_blocks(results: Results, index: int, state: State, say: Readings) -> Iterator[Block]:
    yield heading(state_title(state), 2)
    if state.kind == "combination":
        yield paragraph(
            tr("{factors}; factor on allowable stresses {factor}.").format(
                factors=factors_text(state.factors, say), factor=say.exact(state.allowable_factor, "factor")
            ),
            "lead",
        )
    caption = tr(
        "{name}: u, N (+ tension, − compression), σ, utilisation; allowables dashed, beyond them hatched"
    )
    yield picture(state_figure(results, index), caption.format(name=state.name))
    for row in _rows(results):
        yield _segments(results, row, index, say)
    if results.parts is not None:
        yield part_table(results, results.parts, index, say)
    yield from companion_forces(results, index, say)
    yield _joints(results, index, say)
    yield from contact_blocks(results, index, say)
    yield from peak_tables(results, state.name, say)
    limits = [c for c in results.checks if _is_limit(c) and c.combination == state.name]
    if limits:
        yield check_table(tr("Limits"), limits, say)


def _is_limit(check: Check) -> bool:
    return check.check not in (*STRESSES, "peak", "fatigue")


def state_title(state: State) -> str:
    """What a state is called in a heading."""
    if state.kind == "unloaded":
        return tr("Unloaded member")
    words = tr("Combination {name}") if state.kind == "combination" else tr("Load case {name}, alone")
    return words.format(name=state.name)


def _largest(values: FloatArray) -> float:
    finite = np.abs(values[np.isfinite(values)])
    return float(finite.max()) if finite.size else 0.0


@dataclass(frozen=True, slots=True)
class _Row:
    """Segments that stand one after the other in the results: the member's, or those of all companions."""

    title: str
    of_envelope: str
    marks: tuple[str, ...]
    segments: SegmentResults


def _rows(results: Results) -> Iterator[_Row]:
    marks = tuple(segment.mark for segment in results.project.segments)
    title, of_envelope = tr("Segments: axial force, stress, utilisation"), tr("Envelope by segment")
    yield _Row(title, of_envelope, marks, results.segments)
    if results.companions is not None:
        beside_it = tuple(of.segment.mark for of in beside(results.project))
        title = tr("Segments of companions: axial force, stress, utilisation")
        of_envelope = tr("Envelope by segment of companions")
        yield _Row(title, of_envelope, beside_it, results.companions.segments)


def _segments(results: Results, row: _Row, index: int, say: Readings) -> Block:
    length, stress = say.unit("length"), say.unit("stress")
    columns = [
        column(tr("Segment"), align="left"),
        column(tr("N at start"), say.unit("force")),
        column(tr("N at end"), say.unit("force")),
        column(tr("σ largest"), stress),
        column(tr("at x"), length),
        column(tr("σ smallest"), stress),
        column(tr("at x"), length),
        column(tr("Utilisation")),
        column(tr("at x"), length),
        column(tr("Check"), align="left"),
    ]
    return table(
        row.title,
        columns,
        [_segment_row(results, row, index, place, say) for place in range(len(row.marks))],
        strong=_failing(results, row, index),
    )


def _segment_row(results: Results, row: _Row, index: int, place: int, say: Readings) -> list[str]:
    segments = row.segments
    force = max(_largest(segments.force_max[index]), _largest(segments.force_min[index]))
    stress = max(_largest(segments.stress_max[index]), _largest(segments.stress_min[index]))

    def at(values: FloatArray) -> str:
        return _position(results, float(values[index, place]), say)

    return [
        row.marks[place],
        say.read(segments.force_start[index, place], "force", beside=force),
        say.read(segments.force_end[index, place], "force", beside=force),
        say.read(segments.stress_max[index, place], "stress", beside=stress),
        at(segments.stress_max_at),
        say.read(segments.stress_min[index, place], "stress", beside=stress),
        at(segments.stress_min_at),
        *_utilisation(results, row, index, place, say),
    ]


def _position(results: Results, x: float, say: Readings) -> str:
    if math.isnan(x):
        return NOTHING
    return say.plain(0.0 if abs(x) < 1e-12 * float(results.position[-1]) else x, "length", digits=6)


def _of_segment(results: Results, index: int, mark: str) -> list[Check]:
    name = results.states[index].name
    own = (c for c in results.checks if c.check in STRESSES and c.combination == name)
    return [c for c in own if c.segment == mark]


def _utilisation(results: Results, row: _Row, index: int, place: int, say: Readings) -> list[str]:
    """Utilisation, its place, and the verdict of all checks of the segment in this state."""
    checks = _of_segment(results, index, row.marks[place])
    statuses = {c.status for c in checks}
    value = float(row.segments.utilisation[index, place])
    status = next((status for status in ("fail", "not_made") if status in statuses), "pass")
    words = status_word(status) if checks else tr("no stress")
    if math.isnan(value):
        return [NOTHING, NOTHING, words]
    number = utilisation_text(value, "fail" if status == "fail" else "pass")
    return [number, _position(results, float(row.segments.utilisation_at[index, place]), say), words]


def _failing(results: Results, row: _Row, index: int) -> list[int]:
    marks = {
        c.segment
        for c in results.checks
        if c.status == "fail" and c.check in STRESSES and c.combination == results.states[index].name
    }
    return [place for place, mark in enumerate(row.marks) if mark in marks]


def _joints(results: Results, index: int, say: Readings) -> Block:
    solution = results.solution
    moved, reactions = solution.joint_displacement[index], solution.reaction[index]
    inside = max(_largest(row.segments.force_max[index]) for row in _rows(results))
    far, strong = _largest(moved), max(_largest(reactions), abs(float(solution.loads[index])), inside)
    columns = [
        column(tr("Joint"), align="left"),
        column("x", say.unit("length")),
        column(tr("Displacement u"), say.unit("displacement")),
        column(tr("Reaction R"), say.unit("force")),
    ]
    rows = [
        [
            joint.mark,
            _position(results, x, say),
            say.read(u, "displacement", beside=far),
            NOTHING if math.isnan(r) else say.read(r, "force", beside=strong),
        ]
        for joint, x, u, r in zip(
            results.project.joints, results.position.tolist(), moved.tolist(), reactions.tolist(), strict=True
        )
    ]
    return table(tr("Joints: displacement and reaction"), columns, rows)


def _balance(book: StateBooks) -> Block:
    """The sum of all forces on the member along x, the energies, the numerical error."""
    parts = [
        tr("loads {force}").format(force=book.loads_text),
        tr("reactions {force}").format(force=book.reactions_text),
        *([tr("bedding {force}").format(force=book.bedding_text)] if book.bedding_text else []),
    ]
    energies = tr("strain energy {strain}, potential energy {potential}")
    return facts(
        [
            (tr("Equilibrium along x"), f"{' + '.join(parts)} = {book.residual_text}"),
            (tr("Energy"), energies.format(strain=book.strain_text, potential=book.potential_text)),
            (tr("Numerical error"), book.numerical_error),
        ]
    )


def _envelope_blocks(results: Results, say: Readings) -> Iterator[Block]:
    yield heading(tr("Envelope"), 2)
    yield picture(
        envelope_figure(results),
        tr("Largest and smallest values over all checked states; extremes, not one state in equilibrium."),
    )
    length, stress = say.unit("length"), say.unit("stress")
    columns = [
        column(tr("Segment"), align="left"),
        column(tr("N largest"), say.unit("force")),
        column(tr("N smallest"), say.unit("force")),
        column(tr("σ largest"), stress),
        column(tr("σ smallest"), stress),
        column(tr("Utilisation")),
        column(tr("at x"), length),
        column(tr("In"), align="left"),
    ]
    for row in _rows(results):
        rows = [_envelope_row(results, row, place, say) for place in range(len(row.marks))]
        yield table(row.of_envelope, columns, rows)


def _envelope_row(results: Results, of: _Row, place: int, say: Readings) -> list[str]:
    segments = of.segments
    count = sum(state.checked for state in results.states)
    force = max(_largest(segments.force_max[:count]), _largest(segments.force_min[:count]))
    stress = max(_largest(segments.stress_max[:count]), _largest(segments.stress_min[:count]))
    values = segments.utilisation[:count, place]
    row = [
        of.marks[place],
        say.read(float(segments.force_max[:count, place].max()), "force", beside=force),
        say.read(float(segments.force_min[:count, place].min()), "force", beside=force),
        say.read(float(segments.stress_max[:count, place].max()), "stress", beside=stress),
        say.read(float(segments.stress_min[:count, place].min()), "stress", beside=stress),
    ]
    if np.isnan(values).all():
        return [*row, NOTHING, NOTHING, NOTHING]
    worst = int(np.nanargmax(values))
    fails = any(c.status == "fail" for c in _of_segment(results, worst, row[0]))
    return [
        *row,
        utilisation_text(float(values[worst]), "fail" if fails else "pass"),
        _position(results, float(segments.utilisation_at[worst, place]), say),
        results.states[worst].name,
    ]
