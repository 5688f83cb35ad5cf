"""The calc sheet read back: its numbers are those of the results, and no text can break it."""

from __future__ import annotations

import datetime as dt
import io
import json
import math
import re
from functools import lru_cache
from typing import Any

import hypothesis
import pytest
from hypothesis import given
from msgspec import UNSET, structs
from pypdf import PdfReader

from app.findings import findings
from app.phrases import caution
from app.project_file import dump, sha256
from app.results_file import results_json
from app.samples import names, read_sample
from app.sheet import build_sheet
from app.sheet.content import sheet_content
from app.sheet.short_names import with_short_names
from app.sheet.title import Origin, title_block
from app.words import use_language
from solver.model import (
    FORMAT,
    VERSION,
    Combination,
    DisplacementLimit,
    Display,
    FixedSupport,
    Joint,
    JointLoad,
    Limits,
    LoadCase,
    Material,
    Project,
    ReactionLimit,
    RelativeLimit,
    RoundSection,
    Segment,
    SegmentLoad,
    SheetTexts,
    SpringSupport,
)
from solver.solve import solve
from tests.members import waived
from tests.strategies import projects

DAY = dt.date(2026, 3, 14)
SYSTEMS = ("mm-N-MPa", "mm-kN-MPa", "m-kN-MPa", "in-lbf-psi", "in-kip-ksi")
HALF_A_DIGIT = 5.1e-5  # results are printed to five figures


def sheet(project: Project) -> PdfReader:
    pdf = build_sheet(project, solve(project, cases=False), file_name="member.barwright.json", date=DAY)
    return PdfReader(io.BytesIO(pdf))


@lru_cache
def sample_sheet(name: str) -> PdfReader:
    return sheet(read_sample(name))


def read(pdf: PdfReader) -> str:
    text = "\n".join(page.extract_text() for page in pdf.pages)
    return text.replace("\u202f", "").replace("−", "-")


def content(project: Project) -> dict[str, Any]:
    return sheet_content(project, solve(project, cases=False), Origin("f", "2026-03-14", "p", "0" * 64))


def numbers(line: str) -> list[float]:
    return [float(word) for word in line.split() if re.fullmatch(r"-?\d+(\.\d+)?", word)]


def in_units(project: Project, units: str, orientation: str = "horizontal") -> Project:
    return structs.replace(project, display=Display(units=units, orientation=orientation))


# --- the numbers ---


def test_the_segment_tables_hold_the_numbers_of_the_results_file() -> None:
    project = read_sample("tie_rod")  # in mm, N and MPa
    states = results_json(solve(project, cases=False))["combinations"]
    text = read(sample_sheet("tie_rod"))
    found = 0
    for state in states:
        part = text.partition(f"Combination {state['name']}\n")[2]
        for segment in state["segments"]:
            row = re.search(rf"^{segment['mark']} .*(passes|FAILS)$", part, re.MULTILINE)
            assert row, segment["mark"]
            start, end, most, most_at, least, least_at, used, used_at = numbers(row.group())
            assert [start, end] == pytest.approx(
                [segment["force_start"], segment["force_end"]], rel=HALF_A_DIGIT
            )
            assert [most, least] == pytest.approx(
                [segment["stress_max"] / 1e6, segment["stress_min"] / 1e6], rel=HALF_A_DIGIT
            )
            places = [segment[name] * 1e3 for name in ("stress_max_at", "stress_min_at", "utilisation_at")]
            assert [most_at, least_at, used_at] == pytest.approx(places, rel=1e-5, abs=1e-9)
            assert used == pytest.approx(segment["utilisation"], abs=0.00501)
            found += 1
    assert found == len(states) * len(project.segments)


def test_the_joint_tables_hold_displacements_and_reactions() -> None:
    project = read_sample("tie_rod")
    text = read(sample_sheet("tie_rod"))
    for state in results_json(solve(project, cases=False))["combinations"]:
        part = text.partition(f"Combination {state['name']}\n")[2].partition("Joints: displacement")[2]
        for joint in state["joints"]:
            row = re.search(rf"^{joint['mark']} .*$", part, re.MULTILINE)
            assert row, joint["mark"]
            _, x, u, *reaction = numbers(row.group())
            assert [x, u] == pytest.approx(
                [joint["position"] * 1e3, joint["displacement"] * 1e3], rel=HALF_A_DIGIT, abs=1e-12
            )
            expected = [] if joint["reaction"] is None else [joint["reaction"]]
            assert reaction == pytest.approx(expected, rel=HALF_A_DIGIT)


