"""Small members for tests: a chain of parts with marks given by position (segments A, B …, joints 0, 1 …)."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

from msgspec import UNSET, UnsetType, structs

from solver.model import (
    FORMAT,
    VERSION,
    AnySection,
    AnySupport,
    AreaSection,
    Combination,
    Joint,
    JointLoad,
    LoadCase,
    Material,
    Project,
    RoundSection,
    Segment,
    SegmentLoad,
    Waiver,
)

STEEL = 2.1e11


@dataclass(frozen=True)
class Part:
    """A segment with a material of its own."""

    length: float
    section: AnySection
    modulus: float = STEEL
    expansion: float = 0.0
    density: float = 0.0
    bedding: float = 0.0
    bedding_end: float | UnsetType = UNSET
    allowable_tension: float | UnsetType = UNSET
    allowable_compression: float | UnsetType = UNSET


def area(start: float, end: float | UnsetType = UNSET) -> AreaSection:
    return AreaSection(area=start, area_end=end)


def round_bar(start: float, end: float | UnsetType = UNSET) -> RoundSection:
    return RoundSection(diameter=start, diameter_end=end)


def segment_mark(index: int) -> str:
    return chr(ord("A") + index) if index < 26 else f"S{index}"


def case(
    name: str = "Load",
    *,
    gravity: float = 0.0,
    on_segments: Sequence[SegmentLoad] = (),
    on_joints: Sequence[JointLoad] = (),
) -> LoadCase:
    return LoadCase(
        name=name, gravity=gravity, segment_loads=tuple(on_segments), joint_loads=tuple(on_joints)
    )


def member(
    parts: Sequence[Part],
    supports: Mapping[int, AnySupport],
    cases: Sequence[LoadCase] = (),
    combinations: Sequence[Combination] = (),
) -> Project:
    materials = tuple(
        Material(
            name=f"of {segment_mark(i)}",
            modulus=part.modulus,
            expansion=part.expansion,
            density=part.density,
            allowable_tension=part.allowable_tension,
            allowable_compression=part.allowable_compression,
        )
        for i, part in enumerate(parts)
    )
    segments = tuple(
        Segment(
            mark=segment_mark(i),
            length=part.length,
            material=f"of {segment_mark(i)}",
            section=part.section,
            bedding=part.bedding,
            bedding_end=part.bedding_end,
        )
        for i, part in enumerate(parts)
    )
    joints = tuple(Joint(mark=str(i), support=supports.get(i, UNSET)) for i in range(len(parts) + 1))
    return Project(
        format=FORMAT,
        version=VERSION,
        materials=materials,
        joints=joints,
        segments=segments,
        load_cases=tuple(cases),
        combinations=tuple(combinations),
    )


def waived(project: Project, reason: str = "held all along") -> Project:
    """Without the check of stability, for tests of something else."""
    limits = structs.replace(project.limits, waived=(Waiver("stability", reason),))
    return structs.replace(project, limits=limits)
