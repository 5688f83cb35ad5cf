"""The strips without a window: they show what the solver says, scaled and labelled so that it is read."""

from __future__ import annotations

from dataclasses import replace
from itertools import combinations

import numpy as np
import pytest
from PySide6.QtCore import QRectF, Qt
from PySide6.QtGui import QColor, QFont, QPainterPath

from app.drawing.ruler import Ruler
from app.gui.fonts import Fonts
from app.gui.sheet_layout import Place
from app.gui.strips.company import COMPRESSION, NONE, OVER, TENSION
from app.gui.strips.content import (
    StripContent,
    _range,
    envelope_contents,
    number,
    state_contents,
    with_crossings,
)
from app.gui.strips.curve import Curve
from app.gui.strips.labels import spread
from app.gui.strips.paths import Scale, stretches
from app.gui.strips.readout import envelope_readout, state_readout
from app.gui.strips.strip import Strip
from app.gui.theme import LIGHT
from app.samples import read_sample
from solver.model import AreaSection, Combination, FixedSupport, JointLoad, SegmentLoad
from solver.results import Results
from solver.solve import solve
from tests.drawn_members import busy_member
from tests.gui.sheets import SIZES, laid_out
from tests.members import Part, case, member, round_bar

KINDS = ("displacement", "force", "stress", "utilisation")
BOTH_WAYS = pytest.mark.parametrize("upright", [False, True], ids=["across", "upright"])


def pulled(force: float = 1e5, *, allowable_factor: float = 1.0) -> Results:
    """A bar fixed at its start: segment A in tension, B in compression by a force at their joint."""
    parts = [
        Part(1.0, round_bar(0.04), allowable_tension=1.6e8, allowable_compression=1.4e8),
        Part(1.0, round_bar(0.03), allowable_tension=1.6e8, allowable_compression=1.4e8),
    ]
    load = case(on_joints=[JointLoad("1", force=force)])
    combination = Combination("Working", {"Load": 1.0}, allowable_factor)
    return solve(member(parts, {0: FixedSupport(), 2: FixedSupport()}, [load], [combination]))


def two_states(stress: float, factor: float) -> Results:
    """A bar of 1000 mm² in tension by so many MPa in a state with this factor, and by a tenth in another."""
    part = Part(1.0, AreaSection(area=1e-3), allowable_tension=1.6e8, allowable_compression=1.4e8)
    load = case(on_joints=[JointLoad("1", force=1e3 * stress)])
    combinations = [Combination("Full", {"Load": 1.0}, factor), Combination("Tenth", {"Load": 0.1})]
    return solve(member([part], {0: FixedSupport()}, [load], combinations))


def places(results: Results, size=SIZES[0], *, upright=False) -> list[Place]:
    layout = laid_out(size, upright=upright)
    ruler = Ruler.whole(float(results.position[-1]), layout.begin, layout.end)
    return [Place(rect, ruler, layout.axes, Fonts(QFont())) for rect in layout.strips]


def content(results: Results, kind: str) -> StripContent:
    return state_contents(results, 0)[KINDS.index(kind)]


def strip_in(shown: StripContent, place: Place) -> Strip:
    strip = Strip(LIGHT)
    strip.show_content(shown)
    strip.set_place(place)
    strip.refresh()
    return strip


def filled_with(strip: Strip, fill: str) -> list[Curve]:
    """The curves filled with a colour."""
    found = [curve for curve in strip.curves if curve.brush and curve.brush.color() == QColor(fill)]
    assert all(curve.pen is None for curve in found)
    return found