def formula_parts(project: Project) -> dict[str, dict[str, str]]:
    blocks = content(project)["blocks"]
    items = [item for block in blocks if block["kind"] == "formulas" for item in block["items"]]
    return {item["name"]: item["parts"] for item in items}


def value(text: str) -> float:
    number, _, unit = re.sub("\u202f", "", text).replace("−", "-").partition(" ")
    per_inch = {"lbf": 4.4482216152605, "kip": 4448.2216152605}
    units = {"": 1.0, "N": 1.0, "kN": 1e3, "MPa": 1e6, "mm": 1e-3, "m": 1.0, "mm²": 1e-6, "in": 0.0254}
    units |= {"in²": 0.0254**2, "psi": 4.4482216152605 / 0.0254**2, "ksi": 4448.2216152605 / 0.0254**2}
    return float(number) * (units | per_inch)[unit]


@pytest.mark.parametrize("units", SYSTEMS)
@pytest.mark.parametrize("name", ["hoist_shaft", "tie_rod"])
def test_the_governing_stress_can_be_redone_by_hand(name: str, units: str) -> None:
    project = in_units(read_sample(name), units)
    parts = formula_parts(project)
    governing = results_json(solve(project, cases=False))["governing"]
    used = {key: value(text) for key, text in parts[f"{governing['check']}_numbers"].items()}
    stress = {key: value(text) for key, text in parts["stress_numbers"].items()}
    assert stress["force"] / stress["area"] == pytest.approx(stress["stress"], rel=1e-5)
    assert stress["stress"] == pytest.approx(governing["value"], rel=1e-5)
    redone = abs(used["stress"]) / (used["factor"] * used["allowable"])
    assert redone == pytest.approx(used["utilisation"], abs=6e-5)
    assert redone == pytest.approx(governing["utilisation"], rel=1e-5)
    if "round_numbers" in parts:
        assert math.pi / 4 * value(parts["round_numbers"]["d"]) ** 2 == pytest.approx(
            stress["area"], rel=1e-6
        )


def test_the_governing_displacement_can_be_redone_by_hand() -> None:
    parts = formula_parts(read_sample("quay_pile"))["displacement_numbers"]
    assert abs(value(parts["value"])) / value(parts["limit"]) == pytest.approx(
        float(parts["utilisation"]), abs=6e-5
    )


def test_the_governing_reaction_and_relative_displacement_can_be_redone_by_hand() -> None:
    sample = read_sample("tie_rod")
    tight = structs.replace(sample, limits=Limits(reaction=(ReactionLimit(joint="0", limit=1e3),)))
    parts = formula_parts(tight)
    spring = parts["spring_numbers"]
    stiffness = float(spring["stiffness"].partition(" ")[0].replace("\u202f", "")) * 1e3  # N/mm
    redone = -stiffness * (value(spring["u"]) - value(spring["movement"]))
    assert redone == pytest.approx(value(spring["reaction"]), rel=1e-5)
    assert redone == pytest.approx(value(parts["reaction_numbers"]["value"]), rel=1e-5)
    close = structs.replace(sample, limits=Limits(relative=(RelativeLimit(start="3", end="6", limit=1e-5),)))
    parts = formula_parts(close)["relative_numbers"]
    moved = abs(value(parts["end"]) - value(parts["start"]))
    assert moved / value(parts["limit"]) == pytest.approx(float(parts["utilisation"]), rel=1e-5)


