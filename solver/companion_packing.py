"""Companions as arrays: their segments follow the member's in one chain, which is solved as a whole."""

from __future__ import annotations

from dataclasses import fields, replace

import numpy as np

from solver.arrays import FloatArray, IntArray, frozen
from solver.bonded import Bonded, even
from solver.chain import Chain, Companions, Loads
from solver.model import Companion, CompanionAction, Project
from solver.packing import array_of, loads_on, segment_arrays
from solver.results import State

_PARTING: dict[CompanionAction, float] = {"both": 0.0, "compression": 1.0, "tension": -1.0}
BY_SEGMENT = ("distributed", "temperature", "lack_of_fit")  # of the loads


def with_companions(
    project: Project, chain: Chain, loads: Loads, states: tuple[State, ...]
) -> tuple[Chain, Loads]:
    """The member's chain and loads with its companions' behind them; as they are where there are none."""
    if not project.companions:
        return chain, loads
    segments = [segment for companion in project.companions for segment in companion.segments]
    own = segment_arrays(project, segments)
    whole = Chain(
        length=_joined(chain.length, own["length"]),
        modulus=_joined(chain.modulus, own["modulus"]),
        area=_joined(chain.area, own["area"]),
        bedding=_joined(chain.bedding, np.zeros((len(segments), 2))),
        expansion=_joined(chain.expansion, own["expansion"]),
        density=_joined(chain.density, own["density"]),
        fixed=chain.fixed,
        spring=chain.spring,
        bonded=None if chain.bonded is None else _with_whole_segments(chain.bonded, own),
        stops=chain.stops,
        companions=_companions(project),
    )
    beside = loads_on(project, states, segments)
    more = {name: _joined(getattr(loads, name), beside[name], axis=1) for name in BY_SEGMENT}
    return whole, replace(loads, **more)


def _joined(one: FloatArray, other: FloatArray, axis: int = 0) -> FloatArray:
    return frozen(np.concatenate([one, other], axis=axis))


def _companions(project: Project) -> Companions:
    order = {joint.mark: index for index, joint in enumerate(project.joints)}
    companions: tuple[Companion, ...] = project.companions
    first = np.cumsum([0, *(len(companion.segments) for companion in companions)])
    return Companions(
        start=_indices([order[companion.start] for companion in companions]),
        end=_indices([order[companion.end] for companion in companions]),
        first=_indices(first.tolist()),
        parting=array_of(_PARTING[companion.action] for companion in companions),
    )


def _indices(values: list[int]) -> IntArray:
    found = np.array(values, dtype=np.intp)
    found.setflags(write=False)
    return found


def _with_whole_segments(bonded: Bonded, own: dict[str, FloatArray]) -> Bonded:
    """The parts with segments in which nothing is bonded behind the member's n own ones."""
    n, count = len(bonded.rigidity), len(own["length"])
    area, modulus = own["area"], own["modulus"][:, None]
    new = {
        "segment": np.arange(n, n + count),
        "expansion": own["expansion"],
        "stiffness": modulus * area,
        "transformed": area,
        "excess": np.zeros_like(area),
        "rigidity": modulus * area,
        "mass": own["density"][:, None] * area,
        "several": np.zeros(count, dtype=np.bool_),
        "even": even(area),
    }
    parts = {
        field.name: np.insert(getattr(bonded, field.name), n, new[field.name], axis=0)
        for field in fields(bonded)
    }
    return Bonded(**parts)
