"""Figures: plain SVG, nothing outside the frame, nothing on top of each other, marks beside the colours."""

from __future__ import annotations

import re
from itertools import combinations
from xml.etree import ElementTree
from xml.sax.saxutils import unescape

import hypothesis
import numpy as np
import pytest
from hypothesis import given
from msgspec import UNSET, structs
from msgspec.structs import replace

from app.drawing.member import Member
from app.drawing.shapes import Box
from app.samples import names, read_sample
from app.sheet import colours
from app.sheet.figures import Figure, envelope_figure, member_figure, state_figure
from app.sheet.member_figure import _frame, drawn_positions
from app.sheet.printable import printable_in_figure
from app.sheet.strips import Strip, _with_crossings
from app.sheet.strips import _scale as _scale_of
from app.sheet.svg import Canvas, Ink, text_width
from solver.model import (
    Display,
    FixedSupport,
    JointLoad,
    Limits,
    LoadCase,
    Orientation,
    Project,
    SpringSupport,
)
from solver.results import Results
from solver.solve import solve
from tests.drawn_members import busy_member, uneven_member
from tests.strategies import projects

SVG = "{http://www.w3.org/2000/svg}"


def parsed(svg: str) -> ElementTree.Element:
    return ElementTree.fromstring(svg)  # noqa: S314 - our own figure, not a stranger's


def turned(project: Project, orientation: str) -> Project:
    return structs.replace(project, display=structs.replace(project.display, orientation=orientation))


def texts(figure: Figure) -> list[str]:
    return [element.text or "" for element in parsed(figure.svg).iter(f"{SVG}text")]


def points(figure: Figure) -> list[tuple[float, float]]:
    found = []
    for path in parsed(figure.svg).iter(f"{SVG}path"):
        numbers = [float(n) for n in re.findall(r"-?\d+\.?\d*", path.get("d", ""))]
        found += list(zip(numbers[::2], numbers[1::2], strict=True))
    return found


def figures(results: Results) -> list[Figure]:
    return [
        member_figure(results.project, results.position, results.loads, 0),
        member_figure(results.project, results.position, results.loads, 0, chain=False),
        state_figure(results, 0),
        envelope_figure(results),
    ]


def test_what_is_not_to_scale_is_named_under_the_drawing() -> None:
    results = solve(uneven_member())
    note = member_figure(results.project, results.position).note
    assert "about 1:161, except S0, S2, S4, S5 and 3 others, drawn longer; depths" in note
    assert "S0, S2, S4, S5 and 3 others: not to scale along" in texts(state_figure(results, 0))


@pytest.mark.parametrize("layout", ["horizontal", "vertical"])
def test_drawing_and_strips_in_one_figure_share_the_ruler(layout: Orientation) -> None:
    project = uneven_member()
    project = replace(project, display=replace(project.display, orientation=layout))
    results = solve(project)
    whole = state_figure(results, 0, drawing=True)
    group = next(e for e in parsed(whole.svg).iter(f"{SVG}g") if "translate" in e.get("transform", ""))
    x, y, scale = map(float, re.findall(r"-?[\d.]+", group.get("transform", "")))
    member = Member(project, tuple(results.position.tolist()), None)
    drawn = _frame(member, whole=True).ruler
    upright = layout == "vertical"
    strips = drawn_positions(results.position.tolist(), 270.0 if upright else 420.0, upright=upright)
    for place in results.position.tolist():
        along = scale * drawn.pixel(place) + (y if upright else x)
        assert along == pytest.approx(strips.pixel(place) * (-1 if upright else 1), abs=0.1)
    said = " ".join(texts(whole)).split()
    assert {"u", "N", "σ", "S1"} <= set(said)


