"""The calc sheet of a member with companions: entered, in every state, by hand, left of the clamping."""

from __future__ import annotations

import json

from msgspec import structs

from app import edits
from app.samples import read_sample
from app.sheet.content import sheet_content
from app.sheet.short_names import with_short_names
from app.sheet.title import Origin
from solver.model import Endurance, FatigueRange
from solver.solve import solve
from tests.sleeves import draw_bolt


def content(project):
    results = with_short_names(solve(project))
    return sheet_content(results.project, results, origin())


def origin():
    from datetime import date
    from inspect import signature

    given = {"today": date(2030, 1, 2), "changed": False}
    names = signature(Origin).parameters
    return Origin(**{name: given.get(name, "") for name in names})


def tables(project):
    return {b["title"]: b for b in content(project)["blocks"] if b["kind"] == "table"}


def test_companions_are_listed_with_what_is_theirs():
    found = tables(draw_bolt())
    entered = found["Companions beside the member, each along +x"]["rows"]
    assert entered[0][:5] == ["S", "1 – 2", "compression only", "Sa", "140"]
    assert entered[1][:4] == ["", "", "", "Sb"]
    forces = found["Companions: axial force, and whether the far end has parted"]["rows"]
    assert forces[0][3] == "pressed"
    assert "Segments of companions: axial force, stress, utilisation" in found
    assert "Envelope by segment of companions" in found


def test_a_reaction_of_rounding_alone_reads_nothing():
    joints = [b for b in content(draw_bolt())["blocks"] if b.get("title", "").startswith("Joints: disp")]
    assert joints[0]["rows"][0][3] == "0"


def test_a_limited_reaction_and_a_peak_of_rounding_alone_read_nothing():
    found = [b for b in content(read_sample("capstan_shaft"))["blocks"] if b["kind"] == "table"]
    limits = next(b for b in found if b["title"] == "Limits" and b["columns"][0]["head"] == "Of")
    assert limits["rows"][1][:5] == ["joint 1", "reaction", "Drawn tight", "90 mm", "0"]
    peaks = next(b for b in found if b["title"].startswith("Shoulders: peak stress"))
    assert [row[2] for row in peaks["rows"]] == ["0", "0"]


def test_the_governing_check_of_a_sleeve_is_done_by_hand():
    weak = edits.set_value(draw_bolt(), ("materials", 1, "allowable_compression"), 5e7)
    said = json.dumps(content(weak), ensure_ascii=False)
    assert "Segment Sb at its end, x = 290 mm." in said
    assert "tube_numbers" in said
    assert "companion_compression" in said
    assert "least clamp force" in said


def test_long_marks_are_cut_with_all_that_names_them():
    long = edits.set_value(draw_bolt(), ("companions", 0, "segments", 0, "mark"), "lower sleeve of the stack")
    long = edits.set_value(long, ("companions", 0, "mark"), "stack of sleeves about the bolt")
    rows = tables(long)["Companions beside the member, each along +x"]["rows"]
    assert len(rows[0][0]) <= 18
    assert len(rows[0][3]) <= 18


def test_fatigue_of_a_sleeve_is_listed_and_done_by_hand_where_it_governs():
    lines = {"Steel": Endurance(amplitude=4e8, ultimate=9e8), "Brass": Endurance(amplitude=5e6, ultimate=3e8)}
    bolt = draw_bolt()
    materials = tuple(structs.replace(m, endurance=lines[m.name]) for m in bolt.materials)
    swinging = structs.replace(bolt, materials=materials, fatigue=(FatigueRange("Tight", "Pulled"),))
    rows = tables(swinging)["Fatigue, Tight to Pulled"]["rows"]
    assert [row[0] for row in rows] == [f"segment {mark}" for mark in ("A", "B", "C", "Sa", "Sb")]
    assert rows[4][1] == "290"  # its far end, the thinner one, along the member
    said = json.dumps(content(swinging), ensure_ascii=False)
    assert "Segment Sb at x = 290 mm." in said
    assert "endured_numbers" in said
