"""The contacts of a member on one mesh: one-sided supports with play, their gaps and their forces.

A contact blocks motion of its node beyond the clearance to its side; s contacts, m states. Its force counts
positive where it pushes, so that the member feels −side · force along +x. Some never enter the search for the
closed ones: at a joint that is held anyway nothing moves against them. And two rigid ones that face each
other at one joint without any clearance hold it like a fixed support: the one that pushes has its reaction.
"""

from __future__ import annotations

from dataclasses import dataclass, fields, replace

import numpy as np

from solver.arrays import BoolArray, FloatArray, IntArray
from solver.chain import Chain, Companions, Loads, Stops, Where
from solver.joints import Held
from solver.net import Net


@dataclass(frozen=True, slots=True)
class Contacts:
    """One-sided supports as the ends of the elements see them."""

    node: IntArray  # (s,)
    other: IntArray  # (s,) the node that it moves against, −1 for the ground
    side: FloatArray  # (s,) ±1
    clearance: FloatArray  # (s,)
    stiffness: FloatArray  # (s,) infinite for a rigid one
    spring: FloatArray  # (s,) N/m, of the spring beside it at the joint
    movement: FloatArray  # (m, s) what the play is measured from
    live: BoolArray  # (s,) False where something else holds the node first
    rigid: BoolArray  # (s,)
    facing: BoolArray  # (s,) one of a rigid pair without play

    def of(self, states: Where) -> Contacts:
        """The same contacts in some of the states."""
        return replace(self, movement=self.movement[states])

    def only(self, some: IntArray) -> Contacts:
        """Some of the contacts."""
        movement = self.movement[:, some]
        rest = {name.name: getattr(self, name.name)[some] for name in fields(self) if name.name != "movement"}
        return Contacts(movement=movement, **rest)

    def rest(self) -> FloatArray:
        """(m, s) where the nodes touch."""
        return np.asarray(self.movement + self.side * self.clearance)

    @property
    def turn(self) -> FloatArray:
        """(s,) the side of a contact with the ground, and 0 of one within, which no rigid movement closes."""
        return np.where(self.other < 0, self.side, 0.0)

    def relative(self, u: FloatArray) -> FloatArray:
        """(m, s) how far each node moves from what it moves against, from u (m, nodes)."""
        return np.asarray(u[:, self.node] - np.where(self.other < 0, 0.0, u[:, self.other]))

    def gap(self, u: FloatArray) -> FloatArray:
        """(m, s) the clearance that remains where the nodes move by u (m, s); below 0 where pressed in."""
        return np.asarray(self.clearance - self.side * (u - self.movement))

    def forces(self, closed: BoolArray, gap: FloatArray, reaction: FloatArray) -> FloatArray:
        """(m, s) what each contact pushes with, where it is `closed` (m, s); 0 where it is not.

        `reaction` is what fixed and one-sided supports together exert at the contact's node, along +x.
        """
        soft = closed & ~self.rigid
        sprung = np.where(soft, np.where(self.rigid, 0.0, self.stiffness) * -gap, 0.0)
        others = reaction
        if soft.any():  # at the same node, which only stops share
            alike = (self.node[:, None] == self.node).astype(np.float64)
            others = reaction + (self.side * sprung) @ alike
            sprung = sprung - self.side * self._share(closed, soft, alike) * others
        left = -self.side * others
        force = np.where(closed & self.rigid, left, sprung)
        return np.where(self.facing, np.maximum(left, 0.0), force)

    def _share(self, closed: BoolArray, soft: BoolArray, alike: FloatArray) -> FloatArray:
        """(m, s) of what the balance of its node leaves over, the part of each contact that is soft.

        A very stiff one is pressed in by less than a displacement has digits for. Nothing is left to the soft
        ones where a rigid one at the node takes it.
        """
        stiffness = np.where(soft, np.where(self.rigid, 0.0, self.stiffness), 0.0)
        taken = (closed & self.rigid) @ alike > 0.0
        whole = stiffness @ alike + self.spring
        return np.where(soft & ~taken, stiffness / np.where(soft, whole, 1.0), 0.0)


_NOWHERE, _NOTHING, _NEVER = np.zeros(0, dtype=np.intp), np.zeros(0), np.zeros(0, dtype=np.bool_)
_NONE = Contacts(
    node=_NOWHERE,
    other=_NOWHERE,
    side=_NOTHING,
    clearance=_NOTHING,
    stiffness=_NOTHING,
    spring=_NOTHING,
    movement=np.zeros((1, 0)),
    live=_NEVER,
    rigid=_NEVER,
    facing=_NEVER,
)


