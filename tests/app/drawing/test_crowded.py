"""Drawings with more to say than there is room for: the important first, and never silently less than all."""

from __future__ import annotations

from dataclasses import replace
from itertools import combinations

import pytest

from app.drawing.crowded import left_out_words
from app.drawing.frame import Detail
from app.drawing.handles import handles_of
from app.drawing.layout import lay_out, sketched
from app.drawing.member import Member
from app.drawing.overlay import graded
from app.drawing.shapes import Box, Part
from app.drawing.tinting import legend_size, tinted
from app.samples import names, read_sample
from app.shown import Shown
from solver.solve import solve
from tests import members
from tests.app.drawing.frames import SIZES, window_frame
from tests.drawn_members import all_members, drawn
from tests.members import round_bar

MEMBERS = all_members()
BOTH_WAYS = pytest.mark.parametrize("upright", [False, True], ids=["across", "upright"])
BOTH_SIZES = pytest.mark.parametrize("size", SIZES, ids=["small", "large"])
DISPLACED = "displaced ×100"


def around(stroke):
    xs, ys = zip(*stroke.points, strict=True)
    return Box(min(xs), min(ys), max(xs), max(ys))


def everything_on(project, results, state, size, *, upright):
    """The texts of a drawing with colours and displaced shape, its scale's among them, and the picture."""
    shown = results.states[state]
    member = Member.of(project, Shown(shown.kind, shown.name))
    frame = window_frame(member, size, upright=upright)
    of_force = graded(results, state, "force")
    detail = Detail(hollow=True, words=DISPLACED, legend=legend_size(member, frame, of_force))
    frame = replace(frame, detail=detail)
    picture = lay_out(member, frame)
    tinting = tinted(member, frame, picture, of_force)
    return [*picture.texts, *tinting.texts], picture, tinting


@pytest.mark.parametrize("name", names())
@BOTH_WAYS
@BOTH_SIZES
def test_with_everything_on_no_text_lies_on_another_or_on_a_part(name, upright, size):
    project = read_sample(name)
    results = solve(project)
    for state in range(len(results.states)):
        if graded(results, state, "force") is None:
            continue
        texts, picture, _ = everything_on(project, results, state, size, upright=upright)
        assert [(a.text, b.text) for a, b in combinations(texts, 2) if a.box.meets(b.box)] == []
        notes = [t for t in texts if t.part is None or t.part.kind == "note"]
        drawn_parts = [(stroke.part, around(stroke)) for stroke in picture.strokes if stroke.part is not None]
        assert [(n.text, part) for n in notes for part, box in drawn_parts if n.box.meets(box)] == []


@pytest.mark.parametrize("name", names())
def test_upright_the_scale_of_colours_has_a_place(name):
    project = read_sample(name)
    results = solve(project)
    states = [s for s in range(len(results.states)) if graded(results, s, "force") is not None]
    for state in states:
        texts, _, tinting = everything_on(project, results, state, SIZES[0], upright=True)
        assert tinting.scale, results.states[state].name
        assert any(t.text.startswith("N ") for t in texts)


def warm_running(size, *, upright):
    project = read_sample("hoist_shaft")
    member = Member.of(project, Shown("combination", "Warm running"))
    return lay_out(member, window_frame(member, size, upright=upright))


def kinds(picture):
    return [text.part.kind for text in picture.texts if text.part is not None]