@pytest.mark.parametrize(
    ("length", "shown"),
    [(1.123456789, "1123.456789"), (1.1234567891, "1123.45679"), (1.1e-5 / 3, "0.00366666667")],
)
def test_inputs_are_printed_in_full_up_to_ten_digits(length: float, shown: str) -> None:
    project = read_sample("tie_rod")
    exact = structs.replace(project.segments[2], length=length)
    changed = structs.replace(project, segments=(*project.segments[:2], exact, *project.segments[3:]))
    rows = next(
        b["rows"] for b in content(changed)["blocks"] if b.get("title", "").startswith("Segments, along")
    )
    assert rows[2][2] == shown


def test_numbers_are_laid_out_as_in_the_window_and_read_back_from_the_paper() -> None:
    sample = read_sample("tie_rod")
    tables = {b["title"]: b["rows"] for b in content(sample)["blocks"] if b["kind"] == "table"}
    modulus, expansion = tables["Materials"][0][1:3]
    assert (modulus, expansion) == ("210\u202f000", "1.2·10⁻⁵")
    paper = "\n".join(page.extract_text() for page in sample_sheet("tie_rod").pages)
    assert f"{modulus} {expansion}" in paper
    shown = json.dumps(content(sample), ensure_ascii=False)
    texts = re.sub(r'"(svg|fingerprint)": ("[^"\\]*(\\.[^"\\]*)*"|\[[^]]*\])', "", shown)
    assert not re.search(r"(?<![.\d])\d{5}|\de[-−]?\d", texts), "a number without spaces or with an e"


def test_what_is_not_covered_stands_among_what_is_not_checked() -> None:
    def unchecked(project: Project) -> list[dict[str, Any]]:
        blocks = content(project)["blocks"]
        start = next(i for i, block in enumerate(blocks) if block.get("text") == "Not checked")
        end = next(i for i, block in enumerate(blocks) if block.get("text") == "Notes")
        return blocks[start + 1 : end]

    (made,) = unchecked(read_sample("hoist_shaft"))
    assert made["text"].startswith("Every check")
    loose = read_sample("hoist_shaft")
    loose = structs.replace(
        loose, joints=tuple(structs.replace(joint, lateral=UNSET) for joint in loose.joints)
    )
    caution, listed = unchecked(loose)
    assert caution["text"].startswith("NOT CHECKED")
    (stability,) = listed["items"]
    assert stability.startswith("Not checked: stability, no joint is held sideways")
    caution, listed = unchecked(waived(loose, "guided in its bearings"))
    assert caution["text"].startswith("WAIVED by the engineer")
    assert listed["items"][0].endswith(": guided in its bearings")
    bare = loose
    materials = tuple(structs.replace(m, allowable_compression=UNSET) for m in bare.materials)
    caution, listed = unchecked(structs.replace(bare, materials=materials))
    assert listed["items"][-1] == stability
    assert len(listed["items"]) > 1


@pytest.mark.parametrize("ratio", [1.3, 1.0004, 1.00000004, 1.0000000021, 0.99999998, 0.9996, 0.7])
def test_number_and_verdict_agree_where_they_are_close(ratio: float) -> None:
    (moved,) = solve(small(limit=1.0)).solution.joint_displacement[0][1:]
    blocks = content(small(limit=float(moved) / ratio))["blocks"]
    row = [block["rows"] for block in blocks if block.get("title") == "Limits"][-1][0]
    shown, limit, used = (float(text.partition(" ")[0]) for text in row[4:7])
    assert (shown > limit) == (ratio > 1)
    assert (used > 1) == (ratio > 1)
    assert row[7] == ("FAILS" if ratio > 1 else "passes")


def small(limit: float) -> Project:
    return Project(
        format=FORMAT,
        version=VERSION,
        materials=(Material(name="Steel", modulus=2.1e11),),
        joints=(Joint(mark="wall", support=FixedSupport()), Joint(mark="end")),
        segments=(Segment(mark="A", length=1.0, material="Steel", section=RoundSection(diameter=0.02)),),
        load_cases=(LoadCase(name="pull", joint_loads=(JointLoad(joint="end", force=1e4),)),),
        limits=Limits(displacement=(DisplacementLimit(joint="end", limit=limit),)),
    )


# --- what must stand on every sheet ---


