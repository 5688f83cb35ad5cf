"""What is said of bonded parts: findings, results file, terminal, calc sheet, notes, and no cure for them."""

from __future__ import annotations

import json

import numpy as np
import pytest
from msgspec.structs import replace
from numpy.testing import assert_allclose

from app.cures import failing
from app.cures.changes import section_knobs
from app.drawing.bonded import bonded_text, layers_around, layers_inside, outer_of
from app.drawing.overlay import graded
from app.drawing.rows import thickest
from app.drawing.shapes import Part as Shown
from app.drawing.tips import tip
from app.findings import findings
from app.results_file import results_json
from app.sheet.content import sheet_content
from app.sheet.short_names import with_short_names
from app.sheet.title import Origin
from app.terminal import report
from solver.checks import STRESSES
from solver.model import (
    AreaSection,
    BondedPart,
    Display,
    FixedSupport,
    JointLoad,
    Material,
    RoundSection,
    Segment,
    SegmentLoad,
    TubeSection,
)
from solver.solve import solve
from tests.drawn_members import drawn
from tests.members import Part as Of
from tests.members import case, member

CONCRETE = Material("Concrete", 30e9, 1e-5, 2400.0, 2e6, 15e6)
STEEL = Material("Steel", 200e9, 1.2e-5, 7850.0, 160e6, 160e6)
COLUMN = Segment(
    "A", 3.0, "Concrete", AreaSection(area=0.1), bonded=(BondedPart("Steel", AreaSection(area=2e-3)),)
)


def column(*, steel=STEEL, load=-1.2e6, rise=0.0, gravity=0.0):
    """Concrete with steel in it, and a plain bar of steel on top."""
    pushed = case(
        gravity=gravity,
        on_segments=[SegmentLoad("A", temperature_start=rise)] if rise else [],
        on_joints=[JointLoad("1", force=load)] if load else [],
    )
    bare = member([Of(1.0, AreaSection(area=1.0)), Of(1.0, RoundSection(diameter=0.1))], {0: FixedSupport()})
    top = Segment("B", 1.0, "Steel", RoundSection(diameter=0.1))
    return replace(bare, materials=(CONCRETE, steel), segments=(COLUMN, top), load_cases=(pushed,))


def test_findings_name_the_part_and_show_its_own_scale():
    found = findings(solve(column()), "mm-N-MPa")
    (worst,) = found.segments
    n = 200 / 30
    concrete = 1.2e6 / (0.1 + n * 2e-3)
    assert worst.mark == "A"
    assert worst.sentence.startswith("A, part 1, Concrete: 10.6 of 15 MPa in compression")
    assert worst.short.startswith("part 1, Concrete: 10.6 of 15 MPa")
    assert_allclose(worst.band.compression, -15e6)
    weak = findings(solve(column(steel=replace(STEEL, allowable_compression=50e6))), "mm-N-MPa")
    (worst,) = weak.segments
    assert worst.short.startswith("part 2, Steel: 70.6 of 50 MPa")
    assert_allclose([worst.band.compression, worst.band.low], [-50e6, -n * concrete])
    assert weak.detail.startswith("Largest utilisation 1.41: segment A, part 2, Steel")


def test_a_part_without_allowable_is_named_by_its_material():
    results = solve(column(steel=replace(STEEL, allowable_compression=CONCRETE.allowable_tension)))
    bare = structs_without(results.project, "allowable_compression")
    found = findings(solve(bare), "mm-N-MPa")
    (missing,) = [item for item in found.not_made if item.reason == "no_allowable_compression"]
    assert missing.material == "Steel"
    assert "Steel" in missing.remedy
    assert found.verdict == "incomplete"


def structs_without(project, key):
    from msgspec import UNSET

    own = tuple(replace(m, **{key: UNSET}) if m.name == "Steel" else m for m in project.materials)
    return replace(project, materials=own)


def test_the_results_file_has_the_parts_where_there_are_some():
    results = solve(column())
    values = results_json(results)
    json.dumps(values, allow_nan=False)
    first, second = values["combinations"][0]["segments"]
    assert [part["material"] for part in first["parts"]] == ["Concrete", "Steel"]
    assert first["parts"][0]["stress_min"] == first["stress_min"]
    assert list(first["parts"][1]) == [
        "material",
        "stress_max",
        "stress_max_at",
        "stress_min",
        "stress_min_at",
        "utilisation",
        "utilisation_at",
    ]
    assert "parts" not in second
    stresses = [check for check in values["checks"] if check["check"] in STRESSES]
    assert [(check["part"], check["material"]) for check in stresses] == [(0, "Concrete"), (1, "Steel")]


