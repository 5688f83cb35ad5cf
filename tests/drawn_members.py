"""Members for the tests of drawing and sheet: every shape of section, support and load, few and many."""

from __future__ import annotations

from msgspec import UNSET
from msgspec.structs import replace

from app.drawing.member import Member
from app.samples import names, read_sample
from app.shown import Shown
from solver.model import (
    AnySupport,
    AreaSection,
    Combination,
    FixedSupport,
    Joint,
    JointLoad,
    LoadCase,
    Material,
    Project,
    RectangleSection,
    RoundSection,
    Segment,
    SegmentLoad,
    SpringSupport,
    StopSupport,
    TubeSection,
)
from solver.packing import states_of
from tests.shouldered import spindle

SECTIONS = (
    RoundSection(diameter=0.050, diameter_end=0.060),
    TubeSection(outer=0.080, inner=0.050),
    RectangleSection(width=0.040, depth=0.060),
    AreaSection(area=2e-3, area_end=3e-3),
)


def busy_member(count: int) -> Project:
    """Every shape of section, support and load, on `count` segments, in ten combinations of four cases."""
    segments = tuple(
        Segment(f"S{i}", 0.3 + 0.05 * (i % 5), "Steel", SECTIONS[i % 4], bedding=1e6 if i % 7 == 3 else 0.0)
        for i in range(count)
    )
    joints = tuple(Joint(str(i), _support(i, count) or UNSET) for i in range(count + 1))
    cases = tuple(_case(number, segments, joints) for number in range(4))
    combinations = tuple(
        Combination(f"Combination {k}", {case.name: 1.0 + 0.1 * k for case in cases}) for k in range(10)
    )
    return Project(
        format="barwright-project",
        version=1,
        materials=(Material("Steel", 2.1e11, 1.2e-5, 7850.0, 1.6e8, 1.4e8),),
        joints=joints,
        segments=segments,
        load_cases=cases,
        combinations=combinations,
    )


def _support(joint: int, count: int) -> AnySupport | None:
    if joint in (0, count // 2):
        return FixedSupport()
    return SpringSupport(stiffness=1e8 + joint * 1e6) if joint % 6 == 5 else None


def _case(number: int, segments: tuple[Segment, ...], joints: tuple[Joint, ...]) -> LoadCase:
    return LoadCase(
        f"Case {number}",
        gravity=-9.81 if number == 0 else 0.0,
        segment_loads=tuple(
            SegmentLoad(
                s.mark, 1e3 * (i + 1), -500.0 * number, 10.0 * number, lack_of_fit=1e-4 if i == 3 else 0.0
            )
            for i, s in enumerate(segments)
            if i % 3 == number % 3
        ),
        joint_loads=tuple(
            JointLoad(joint.mark, force=2e4 * (j + 1) * (-1) ** j)
            for j, joint in enumerate(joints)
            if j and j % (2 + number) == 0
        ),
    )


def stopped_member() -> Project:
    """A stop of either side at its joint, before the member and behind it."""
    project = busy_member(4)
    joints = (
        Joint("0", StopSupport(side="minus", clearance=2e-4)),
        Joint("1", StopSupport(side="plus", clearance=5e-4, stiffness=1e8)),
        Joint("2", FixedSupport()),
        Joint("3"),
        Joint("4", SpringSupport(stiffness=4e7)),
    )
    return Project(
        format="barwright-project",
        version=1,
        materials=project.materials,
        joints=joints,
        segments=project.segments,
        load_cases=project.load_cases,
    )


def crowded_supports() -> Project:
    """Several supports at one joint: at both ends, and between them on up to three levels."""
    plus, minus = StopSupport(side="plus", clearance=2e-4), StopSupport(side="minus", clearance=2e-4)
    tight = StopSupport(side="plus", clearance=0.0, stiffness=3.5e8)
    several = {
        0: (plus, minus),
        1: (SpringSupport(stiffness=6e8), replace(minus, clearance=1.25e-3), plus, tight),
        3: (plus, minus),
        4: (SpringSupport(stiffness=4e7), tight),
    }
    project = stopped_member()
    joints = (replace(j, support=UNSET, supports=several.get(i, ())) for i, j in enumerate(project.joints))
    return replace(project, joints=tuple(joints))


def uneven_member(count: int = 12) -> Project:
    """A busy member of which some segments are a thousand times as long as others."""
    project = busy_member(count)
    lengths = (0.005, 2.0, 0.010, 6.0, 0.020)
    segments = (replace(s, length=lengths[i % 5]) for i, s in enumerate(project.segments))
    return replace(project, segments=tuple(segments))


def all_members() -> dict[str, Project]:
    """The samples, busy members of 1 to 40 segments, and some with stops or shoulders."""
    found = {name: read_sample(name) for name in names()}
    found |= {f"busy {count}": busy_member(count) for count in (1, 12, 25, 40)}
    return found | {
        "stops": stopped_member(),
        "several": crowded_supports(),
        "uneven": uneven_member(),
        "spindle": spindle(),
    }


def first_state(project: Project) -> Shown:
    """The first state of a project."""
    state = states_of(project)[0]
    return Shown(state.kind, state.name)


def drawn(project: Project) -> Member:
    """The member with the loads of its first state."""
    return Member.of(project, first_state(project))