@pytest.mark.parametrize("name", names())
def test_every_page_has_the_caution_and_its_number(name: str) -> None:
    pdf = sample_sheet(name)
    count = len(pdf.pages)
    assert count <= 12
    for number, page in enumerate(pdf.pages, 1):
        text = " ".join(page.extract_text().split())
        assert caution() in text
        assert f"Page {number} of {count}" in text


def test_only_supports_move_and_what_stands_beside_its_name_does_not_say_it_again() -> None:
    sample = read_sample("tie_rod")
    limits = Limits(relative=(RelativeLimit(start="3", end="6", limit=1e-3),))
    blocks = content(structs.replace(sample, limits=limits))["blocks"]
    (limit,) = next(block["rows"] for block in blocks if block.get("title") == "Limits")
    assert limit[0] == "Relative displacement of joints 3 to 6"
    checks = [row for block in blocks if block["kind"] == "table" for row in block["rows"] if len(row) == 8]
    assert "relative displacement" in {row[1] for row in checks}
    facts = [row for block in blocks if block["kind"] == "facts" for row in block["rows"]]
    bounds = [value for name, value in facts if name == "Numerical error"]
    assert len(bounds) == 3
    assert all(value.startswith("at most ") for value in bounds)


@pytest.mark.parametrize("name", names())
def test_title_block_and_attachment_tell_where_the_sheet_comes_from(name: str) -> None:
    project, pdf = read_sample(name), sample_sheet(name)
    first = pdf.pages[0].extract_text()
    expected = (project.title, project.sheet.job, project.sheet.author, project.sheet.revision)
    for text in (*expected, project.sheet.date, "2026-03-14", "member.barwright.json", sha256(project)):
        assert text in first
    assert pdf.attachments["project.barwright.json"] == [dump(project)]
    assert pdf.metadata is not None
    assert pdf.metadata.title == project.title


@pytest.mark.parametrize("name", names())
def test_the_sheet_is_tagged_and_archival(name: str) -> None:
    root = sample_sheet(name).trailer["/Root"]
    assert root["/MarkInfo"]["/Marked"]
    metadata = root["/Metadata"].get_data().decode()
    assert "<pdfaid:part>3</pdfaid:part>" in metadata
    assert "<pdfuaid:part>1</pdfuaid:part>" in metadata


def test_a_failure_stands_on_the_first_page_and_beside_its_numbers() -> None:
    pdf = sample_sheet("tie_rod")
    assert "Does not pass" in pdf.pages[0].extract_text()
    tables = [block for block in content(read_sample("tie_rod"))["blocks"] if block["kind"] == "table"]
    failing = [[row[0] for row in table["rows"] if row[-1] == "FAILS"] for table in tables]
    assert ["D", "F"] in failing
    assert ["segment D", "segment F"] in failing
    for table in tables:  # stressed in the eye where the word says so, and nowhere else
        assert table["strong"] == [i for i, row in enumerate(table["rows"]) if row[-1] == "FAILS"]
    assert read(pdf).count("FAILS") == sum(map(len, failing))


def test_what_a_critical_factor_is_not_stands_beside_it() -> None:
    text = " ".join(read(sample_sheet("quay_pile")).split())
    assert text.count("elastic critical load, without imperfections: it is not a design resistance") == 2
    assert "no slip limit" in text


def test_what_was_not_checked_never_reads_as_passed() -> None:
    project = read_sample("hoist_shaft")
    bare = tuple(structs.replace(m, allowable_tension=UNSET) for m in project.materials)
    text = read(sheet(structs.replace(project, materials=bare)))
    assert "NOT CHECKED, and so not passed" in text
    assert re.search(r"^A .*NOT CHECKED$", text, re.MULTILINE)
    assert not re.search(r"^A .*passes$", text.partition("Combination Cold start\n")[2][:3000], re.MULTILINE)


def test_a_member_without_any_load_or_limit_prints() -> None:
    bare = structs.replace(small(1.0), load_cases=(), limits=Limits())
    text = read(sheet(bare))
    assert "There are no load cases: the member is unloaded." in text
    assert "Nothing checked" in text