class TestCurves:
    def test_come_with_their_symbols_in_order(self):
        shown = state_contents(pulled(), 0)
        assert [c.kind for c in shown] == list(KINDS)
        assert [c.title for c in shown] == ["u", "N", "σ", "utilisation"]
        assert [c.unit for c in shown] == ["mm", "N", "MPa", ""]

    def test_are_the_solvers_and_short_enough_to_repaint(self):
        results = solve(busy_member(40))
        for shown, column in zip(state_contents(results, 3), KINDS[:3], strict=False):
            trace = shown.traces[0]
            assert len(trace.x) <= 700  # 600 from the solver and the crossings put in
            largest = getattr(results.segments, f"{column}_max")[3].max()
            assert trace.value.max() == pytest.approx(largest, rel=1e-12)

    def test_tension_and_compression_are_told_apart_and_jumps_are_not_drawn(self):
        trace = content(pulled(), "force").traces[0]
        middle = 0.5 * (trace.x[1:] + trace.x[:-1])
        drawn = trace.drawn
        assert set(drawn[(middle < 1.0) & (drawn != NONE)]) == {TENSION}
        assert set(drawn[(middle > 1.0) & (drawn != NONE)]) == {COMPRESSION}
        assert (drawn == NONE).sum() == 1

    def test_what_is_over_the_limit_is_told_apart_from_where_it_passes_it(self):
        # A taper from ⌀40 to ⌀20 under 1e5 N: σ = 160 MPa where A = 625 mm², that is at d = 28.209… mm.
        load = case(on_joints=[JointLoad("1", force=1e5)])
        part = Part(1.0, round_bar(0.04, 0.02), allowable_tension=1.6e8)
        results = solve(member([part], {0: FixedSupport()}, [load]))
        diameter = np.sqrt(4 * 1e5 / 1.6e8 / np.pi)
        passed = (0.04 - diameter) / 0.02
        for kind in ("stress", "utilisation"):
            trace = content(results, kind).traces[0]
            first_over = trace.x[:-1][trace.drawn == OVER].min()
            # Linear between points about 1/600 apart, of a curve with σ''/σ' of about 20: error below 1e-4.
            assert first_over == pytest.approx(passed, abs=1e-4)

    def test_an_unchecked_stretch_says_so(self):
        parts = [Part(1.0, round_bar(0.04), allowable_tension=1.6e8), Part(1.0, round_bar(0.04))]
        load = case(on_joints=[JointLoad("2", force=1e5)])
        results = solve(member(parts, {0: FixedSupport()}, [load]))
        shown = content(results, "utilisation")
        assert shown.unchecked == ((1.0, 2.0),)
        assert np.isnan(shown.traces[0].value[-1])
        assert shown.traces[0].drawn[-1] == NONE

    def test_crossings_are_put_in_between_but_never_at_a_jump(self):
        columns = np.array([[0.0, 1.0, 1.0, 2.0], [-1.0, 3.0, -3.0, 1.0]])
        found = with_crossings(columns, 1, 0.0)
        np.testing.assert_allclose(found[0], [0.0, 0.25, 1.0, 1.0, 1.75, 2.0])
        np.testing.assert_array_equal(found[1], [-1.0, 0.0, 3.0, -3.0, 0.0, 1.0])


