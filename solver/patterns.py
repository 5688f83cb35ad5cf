"""The joints of all states: states with the same closed contacts share a matrix and are solved together.

Which contacts are closed follows from the complementarity problem (`solver.closing`); what is then solved to
all digits has the last word. A closed contact that would pull or an open one that is pressed in, by more than
rounding, changes sides and its state is solved anew. What then holds is complementarity itself, on which the
bound of the error relies: no contact pulls, none is pressed in, none pushes across a gap.

Changing sides like this most often finds the closed contacts by itself, starting with all of them open, at
a cost in proportion to the member. So where there are very many contacts it is tried first, and their own
problem, whose cost grows faster than their number, is set up where this fails.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from contextlib import suppress
from dataclasses import dataclass, replace

import numpy as np

from solver.arrays import BoolArray, FloatArray, IntArray
from solver.bound import EPSILON, force_roundings
from solver.chain import Chain, Loads, Where
from solver.closing import closed_contacts, held_without
from solver.condense import Condensed
from solver.contacts import Contacts, contacts_of, held_by
from solver.joints import Displacements, FactorError, Held, JointSystem, held, taken
from solver.mesh import Mesh
from solver.net import Net, net_of

REPAIRS = 20
FEW = 256  # contacts, up to which their own problem costs less than trials with the whole member
_ROUNDINGS = 8 * EPSILON  # of a gap's terms
ALL = slice(None)


class Unsettled(Exception):  # noqa: N818 - a finding: rounding decides about a contact
    """No choice of closed contacts is free of contradiction in `state`, at the node `at`."""

    def __init__(self, state: int, at: int, force: float) -> None:
        super().__init__(f"state {state}, node {at}")
        self.state = state
        self.at = at
        self.force = force  # N


@dataclass(frozen=True, slots=True)
class Group:
    """States whose closed contacts are the same: what holds them, their factored matrix, their answers."""

    states: Where
    held: Held
    condensed: Condensed
    system: JointSystem
    ends: Displacements
    contacts: Contacts
    closed: BoolArray  # (s,)

    def displacements_at(self, node: IntArray) -> FloatArray:
        """(m, s) of some nodes."""
        return np.asarray(self.ends.high[:, node] + self.ends.low[:, node])

    def contact_forces(self, start_force: FloatArray, end_force: FloatArray) -> FloatArray:
        """(m, s) what the contacts push with, from the axial forces (m, e) of this group's states."""
        contacts = self.contacts
        whole = taken(self.held, start_force, end_force)[:, contacts.node]
        springs = contacts.spring * (contacts.movement - self.displacements_at(contacts.node))
        return contacts.forces(self.closed, self.gaps(), whole - springs)

    def gaps(self) -> FloatArray:
        """(m, s) the clearances that remain, below 0 where a contact is pressed in."""
        moved = self.contacts.relative(self.ends.high) + self.contacts.relative(self.ends.low)
        return self.contacts.gap(moved)

    def force_roundings(self) -> FloatArray:
        """(m, nodes) N, how far rounding can have moved the sum of forces at the nodes."""
        return force_roundings(
            self.held,
            self.condensed,
            self.ends,
            self.ends.mean(self.held.net),
            self.ends.stretch(self.held.net),
        )


@dataclass(frozen=True, slots=True)
class Patterns:
    """All groups; `closed` (m, s) says which contacts act as supports in which state."""

    groups: tuple[Group, ...]
    ends: Displacements
    contacts: Contacts
    closed: BoolArray
    net: Net

    def each(self, work: Callable[[Group], FloatArray]) -> FloatArray:
        """Rows of all states (m, …) from the rows of each group."""
        if len(self.groups) == 1:
            return work(self.groups[0])
        rows = [(group.states, work(group)) for group in self.groups]
        whole = np.empty((self.closed.shape[0], *rows[0][1].shape[1:]))
        for states, values in rows:
            whole[states] = values
        return whole

    def contact_forces(self, start_force: FloatArray, end_force: FloatArray) -> FloatArray:
        """(m, s) what each contact pushes with, from the axial forces (m, e) at the ends of all elements."""
        return self.each(
            lambda group: group.contact_forces(start_force[group.states], end_force[group.states])
        )


