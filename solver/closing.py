"""Which contacts close in which state, from the condensed stiffness seen by the contacts alone.

With all contacts open the member answers the loads with gaps q and unit contact forces with the compliance A,
so that the gaps under the contact forces z are w = A z + q (on the diagonal of A the contact's own compliance
too): a linear complementarity problem of the size of the contacts, not of the member.

Where contacts alone hold the member, it has a rigid movement α that no stiffness resists, and A is found with
the node of the first contact held. Then α is a further unknown, w = A z + q − turn α, and the balance of all
forces, Σ turn z = F with F the resultant of the loads, a further equation; turn is the side of a contact with
the ground and 0 of one between the member and a companion. Both leave by one step: the first
contact's force and α are expressed by the others, which makes its gap the first unknown of a problem of the
same kind, with the first contact's force as the first of its answers.
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from solver.arrays import BoolArray, FloatArray, IntArray
from solver.complementarity import complementary
from solver.condense import Condensed
from solver.contacts import Contacts
from solver.joints import Held, JointSystem

CLOSED = 1e-12  # of the largest force: a contact that pushes with less is open
TOUCHING = 1e-12  # of the largest displacement: play up to this is none
BEYOND_ROUNDING = 1e-11  # of the largest contact force; a smaller one is settled by its gap
CHUNK = 1 << 21  # numbers in a set of unit loads
PRESSED, LOOSE = -1, -2


class Loose(Exception):  # noqa: N818 - a finding: no contact holds the member in these states
    """Only contacts could hold the member, and the loads of `states` do not press it against them."""

    def __init__(self, states: IntArray) -> None:
        super().__init__(f"states {states.tolist()}")
        self.states = states


def closed_contacts(condensed: Condensed, base: Held, contacts: Contacts) -> BoolArray:
    """(m, s) which contacts are closed; raises Loose where the member is not held by any of them."""
    closed = np.zeros(contacts.movement.shape, dtype=np.bool_)
    live = np.flatnonzero(contacts.live)
    if not live.size:
        return closed
    some = contacts.only(live)
    if held_without(base, condensed):
        closed[:, live] = _closed_of_held(condensed, base, some)
    else:
        closed[:, live] = _closed_of_loose(condensed, base, some)
    return closed


def held_without(base: Held, condensed: Condensed) -> bool:
    """Whether something else than contacts holds the member."""
    return bool(base.fixed.size or base.sprung.size or condensed.mean_mean.any())


def _closed_of_held(condensed: Condensed, base: Held, contacts: Contacts) -> BoolArray:
    system = JointSystem(condensed, base)
    gaps = _gaps(system, contacts)
    compliance = _compliance(system, base, contacts, base.force.shape[1])
    return np.array([_pushing(complementary(compliance, gap)) for gap in gaps])


def _closed_of_loose(condensed: Condensed, base: Held, contacts: Contacts) -> BoolArray:
    pinned = replace(base, fixed=contacts.node[:1])
    system = JointSystem(condensed, pinned)
    gaps = _gaps(system, contacts)
    resultant = _resultant(base, condensed)
    compliance = _compliance(system, pinned, contacts, base.force.shape[1])
    closed = np.zeros(gaps.shape, dtype=np.bool_)
    reach = TOUCHING * (np.abs(contacts.rest()) + np.abs(gaps)).max(axis=1)
    inner, settled = _without_ground(compliance, gaps, resultant, contacts)
    holds = [_hold(*state, contacts.turn) for state in zip(settled, resultant, reach, strict=True)]
    if LOOSE in holds:
        raise Loose(np.flatnonzero(np.array(holds) == LOOSE))
    for state, hold in enumerate(holds):
        if hold == PRESSED:
            closed[state] = _pushing(_balanced(compliance, contacts.turn, gaps[state], resultant[state]))
        else:
            closed[state] = inner[state]
            closed[state, hold] = True
    return closed


def _without_ground(
    compliance: FloatArray, gaps: FloatArray, resultant: FloatArray, contacts: Contacts
) -> tuple[BoolArray, FloatArray]:
    """Where no resultant presses: which contacts within close by themselves, and the gaps (m, s) then."""
    closed, settled = np.zeros(gaps.shape, dtype=np.bool_), gaps.copy()
    within = np.flatnonzero(contacts.other >= 0)
    if not within.size:
        return closed, settled
    for state in np.flatnonzero(resultant == 0.0):
        force = complementary(compliance[np.ix_(within, within)], gaps[state, within])
        closed[state, within] = _pushing(force)
        if force is not None:
            settled[state] += compliance[:, within] @ force
    return closed, settled


def _hold(gap: FloatArray, resultant: float, reach: float, turn: FloatArray) -> int:
    """PRESSED, or LOOSE, or the contact that the member touches without a force and without play."""
    plus, minus = np.flatnonzero(turn > 0.0), np.flatnonzero(turn < 0.0)
    if resultant != 0.0:
        return PRESSED if (plus if resultant > 0.0 else minus).size else LOOSE
    if not (plus.size and minus.size):
        return LOOSE
    first = int(plus[np.argmin(gap[plus])])
    play = gap[first] + gap[minus].min()
    if abs(play) <= reach:
        return first
    return PRESSED if play < 0.0 else LOOSE


def _balanced(
    compliance: FloatArray, turn: FloatArray, gap: FloatArray, resultant: float
) -> FloatArray | None:
    """(s,) the contact forces that balance the resultant; the first contact's node held in the rest."""
    own, first = compliance[0, 0], turn[0]
    matrix = compliance + own * np.outer(turn, turn)
    matrix[0], matrix[:, 0] = -first * turn, first * turn
    matrix[0, 0] = 0.0
    constant = gap - first * turn * gap[0] - own * resultant * turn
    constant[0] = first * resultant
    found = complementary(matrix, constant, _scale_of_balanced(matrix, gap, resultant))
    if found is None:
        return None
    return np.append(constant[0] + matrix[0] @ found, found[1:])