def test_the_words_of_a_figure_name_what_it_shows() -> None:
    results = solve(uneven_member())
    assert state_figure(results, 0, ("stress", "displacement")).alt.startswith("Strips of σ, stress; u, disp")
    whole = envelope_figure(results, ("force",), drawing=True)
    assert whole.alt.startswith("Drawing of the member")
    assert "Strips of N, axial force: envelope" in whole.alt
    assert whole.alt in unescape(whole.svg)
    assert "pick" not in " ".join(texts(whole))  # nothing can be picked on paper


def test_a_curve_that_ends_at_a_joint_and_changes_sign_elsewhere_is_drawn_whole() -> None:
    x = np.array([0.0, 1.0, 1.0, 2.0])
    value, over = np.array([-1.0, 1.0, np.nan, np.nan]), np.array([0.5, 1.5, 0.0, 0.0])
    crossed = _with_crossings(x, value, over)
    np.testing.assert_allclose(crossed[0], [0.0, 0.5, 0.5, 1.0, 1.0, 2.0], atol=1e-8)
    assert np.isfinite(crossed[1][:4]).all()


@pytest.mark.parametrize("orientation", ["horizontal", "vertical"])
@pytest.mark.parametrize("name", names())
def test_nothing_reaches_out_of_the_frame(name: str, orientation: str) -> None:
    for figure in figures(solve(turned(read_sample(name), orientation))):
        root = parsed(figure.svg)
        x, y, width, height = map(float, root.get("viewBox", "").split())
        size = float(root.get("width", "")), float(root.get("height", ""))
        assert size == pytest.approx((figure.width, figure.height), abs=0.01)
        assert width / height == pytest.approx(figure.width / figure.height, abs=1e-3)
        assert all(x <= px <= x + width and y <= py <= y + height for px, py in points(figure))


@hypothesis.settings(max_examples=15)
@given(projects())
def test_any_project_can_be_drawn(project: Project) -> None:
    for figure in figures(solve(project)):
        assert parsed(figure.svg).tag == f"{SVG}svg"
        drawn = re.sub(
            r"<text.*?</text>|aria-label=\"[^\"]*\"|aria-label='[^']*'", "", figure.svg, flags=re.DOTALL
        )
        assert not re.search("nan|inf", drawn)


def test_the_drawing_names_segments_loads_and_lengths() -> None:
    results = solve(read_sample("tie_rod"))
    state = results.state_index("Storm surge")
    shown = texts(member_figure(results.project, results.position, results.loads, state))
    loads = ("3.5 mm too short", "0.9 → 0.35 N/mm", "22000 N/mm", "moved +0.4 mm")
    for expected in ("A", "H", "1100", "⌀38", *loads):
        assert expected in [text.replace("\u202f", "") for text in shown], expected


@pytest.mark.parametrize("name", names())
def test_a_sample_loses_no_label_on_paper(name: str) -> None:
    results = solve(read_sample(name))
    for state in range(len(results.states)):
        for chain in (True, False):
            figure = member_figure(results.project, results.position, results.loads, state, chain=chain)
            assert "left out" not in figure.note


def test_labels_without_room_are_owned_up_to() -> None:
    results = solve(busy_member(40))
    assert "left out" in member_figure(results.project, results.position, results.loads, 0).note


@pytest.mark.parametrize("orientation", ["horizontal", "vertical"])
@pytest.mark.parametrize("count", [1, 12, 40])
def test_labels_of_the_drawing_stand_apart(count: int, orientation: str) -> None:
    results = solve(turned(busy_member(count), orientation))
    for chain in (True, False):
        root = parsed(member_figure(results.project, results.position, results.loads, 0, chain=chain).svg)
        boxes = [(e.text, line_box(e)) for e in root.iter(f"{SVG}text")]
        for (one, box), (other, second) in combinations(boxes, 2):
            assert not box.meets(second), (one, other)