def patterns(chain: Chain, loads: Loads, mesh: Mesh, condensed: Condensed) -> Patterns:
    """The joints solved. Raises Loose where nothing holds, Unsettled, or FactorError."""
    net = net_of(chain, mesh)
    base, contacts = held(chain, loads, net), contacts_of(chain, loads, net)
    closed = np.zeros(contacts.movement.shape, dtype=np.bool_)
    if not contacts.node.size:
        group = _group(condensed, base, contacts, closed, ALL)
        return Patterns((group,), group.ends, contacts, closed, net)
    base = _with_facing(base, contacts)
    if np.count_nonzero(contacts.live) > FEW and held_without(base, condensed):
        with suppress(Unsettled):
            return _settled(condensed, base, contacts, closed)
    return _settled(condensed, base, contacts, closed_contacts(condensed, base, contacts))


def _with_facing(base: Held, contacts: Contacts) -> Held:
    """Facing rigid contacts without play hold their node."""
    if not contacts.facing.any():
        return base
    fixed = np.union1d(base.fixed, contacts.node[contacts.facing])
    free = ~np.isin(base.sprung, fixed)
    movement = base.movement.copy()
    movement[:, contacts.node[contacts.facing]] = contacts.movement[:, contacts.facing]
    return replace(base, fixed=fixed, sprung=base.sprung[free], spring=base.spring[free], movement=movement)


def _settled(condensed: Condensed, base: Held, contacts: Contacts, closed: BoolArray) -> Patterns:
    wrong: BoolArray = np.zeros_like(closed)
    for _ in range(REPAIRS):
        closed = closed ^ wrong
        found = _solved(condensed, base, contacts, closed)
        wrong = _contradictions(found)
        if not held_without(base, condensed):
            wrong &= (closed ^ wrong).any(axis=1, keepdims=True)  # the last contact is not let go
        if not wrong.any():
            return found
    state, contact = np.argwhere(wrong)[0].tolist()
    raise Unsettled(state, int(contacts.node[contact]), float(np.abs(condensed.load_stretch[state]).max()))


def _solved(condensed: Condensed, base: Held, contacts: Contacts, closed: BoolArray) -> Patterns:
    groups = tuple(_group(condensed, base, contacts, closed, states) for states in _alike(closed))
    shape = base.force.shape
    whole = Displacements(np.empty(shape), np.empty(shape))
    for group in groups:
        whole.high[group.states], whole.low[group.states] = group.ends.high, group.ends.low
    return Patterns(groups, whole, contacts, closed, base.net)


def _alike(closed: BoolArray) -> Iterator[Where]:
    """The states of each pattern of closed contacts."""
    found: dict[bytes, list[int]] = {}
    for state, shut in enumerate(closed):
        found.setdefault(shut.tobytes(), []).append(state)
    return iter([ALL] if len(found) == 1 else map(np.array, found.values()))


def _group(condensed: Condensed, base: Held, contacts: Contacts, closed: BoolArray, states: Where) -> Group:
    shut = closed[states][0]
    if states is not ALL:
        base = replace(base, force=base.force[states], movement=base.movement[states])
        condensed, contacts = condensed.of(states), contacts.of(states)
    at = held_by(base, contacts, shut)
    try:
        system = JointSystem(condensed, at)
    except FactorError as lost:
        largest = np.zeros(closed.shape[0])
        largest[states] = lost.largest_load
        raise FactorError(lost.at, largest) from lost
    return Group(states, at, condensed, system, system.displacements(), contacts, shut)


def _contradictions(found: Patterns) -> BoolArray:
    """(m, s) closed contacts that pull and open ones that are pressed in, by more than rounding."""
    wrong = np.zeros(found.closed.shape, dtype=np.bool_)
    for group in found.groups:
        contacts = group.contacts
        gap, u = group.gaps(), np.abs(group.displacements_at(contacts.node))
        terms = u + np.abs(contacts.movement) + contacts.clearance
        roundings = _ROUNDINGS * (terms + np.where(contacts.other < 0, 0.0, u))
        force = group.contact_forces(*group.system.end_forces(group.ends))
        pulls = force < -group.force_roundings()[:, contacts.node]
        lets_go = (contacts.rigid & pulls) | (gap > roundings)
        wrong[group.states] = contacts.live & np.where(group.closed, lets_go, gap < -roundings)
    return wrong
