"""Random projects for hypothesis: always well formed and solvable, with every kind of record in them.

Sizes stay in the range of real works (millimetres to metres, kilonewtons to meganewtons), so that what fails
is a fault of the program and not of floating point at its limits; tests of limits make their own members.
"""

from __future__ import annotations

from hypothesis import strategies as st
from msgspec import UNSET, structs

from solver.model import (
    FORMAT,
    VERSION,
    AreaSection,
    BondedPart,
    Combination,
    Companion,
    CompanionSegment,
    DisplacementLimit,
    Display,
    Endurance,
    FatigueRange,
    FixedSupport,
    Joint,
    JointLoad,
    Lateral,
    Limits,
    LoadCase,
    Material,
    Project,
    ReactionLimit,
    RectangleSection,
    RelativeLimit,
    RoundSection,
    Segment,
    SegmentLoad,
    SheetTexts,
    Shoulder,
    SpringSupport,
    StopSupport,
    TubeSection,
    Waiver,
)


def numbers(low: float, high: float) -> st.SearchStrategy[float]:
    """Between the two, and either 0 or of a size that occurs: nobody has a load of 1e-200 N."""
    least = 1e-6 * max(abs(low), abs(high))
    return st.floats(low, high).map(lambda value: 0.0 if low <= 0.0 and abs(value) < least else value)


def maybe(strategy: st.SearchStrategy) -> st.SearchStrategy:
    """The value, or a key left out."""
    return st.just(UNSET) | strategy


def texts() -> st.SearchStrategy[str]:
    """Any text a file can hold, line breaks and other scripts included."""
    return st.text(st.characters(exclude_categories=["Cs"]), max_size=12)


def names(count: int) -> st.SearchStrategy[tuple[str, ...]]:
    """Different names, plain ones mostly."""
    plain = st.just(tuple(f"name {index}" for index in range(count)))
    odd = st.lists(texts().filter(bool), min_size=count, max_size=count, unique=True).map(tuple)
    return plain | odd


SIZES = numbers(0.005, 0.3)


def ending(start: float) -> st.SearchStrategy:
    """The other end of a taper: up to three times thicker or thinner, or left out."""
    return maybe(numbers(start / 3, start * 3))


@st.composite
def area_sections(draw: st.DrawFn) -> AreaSection:
    area = draw(numbers(1e-5, 0.05))
    moment = draw(maybe(numbers(1e-10, 1e-4)))
    moment_end = UNSET if moment is UNSET else draw(maybe(numbers(1e-10, 1e-4)))
    return AreaSection(
        area=area, area_end=draw(ending(area)), second_moment=moment, second_moment_end=moment_end
    )


@st.composite
def round_sections(draw: st.DrawFn) -> RoundSection:
    diameter = draw(SIZES)
    return RoundSection(diameter=diameter, diameter_end=draw(ending(diameter)))


@st.composite
def tube_sections(draw: st.DrawFn) -> TubeSection:
    """Inner below outer at both ends, also where an end is left out and follows its start."""
    outer, outer_end = draw(SIZES), draw(maybe(SIZES))
    least = outer if outer_end is UNSET else min(outer, outer_end)
    bores = numbers(0.0, 0.9 * least)
    return TubeSection(outer=outer, outer_end=outer_end, inner=draw(bores), inner_end=draw(maybe(bores)))


@st.composite
def rectangle_sections(draw: st.DrawFn) -> RectangleSection:
    width, depth = draw(SIZES), draw(SIZES)
    return RectangleSection(
        width=width, width_end=draw(ending(width)), depth=depth, depth_end=draw(ending(depth))
    )


def sections() -> st.SearchStrategy:
    """Every shape, tapered or not."""
    return area_sections() | round_sections() | tube_sections() | rectangle_sections()


@st.composite
def materials(draw: st.DrawFn, name: str) -> Material:
    allowables = maybe(numbers(1e6, 4e8))
    return Material(
        name=name,
        modulus=draw(numbers(1e9, 2.2e11)),
        expansion=draw(numbers(-1e-6, 3e-5)),
        density=draw(numbers(0.0, 9000.0)),
        allowable_tension=draw(allowables),
        allowable_compression=draw(allowables),
    )


@st.composite
def segments(draw: st.DrawFn, mark: str = "A", material: str = "Steel") -> Segment:
    bedded = draw(st.booleans())
    beds = numbers(0.0, 5e8)
    return Segment(
        mark=mark,
        length=draw(numbers(0.05, 6.0)),
        material=material,
        section=draw(sections()),
        bedding=draw(beds) if bedded else 0.0,
        bedding_end=draw(maybe(beds)) if bedded else UNSET,
    )


