"""Shoulders on the sheet: what was entered, the factors and what they are made of, peak stresses."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence

from msgspec import UNSET, UnsetType

from app.numerals import reading
from app.phrases.checks import why_text
from app.sheet.blocks import Block, Value, column, formula, formulas, heading, paragraph, table
from app.sheet.readings import NOTHING, Readings
from app.sheet.verdicts import against, status_word
from app.shoulder_entry import shoulder_entry
from app.units import utilisation_text
from app.words import tr
from solver.checks import Check
from solver.model import Joint, Material, Project
from solver.results import Results
from solver.shoulders import Notch, Step, notches

Cells = Callable[[Material], list[str]]


def strength_columns(project: Project, say: Readings) -> tuple[list[dict[str, Value]], Cells]:
    """The columns of materials for peak stress and fatigue, those that hold something, and cells."""
    parts: list[tuple[str, Callable[[Material], float | UnsetType]]] = [
        (tr("Allowable peak stress"), lambda m: m.allowable_peak),
        (tr("Endured amplitude Sa"), lambda m: m.endurance.amplitude if m.endurance else UNSET),
        (tr("Ultimate stress Su"), lambda m: m.endurance.ultimate if m.endurance else UNSET),
    ]
    used = [(title, of) for title, of in parts if any(of(m) for m in project.materials)]

    def cells(material: Material) -> list[str]:
        values = [of(material) for _, of in used]
        return [NOTHING if isinstance(v, UnsetType) else say.exact(v, "stress") for v in values]

    return [column(title, say.unit("stress")) for title, _ in used], cells


def shoulder_words(joint: Joint, say: Readings) -> str:
    """What was entered at a joint."""
    return shoulder_entry(joint.shoulder, say.units) or NOTHING


def peak_tables(results: Results, name: str, say: Readings) -> Iterator[Block]:
    """The peak stresses of one state; nothing for a member without shoulders."""
    checks = [c for c in results.checks if c.check == "peak" and c.combination == name]
    if not checks:
        return
    stress = say.unit("stress")
    columns = [
        column(tr("Joint"), align="left"),
        column(tr("On segment"), align="left"),
        column(tr("Nominal σ"), stress),
        column("Kt"),
        column(tr("Peak stress"), stress),
        column(tr("Limit"), stress),
        column(tr("Utilisation")),
        column(tr("Verdict"), align="left"),
    ]
    strong = [row for row, check in enumerate(checks) if check.status == "fail"]
    rows = [_peak_row(check, say) for check in checks]
    yield table(tr("Shoulders: peak stress Kt σ of the smaller side"), columns, rows, strong=strong)


def _peak_row(check: Check, say: Readings) -> list[str]:
    place = [str(check.joint), str(check.segment)]
    if check.value is None or check.limit is None or check.utilisation is None:
        factor = NOTHING if check.factor is None else factor_text(check.factor)
        return [*place, NOTHING, factor, NOTHING, NOTHING, NOTHING, status_word(check.status)]
    value, limit = against(check.value, check.limit, "stress", say)
    return [
        *place,
        say.read(check.nominal or 0.0, "stress"),
        factor_text(check.factor or 1.0),
        value,
        limit,
        utilisation_text(check.utilisation, check.status),
        status_word(check.status),
    ]


def factor_text(factor: float) -> str:
    """A factor to the digits of a hand calculation."""
    return reading(factor, 5, strip=True)


def factor_blocks(project: Project, governing: Check | None, say: Readings) -> Iterator[Block]:
    """The factors of all shoulders with everything they follow from.

    The largest is given by hand, where that of the governing check is not already.
    """
    found = notches(project)
    if not found:
        return
    yield heading(tr("Stress concentration at shoulders"), 2)
    steps = [notch for notch in found if notch.step is not None and notch.factor is not None]
    if steps:
        yield paragraph(
            tr(
                "Factors of fillets between solid round sections in tension: the fit of the chart “shouldered"
                " bar of circular cross section” of W. D. Pilkey and D. F. Pilkey, Peterson's Stress"
                " Concentration Factors, with h = (D − d) / 2, for h/r from 0.1 to 20. The coefficients were"
                " put down from memory of that source: verify the factor."
            ),
            "lead",
        )
    yield _factor_table(project, found, say)
    done = [notch for notch in steps if _is_of(governing, notch, project)]
    if steps and not done:
        yield formulas(list(by_hand(max(steps, key=lambda notch: notch.factor or 0.0), project, say)))


def _is_of(check: Check | None, notch: Notch, project: Project) -> bool:
    return check is not None and check.joint == project.joints[notch.joint].mark and check.factor is not None


def _factor_table(project: Project, found: Sequence[Notch], say: Readings) -> Block:
    size = say.unit("size")
    columns = [
        column(tr("Joint"), align="left"),
        column(tr("On segment"), align="left"),
        column("D", size),
        column("d", size),
        column("r", size),
        column("h/r"),
        column("2h/D"),
        *(column(f"C{i}") for i in range(1, 5)),
        column("Kt"),
    ]
    rows = [_factor_row(project, notch, say) for notch in found]
    return table(tr("Shoulders: factor Kt"), columns, rows)


def _factor_row(project: Project, notch: Notch, say: Readings) -> list[str]:
    place = [project.joints[notch.joint].mark, project.segments[notch.segment].mark]
    step = notch.step
    if notch.factor is None:
        reason = why_text(notch.reason, notch.ratio) if notch.reason else NOTHING
        return [*place, *9 * [NOTHING], f"{NOTHING} ({reason})"]
    if step is None:
        return [*place, *9 * [NOTHING], tr("{factor} (entered)").format(factor=factor_text(notch.factor))]
    sizes = [say.exact(value, "size") for value in (step.large, step.small, step.radius)]
    numbers = [reading(value, 5, strip=True) for value in (step.ratio, step.depth, *step.coefficients)]
    return [*place, *sizes, *numbers, factor_text(notch.factor)]


def by_hand(notch: Notch, project: Project, say: Readings) -> Iterator[dict[str, Value]]:
    """A factor with its numbers put in; the entered one as it stands."""
    mark, factor = project.joints[notch.joint].mark, factor_text(notch.factor or 1.0)
    label = tr("factor at joint {joint}").format(joint=mark)
    if notch.step is None:
        yield formula(
            label, "factor_entered", tr("Kt = {factor}, entered").format(factor=factor), factor=factor
        )
        return
    yield _step_formula(notch.step, say)
    yield from _coefficient_formulas(notch.step)
    yield _factor_formula(label, notch.step, factor)


def _step_formula(step: Step, say: Readings) -> dict[str, Value]:
    parts = {
        "large": say.exact(step.large, "size", unit=True),
        "small": say.exact(step.small, "size", unit=True),
        "height": say.plain(step.height, "size", unit=True),
        "ratio": reading(step.ratio, 5, strip=True),
        "depth": reading(step.depth, 5, strip=True),
    }
    alt = tr("h = (D − d) / 2 = ({large} − {small}) / 2 = {height}, h/r = {ratio}, 2h/D = {depth}")
    return formula(tr("step"), "step_numbers", alt.format(**parts), **parts)


def _coefficient_formulas(step: Step) -> Iterator[dict[str, Value]]:
    for number, (row, value) in enumerate(zip(step.rows, step.coefficients, strict=True), 1):
        constant, root, linear = (reading(abs(part), 4, strip=True) for part in row)
        signs = ["−" if part < 0 else "+" for part in row]
        parts = {
            "number": str(number),
            "constant": f"{'−' if row[0] < 0 else ''}{constant}",
            "root": f"{signs[1]} {root}",
            "linear": f"{signs[2]} {linear}",
            "value": reading(value, 5),
        }
        alt = tr("C{number} = {constant} {root} √(h/r) {linear} h/r = {value}").format(**parts)
        yield formula(f"C{number}", "coefficient_numbers", alt, **parts)


def _factor_formula(label: str, step: Step, factor: str) -> dict[str, Value]:
    parts = {f"c{i}": reading(value, 5) for i, value in enumerate(step.coefficients, 1)}
    parts |= {"depth": reading(step.depth, 5, strip=True), "factor": factor}
    alt = tr(
        "Kt = C1 + C2 (2h/D) + C3 (2h/D)² + C4 (2h/D)³"
        " = {c1} + ({c2}) · {depth} + ({c3}) · {depth}² + ({c4}) · {depth}³ = {factor}, at least 1"
    )
    return formula(label, "factor_numbers", alt.format(**parts), **parts)
