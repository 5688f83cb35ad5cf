"""From the records of a project to the arrays that the solver works on.

The only place before the results that loops over records.
Each load case is summed into arrays of its own first; the states are then one matrix of factors times the
cases, so that any number of combinations costs one product.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping, Sequence
from typing import TypeAlias

import numpy as np
from msgspec import UnsetType

from solver.arrays import BoolArray, FloatArray, frozen
from solver.bonded import Bonded, bonded_parts
from solver.chain import NO_STOPS, Chain, Loads, Stops
from solver.model import (
    BondedPart,
    CompanionSegment,
    FixedSupport,
    Material,
    Project,
    Segment,
    SegmentLoad,
    SpringSupport,
    StopSupport,
    end_of,
    supports_of,
)
from solver.results import State
from solver.sections import area_coefficients

UNLOADED = "Unloaded"
AnySegment: TypeAlias = Segment | CompanionSegment


def pack(project: Project, *, cases: bool = True) -> tuple[Chain, Loads, tuple[State, ...]]:
    """The chain, the loads of every state, and the states; the project must be well formed.

    Checked states come first. With `cases`, the load cases follow the combinations, unchecked.
    A number too large for floating point comes out infinite or NaN: the caller looks.
    """
    states = states_of(project, cases=cases)
    with np.errstate(over="ignore", invalid="ignore"):
        return pack_chain(project), pack_loads(project, states), states


def states_of(project: Project, *, cases: bool = True) -> tuple[State, ...]:
    """The states of a project: combinations, else cases alone, else the unloaded member."""
    if not project.combinations:
        return _alone(project, checked=True) or (State(UNLOADED, "unloaded", {}, 1.0, True),)
    combined = tuple(
        State(c.name, "combination", dict(c.factors), float(c.allowable_factor), True)
        for c in project.combinations
    )
    return combined + (_alone(project, checked=False) if cases else ())


def _alone(project: Project, *, checked: bool) -> tuple[State, ...]:
    return tuple(State(case.name, "case", {case.name: 1.0}, 1.0, checked) for case in project.load_cases)


def pack_chain(project: Project) -> Chain:
    """The member as arrays."""
    segments = project.segments
    by_name = {material.name: material for material in project.materials}
    own = segment_arrays(project, segments)
    fixed, spring, stops = _supports(project)
    return Chain(
        length=own["length"],
        modulus=own["modulus"],
        area=own["area"],
        expansion=own["expansion"],
        density=own["density"],
        bedding=array_of(_beddings(segments)).reshape(-1, 2),
        fixed=fixed,
        spring=spring,
        stops=stops,
        bonded=_bonded(segments, by_name),
    )


def segment_arrays(project: Project, segments: Sequence[AnySegment]) -> dict[str, FloatArray]:
    """What segments of the member and of companions have alike, by the name of the chain's array."""
    by_name = {material.name: material for material in project.materials}
    materials = [by_name[segment.material] for segment in segments]
    areas = (area for segment in segments for area in area_coefficients(segment.section))
    return {
        "length": array_of(segment.length for segment in segments),
        "modulus": array_of(material.modulus for material in materials),
        "area": array_of(areas).reshape(-1, 3),
        "expansion": array_of(material.expansion for material in materials),
        "density": array_of(material.density for material in materials),
    }


def _bonded(segments: tuple[Segment, ...], by_name: Mapping[str, Material]) -> Bonded | None:
    """All parts, the segments' own first; None where no segment has bonded parts."""
    added = [(index, part) for index, segment in enumerate(segments) for part in segment.bonded]
    if not added:
        return None
    every: list[Segment | BondedPart] = [*segments, *(part for _, part in added)]
    materials = [by_name[part.material] for part in every]
    sections = [part.section for part in every]
    return bonded_parts(
        segment=np.array([*range(len(segments)), *(index for index, _ in added)], dtype=np.intp),
        modulus=array_of(material.modulus for material in materials),
        area=array_of(value for section in sections for value in area_coefficients(section)).reshape(-1, 3),
        expansion=array_of(material.expansion for material in materials),
        density=array_of(material.density for material in materials),
    )


def array_of(values: Iterable[float]) -> FloatArray:
    """The numbers as a read-only array."""
    return frozen(np.fromiter(values, dtype=np.float64))


def _beddings(segments: tuple[Segment, ...]) -> Iterable[float]:
    for segment in segments:
        yield segment.bedding
        yield end_of(segment.bedding, segment.bedding_end)


