"""The checks: the governing one by hand, then the worst of each kind, then what was not checked.

Nothing is computed here: the formulas are filled with the solver's values, to so many digits that a checker
with a pocket calculator arrives at the numbers shown.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator

import numpy as np
from msgspec import UnsetType

from app.beside import beside, beside_at, index_of_mark
from app.findings import findings
from app.findings.stability import waived_notes
from app.findings.subjects import worst_first
from app.numerals import reading
from app.phrases.checks import state_text
from app.phrases.segments import segment_words
from app.sheet.blocks import Block, Value, bullets, formula, formulas, heading, paragraph
from app.sheet.bonded import part_by_hand
from app.sheet.peak_proof import peak_or_fatigue_by_hand
from app.sheet.readings import Readings
from app.sheet.shoulders import factor_blocks
from app.sheet.stability import stability_by_hand
from app.sheet.verdicts import check_table, kind_words, quantity_of, subject, utilisation_by_hand
from app.words import tr
from solver.checks import Check
from solver.companion_fields import companion_force_at
from solver.fields import PointValues, at
from solver.model import (
    AnySection,
    AreaSection,
    RectangleSection,
    RoundSection,
    SpringSupport,
    TubeSection,
    end_of,
    parts_of,
    supports_of,
)
from solver.results import Results
from solver.sections import area_at, area_coefficients


def proof_blocks(results: Results, say: Readings) -> Iterator[Block]:
    """The chapter of checks."""
    yield heading(tr("Checks"))
    if results.governing is None:
        yield paragraph(tr("No check could be made."), "caution")
    else:
        yield from _governing_blocks(results, results.governing, say)
    yield from factor_blocks(results.project, results.governing, say)
    made = [check for check in results.checks if check.status in ("pass", "fail")]
    if made:
        yield _worst_table(made, say)
    failing = [check for check in made if check.status == "fail"]
    if failing:
        yield check_table(tr("Every check that fails"), failing, say)
    yield from _not_made(results, say)


def _governing_blocks(results: Results, check: Check, say: Readings) -> Iterator[Block]:
    yield heading(tr("The governing check, by hand"), 2)
    yield paragraph(
        tr("Largest utilisation of all checks: {kind}, {subject}, {combination}.").format(
            kind=kind_words(check), subject=subject(check), combination=state_text(check)
        ),
        "lead",
    )
    if check.check == "stability":
        yield from stability_by_hand(results, check, say)
    elif check.check in ("peak", "fatigue"):
        yield from peak_or_fatigue_by_hand(results, check, say)
    elif check.segment is not None:
        yield from _stress_by_hand(results, check, say)
    elif check.joint is not None:
        yield from _joint_by_hand(results, check, say)
    else:
        yield from _relative_by_hand(results, check, say)


def _stress_by_hand(results: Results, check: Check, say: Readings) -> Iterator[Block]:
    if index_of_mark(results.project, str(check.segment)) is not None:
        yield from _beside_by_hand(results, check, say)
        return
    state = _state(results, check)
    place = next(i for i, s in enumerate(results.project.segments) if s.mark == check.segment)
    x = float(check.position or 0.0)
    s = _share(x, float(results.position[place]), float(results.chain.length[place]))
    values = _in_segment(results, state, x, place)
    yield paragraph(
        _place_words(s).format(
            x=say.plain(x, "length", unit=True),
            share=reading(s, 6, strip=True),
            mark=segment_words(check),
        ),
        "lead",
    )
    section = parts_of(results.project.segments[place])[int(check.part or 0)].section
    area = float(area_at(np.array(area_coefficients(section)), np.array(s)))
    if check.part is not None:
        yield formulas(
            [
                _area_by_hand(section, s, area, say),
                *part_by_hand(results, check, state, place, s, values.force, say),
                _utilisation_by_hand(results, check, state, _stress_text(check, say), say),
            ]
        )
        return
    stress = say.plain(values.stress, "stress", unit=True, digits=6)
    force = say.plain(values.force, "force", unit=True)
    size = say.plain(area, "area", unit=True)
    alt = tr("σ = N / A = {force} / {area} = {stress}").format(force=force, area=size, stress=stress)
    yield formulas(
        [
            _area_by_hand(section, s, area, say),
            formula(tr("stress"), "stress_numbers", alt, force=force, area=size, stress=stress),
            _utilisation_by_hand(results, check, state, stress, say),
        ]
    )


def _stress_text(check: Check, say: Readings) -> str:
    return say.plain(float(check.value or 0.0), "stress", unit=True, digits=6)


def _beside_by_hand(results: Results, check: Check, say: Readings) -> Iterator[Block]:
    """The stress in a segment of a companion."""
    index, found = index_of_mark(results.project, str(check.segment)), results.companions
    if index is None or found is None:
        return
    state, x, of = _state(results, check), float(check.position or 0.0), beside_at(results.project, index)
    s = _share(x, float(found.begins[index]), float(found.chain.length[index]))
    area = float(area_at(found.chain.area[index], np.array(s)))
    force = say.plain(companion_force_at(results, state, of.at, x) or 0.0, "force", unit=True)
    stress, size = _stress_text(check, say), say.plain(area, "area", unit=True)
    where = _place_words(s).format(
        x=say.plain(x, "length", unit=True), share=reading(s, 6, strip=True), mark=check.segment
    )
    yield paragraph(where, "lead")
    alt = tr("σ = N / A = {force} / {area} = {stress}").format(force=force, area=size, stress=stress)
    yield formulas(
        [
            _area_by_hand(of.segment.section, s, area, say),
            formula(tr("stress"), "stress_numbers", alt, force=force, area=size, stress=stress),
            _utilisation_by_hand(results, check, state, stress, say),
        ]
    )


def _share(x: float, start: float, length: float) -> float:
    """The fraction 0…1 of a segment at x, without the rounding of positions at its ends."""
    s = min(1.0, max(0.0, (x - start) / length))
    return round(s) if min(s, 1 - s) < 1e-9 else s


def _place_words(s: float) -> str:
    if s == 0.0:
        return tr("Segment {mark} at its start, x = {x}.")
    if s == 1.0:
        return tr("Segment {mark} at its end, x = {x}.")
    return tr("Segment {mark} at x = {x}, {share} of its length from its start.")


def _state(results: Results, check: Check) -> int:
    return next(i for i, s in enumerate(results.states) if s.checked and s.name == check.combination)


def _in_segment(results: Results, state: int, x: float, place: int) -> PointValues:
    """The side of x that lies in the segment."""
    readout = at(results, state, x)
    sides = [side for side in (readout.left, readout.right) if side is not None]
    return next((side for side in sides if side.segment == place), sides[0])


def _area_by_hand(section: AnySection, s: float, area: float, say: Readings) -> dict[str, Value]:
    """The area from the dimensions at that place, which vary linearly along the segment."""

    def size(start: float, end: float | UnsetType) -> str:
        return say.plain((1 - s) * start + s * end_of(start, end), "size", unit=True)

    result = say.plain(area, "area", unit=True)
    match section:
        case RoundSection():
            parts = {"d": size(section.diameter, section.diameter_end)}
            name, alt = "round_numbers", tr("A = π · ({d})² / 4 = {area}")
        case TubeSection():
            parts = {
                "outer": size(section.outer, section.outer_end),
                "inner": size(section.inner, section.inner_end),
            }
            name, alt = "tube_numbers", tr("A = π / 4 · (({outer})² − ({inner})²) = {area}")
        case RectangleSection():
            parts = {"b": size(section.width, section.width_end), "h": size(section.depth, section.depth_end)}
            name, alt = "rectangle_numbers", tr("A = {b} · {h} = {area}")
        case AreaSection():
            parts, name, alt = {}, "area_numbers", tr("A = {area}")
    return formula(tr("area"), name, alt.format(area=result, **parts), area=result, **parts)


def _utilisation_by_hand(
    results: Results, check: Check, state: int, stress: str, say: Readings
) -> dict[str, Value]:
    made_of = {segment.mark: segment.material for segment in results.project.segments}
    made_of |= {of.segment.mark: of.segment.material for of in beside(results.project)}
    name = check.material or made_of[str(check.segment)]
    material = next(m for m in results.project.materials if m.name == name)
    allowable = material.allowable_tension if check.check == "tension" else material.allowable_compression
    parts = {
        "stress": stress,
        "factor": say.exact(results.states[state].allowable_factor, "factor"),
        "allowable": say.exact(float(allowable or 0.0), "stress", unit=True),
        "utilisation": utilisation_by_hand(check),
    }
    sign = "" if check.check == "tension" else "−"
    alt = tr("utilisation = {sign}({stress}) / ({factor} · {allowable}) = {utilisation}")
    return formula(tr("utilisation"), f"{check.check}_numbers", alt.format(sign=sign, **parts), **parts)


def _joint_by_hand(results: Results, check: Check, say: Readings) -> Iterator[Block]:
    quantity = quantity_of(check)
    parts = _against_limit(check, say)
    name = "R" if check.check == "reaction" else "u"
    alt = tr("utilisation = |{name}| / limit = |{value}| / {limit} = {utilisation}").format(
        name=name, **parts
    )
    spring = _spring_by_hand(results, check, say) if quantity == "force" else []
    yield formulas([*spring, formula(tr("utilisation"), f"{check.check}_numbers", alt, **parts)])


def _against_limit(check: Check, say: Readings) -> dict[str, str]:
    quantity = quantity_of(check)
    return {
        "value": say.plain(float(check.value or 0.0), quantity, unit=True, digits=6),
        "limit": say.exact(float(check.limit or 0.0), quantity, unit=True),
        "utilisation": utilisation_by_hand(check),
    }


def _spring_by_hand(results: Results, check: Check, say: Readings) -> list[dict[str, Value]]:
    """The reaction of a spring that holds a joint alone, from its stiffness and the joint's displacement."""
    place = next(i for i, j in enumerate(results.project.joints) if j.mark == check.joint)
    supports, state = supports_of(results.project.joints[place]), _state(results, check)
    support = supports[0] if len(supports) == 1 else None
    if not isinstance(support, SpringSupport):
        return []
    parts = {
        "stiffness": say.exact(support.stiffness, "spring", unit=True),
        "u": say.plain(float(results.solution.joint_displacement[state, place]), "displacement", unit=True),
        "movement": say.plain(float(results.loads.movement[state, place]), "displacement", unit=True),
        "reaction": say.plain(float(check.value or 0.0), "force", unit=True, digits=6),
    }
    alt = tr("R = −k (u − δ) = −{stiffness} · ({u} − ({movement})) = {reaction}").format(**parts)
    return [formula(tr("reaction of the spring"), "spring_numbers", alt, **parts)]


