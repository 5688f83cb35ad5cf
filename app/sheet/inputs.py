"""Every input with its unit, exact to the last digit, so that a checker can redo any number."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from msgspec import UnsetType
from msgspec.structs import replace

from app.beside import beside
from app.edits.companions import segment_marks
from app.numerals import MINUS
from app.sheet.blocks import Block, column, heading, paragraph, picture, table
from app.sheet.companions import companion_inputs
from app.sheet.joint_inputs import joint_inputs
from app.sheet.member_figure import Figure, member_figure
from app.sheet.readings import NOTHING, Readings
from app.sheet.section_words import area_words, section_words
from app.sheet.shoulders import strength_columns
from app.sheet.stability_inputs import stability_inputs
from app.words import tr
from solver.model import (
    BondedPart,
    LoadCase,
    Material,
    Project,
    SegmentLoad,
    end_of,
    parts_of,
)
from solver.packing import pack
from solver.results import Results


def input_blocks(results: Results, say: Readings) -> Iterator[Block]:
    """The chapter of inputs."""
    project = results.project
    _, loads, states = pack(project)
    alone = {state.name: index for index, state in enumerate(states) if state.kind == "case"}
    yield heading(tr("Input"))
    yield paragraph(
        tr("The values as entered; those of more than ten digits to nine, in full in the attached project."),
        "lead",
    )
    yield _materials(project, say)
    yield _segments(project, say)
    yield from companion_inputs(project, say)
    yield joint_inputs(project, results, say)
    if not project.load_cases:
        yield paragraph(tr("There are no load cases: the member is unloaded."))
    for case in (_in_chain_order(case, project) for case in project.load_cases):
        figure = member_figure(project, results.position, loads, alone[case.name], chain=False)
        yield from _load_case(case, figure, say)
    yield from _combinations(project, say)
    yield from _limits(project, say)
    yield from stability_inputs(project, say)


def _materials(project: Project, say: Readings) -> Block:
    strength, strength_cells = strength_columns(project, say)
    columns = [
        column(tr("Material"), align="left"),
        column("E", say.unit("modulus")),
        column("α", say.unit("expansion")),
        column("ρ", say.unit("density")),
        column(tr("Allowable in tension"), say.unit("stress")),
        column(tr("Allowable in compression"), say.unit("stress")),
        *strength,
    ]
    used = {part.material for segment in project.segments for part in parts_of(segment)}
    used |= {of.segment.material for of in beside(project)}
    rows = [[*_material_row(m, say, used=m.name in used), *strength_cells(m)] for m in project.materials]
    return table(tr("Materials"), columns, rows)


def _material_row(material: Material, say: Readings, *, used: bool) -> list[str]:
    allowables = (material.allowable_tension, material.allowable_compression)
    return [
        material.name if used else tr("{name} (not used)").format(name=material.name),
        say.exact(material.modulus, "modulus"),
        say.exact(material.expansion, "expansion"),
        say.exact(material.density, "density"),
        *(NOTHING if isinstance(v, UnsetType) else say.exact(v, "stress") for v in allowables),
    ]


def _segments(project: Project, say: Readings) -> Block:
    bedded = any(s.bedding or end_of(s.bedding, s.bedding_end) for s in project.segments)
    columns = [
        column(tr("Segment"), align="left"),
        column(tr("From – to"), align="left"),
        column(tr("Length"), say.unit("length")),
        column(tr("Section"), say.unit("size"), align="left"),
        column(tr("Area"), say.unit("area")),
        column(tr("Material"), align="left"),
        *([column(tr("Bedding"), say.unit("bedding"))] if bedded else []),
    ]
    return table(tr("Segments, along +x"), columns, list(_segment_rows(project, say, bedded=bedded)))


def _segment_rows(project: Project, say: Readings, *, bedded: bool) -> Iterator[list[str]]:
    for index, segment in enumerate(project.segments):
        ends = f"{project.joints[index].mark} – {project.joints[index + 1].mark}"
        row = [
            segment.mark,
            ends,
            say.exact(segment.length, "length"),
            section_words(segment.section, say),
            area_words(segment.section, say),
            segment.material,
        ]
        if bedded:
            row.append(say.pair(segment.bedding, end_of(segment.bedding, segment.bedding_end), "bedding"))
        yield row
        for number, part in enumerate(segment.bonded, start=2):
            yield _part_row(number, part, len(row), say)


def _part_row(number: int, part: BondedPart, cells: int, say: Readings) -> list[str]:
    """A bonded part, under the segment's own."""
    words = tr("part {number}").format(number=number)
    row = ["", words, "", section_words(part.section, say), area_words(part.section, say), part.material]
    return row + [""] * (cells - len(row))