def test_same_project_and_date_give_the_same_bytes() -> None:
    project = read_sample("hoist_shaft")
    results = solve(project)
    first, second = (build_sheet(project, results, file_name="f", date=DAY) for _ in range(2))
    assert first == second
    assert first != build_sheet(project, results, file_name="f", date=dt.date(2026, 3, 15))
    made = PdfReader(io.BytesIO(first)).metadata
    assert made is not None
    assert made.creation_date == dt.datetime(2026, 3, 14, tzinfo=dt.UTC)  # the clock was not asked


@pytest.mark.parametrize(
    ("units", "orientation"), list(zip(SYSTEMS, ["vertical", "horizontal"] * 3, strict=False))
)
def test_every_unit_system_and_layout_prints(units: str, orientation: str) -> None:
    pdf = sheet(in_units(read_sample("hoist_shaft"), units, orientation))
    force = {"mm-N-MPa": "N", "in-lbf-psi": "lbf", "in-kip-ksi": "kip"}.get(units, "kN")
    assert f"force {force}," in read(pdf)
    paper = 612 if units.startswith("in-") else 595
    assert int(pdf.pages[0].mediabox.width) == paper
    assert len(pdf.pages) <= 14


# --- texts that want to be more than texts ---

HOSTILE = (
    '#set page(fill: red) *bold* _x_ $a^2$ `raw` <lab> @ref // c #panic("x") \\u{41}',
    "<b>&amp;</b><script>alert(1)</script>]]>",
    "\U0001f600 emoji 漢字 \u202eright\u202c עברית العربية",
    "a\x00b\x07c\nnew line\ttab",
    "W" * 10_000,
    "x " * 5_000,
    "é" * 50 + "\u0301" * 500,
    "⚆Ȃ ẘ∹ ❈ấ ⋄ǭ",
)


def hostile(kind: str, index: int) -> str:
    return f"{HOSTILE[(index + len(kind)) % len(HOSTILE)]} {kind}{index}"


def many(count: int, combinations: int, name: Any, orientation: str = "horizontal") -> Project:
    ends = {0: FixedSupport(), count: SpringSupport(stiffness=3e8)}
    return Project(
        format=FORMAT,
        version=VERSION,
        title=name("title", 0),
        notes="\n".join(HOSTILE) if name is hostile else "",
        sheet=SheetTexts(*(name("sheet", i) for i in range(5))),
        display=Display(orientation=orientation),
        materials=(Material(name=name("M", 0), modulus=2.1e11, density=7850.0, allowable_compression=1.6e8),),
        joints=tuple(Joint(mark=name("J", i), support=ends.get(i, UNSET)) for i in range(count + 1)),
        segments=tuple(
            Segment(
                mark=name("S", i),
                length=0.1 + 0.05 * (i % 5),
                material=name("M", 0),
                section=RoundSection(diameter=0.05, diameter_end=0.06),
                bedding=float(i % 3) * 1e6,
            )
            for i in range(count)
        ),
        load_cases=tuple(
            LoadCase(
                name=name("C", c),
                gravity=-9.81 * (c == 0),
                segment_loads=tuple(
                    SegmentLoad(
                        segment=name("S", i), load_start=1e3, load_end=2e3, temperature_start=10.0 * c
                    )
                    for i in range(c, count, 2)
                ),
                joint_loads=tuple(JointLoad(joint=name("J", i), force=2e4) for i in range(1, count, 3)),
            )
            for c in range(2)
        ),
        combinations=tuple(
            Combination(name=name("K", k), factors={name("C", 0): 1.0, name("C", 1): 0.1 * k})
            for k in range(combinations)
        ),
        limits=Limits(relative=(RelativeLimit(start=name("J", 0), end=name("J", count), limit=1e-3),)),
    )


@pytest.mark.parametrize("orientation", ["horizontal", "vertical"])
def test_hostile_texts_stay_texts(orientation: str) -> None:
    project = many(8, 2, hostile, orientation)
    pdf = sheet(project)
    text = " ".join(read(pdf).split())
    assert HOSTILE[0] in text
    assert HOSTILE[1] in text
    assert "[U+1F600] emoji [U+6F22][U+5B57] [U+202E]right[U+202C]" in text
    assert "a[U+0000]b[U+0007]c new line tab" in text
    assert text.replace(" ", "").count("W") >= 10_000
    assert text.count("x x x") > 1_000
    assert "[U+0301]" in text
    assert not set(text) & set("\u200b\u200e")
    assert len(pdf.pages) <= 24
    assert pdf.attachments["project.barwright.json"] == [dump(project)]