class TestUpright:
    def test_forces_distributed_loads_movements_and_weight_come_before_warmth(self):
        shown = kinds(warm_running(SIZES[0], upright=True))
        assert [shown.count(kind) for kind in ("force", "distributed", "movement", "gravity")] == [1, 1, 1, 1]
        assert shown.count("warmth") == 12

    def test_all_lengths_and_sections_have_a_place_beside_short_segments(self):
        shown = kinds(warm_running(SIZES[0], upright=True))
        assert (shown.count("length"), shown.count("section")) == (12, 12)

    def test_with_room_nothing_that_acts_is_left_out(self):
        assert kinds(warm_running(SIZES[1], upright=True)).count("warmth") == 12

    def test_the_label_of_a_distributed_load_stands_off_where_it_is_taken_hold_of(self):
        member = Member.of(read_sample("hoist_shaft"), Shown("combination", "Warm running"))
        sketch = sketched(member, window_frame(member, SIZES[0], upright=True))
        (label,) = [t for t in sketch.picture.texts if t.part is not None and t.part.kind == "distributed"]
        edge = max(handle.centre[0] for handle in handles_of(sketch) if handle.kind == "distributed")
        assert edge + 5.0 <= label.box.left

    def test_a_label_is_broken_into_even_lines(self):
        shown = warm_running(SIZES[0], upright=True)
        broken = [t.text for t in shown.texts if t.part is not None and t.part.kind == "warmth"]
        assert not any(line in ("K", "→") for text in broken for line in text.split("\n"))


class TestLeftOut:
    @pytest.mark.parametrize("name", MEMBERS)
    @BOTH_WAYS
    @BOTH_SIZES
    def test_is_said_in_a_corner(self, name, upright, size):
        member = drawn(MEMBERS[name])
        frame = window_frame(member, size, upright=upright)
        picture = lay_out(member, frame)
        texts = [text.text.replace("\n", " ") for text in picture.texts]
        said = [text for text in texts if "without room" in text]
        assert len(said) == (1 if picture.left_out else 0)
        assert all(text in left_out_words(picture.left_out) for text in said)

    @pytest.mark.parametrize("width", [240.0, 400.0, 900.0])
    @BOTH_WAYS
    def test_is_said_within_the_drawing_however_narrow(self, width, upright):
        member = drawn(MEMBERS["busy 40"])
        frame = window_frame(member, (width, 480.0), upright=upright)
        (said,) = [text for text in lay_out(member, frame).texts if "without" in text.text]
        assert frame.box.left <= said.box.left < said.box.right <= frame.box.right

    def test_not_on_paper_which_says_it_below(self):
        member = drawn(MEMBERS["busy 40"])
        frame = window_frame(member, SIZES[0], upright=False)
        picture = lay_out(member, replace(frame, detail=Detail(factor=False)))
        assert picture.left_out
        assert not any("without room" in text.text for text in picture.texts)

    @pytest.mark.parametrize("case", ["Hoisting", "Weight"])
    def test_is_said_over_or_under_the_member_upright_and_not_beside_it(self, case):
        member = Member.of(read_sample("hoist_shaft"), Shown("case", case))
        frame = window_frame(member, SIZES[0], upright=True)
        (said,) = [text for text in lay_out(member, frame).texts if "without" in text.text]
        low, high = sorted((frame.ruler.begin, frame.ruler.end))
        assert said.box.bottom <= low or said.box.top >= high


@pytest.mark.parametrize("end", [0.058, 0.040])
def test_while_a_segment_is_pulled_to_a_taper_its_section_stays_written(end):
    straight, taper = (
        Member.of(
            members.member([members.Part(0.2, s) for s in (round_bar(0.05), last)], {}), Shown("envelope")
        )
        for last in (round_bar(0.06), round_bar(0.06, end))
    )
    frame = window_frame(straight, SIZES[1], upright=True)
    pulled = sketched(taper, frame, sketched(straight, frame))
    said = [t.text for t in pulled.picture.texts if t.part == Part("section", 1)]
    assert said == [f"⌀60\n→⌀{1000 * end:.0f}"]


@BOTH_SIZES
def test_the_word_for_labels_left_out_does_not_read_on_from_another_text(size):
    project = read_sample("hoist_shaft")
    results = solve(project)
    for state in range(len(results.states)):
        texts, _, _ = everything_on(project, results, state, size, upright=True)
        for said in (t for t in texts if "without" in t.text):
            wider = Box(said.box.left - 6.0, said.box.top, said.box.right + 6.0, said.box.bottom)
            assert [t.text for t in texts if t is not said and t.box.meets(wider)] == []