def _relative_by_hand(results: Results, check: Check, say: Readings) -> Iterator[Block]:
    state = _state(results, check)
    joints = {joint.mark: index for index, joint in enumerate(results.project.joints)}
    moved = results.solution.joint_displacement[state]
    parts = _against_limit(check, say) | {
        name: say.plain(float(moved[joints[str(mark)]]), "displacement", unit=True)
        for name, mark in (("start", check.start), ("end", check.end))
    }
    alt = tr("utilisation = |u at {to} − u at {of}| / limit = |{end} − ({start})| / {limit} = {utilisation}")
    spoken = alt.format(to=check.end, of=check.start, **parts)
    yield formulas([formula(tr("utilisation"), "relative_numbers", spoken, **parts)])


def _worst_table(made: Iterable[Check], say: Readings) -> Block:
    """The largest utilisation of every segment and of every limit, worst first."""
    title = tr("Largest utilisation of each segment and limit, the worst first")
    return check_table(title, worst_first(made), say)


def _not_made(results: Results, say: Readings) -> Iterator[Block]:
    """What could not be checked, and what of it the engineer does without."""
    yield heading(tr("Not checked"), 2)
    missing = [f"{found.sentence}: {found.remedy}" for found in findings(results, say.units).not_made]
    if not missing and not any(check.waiver for check in results.checks):
        yield paragraph(tr("Every check of stresses and limits that the input asks for was made."))
    if missing:
        yield paragraph(tr("NOT CHECKED, and so not passed:"), "caution")
        yield bullets(missing)
    waived = list(waived_notes(results))
    if waived:
        yield paragraph(tr("WAIVED by the engineer, and so neither passed nor failed:"), "caution")
        yield bullets(waived)