class TestLimits:
    def test_are_the_allowables_times_the_states_factor(self):
        shown = content(pulled(allowable_factor=1.1), "stress")
        assert sorted(limit.value for limit in shown.limits) == pytest.approx([-1.54e8, 1.76e8])
        assert {limit.texts[0] for limit in shown.limits} == {"allowable 176", "allowable 154"}
        assert shown.low < -1.54e8
        assert shown.high > 1.76e8

    def test_far_from_the_stress_are_named_but_do_not_flatten_it(self):
        shown = content(pulled(force=1e3), "stress")
        assert shown.limits == ()
        assert len(shown.beyond) == 2
        assert shown.high < 1e6

    def test_of_an_envelope_are_the_least_of_its_states(self):
        shown = envelope_contents(pulled())[2]
        assert {limit.texts[0] for limit in shown.limits} == {"allowable 160", "allowable 140"}
        # Forged steel allows 140 MPa and rod steel 180 MPa, by factors of 1, 1 and 1.1 in the combinations.
        shown = envelope_contents(solve(read_sample("tie_rod")))[2]
        assert {limit.texts[0] for limit in shown.limits} == {"least allowable 140", "least allowable 180"}
        assert sorted({limit.value for limit in shown.limits}) == pytest.approx([1.4e8, 1.8e8])
        assert shown.high > 1.8e8

    def test_of_an_envelope_over_its_least_is_told_apart_only_where_a_state_is_over(self):
        # 165 MPa against 160 MPa, allowed by the factor of its own combination, not by that of the other.
        for factor, over in ((1.1, False), (1.0, True)):
            results = two_states(165.0, factor)
            trace = envelope_contents(results)[2].traces[0]
            assert (OVER in trace.drawn) is over
            assert (OVER in envelope_contents(results)[3].traces[0].drawn) is over

    @pytest.mark.parametrize(("stress", "drawn"), [(14.0, True), (13.0, False)])
    def test_are_drawn_to_scale_up_to_twelve_times_the_stress(self, stress, drawn):
        shown = two_states(stress, 1.0)
        strip = state_contents(shown, 0)[2]
        assert len(strip.limits) == (1 if drawn else 0)
        assert len(strip.beyond) == (0 if drawn else 1)

    def test_are_drawn_to_scale_near_the_stress_of_the_other_sign_too(self):
        # Held at both ends, 1/20 of its length beyond the force: that part is pressed by 19/20 of 100 MPa.
        parts = [
            Part(length, AreaSection(area=1e-3), allowable_tension=1.6e8, allowable_compression=1.4e8)
            for length in (1.9, 0.1)
        ]
        load = case(on_joints=[JointLoad("1", force=1e5)])
        shown = content(solve(member(parts, {0: FixedSupport(), 2: FixedSupport()}, [load])), "stress")
        assert max(trace.value.max() for trace in shown.traces) == pytest.approx(5e6)  # 160 is 32 times this
        assert {limit.texts[0] for limit in shown.limits} == {"allowable 160", "allowable 140"}

    @BOTH_WAYS
    @pytest.mark.usefixtures("qapp")
    def test_off_the_strip_are_named_at_its_edge_with_an_arrow(self, upright):
        results = two_states(5.0, 1.0)
        place = places(results, upright=upright)[2]
        (label,) = [x for x in strip_in(content(results, "stress"), place).labels if "allowable" in x.text]
        assert label.text == ("→ allowable 160" if upright else "↑ allowable 160")
        edge = label.rect.right() if upright else label.rect.top()
        assert abs(edge - (place.rect.right() if upright else place.rect.top())) < 10.0

    @pytest.mark.usefixtures("qapp")
    @pytest.mark.parametrize("name", ["hoist_shaft", "tie_rod"])
    def test_are_dashed_and_named_inside_the_strip_of_every_combination(self, name):
        results = solve(read_sample(name))
        for shown_state in (*(state_contents(results, i) for i in range(3)), envelope_contents(results)):
            shown, place = shown_state[2], places(results)[2]
            assert shown.limits
            scale = Scale.of(shown, place.rect, place.axes)
            for limit in shown.limits:
                assert place.rect.top() < scale.pixel(limit.value) < place.rect.bottom()
            assert any("allowable" in label.text for label in strip_in(shown, place).labels)

    def test_utilisation_always_shows_its_line_at_one(self):
        shown = content(pulled(force=1.0), "utilisation")
        assert shown.limits[0].value == 1.0
        assert shown.high > 1.0


