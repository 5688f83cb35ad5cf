"""The drawing in the window's own font: none of its labels meets another, a hatch, or the edge."""

from __future__ import annotations

from itertools import combinations

import pytest
from msgspec import structs
from PySide6.QtGui import QFont

from app.drawing.layout import lay_out
from app.drawing.member import Member
from app.drawing.ruler import Ruler
from app.drawing.shapes import Box, Stroke, Text
from app.gui.fonts import Fonts
from app.gui.sheet_layout import Place, sheet_layout
from app.samples import names, read_sample
from app.shown import Shown
from app.units import SYSTEM_NAMES
from tests.drawn_members import all_members, drawn
from tests.gui.sheets import SIZES, drawing_place

MEMBERS = all_members()
BOTH_WAYS = pytest.mark.parametrize("upright", [False, True], ids=["across", "upright"])


def crossing(texts: list[Text]) -> list[tuple[str, str]]:
    """Pairs of texts whose boxes meet."""
    return [(a.text, b.text) for a, b in combinations(texts, 2) if a.box.meets(b.box)]


def around(stroke: Stroke) -> Box:
    """The box around a stroke."""
    xs, ys = zip(*stroke.points, strict=True)
    return Box(min(xs), min(ys), max(xs), max(ys))


@pytest.mark.usefixtures("qapp")
class TestLabels:
    @pytest.mark.parametrize("name", MEMBERS)
    @BOTH_WAYS
    @pytest.mark.parametrize("size", SIZES, ids=["small", "large"])
    def test_none_lies_on_another_nor_is_cut_off(self, name, upright, size):
        member = drawn(MEMBERS[name])
        frame = drawing_place(member, size, upright=upright).frame
        texts = lay_out(member, frame).texts
        assert crossing(texts) == []
        for text in texts:
            assert frame.box.contains((text.box.left, text.box.top)), text.text
            assert frame.box.contains((text.box.right, text.box.bottom)), text.text

    @pytest.mark.parametrize("units", SYSTEM_NAMES)
    @pytest.mark.parametrize("name", names())
    def test_none_touches_a_hatch_nor_the_edge(self, name, units):
        project = read_sample(name)
        member = drawn(structs.replace(project, display=structs.replace(project.display, units=units)))
        for upright in (False, True):
            shown = lay_out(member, drawing_place(member, SIZES[0], upright=upright).frame)
            hatches = [around(stroke) for stroke in shown.strokes if stroke.pairs]
            for text in shown.texts:
                box = text.box
                assert box.left >= 4.0
                near = Box(box.left - 2.0, box.top, box.right + 2.0, box.bottom)
                assert not any(near.meets(hatch) for hatch in hatches), text.text

    @pytest.mark.parametrize("size", [1.0, 1.5])
    def test_forces_keep_their_values_upright_at_large_fonts(self, size):
        font = QFont()
        font.setPointSizeF(size * font.pointSizeF())
        project = read_sample("quay_pile")
        project = structs.replace(project, display=structs.replace(project.display, units="in-lbf-psi"))
        member = drawn(project)
        layout = sheet_layout(900, 473, True, Fonts(font).text_height)
        ruler = Ruler.whole(member.position[-1], layout.begin, layout.end)
        shown = lay_out(member, Place(layout.drawing, ruler, layout.axes, Fonts(font)).frame)
        assert len([t for t in shown.texts if t.part is not None and t.part.kind == "force"]) == 3
        assert crossing(shown.texts) == []

    def test_upright_companions_give_their_labels_up_before_loads_do(self):
        member = Member.of(read_sample("capstan_shaft"), Shown("combination", "Paying out, warm"))
        layout = sheet_layout(880, 473, True, Fonts(QFont()).text_height)
        ruler = Ruler.whole(member.position[-1], layout.begin, layout.end)
        shown = lay_out(member, Place(layout.drawing, ruler, layout.axes, Fonts(QFont())).frame)
        kinds = [text.part.kind for text in shown.texts if text.part is not None]
        assert kinds.count("force") == 2
        assert "warmth" in kinds
        assert not {"companion", "companion_section", "companion_length"} & set(kinds)