def _scale_of_balanced(matrix: FloatArray, gap: FloatArray, resultant: float) -> FloatArray:
    """Forces are scaled by the roots of compliances, and the first unknown, a gap, the other way round."""
    compliance = np.diagonal(matrix).copy()
    largest = float(compliance.max())
    if largest == 0.0:  # all of them rigid and at one node
        largest = float(np.abs(gap).max()) / abs(resultant) if resultant and gap.any() else 1.0
    compliance[compliance == 0.0] = largest
    scale: FloatArray = 1.0 / np.sqrt(compliance)
    scale[0] = np.sqrt(largest)
    return scale


def _resultant(base: Held, condensed: Condensed) -> FloatArray:
    """(m,) N, of all loads along +x, exactly 0 where it is rounding."""
    loads = np.concatenate([base.force, condensed.load_mean], axis=1)
    resultant = loads.sum(axis=1)
    return np.where(np.abs(resultant) <= CLOSED * np.abs(loads).max(axis=1), 0.0, resultant)


def _gaps(system: JointSystem, contacts: Contacts) -> FloatArray:
    """(m, s) with all contacts open."""
    u = system.displacements()
    return contacts.gap(contacts.relative(u.high) + contacts.relative(u.low))


def _compliance(system: JointSystem, base: Held, contacts: Contacts, count: int) -> FloatArray:
    """(s, s) by how much a unit force of one contact widens the gap of another, `count` ends of elements."""
    every = np.arange(contacts.node.size)
    within = contacts.other >= 0
    matrix = np.zeros((every.size, every.size))
    for some in np.array_split(every, 1 + every.size * count // CHUNK):
        unit, row = np.zeros((some.size, count)), np.arange(some.size)
        unit[row, contacts.node[some]] = contacts.side[some]
        unit[row[within[some]], contacts.other[some[within[some]]]] = -contacts.side[some[within[some]]]
        unit[:, base.fixed] = 0.0
        matrix[some] = contacts.relative(system.solve(unit)) * contacts.side
    matrix[every, every] += 1.0 / contacts.stiffness
    return matrix


def _pushing(force: FloatArray | None) -> BoolArray:
    """(s,) where there is a force; a problem without solution cannot come from a member that is held."""
    if force is None:
        raise ArithmeticError("contact forces not found")
    return np.asarray(force > BEYOND_ROUNDING * force.max(initial=0.0))