def test_the_terminal_has_a_row_for_each_part():
    project = column()
    text = report(project, solve(project, cases=False), "column.barwright.json")
    rows = [line.rsplit(maxsplit=1) for line in text.splitlines()]
    assert ["A, part 1, Concrete", "0.71"] in rows
    assert ["A, part 2, Steel", "0.44"] in rows
    assert ["B", "–"] in rows


def content(project):
    results = with_short_names(solve(project, cases=False))
    return sheet_content(results.project, results, Origin("column", "", "", "", changed=False))


@pytest.mark.parametrize("limit", [15e6, 50e6])
def test_the_sheet_computes_the_governing_part_by_hand(limit):
    steel = replace(STEEL, allowable_compression=limit * 10 if limit == 15e6 else limit)
    text = json.dumps(content(column(steel=steel, rise=20.0)), ensure_ascii=False)
    assert "part_rigidity_numbers" in text
    assert "Bonded parts: stress and utilisation of each" in text
    assert "Bonded parts share the strain" in text


def test_by_hand_the_numbers_of_the_sheet_give_the_stress():
    found = [
        f
        for block in content(in_kilonewtons(column(rise=20.0)))["blocks"]
        if block["kind"] == "formulas"
        for f in block["items"]
    ]
    (stress,) = [f["parts"] for f in found if f["name"] == "part_numbers"]
    modulus, force, rigidity, free, shown = (
        number(stress[k]) for k in ("modulus", "force", "rigidity", "free", "stress")
    )
    assert_allclose(modulus * (force / rigidity + free * 1e-6), shown, rtol=1e-5)
    rigidities = [number(f["parts"]["rigidity"]) for f in found if f["name"] == "part_rigidity_numbers"]
    assert_allclose(sum(rigidities), rigidity, rtol=1e-6)


def in_kilonewtons(project):
    return replace(project, display=Display(units="mm-kN-MPa"))


def number(text):
    """The number of a text with its unit, or times a power of ten."""
    kept = text.replace("\u202f", "").replace("\u00a0", " ").replace("−", "-")
    digits = kept.split("·")[0].split("MPa")[0].split(" kN")[0]
    return float("".join(c for c in digits if c in "0123456789.-"))


def test_long_names_are_cut_in_the_parts_too():
    long = "Steel of a name that is much too long for any table of any sheet"
    project = column()
    bonded = (BondedPart(long, COLUMN.bonded[0].section),)
    top = replace(project.segments[1], material=long)
    renamed = replace(
        project,
        materials=(CONCRETE, replace(STEEL, name=long)),
        segments=(replace(COLUMN, bonded=bonded), top),
    )
    short = with_short_names(solve(renamed))
    name = short.project.materials[1].name
    assert len(name) < len(long)
    assert short.parts.material == ("Concrete", name, name)
    assert [c.material for c in short.checks if c.check in STRESSES] == ["Concrete", name]


def test_a_part_without_density_is_noted_under_gravity():
    notes = findings(solve(column(steel=replace(STEEL, density=0.0), gravity=-9.81)), "mm-N-MPa").notes
    assert any("leaves out a part of A" in note for note in notes)
    assert not any("leaves out" in note for note in findings(solve(column(gravity=-9.81)), "mm-N-MPa").notes)


def test_no_cure_changes_a_section_with_parts_bonded_to_it():
    project = column(steel=replace(STEEL, allowable_compression=50e6))
    assert failing(solve(project))
    assert section_knobs(project, 0) == ()
    assert section_knobs(project, 1)


def test_colours_show_what_parts_hold_against_each_other():
    results = solve(column(load=0.0, rise=60.0))
    assert np.abs(results.segments.force_max).max() < 1.0
    shown = graded(results, 0, "stress")
    assert shown is not None
    assert np.abs(shown.value).max() > 1e5
    assert results.checks


def test_layers_lie_around_and_inside_by_their_thickness():
    cladding = BondedPart("Steel", TubeSection(outer=0.4, inner=0.38))
    core = BondedPart("Steel", RoundSection(diameter=0.05))
    segment = replace(COLUMN, section=RoundSection(diameter=0.38), bonded=(core, cladding))
    assert layers_around(segment) == [cladding.section]
    assert layers_inside(segment) == [core.section]
    assert outer_of(segment, 0.5) == pytest.approx(0.2)
    shown = drawn(replace(column(), segments=(segment, column().segments[1])))
    assert thickest(shown) == pytest.approx(0.2)
    assert "bonded: Steel ⌀50; Steel ⌀400×10" in tip(shown, Shown("segment", 0))
    assert bonded_text((), "mm-N-MPa") == ""