def supports() -> st.SearchStrategy:
    """What holds a joint, from both sides."""
    springs = numbers(1e4, 1e10).map(lambda stiffness: SpringSupport(stiffness=stiffness))
    return st.just(FixedSupport()) | springs


@st.composite
def joints(draw: st.DrawFn, marks: tuple[str, ...]) -> tuple[Joint, ...]:
    """At least one of them supported."""
    held = draw(st.sets(st.integers(0, len(marks) - 1), min_size=1, max_size=3))
    return tuple(
        Joint(mark=mark, support=draw(supports()) if index in held else UNSET)
        for index, mark in enumerate(marks)
    )


@st.composite
def segment_loads(draw: st.DrawFn, mark: str) -> SegmentLoad:
    loads, rises = numbers(-5e4, 5e4), numbers(-60.0, 90.0)
    return SegmentLoad(
        segment=mark,
        load_start=draw(loads),
        load_end=draw(maybe(loads)),
        temperature_start=draw(rises),
        temperature_end=draw(maybe(rises)),
        lack_of_fit=draw(numbers(-1e-3, 1e-3)),
    )


@st.composite
def joint_loads(draw: st.DrawFn, joint: Joint) -> JointLoad:
    movements = st.just(0.0) if joint.support is UNSET else numbers(-5e-3, 5e-3)
    return JointLoad(joint=joint.mark, force=draw(numbers(-5e5, 5e5)), movement=draw(movements))


@st.composite
def load_cases(
    draw: st.DrawFn, name: str, chain: tuple[Segment, ...], between: tuple[Joint, ...]
) -> LoadCase:
    """Several records for one segment or joint among them."""
    loaded = draw(st.lists(st.sampled_from(chain), max_size=3))
    pulled = draw(st.lists(st.sampled_from(between), max_size=3))
    return LoadCase(
        name=name,
        gravity=draw(st.sampled_from([0.0, 9.81, -9.81])),
        segment_loads=tuple(draw(segment_loads(segment.mark)) for segment in loaded),
        joint_loads=tuple(draw(joint_loads(joint)) for joint in pulled),
    )


@st.composite
def combinations(draw: st.DrawFn, name: str, cases: tuple[str, ...]) -> Combination:
    named = draw(st.sets(st.sampled_from(cases))) if cases else set()
    factors = {case: draw(numbers(-2.0, 2.0)) for case in cases if case in named}
    return Combination(name=name, factors=factors, allowable_factor=draw(numbers(0.5, 1.5)))


@st.composite
def limits(draw: st.DrawFn, between: tuple[Joint, ...]) -> Limits:
    marks = [joint.mark for joint in between]
    some = st.sets(st.sampled_from(marks), max_size=2).map(sorted)
    pairs = st.lists(st.permutations(marks).map(lambda order: (order[0], order[1])), max_size=2)
    return Limits(
        displacement=tuple(DisplacementLimit(m, draw(numbers(1e-5, 1e-2))) for m in draw(some)),
        relative=tuple(RelativeLimit(a, b, draw(numbers(1e-5, 1e-2))) for a, b in draw(pairs)),
        reaction=tuple(ReactionLimit(m, draw(numbers(1e2, 1e6))) for m in draw(some)),
    )


def displays() -> st.SearchStrategy[Display]:
    units = st.sampled_from(["mm-N-MPa", "mm-kN-MPa", "m-kN-MPa", "in-lbf-psi", "in-kip-ksi"])
    orientations = st.sampled_from(["horizontal", "vertical"])
    return st.builds(Display, units=maybe(units), orientation=maybe(orientations))


def sheet_texts() -> st.SearchStrategy[SheetTexts]:
    return st.builds(SheetTexts, texts(), texts(), texts(), texts(), texts())


@st.composite
def projects(draw: st.DrawFn, max_segments: int = 4) -> Project:
    """A whole project: well formed, held in every combination, no stops."""
    count = draw(st.integers(1, max_segments))
    of_what = tuple(draw(materials(name)) for name in draw(names(draw(st.integers(1, 2)))))
    between = draw(joints(draw(names(count + 1))))
    chain = tuple(draw(segments(mark, draw(st.sampled_from(of_what)).name)) for mark in draw(names(count)))
    case_names = draw(names(draw(st.integers(0, 2))))
    cases = tuple(draw(load_cases(name, chain, between)) for name in case_names)
    together = draw(names(draw(st.integers(0, 2))))
    return Project(
        format=FORMAT,
        version=VERSION,
        title=draw(texts()),
        notes=draw(texts()),
        sheet=draw(sheet_texts()),
        display=draw(displays()),
        materials=of_what,
        joints=between,
        segments=chain,
        load_cases=cases,
        combinations=tuple(draw(combinations(name, case_names)) for name in together),
        limits=draw(limits(between)),
    )


