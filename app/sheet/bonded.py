"""Bonded parts on the sheet: the formulas they add, their stresses by state, and one by hand."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from app.numerals import reading
from app.phrases.segments import part_words
from app.sheet.blocks import Block, Value, column, formula, table
from app.sheet.readings import NOTHING, Readings
from app.sheet.verdicts import status_word
from app.units import utilisation_text
from app.words import tr
from solver.checks import Check
from solver.model import Material, Project, parts_of
from solver.results import PartResults, Results
from solver.sections import area_at, area_coefficients

_MICRO = 1e6


def is_bonded(project: Project) -> bool:
    """Whether any segment has bonded parts."""
    return any(segment.bonded for segment in project.segments)


def bonded_formulas() -> Iterator[dict[str, Value]]:
    """What is computed otherwise where several parts share a segment's strain."""
    yield formula(
        tr("bonded parts, together"),
        "bonded",
        tr("E A equals the sum of E i A i, E A ε₀ the sum of E i A i ε₀ i, ε₀ i equals α i ΔT plus λ over L"),
    )
    yield formula(
        tr("stress of part i"), "part_stress", tr("σ i equals E i times N over E A plus ε₀ minus ε₀ i")
    )
    yield formula(
        tr("strain energy U"),
        "part_energy",
        tr(
            "2 U equals ∫ q u plus Σ P u plus Σ R δ minus the sum over the parts of ∫ N i ε₀ i, N i = σ i A i"
        ),
    )


def part_table(results: Results, parts: PartResults, state: int, say: Readings) -> Block:
    """The stress and utilisation of every part of the segments with bonded ones, in one state."""
    length, stress = say.unit("length"), say.unit("stress")
    columns = [
        column(tr("Segment"), align="left"),
        column(tr("Part"), align="left"),
        column(tr("Material"), align="left"),
        column(tr("σ largest"), stress),
        column(tr("at x"), length),
        column(tr("σ smallest"), stress),
        column(tr("at x"), length),
        column(tr("Utilisation")),
        column(tr("at x"), length),
        column(tr("Check"), align="left"),
    ]
    order = [
        part
        for index, segment in enumerate(results.project.segments)
        if segment.bonded
        for part in parts.of_segment(index).tolist()
    ]
    rows = [_part_row(results, parts, state, part, say) for part in order]
    failing = [row for row, part in enumerate(order) if _status(results, parts, state, part) == "fail"]
    return table(tr("Bonded parts: stress and utilisation of each"), columns, rows, strong=failing)


def _part_row(results: Results, parts: PartResults, state: int, part: int, say: Readings) -> list[str]:
    most = float(np.max(np.abs([parts.stress_max[state], parts.stress_min[state]])))
    status = _status(results, parts, state, part)
    used = float(parts.utilisation[state, part])
    place = [NOTHING, NOTHING]
    if not np.isnan(used):
        number = utilisation_text(used, "fail" if status == "fail" else "pass")
        place = [number, say.plain(float(parts.utilisation_at[state, part]), "length", digits=6)]
    return [
        results.project.segments[parts.segment[part]].mark,
        str(int(parts.number[part]) + 1),
        parts.material[part],
        say.read(float(parts.stress_max[state, part]), "stress", beside=most),
        say.plain(float(parts.stress_max_at[state, part]), "length", digits=6),
        say.read(float(parts.stress_min[state, part]), "stress", beside=most),
        say.plain(float(parts.stress_min_at[state, part]), "length", digits=6),
        *place,
        status_word(status) if status else tr("no stress"),
    ]


def _status(results: Results, parts: PartResults, state: int, part: int) -> str:
    """The worst of the part's checks in the state; empty where it has none."""
    of = results.project.segments[parts.segment[part]].mark, int(parts.number[part])
    name = results.states[state].name
    found = {c.status for c in results.checks if (c.segment, c.part) == of and c.combination == name}
    return next((status for status in ("fail", "not_made", "pass") if status in found), "")


def part_by_hand(
    results: Results, check: Check, state: int, place: int, s: float, force: float, say: Readings
) -> list[dict[str, Value]]:
    """The stress of a part from the axial force, at the fraction s of its segment."""
    segment = results.project.segments[place]
    named = {material.name: material for material in results.project.materials}
    materials = [named[part.material] for part in parts_of(segment)]
    areas = [float(area_at(np.array(area_coefficients(p.section)), np.array(s))) for p in parts_of(segment)]
    rigidity = sum(m.modulus * a for m, a in zip(materials, areas, strict=True))
    own = materials[int(check.part or 0)]
    excess = sum(m.modulus * a * (m.expansion - own.expansion) for m, a in zip(materials, areas, strict=True))
    first, last = results.loads.temperature[state, place]
    rise = float(first) * (1 - s) + float(last) * s
    return [
        *_rigidities(materials, areas, say),
        _free(excess * rise / rigidity, rise, say),
        _stress(own, excess * rise / rigidity, rigidity, force, check, say),
    ]


def _rigidities(materials: list[Material], areas: list[float], say: Readings) -> Iterator[dict[str, Value]]:
    """One line for each part and one for their sum: all in one would run over the sheet's edge."""
    for number, (material, area) in enumerate(zip(materials, areas, strict=True)):
        parts = {
            "modulus": say.exact(material.modulus, "modulus", unit=True),
            "area": say.plain(area, "area", unit=True),
            "rigidity": say.plain(material.modulus * area, "force", unit=True),
        }
        alt = tr("E A of the part = {modulus} · {area} = {rigidity}").format(**parts)
        yield formula(part_words(number, material.name), "part_rigidity_numbers", alt, **parts)
    whole = sum(m.modulus * a for m, a in zip(materials, areas, strict=True))
    parts = {"rigidity": say.plain(whole, "force", unit=True)}
    alt = tr("E A = the sum over the parts = {rigidity}").format(**parts)
    yield formula(tr("together"), "rigidity_numbers", alt, **parts)


def _strain(value: float) -> str:
    return f"{reading(value * _MICRO, 7, strip=True)} · 10⁻⁶"


def _free(strain: float, rise: float, say: Readings) -> dict[str, Value]:
    parts = {"rise": say.plain(rise, "temperature", unit=True), "free": _strain(strain)}
    alt = tr("ε₀ − ε₀ of the part = ΔT · Σ E A (α − α of the part) / E A, ΔT = {rise}, = {free}")
    return formula(tr("hindered strain"), "free_numbers", alt.format(**parts), **parts)


def _stress(
    own: Material, strain: float, rigidity: float, force: float, check: Check, say: Readings
) -> dict[str, Value]:
    parts = {
        "modulus": say.exact(own.modulus, "modulus", unit=True),
        "force": say.plain(force, "force", unit=True),
        "rigidity": say.plain(rigidity, "force", unit=True),
        "free": _strain(strain),
        "stress": say.plain(float(check.value or 0.0), "stress", unit=True, digits=6),
    }
    alt = tr(
        "σ = E (N / E A + ε₀ − ε₀ of the part) = {modulus} · ({force} / {rigidity} + ({free})) = {stress}"
    )
    return formula(tr("stress"), "part_numbers", alt.format(**parts), **parts)