def _in_chain_order(case: LoadCase, project: Project) -> LoadCase:
    """The case with its loads in the order of the chain, in which a checker goes through them."""
    segments = segment_marks(project)
    joints = [joint.mark for joint in project.joints]
    return replace(
        case,
        segment_loads=tuple(sorted(case.segment_loads, key=lambda load: segments.index(load.segment))),
        joint_loads=tuple(sorted(case.joint_loads, key=lambda load: joints.index(load.joint))),
    )


def _load_case(case: LoadCase, figure: Figure, say: Readings) -> Iterator[Block]:
    yield heading(tr("Load case {name}").format(name=case.name), 2)
    if case.gravity:
        value = say.exact(case.gravity, "acceleration", unit=True)
        yield paragraph(
            tr("Gravity along +x: {value}, on the density of every segment.").format(value=value), "lead"
        )
    if case.gravity or case.segment_loads or case.joint_loads:
        yield picture(figure, tr("Load case {name}: loads, factor 1").format(name=case.name))
    if case.segment_loads:
        yield _segment_loads(case, say)
    if case.joint_loads:
        yield _joint_loads(case, say)
    if not (case.gravity or case.segment_loads or case.joint_loads):
        yield paragraph(tr("No loads."))


def _segment_loads(case: LoadCase, say: Readings) -> Block:
    columns = [
        column(tr("Segment"), align="left"),
        column(tr("q at start"), say.unit("distributed")),
        column(tr("q at end"), say.unit("distributed")),
        column(tr("ΔT at start"), say.unit("temperature")),
        column(tr("ΔT at end"), say.unit("temperature")),
        column(tr("Lack of fit λ"), say.unit("displacement")),
    ]
    return table(tr("On segments"), columns, [_segment_load_row(load, say) for load in case.segment_loads])


def _segment_load_row(load: SegmentLoad, say: Readings) -> list[str]:
    return [
        load.segment,
        say.exact(load.load_start, "distributed"),
        say.exact(end_of(load.load_start, load.load_end), "distributed"),
        say.exact(load.temperature_start, "temperature"),
        say.exact(end_of(load.temperature_start, load.temperature_end), "temperature"),
        say.exact(load.lack_of_fit, "displacement"),
    ]


def _joint_loads(case: LoadCase, say: Readings) -> Block:
    columns = [
        column(tr("Joint"), align="left"),
        column(tr("Force P"), say.unit("force")),
        column(tr("Movement δ of the support"), say.unit("displacement")),
    ]
    rows = [
        [load.joint, say.exact(load.force, "force"), say.exact(load.movement, "displacement")]
        for load in case.joint_loads
    ]
    return table(tr("At joints"), columns, rows)


def _combinations(project: Project, say: Readings) -> Iterator[Block]:
    yield heading(tr("Combinations and limits"), 2)
    if not project.combinations:
        yield paragraph(tr("No combinations: every load case is checked alone with factor 1."))
        return
    columns = [
        column(tr("Combination"), align="left"),
        column(tr("Load cases with their factors"), align="left"),
        column(tr("Factor f on allowable stresses")),
    ]
    rows = [
        [
            combination.name,
            factors_text(combination.factors, say),
            say.exact(combination.allowable_factor, "factor"),
        ]
        for combination in project.combinations
    ]
    yield table(tr("Combinations"), columns, rows)
    if project.fatigue:
        heads = [column(tr("Fatigue from"), align="left"), column(tr("to combination"), align="left")]
        yield table(tr("Ranges of fatigue"), heads, [[swing.start, swing.end] for swing in project.fatigue])


def factors_text(factors: Mapping[str, float], say: Readings) -> str:
    """The factors as a sum: "1.35 · Dead + 1.5 · Service"; nothing where every case counts 0."""
    text = ""
    for name, factor in factors.items():
        sign = (MINUS if factor < 0 else "") if not text else f" {MINUS} " if factor < 0 else " + "
        text += f"{sign}{say.exact(abs(factor), 'factor')} · {name}"
    return text or tr("no load case")


def _limits(project: Project, say: Readings) -> Iterator[Block]:
    limits = project.limits
    rows = [
        *(
            [
                tr("Displacement of joint {joint}").format(joint=v.joint),
                "|u|",
                say.exact(v.limit, "displacement", unit=True),
            ]
            for v in limits.displacement
        ),
        *(
            [
                tr("Relative displacement of joints {start} to {end}").format(end=v.end, start=v.start),
                "|Δu|",
                say.exact(v.limit, "displacement", unit=True),
            ]
            for v in limits.relative
        ),
        *(
            [
                tr("Reaction at joint {joint}").format(joint=v.joint),
                "|R|",
                say.exact(v.limit, "force", unit=True),
            ]
            for v in limits.reaction
        ),
    ]
    if not rows:
        yield paragraph(tr("No limits on displacements or reactions are set."))
        return
    columns = [column(tr("Limit on"), align="left"), column("", align="left"), column(tr("At most"))]
    yield table(tr("Limits"), columns, rows)
