"""Shoulders on the drawing: the fillet in the corner of the step, its label, where it is pointed at."""

from __future__ import annotations

import pytest
from msgspec.structs import replace

from app.drawing.layout import lay_out
from app.drawing.shapes import Part
from solver.model import Shoulder
from tests.app.drawing.frames import SIZES, window_frame
from tests.drawn_members import drawn
from tests.shouldered import spindle, with_shoulders

BOTH_WAYS = pytest.mark.parametrize("upright", [False, True], ids=["across", "upright"])


def picture_of(project, *, upright=False, size=SIZES[0]):
    member = drawn(project)
    return lay_out(member, window_frame(member, size, upright=upright))


def fillets(picture, joint):
    return [s for s in picture.strokes if s.part == Part("shoulder", joint) and s.fill]


@BOTH_WAYS
def test_each_step_has_two_fillets_in_its_corners_and_says_its_factor(upright):
    picture = picture_of(spindle(), upright=upright)
    for joint, said in ((1, "r 2 mm, Kt 2.08"), (2, "Kt 1.8")):
        assert len(fillets(picture, joint)) == 2
        (text,) = (t for t in picture.texts if t.part == Part("shoulder", joint))
        assert text.text.replace("\n", " ") == said
        label = picture.label_at(text.box.centre)
        assert label is not None
        assert label.part == Part("shoulder", joint)


@pytest.mark.parametrize(("joint", "sense"), [(1, 1.0), (2, -1.0)])
def test_the_fillet_lies_on_the_thinner_side(joint, sense):
    """Joint 1: ⌀50 before ⌀40. Joint 2: the tube behind is thicker, though its area is smaller."""
    picture = picture_of(spindle())
    for stroke in fillets(picture, joint):
        along = [x for x, _ in stroke.points]
        corner = along[0]
        assert all(sense * (x - corner) >= 0.0 for x in along)
        assert max(abs(x - corner) for x in along) >= 4.0


def test_a_larger_radius_is_drawn_larger_up_to_a_bound():
    def size(radius):
        found = fillets(picture_of(with_shoulders(spindle(), {1: Shoulder(fillet_radius=radius)})), 1)[0]
        return max(x for x, _ in found.points) - min(x for x, _ in found.points)

    sizes = [size(radius) for radius in (0.0003, 0.002, 0.005, 0.04)]
    assert sizes == sorted(sizes)
    assert sizes[0] < sizes[2]
    assert sizes[-1] <= 14.0


def test_what_has_no_factor_says_so_and_an_end_is_drawn_too():
    project = with_shoulders(spindle(), {1: Shoulder(fillet_radius=1e-4), 3: Shoulder(factor=2.0)})
    texts = [text.text for text in picture_of(project).texts]
    assert "r 0.1 mm, no Kt" in texts
    assert "Kt 2, not used" in texts


def test_a_member_without_shoulders_is_drawn_as_before():
    bare = with_shoulders(spindle(), {})
    again = replace(bare, fatigue=())
    assert picture_of(bare) == picture_of(again)