def line_box(element: ElementTree.Element) -> Box:
    """The box of a line of text from its baseline to the height of a capital, as wide as it is set."""
    size, x, y = (float(element.get(key, "")) for key in ("font-size", "x", "y"))
    width = text_width(element.text or "", size)
    left = x - {"start": 0.0, "middle": 0.5, "end": 1.0}[element.get("text-anchor", "")] * width
    return Box(left, y - 0.7 * size, left + width, y)


def test_paper_marks_the_joints_and_brackets_what_is_warmed() -> None:
    """Nothing can be pointed at there."""
    results = solve(read_sample("hoist_shaft"))
    warm = results.state_index("Warm running")
    figure = member_figure(results.project, results.position, results.loads, warm)
    assert {joint.mark for joint in results.project.joints} <= set(texts(figure))
    brackets = [path for path in parsed(figure.svg).iter(f"{SVG}path") if is_bracket(path.get("d", ""))]
    assert len(brackets) == len(results.project.segments)  # each warmed otherwise


def is_bracket(steps: str) -> bool:
    """Four corners, of which the inner two are equally high and the outer two lower."""
    numbers = [float(n) for n in re.findall(r"-?\d+\.?\d*", steps)]
    return len(numbers) == 8 and "Z" not in steps and numbers[1] == numbers[7] > numbers[3] == numbers[5]


def test_long_marks_are_cut_in_the_drawing_and_whole_in_what_it_says() -> None:
    project = read_sample("tie_rod")
    first = structs.replace(project.segments[2], mark="Middle of the rod, forged")
    project = structs.replace(project, segments=(*project.segments[:2], first, *project.segments[3:]))
    figure = member_figure(project, np.cumsum([0.0, *(s.length for s in project.segments)]))
    assert [text for text in texts(figure) if text.startswith("Middle") and text.endswith("…")]
    assert "Middle of the rod, forged" in figure.alt


def test_a_stiffness_too_long_for_the_margin_stands_under_the_member() -> None:
    project = read_sample("tie_rod")
    first = structs.replace(project.joints[0], support=SpringSupport(stiffness=1.2e11))
    project = structs.replace(project, joints=(first, *project.joints[1:]))
    figure = member_figure(project, solve(project).position)
    shown = [text.replace("\u202f", "") for text in texts(figure)]
    assert any(text.startswith("12") and text.endswith("N/mm") for text in shown), shown
    assert "left out" not in figure.note


def test_the_drawing_turns_with_the_project() -> None:
    results = solve(read_sample("tie_rod"))
    across, upright = (
        member_figure(turned(results.project, way), results.position) for way in ("horizontal", "vertical")
    )
    assert across.width > across.height
    assert upright.height > upright.width


def test_equal_scales_are_said_to_be_equal() -> None:
    results = solve(read_sample("hoist_shaft"))
    assert member_figure(results.project, results.position).note.startswith("Drawn to scale")
    results = solve(read_sample("tie_rod"))
    assert "depths to a scale of their own" in member_figure(results.project, results.position).note


def test_signs_stand_beside_the_colours_and_hatching_beside_over_the_limit() -> None:
    results = solve(read_sample("hoist_shaft"))
    figure = state_figure(results, results.state_index("Warm running"))
    assert "−" in texts(figure)
    assert colours.COMPRESSION in figure.svg
    assert "url(#hatch" not in figure.svg
    results = solve(read_sample("tie_rod"))
    figure = state_figure(results, results.state_index("Storm surge"))
    assert "+" in texts(figure)
    assert figure.svg.count("url(#hatch") == 4  # two segments fail, in stress and in utilisation


def test_only_colours_of_the_table_are_used() -> None:
    table = {value for name, value in vars(colours).items() if name.isupper()} | {"#FFFFFF"}
    for figure in figures(solve(read_sample("quay_pile"))):
        assert set(re.findall(r"#[0-9A-Fa-f]{6}", figure.svg)) <= table