def _supports(project: Project) -> tuple[BoolArray, FloatArray, Stops]:
    """Fixed joints, springs and stops; springs at one joint add up, several fixed supports are one."""
    fixed = np.zeros(len(project.joints), dtype=np.bool_)
    spring = np.zeros(len(project.joints))
    stops: list[tuple[int, StopSupport]] = []
    for index, joint in enumerate(project.joints):
        for support in supports_of(joint):
            if isinstance(support, FixedSupport):
                fixed[index] = True
            elif isinstance(support, SpringSupport):
                spring[index] += support.stiffness
            else:
                stops.append((index, support))
    fixed.setflags(write=False)
    return fixed, frozen(spring), _stops(stops) if stops else NO_STOPS


def _stops(found: list[tuple[int, StopSupport]]) -> Stops:
    joint = np.array([index for index, _ in found], dtype=np.intp)
    joint.setflags(write=False)
    return Stops(
        joint=joint,
        side=array_of(1.0 if stop.side == "plus" else -1.0 for _, stop in found),
        clearance=array_of(stop.clearance for _, stop in found),
        stiffness=array_of(_stiffness_of(stop) for _, stop in found),
    )


def _stiffness_of(stop: StopSupport) -> float:
    return np.inf if isinstance(stop.stiffness, UnsetType) else stop.stiffness


def pack_loads(project: Project, states: tuple[State, ...]) -> Loads:
    """The loads of the states, factored and summed."""
    factors = _factors(project, states)
    on_joints = _combined(factors, _joint_values(project))
    gravity = array_of(case.gravity for case in project.load_cases)
    return Loads(
        **loads_on(project, states, project.segments),
        gravity=_part(factors @ gravity),
        joint_force=_part(on_joints[..., 0]),
        movement=_part(on_joints[..., 1]),
    )


def loads_on(
    project: Project, states: tuple[State, ...], segments: Sequence[AnySegment]
) -> dict[str, FloatArray]:
    """The loads of the states on some segments, by the name of the loads' array."""
    values = _combined(_factors(project, states), _segment_values(project, segments))
    return {
        "distributed": _part(values[..., 0:2]),
        "temperature": _part(values[..., 2:4]),
        "lack_of_fit": _part(values[..., 4]),
    }


def _part(array: FloatArray) -> FloatArray:
    return frozen(np.ascontiguousarray(array))


def _factors(project: Project, states: tuple[State, ...]) -> FloatArray:
    """The factor of each case in each state, (m, c)."""
    names = [case.name for case in project.load_cases]
    return np.array([[state.factors.get(name, 0.0) for name in names] for state in states], dtype=np.float64)


def _combined(factors: FloatArray, values: FloatArray) -> FloatArray:
    """Factors (m, c) times values (c, …), giving (m, …)."""
    flat = factors @ values.reshape(len(values), math.prod(values.shape[1:]))
    return flat.reshape(len(factors), *values.shape[1:])


def _segment_values(project: Project, segments: Sequence[AnySegment]) -> FloatArray:
    """By case and segment: load and temperature at start and end, lack of fit; (c, n, 5)."""
    index_of = {segment.mark: index for index, segment in enumerate(segments)}
    values = np.zeros((len(project.load_cases), len(segments), 5))
    for case, row in zip(project.load_cases, values, strict=True):
        loads = case.segment_loads
        if project.companions:  # member and companions have their loads in the same list
            loads = tuple(load for load in loads if load.segment in index_of)
        places = np.fromiter((index_of[load.segment] for load in loads), dtype=np.intp, count=len(loads))
        numbers = array_of(_numbers(loads)).reshape(-1, 5)
        if len(np.unique(places)) == len(places):  # which is most often so, and much faster
            row[places] += numbers
        else:
            np.add.at(row, places, numbers)
    return values


def _numbers(loads: tuple[SegmentLoad, ...]) -> Iterable[float]:
    for load in loads:
        yield load.load_start
        yield end_of(load.load_start, load.load_end)
        yield load.temperature_start
        yield end_of(load.temperature_start, load.temperature_end)
        yield load.lack_of_fit


def _joint_values(project: Project) -> FloatArray:
    """By case and joint: force and movement; (c, n + 1, 2)."""
    index_of = {joint.mark: index for index, joint in enumerate(project.joints)}
    values = np.zeros((len(project.load_cases), len(project.joints), 2))
    for case, row in zip(project.load_cases, values, strict=True):
        for load in case.joint_loads:
            row[index_of[load.joint]] += (load.force, load.movement)
    return values