class TestRange:
    @pytest.mark.parametrize("kind", KINDS)
    def test_holds_zero_and_the_curve(self, kind):
        shown = content(solve(busy_member(12)), kind)
        value = shown.traces[0].value
        assert shown.low <= min(0.0, np.nanmin(value))
        assert shown.high >= max(0.0, np.nanmax(value))

    def test_round_off_does_not_fill_a_strip(self):
        # Heated and free to grow: no force, no stress, whatever the last bits say.
        part = Part(1.0, round_bar(0.04), expansion=1.2e-5, allowable_tension=1.6e8)
        load = case(on_segments=[SegmentLoad("A", temperature_start=37.0)])
        results = solve(member([part], {0: FixedSupport()}, [load]))
        for kind in ("force", "stress"):
            shown = content(results, kind)
            filled = np.ptp(shown.traces[0].value) / (shown.high - shown.low)
            assert filled < 1e-2
            assert [extreme.text for extreme in shown.extremes] == [number(kind, 0.0, "mm-N-MPa")]

    def test_noise_alone_stays_a_flat_line(self):
        noise = np.array([3e-9, -7e-9, 5e-9])
        low, high = _range((noise,), (), 210.0)
        assert high - low >= 210.0

    def test_an_unloaded_member_has_strips(self):
        results = solve(member([Part(1.0, round_bar(0.04))], {0: FixedSupport()}))
        for shown in state_contents(results, 0):
            assert shown.high > shown.low


@pytest.mark.usefixtures("qapp")
class TestPixels:
    @BOTH_WAYS
    def test_lines_and_fills_stay_in_their_strip(self, upright):
        results = solve(busy_member(12))
        for shown, place in zip(state_contents(results, 0), places(results, upright=upright), strict=True):
            for curve in strip_in(shown, place).curves:
                assert place.rect.adjusted(-1, -1, 1, 1).contains(curve.path.boundingRect())

    @BOTH_WAYS
    def test_fills_have_the_areas_of_their_curve(self, upright):
        results = solve(read_sample("hoist_shaft"))  # tension, compression, tension: runs with a gap between
        shown = content(results, "force")
        place = places(results, upright=upright)[1]
        scale = Scale.of(shown, place.rect, place.axes)
        trace = shown.traces[0]
        strip = strip_in(shown, place)
        pixels = abs(place.ruler.scale * (scale.end - scale.begin) / (scale.high - scale.low))
        # The area by the shoelace formula against the integral by trapezoids: two roads to one polygon.
        for fill, side in ((LIGHT.tension_fill, np.maximum), (LIGHT.compression_fill, np.minimum)):
            integral = abs(np.trapezoid(side(trace.value, 0.0), trace.x)) * pixels
            (curve,) = filled_with(strip, fill)
            # Points off a straight line by less than 6 · 0.03 pixels are left out, of 40 pixels of depth.
            assert _area(curve.path) == pytest.approx(integral, rel=5e-3)

    @BOTH_WAYS
    def test_a_strip_draws_the_curves_of_what_it_shows(self, upright):
        results = solve(busy_member(12))
        strip = strip_in(state_contents(results, 0)[1], places(results, upright=upright)[1])
        assert strip.curves
        strip.show_content(None)
        strip.refresh()
        assert strip.curves == []
        assert strip.labels == ()

    def test_what_is_over_the_limit_is_hatched_in_stress_and_utilisation(self):
        results = solve(read_sample("tie_rod"))
        for index, hatched in ((1, 0), (2, 1), (3, 1)):
            strip = strip_in(envelope_contents(results)[index], places(results)[index])
            brushes = [curve.brush for curve in filled_with(strip, LIGHT.over)]
            assert len(brushes) == hatched
            assert all(brush.style() == Qt.BrushStyle.BDiagPattern for brush in brushes)

    @BOTH_WAYS
    @pytest.mark.parametrize("size", SIZES, ids=["small", "large"])
    @pytest.mark.parametrize("name", ["hoist_shaft", "quay_pile", "tie_rod", "busy 40"])
    def test_labels_stand_apart_and_inside_the_sheet(self, name, size, upright):
        results = solve(busy_member(40) if name == "busy 40" else read_sample(name))
        of_states = [state_contents(results, index) for index in range(min(len(results.states), 4))]
        for shown_state in (*of_states, envelope_contents(results)):
            labels = [
                label
                for shown, place in zip(shown_state, places(results, size, upright=upright), strict=True)
                for label in strip_in(shown, place).labels
            ]
            sheet = QRectF(0.0, 0.0, *size)
            assert [label.text for label in labels if not sheet.contains(label.rect)] == []
            tight = [(label.text, label.rect.adjusted(0.5, 0.5, -0.5, -0.5)) for label in labels]
            assert [(a, b) for (a, x), (b, y) in combinations(tight, 2) if x.intersects(y)] == []

    def test_signs_say_what_colours_say(self):
        results = pulled()
        place = places(results)[1]
        labels = strip_in(content(results, "force"), place).labels
        at = {label.text: label.rect.center().x() for label in labels if label.face == "mark"}
        assert at["+"] < place.ruler.pixel(1.0) < at["−"]

    def test_zoomed_in_labels_keep_to_the_window(self):
        results = solve(busy_member(25))
        for place, shown in zip(places(results), state_contents(results, 0), strict=True):
            close = replace(place, ruler=place.ruler.zoomed(8.0, place.ruler.begin))
            for label in strip_in(shown, close).labels:
                assert label.rect.right() <= place.rect.right() + 0.5