# --- what few members have: the file holds it, each feature's own tests solve it ---


def stops() -> st.SearchStrategy[StopSupport]:
    """To either side, rigid or not."""
    return st.builds(
        StopSupport,
        side=st.sampled_from(["plus", "minus"]),
        clearance=numbers(0.0, 5e-3),
        stiffness=maybe(numbers(1e5, 1e10)),
    )


def shoulders() -> st.SearchStrategy[Shoulder]:
    """By fillet or by factor."""
    fillets = st.builds(Shoulder, fillet_radius=numbers(1e-4, 0.02))
    return fillets | st.builds(Shoulder, factor=numbers(1.0, 4.0))


def laterals() -> st.SearchStrategy[Lateral]:
    """Held, free, on a spring or left out."""
    holds = maybe(st.sampled_from(["free", "fixed"]) | numbers(1e3, 1e9))
    return st.builds(Lateral, translation=holds, rotation=holds)


@st.composite
def companions(draw: st.DrawFn, project: Project, mark: str) -> Companion:
    """Of as many segments as the member has between the two joints, and as long."""
    joints = project.joints
    first = draw(st.integers(0, len(joints) - 2))
    last = draw(st.integers(first + 1, len(joints) - 1))
    parts = tuple(
        CompanionSegment(f"{mark} of {s.mark}", s.length, s.material, draw(sections()))
        for s in project.segments[first:last]
    )
    acts = draw(maybe(st.sampled_from(["both", "compression", "tension"])))
    return Companion(mark=mark, start=joints[first].mark, end=joints[last].mark, acts=acts, segments=parts)


@st.composite
def full_projects(draw: st.DrawFn, max_segments: int = 4) -> Project:
    """A well-formed project with every record that a file can hold."""
    project = draw(projects(max_segments))
    whole = structs.replace(
        project,
        materials=tuple(draw(_full_material(material)) for material in project.materials),
        joints=tuple(draw(_full_joint(joint)) for joint in project.joints),
        segments=tuple(structs.replace(s, bonded=draw(bonded(project))) for s in project.segments),
        companions=tuple(draw(companions(project, mark)) for mark in draw(_few("beside", "around"))),
        limits=draw(_full_limits(project.limits)),
    )
    named = [combination.name for combination in project.combinations]
    if len(named) == 2:
        whole = structs.replace(whole, fatigue=draw(st.just(()) | st.just((FatigueRange(*named),))))
    return whole


def _few(*marks: str) -> st.SearchStrategy[tuple[str, ...]]:
    return st.integers(0, len(marks)).map(lambda count: marks[:count])


def bonded(project: Project) -> st.SearchStrategy[tuple[BondedPart, ...]]:
    """Parts that share a segment's strain, of the project's materials."""
    named = st.sampled_from([material.name for material in project.materials])
    return st.lists(st.builds(BondedPart, named, sections()), max_size=2).map(tuple)


@st.composite
def _full_material(draw: st.DrawFn, material: Material) -> Material:
    line = st.builds(Endurance, amplitude=numbers(1e6, 4e8), ultimate=numbers(1e7, 1e9))
    peak = draw(maybe(numbers(1e6, 8e8)))
    return structs.replace(material, allowable_peak=peak, endurance=draw(maybe(line)))


@st.composite
def _full_joint(draw: st.DrawFn, joint: Joint) -> Joint:
    beside = {"shoulder": draw(maybe(shoulders())), "lateral": draw(maybe(laterals()))}
    return structs.replace(joint, **beside, **draw(_held(joint)))


@st.composite
def _full_limits(draw: st.DrawFn, limits: Limits) -> Limits:
    reasons = texts().filter(str.strip)
    waivers = st.just(()) | reasons.map(lambda reason: (Waiver("stability", reason),))
    factor = draw(maybe(numbers(1.0, 5.0)))
    return structs.replace(limits, stability_factor=factor, waived=draw(waivers))


def _held(joint: Joint) -> st.SearchStrategy[dict[str, object]]:
    """As it is, or by several supports, stops among them."""
    lists = st.lists(supports() | stops(), min_size=1, max_size=3).map(tuple)
    several = lists.map(lambda found: {"support": UNSET, "supports": found})
    return st.just({}) | (several if joint.support is not UNSET else st.nothing())