def contacts_of(chain: Chain, loads: Loads, net: Net) -> Contacts:
    """The stops as contacts, and after them the far ends of companions that can part."""
    stops = chain.stops
    if not stops.joint.size and chain.companions is None:
        return replace(_NONE, movement=np.zeros((loads.gravity.size, 0)))
    facing = facing_pairs(stops) & ~chain.fixed[stops.joint]
    held = chain.fixed.copy()
    held[stops.joint[facing]] = True
    found = Contacts(
        node=net.joints[stops.joint],
        other=np.full(stops.joint.size, -1),
        side=stops.side,
        clearance=stops.clearance,
        stiffness=stops.stiffness,
        spring=chain.spring[stops.joint],
        movement=loads.movement[:, stops.joint],
        live=~held[stops.joint] & ~_behind_another(stops),
        rigid=np.isinf(stops.stiffness),
        facing=facing,
    )
    return found if chain.companions is None else _with_parting(found, chain.companions, net)


def _with_parting(stops: Contacts, companions: Companions, net: Net) -> Contacts:
    parting = np.flatnonzero(companions.parting)
    none, yes = np.zeros(parting.size), np.ones(parting.size, dtype=np.bool_)
    ends = Contacts(
        node=net.far[parting],
        other=net.joints[companions.end[parting]],
        side=companions.parting[parting],
        clearance=none,
        stiffness=np.full(parting.size, np.inf),
        spring=none,
        movement=np.zeros((stops.movement.shape[0], parting.size)),
        live=yes,
        rigid=yes,
        facing=~yes,
    )
    both = {f.name: (getattr(stops, f.name), getattr(ends, f.name)) for f in fields(Contacts)}
    return Contacts(**{name: np.concatenate(two, axis=-1) for name, two in both.items()})


def facing_pairs(stops: Stops) -> BoolArray:
    """(s,) the first rigid stop without clearance of each side, at joints where both sides have one."""
    tight = np.isinf(stops.stiffness) & (stops.clearance == 0.0)
    found = np.zeros(tight.shape, dtype=np.bool_)
    plus = {int(stops.joint[i]): i for i in np.flatnonzero(tight & (stops.side > 0))[::-1]}
    minus = {int(stops.joint[i]): i for i in np.flatnonzero(tight & (stops.side < 0))[::-1]}
    for joint in plus.keys() & minus.keys():
        found[[plus[joint], minus[joint]]] = True
    return found


def _behind_another(stops: Stops) -> BoolArray:
    """(s,) those that another one at the same joint always meets first: a rigid one of the same side."""
    number = np.arange(stops.joint.size)
    alike = (stops.joint[:, None] == stops.joint) & (stops.side[:, None] == stops.side)
    nearer = stops.clearance[:, None] > stops.clearance
    first = (stops.clearance[:, None] == stops.clearance) & (number[:, None] > number)
    same_kind = first & np.isinf(stops.stiffness[:, None])
    return np.asarray((alike & np.isinf(stops.stiffness) & (nearer | same_kind)).any(axis=1))


def held_by(base: Held, contacts: Contacts, closed: BoolArray) -> Held:
    """The supports with the `closed` (s,) contacts as supports that hold both ways; states as in both."""
    shut = np.flatnonzero(closed)
    if not shut.size:
        return base
    rest, movement = contacts.rest(), base.movement.copy()
    rigid, soft = shut[contacts.rigid[shut]], shut[~contacts.rigid[shut]]
    held = contacts.node[rigid]
    sprung, spring = base.sprung, base.spring
    if soft.size:
        sprung, spring, meant = _together(base, contacts, soft, rest)
        movement[:, sprung] = meant
    parting = contacts.other[rigid] >= 0
    net = base.net.with_ties(held[parting], contacts.other[rigid[parting]])
    rigid, held = rigid[~parting], held[~parting]
    movement[:, held] = rest[:, rigid]
    fixed = np.append(base.fixed, held)
    if held.size:
        free = ~np.isin(sprung, held)
        sprung, spring = sprung[free], spring[free]
    return Held(net, fixed, sprung, spring, base.force, movement)


def _together(
    base: Held, contacts: Contacts, soft: IntArray, rest: FloatArray
) -> tuple[IntArray, FloatArray, FloatArray]:
    """Springs and closed stops with stiffness as one spring a node: which, how stiff, where at rest."""
    sprung, which = np.unique(np.append(base.sprung, contacts.node[soft]), return_inverse=True)
    each = np.append(base.spring, contacts.stiffness[soft])
    spring = np.bincount(which, each, sprung.size).astype(np.float64)
    wanted = each * np.concatenate([base.movement[:, base.sprung], rest[:, soft]], axis=1)
    return sprung, spring, (wanted @ (which[:, None] == np.arange(sprung.size))) / spring
