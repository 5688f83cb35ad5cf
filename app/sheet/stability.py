"""Stability on paper: how the critical factor is found, what it is in every state, its utilisation by hand.

The chapter says in plain words what the elastic critical load is not. For a checker with a pocket calculator
it gives the length of the pinned column of the same stiffness that would buckle under the same force.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

import numpy as np
from msgspec import UnsetType

from app.numerals import reading
from app.phrases.stability import BESIDE, CONTACT, ELASTIC, factor_text
from app.sheet.blocks import (
    Block,
    Value,
    bullets,
    column,
    formula,
    formulas,
    heading,
    paragraph,
    picture,
    table,
)
from app.sheet.readings import NOTHING, Readings
from app.sheet.strip_figure import mode_figure
from app.sheet.verdicts import against, status_word
from app.units import utilisation_text
from app.words import tr
from solver.checks import Check
from solver.model import StopSupport, supports_of
from solver.results import Results
from solver.second_moments import rigidity_at
from solver.stability import column_of


def stability_blocks(results: Results, say: Readings) -> Iterator[Block]:
    """The chapter; nothing where no state has a critical factor."""
    states = [i for i, found in enumerate(results.stability) if found and found.critical_factor is not None]
    if not states:
        return
    yield heading(tr("Stability"))
    yield paragraph(
        tr(
            "Elastic flexural buckling of the whole member about the weaker axis of every section, under its"
            " own axial force N(x), all loads of a combination scaled together. Hermite beam elements of"
            " rising degree, the geometric stiffness by quadrature of the equilibrated N(x), refined until"
            " the factor no longer changes by 1e-7 of itself."
        )
    )
    spoken = tr("η equals the required factor over the critical factor")
    yield formulas(
        [
            formula(tr("bent beside the axis"), "buckling", _spoken()),
            formula(tr("utilisation of stability"), "stability", spoken),
        ]
    )
    yield bullets(_said(results))
    yield _table(results, states, say)
    yield from _mode(results, states)


def _spoken() -> str:
    return tr("second derivative of E I w″ minus λ times derivative of N w′ equals 0, least λ")


def _said(results: Results) -> list[str]:
    said = [
        tr(ELASTIC),
        tr("A lateral support holds its joint sideways, against turning, or both, stiff or by a spring."),
    ]
    if any(len(segment.bonded) for segment in results.project.segments):
        said.append(tr("Bonded parts bend together: E I is the sum of theirs, each about its own axis."))
    supports = (support for joint in results.project.joints for support in supports_of(joint))
    if any(isinstance(support, StopSupport) for support in supports):
        said.append(tr(CONTACT))
    if results.project.companions:
        said.append(tr(BESIDE))
    return said


def _table(results: Results, states: list[int], say: Readings) -> Block:
    columns = [
        column(tr("In"), align="left"),
        column(tr("N smallest"), say.unit("force")),
        column(tr("at x"), say.unit("length")),
        column(tr("Critical factor")),
        column(tr("N critical"), say.unit("force")),
        column(tr("Pinned length"), say.unit("length")),
        column(tr("Required")),
        column(tr("Utilisation")),
        column(tr("Verdict"), align="left"),
    ]
    rows = [_row(results, state, say) for state in states]
    failing = [row for row, state in enumerate(states) if _check_of(results, state).status == "fail"]
    title = tr(
        "Critical factors; pinned length: of the column with pinned ends, with E I and N of the place of the"
        " smallest N, that has the same critical load"
    )
    return table(title, columns, rows, strong=failing)


def _mode(results: Results, states: list[int]) -> Iterator[Block]:
    """The shape in the state of the least factor."""
    found = [(s, r) for s in states if (r := results.stability[s]) is not None]
    shapes = [(r.critical_factor, state) for state, r in found if r.critical_factor and r.mode is not None]
    if not shapes:
        return
    _factor, state = min(shapes, key=lambda shape: shape[0])
    words = tr(
        "The shape in which the member bends out first, with the least critical factor: {state}. A shape"
        " only, its largest value set to 1."
    )
    yield picture(mode_figure(results, state), words.format(state=results.states[state].name))


def _check_of(results: Results, state: int) -> Check:
    name = results.states[state].name
    return next(c for c in results.checks if c.check == "stability" and c.combination == name)


def _row(results: Results, state: int, say: Readings) -> list[str]:
    found, check = results.stability[state], _check_of(results, state)
    factor = found.critical_factor if found and found.critical_factor else math.nan
    place = int(np.argmin(results.segments.force_min[state]))
    force = float(results.segments.force_min[state, place])
    x = float(results.segments.force_min_at[state, place])
    pinned = math.pi * math.sqrt(_rigidity(results, place, x) / (factor * -force))
    made = check.limit is not None and check.utilisation is not None
    return [
        results.states[state].name,
        say.read(force, "force"),
        say.plain(x, "length", digits=6),
        against(factor, check.limit, "factor", say)[0] if check.limit else factor_text(factor),
        say.read(force * factor, "force"),
        say.plain(pinned, "length", digits=4),
        against(factor, check.limit, "factor", say)[1] if check.limit else NOTHING,
        utilisation_text(check.utilisation or 0.0, check.status) if made else NOTHING,
        status_word(check.status),
    ]


def _rigidity(results: Results, place: int, x: float) -> float:
    """E I of a segment at x."""
    beam = column_of(results.project, results.chain)
    s = min(1.0, max(0.0, (x - float(results.position[place])) / float(results.chain.length[place])))
    row = max(i for i in np.flatnonzero(beam.segment == place) if beam.start[i] <= s)
    return float(rigidity_at(beam.rigidity[row], np.array([s]))[0])


def stability_by_hand(results: Results, check: Check, say: Readings) -> Iterator[Block]:
    """The governing check where it is that of stability."""
    required = results.project.limits.stability_factor
    parts: dict[str, str] = {
        "required": "" if isinstance(required, UnsetType) else say.exact(required, "factor"),
        "factor": reading(check.value or 0.0, 6),
        "utilisation": utilisation_text(check.utilisation or 0.0, check.status),
    }
    alt = tr("utilisation = required factor / critical factor = {required} / {factor} = {utilisation}")
    item: dict[str, Value] = formula(tr("utilisation"), "stability_numbers", alt.format(**parts), **parts)
    yield formulas([item])