def test_a_long_member_pages_well() -> None:
    pdf = sheet(many(40, 10, lambda kind, index: f"{kind}{index}"))
    assert len(pdf.pages) <= 36
    pages = [page.extract_text() for page in pdf.pages]
    rows = [page for page in pages if re.search(r"^S\d+ .*(passes|FAILS|NOT CHECKED)$", page, re.MULTILINE)]
    assert len(rows) >= 10
    assert all("Utilisation" in page for page in rows)  # the head is repeated on every page


@hypothesis.settings(max_examples=10)
@given(projects())
def test_any_project_prints(project: Project) -> None:
    pdf = sheet(project)
    assert pdf.attachments["project.barwright.json"] == [dump(project)]
    assert f"Page 1 of {len(pdf.pages)}" in pdf.pages[0].extract_text()


def test_a_sheet_of_a_changed_project_does_not_claim_to_be_the_files() -> None:
    project = read_sample("tie_rod")
    texts = [
        json.dumps(title_block(project, Origin("a.json", "2026-01-01", "p", "0", changed=changed)))
        for changed in (False, True)
    ]
    assert "SHA-256 of the project as saved" in texts[0]
    assert "changed since it was saved" not in texts[0]
    assert "a.json, changed since it was saved" in texts[1]
    assert "project as saved" not in texts[1]
    assert "SHA-256 of the project as printed, in the form in which it is saved" in texts[1]


def test_loads_stand_in_the_order_of_the_chain_and_an_unused_material_is_marked() -> None:
    project = read_sample("tie_rod")
    case = project.load_cases[0]
    marks = [segment.mark for segment in project.segments]
    loads = tuple(SegmentLoad(mark, 100.0) for mark in reversed(marks))
    idle = structs.replace(project.materials[0], name="Idle")
    changed = structs.replace(
        project,
        materials=(*project.materials, idle),
        load_cases=(structs.replace(case, segment_loads=loads), *project.load_cases[1:]),
    )
    said = content(changed)["blocks"]
    tables = {block["title"]: block for block in reversed(said) if block["kind"] == "table"}
    assert [row[0] for row in tables["On segments"]["rows"]] == marks
    names = [row[0] for row in tables["Materials"]["rows"]]
    assert names == [*(m.name for m in project.materials), "Idle (not used)"]


def test_the_name_of_the_unloaded_state_is_in_the_language_of_the_sheet() -> None:
    project = structs.replace(read_sample("tie_rod"), load_cases=(), combinations=())
    use_language("de")
    try:
        shown = with_short_names(solve(project, cases=False))
        found = str(sheet_content(shown.project, shown, Origin("f", "2026-03-14", "p", "0" * 64)))
        said = str(findings(shown, "mm-N-MPa"))
    finally:
        use_language("en")
    assert "in Unloaded" not in said
    assert "Unloaded" not in found
    assert "Unbelastet" in found


def test_stability_has_its_chapter_with_factor_and_shape() -> None:
    blocks = content(read_sample("loft_column"))["blocks"]
    start = next(i for i, block in enumerate(blocks) if block.get("text") == "Stability")
    end = next(i for i, block in enumerate(blocks) if block.get("text") == "Checks")
    chapter = blocks[start:end]
    (rows,) = [block["rows"] for block in chapter if block["kind"] == "table"]
    assert [(row[0], row[3], row[6], row[7]) for row in rows] == [
        ("Full use", "4.25", "≥ 4", "0.94"),
        ("Winter, full", "4.25", "≥ 4", "0.94"),
        ("Empty", "8.06", "≥ 4", "0.50"),
    ]
    (shape,) = [block for block in chapter if block["kind"] == "figure"]
    assert "A shape only" in shape["caption"]
    hand = next(block for block in blocks[end:] if block["kind"] == "formulas")
    assert hand["items"][0]["name"] == "stability_numbers"