def _area(path: QPainterPath) -> float:
    """The area inside a path that never crosses itself."""
    total = 0.0
    for polygon in path.toSubpathPolygons():
        x, y = np.array([[point.x(), point.y()] for point in polygon]).T
        total += 0.5 * float(np.sum(x * np.roll(y, -1) - y * np.roll(x, -1)))
    return abs(total)


class TestSpread:
    def test_leaves_what_has_room_where_it_wants_to_be(self):
        assert spread([10.0, 40.0], [12.0, 12.0], 0.0, 100.0) == [10.0, 40.0]

    def test_pushes_apart_and_keeps_inside(self):
        assert spread([95.0, 96.0], [12.0, 12.0], 0.0, 100.0) == [76.0, 88.0]
        assert spread([-5.0, -4.0], [12.0, 12.0], 0.0, 100.0) == [0.0, 12.0]

    def test_drops_what_has_no_room(self):
        assert spread([0.0, 0.0], [12.0, 12.0], 0.0, 20.0) == [0.0]


def test_stretches_are_the_runs_of_chosen_intervals():
    first, last = stretches(np.array([TENSION, TENSION, NONE, COMPRESSION, TENSION]) == TENSION)
    assert (first.tolist(), last.tolist()) == ([0, 4], [2, 5])


class TestReadout:
    def test_gives_both_sides_of_a_joint_where_they_differ(self):
        line = state_readout(pulled(), 0, 1.0)
        assert line.startswith("x 1000 mm (joint 1)")
        # By stiffness: A takes A₁/(A₁ + A₂) = 0.64 of 1e5 N in tension, B the rest in compression.
        assert "N 64 000 | −36 000 N" in line.replace("\u202f", " ").replace("\u2009", " ")
        assert line.count("u ") == 1

    def test_inside_a_segment_there_is_one_value(self):
        line = state_readout(pulled(), 0, 0.5)
        assert "joint" not in line
        assert "|" not in line

    def test_of_an_envelope_gives_smallest_and_largest(self):
        line = envelope_readout(solve(read_sample("tie_rod")), 1.0)
        assert "…" in line

    def test_reads_rounding_as_0(self):
        results = solve(read_sample("quay_pile"))
        summer = next(i for i, state in enumerate(results.states) if state.name == "Summer")
        for x in results.position[3:-1].tolist():  # above the bedding, free to grow
            line = state_readout(results, summer, x)
            assert "N 0 " in line
            assert "σ 0 MPa" in line

    def test_says_where_nothing_is_checked(self):
        results = solve(member([Part(1.0, round_bar(0.04))], {0: FixedSupport()}))
        assert state_readout(results, 0, 0.5).endswith("utilisation not checked")


def test_a_segment_without_force_has_no_sign():
    results = solve(read_sample("hoist_shaft"))
    state = next(i for i, one in enumerate(results.states) if one.name == "Warm")
    for content in state_contents(results, state)[1:3]:
        (trace,) = content.traces
        inside = trace.x[:-1] < results.position[1] - 1e-9
        assert TENSION not in trace.drawn[inside]
        assert COMPRESSION not in trace.drawn[inside]
        assert COMPRESSION in trace.drawn