def test_a_hostile_name_stays_a_name() -> None:
    canvas = Canvas()
    canvas.text((0, 0), '</text><script>alert("x")</script>\U0001f600\x00')
    canvas.path([(0, 0), (1, 1)], Ink("#000000"))
    root = parsed(canvas.render('"/><x y="'))
    assert [element.tag for element in root] == [f"{SVG}defs", f"{SVG}text", f"{SVG}path"]
    assert root[1].text == '</text><script>alert("x")</script>[U+1F600][U+0000]'


def test_the_estimated_width_covers_the_text() -> None:
    # widths of Libertinus Serif as Typst measured them at 100 pt
    measured = {"0123456789": 465.0, "−560 → −400 kN/m": 809.4, "Spun concrete": 580.3, "WWWW": 387.6}
    for text, width in measured.items():
        assert width <= text_width(text, 100.0) <= 1.5 * width


def test_the_display_units_reach_the_figures() -> None:
    project = structs.replace(read_sample("tie_rod"), display=Display(units="in-kip-ksi"))
    results = solve(project)
    assert {"in", "kip", "ksi"} <= set(texts(state_figure(results, 0)))


def test_allowables_are_drawn_as_in_the_window() -> None:
    results = solve(read_sample("tie_rod"))
    state = results.state_index("Storm surge")
    assert {"allowable 198", "154"} <= set(texts(state_figure(results, state)))
    shown = envelope_figure(results)
    assert {"least allowable 180", "least 140"} <= set(texts(shown))
    assert shown.svg.count("url(#hatch") == 4  # where a state is over its own allowable, in σ and utilisation


def test_an_allowable_far_from_the_stress_is_named_at_the_edge() -> None:
    results = solve(read_sample("quay_pile"))
    (far,) = [text for text in texts(envelope_figure(results)) if "160" in text]
    assert far == "→ least allowable 160"
    assert [printable_in_figure(arrow) for arrow in "←→↑↓"] == list("←→↑↓")


@pytest.mark.parametrize("name", names())
def test_labels_of_allowables_stand_apart(name: str) -> None:
    results = solve(read_sample(name))
    for figure in (envelope_figure(results), *(state_figure(results, index) for index in range(3))):
        boxes = [box_of(e) for e in parsed(figure.svg).iter(f"{SVG}text") if "allowable" in (e.text or "")]
        for one, other in combinations(boxes, 2):
            assert one[0] + one[2] <= other[0] or other[0] + other[2] <= one[0] or abs(one[1] - other[1]) >= 6


def box_of(element: ElementTree.Element) -> tuple[float, float, float]:
    """Left, baseline and width of a centred text."""
    width = text_width(element.text or "", 6.5)
    return float(element.get("x", "")) - width / 2, float(element.get("y", "")), width


def test_rounding_at_a_held_end_is_no_value_to_label() -> None:
    x = np.array([0.0, 0.5, 1.0])
    strip = Strip("u", "displacement", "displacement", x, (np.array([-4e-21, 2e-4, 1e-4]),))
    _scale, least, most = _scale_of(strip, 0.0, 44.0)
    assert (least, most) == (0.0, 2e-4)


def test_a_utilisation_that_starts_beyond_its_limit_is_hatched_from_where_it_was_checked() -> None:
    """Beside it stands tension without an allowable: no check there, so nothing to draw a line from."""
    sample = read_sample("tie_rod")
    steel = structs.replace(sample.materials[0], allowable_compression=1e5, allowable_tension=UNSET)
    held = [structs.replace(joint, support=FixedSupport()) for joint in sample.joints]
    pulled = JointLoad(joint=sample.joints[1].mark, movement=1e-3)
    project = structs.replace(
        sample,
        materials=(steel, *sample.materials[1:]),
        joints=tuple(held),
        load_cases=(LoadCase(name="moved", joint_loads=(pulled,)),),
        combinations=(),
        limits=Limits(),
    )
    for figure in figures(solve(project)):
        assert "nan" not in figure.svg
