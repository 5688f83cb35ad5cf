"""Which contacts close in which state, from the condensed stiffness seen by the contacts alone.

With all contacts open the member answers the loads with gaps q and unit contact forces with the compliance A,
so that the gaps under the contact forces z are w = A z + q (on the diagonal of A the contact's own compliance
too): a linear complementarity problem of the size of the contacts, not of the member.

Where contacts alone hold the member, it has a rigid movement α that no stiffness resists, and A is found with
the node of the first contact held. Then α is a further unknown, w = A z + q − side α, and the balance of all
forces, Σ side z = F with F the resultant of the loads, a further equation. Both leave by one step: the first
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
BEYOND_ROUNDING = 1e-14  # of the largest contact force
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
    holds = [_hold(*state, contacts.side) for state in zip(gaps, resultant, reach, strict=True)]
    if LOOSE in holds:
        raise Loose(np.flatnonzero(np.array(holds) == LOOSE))
    for state, hold in enumerate(holds):
        if hold == PRESSED:
            closed[state] = _pushing(_balanced(compliance, contacts.side, gaps[state], resultant[state]))
        else:
            closed[state, hold] = True
    return closed


def _hold(gap: FloatArray, resultant: float, reach: float, side: FloatArray) -> int:
    """PRESSED, or LOOSE, or the contact that the member touches without a force and without play."""
    plus, minus = np.flatnonzero(side > 0.0), np.flatnonzero(side < 0.0)
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
    compliance: FloatArray, side: FloatArray, gap: FloatArray, resultant: float
) -> FloatArray | None:
    """(s,) the contact forces that balance the resultant; the first contact's node held in the rest."""
    own, turn = compliance[0, 0], side[0] * side
    matrix = compliance + own * np.outer(side, side)
    matrix[0], matrix[:, 0] = -turn, turn
    matrix[0, 0] = 0.0
    constant = gap - turn * gap[0] - own * resultant * side
    constant[0] = side[0] * resultant
    found = complementary(matrix, constant)
    if found is None:
        return None
    first = constant[0] + matrix[0] @ found
    return np.append(first, found[1:])


def _resultant(base: Held, condensed: Condensed) -> FloatArray:
    """(m,) N, of all loads along +x, exactly 0 where it is rounding."""
    loads = np.concatenate([base.force, condensed.load_mean], axis=1)
    resultant = loads.sum(axis=1)
    return np.where(np.abs(resultant) <= CLOSED * np.abs(loads).max(axis=1), 0.0, resultant)


def _gaps(system: JointSystem, contacts: Contacts) -> FloatArray:
    """(m, s) with all contacts open."""
    u = system.displacements()
    return contacts.gap(u.high[:, contacts.node] + u.low[:, contacts.node])


def _compliance(system: JointSystem, base: Held, contacts: Contacts, count: int) -> FloatArray:
    """(s, s) by how much a unit force of one contact widens the gap of another, `count` ends of elements."""
    node = contacts.node
    movable = np.flatnonzero(~np.isin(node, base.fixed))
    matrix = np.zeros((node.size, node.size))
    for some in np.array_split(movable, 1 + movable.size * count // CHUNK):
        unit = np.zeros((some.size, count))
        unit[np.arange(some.size), node[some]] = contacts.side[some]
        matrix[some] = system.solve(unit)[:, node] * contacts.side
    matrix[:, np.isin(node, base.fixed)] = 0.0
    matrix[np.diag_indices(node.size)] += 1.0 / contacts.stiffness
    return matrix


def _pushing(force: FloatArray | None) -> BoolArray:
    """(s,) where there is a force; a problem without solution cannot come from a member that is held."""
    if force is None:
        raise ArithmeticError("contact forces not found")
    return np.asarray(force > BEYOND_ROUNDING * force.max(initial=0.0))
