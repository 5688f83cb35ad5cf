"""The findings with real events: what is listed, in which order, choosing, what is out of date, problems."""

from __future__ import annotations

from dataclasses import replace
from itertools import pairwise

import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QColor, QPalette
from pytestqt.qtbot import QtBot

from app.findings import Band, findings
from app.gui.findings.content import blocks, problem_rows, rows
from app.gui.findings.panel import FindingsPanel
from app.gui.findings.row import PAD
from app.gui.findings.scale import SCALE_HEIGHT, StressScale
from app.gui.fonts import Fonts
from app.gui.theme import DARK, LIGHT
from app.gui.view import Selection, Shown, View
from app.samples import read_sample
from solver.model import FixedSupport, JointLoad
from solver.solve import solve
from tests.drawn_members import busy_member
from tests.members import Part, case, member, round_bar

ROD = read_sample("tie_rod")
ROD_FINDINGS = findings(solve(ROD), ROD.display.unit_system)


@pytest.fixture
def view() -> View:
    return View()


@pytest.fixture
def panel(qtbot: QtBot, view: View) -> FindingsPanel:
    made = FindingsPanel(view)
    qtbot.addWidget(made)
    made.resize(310, 600)
    made.show_findings(ROD_FINDINGS, (), True)
    with qtbot.waitExposed(made):
        made.show()
    return made


class TestContent:
    def test_the_worst_comes_first_then_what_is_not_checked(self):
        shown = rows(ROD_FINDINGS)
        checked = [float(row.value) for row in shown if row.tone in ("pass", "fail")]
        assert checked == sorted(checked, reverse=True)
        assert len(checked) == len(ROD_FINDINGS.segments) + len(ROD_FINDINGS.limits)
        tones = [row.tone for row in shown]
        assert tones == sorted(tones, key=lambda tone: tone in ("not_made", "note"))

    def test_what_was_not_checked_says_what_to_enter(self):
        results = solve(
            member([Part(1.0, round_bar(0.04))], {0: FixedSupport()}, [case(on_joints=[JointLoad("1", 1e3)])])
        )
        shown = rows(findings(results, "mm-N-MPa"))
        (missing,) = [row for row in shown if row.tone == "not_made"]
        assert missing.remedy
        assert missing.remedy in missing.spoken
        assert missing.segments == frozenset({0})

    def test_the_numbers_of_a_scale_stand_where_they_change(self):
        scales = [row for row in rows(ROD_FINDINGS) if row.band is not None]
        for above, row in pairwise(scales):
            ends = row.band.compression_text, row.band.tension_text
            assert row.band_named == (ends != (above.band.compression_text, above.band.tension_text))

    def test_no_line_ends_between_a_number_and_its_unit(self):
        stress, limit = ROD_FINDINGS.segments[0], ROD_FINDINGS.limits[0]
        shown = {row.spoken: row.text for row in rows(ROD_FINDINGS)}
        assert " MPa" in stress.short
        assert shown[stress.sentence] == stress.short.replace(" MPa", "\u00a0MPa").replace(" mm", "\u00a0mm")
        assert shown[limit.sentence] != limit.sentence
        (problem,) = problem_rows(("Length of A: must be greater than 0, is −5 mm",))
        assert problem.text.endswith("−5\u00a0mm")

    def test_reactions_are_those_of_the_shown_state_or_of_all(self):
        of_all = blocks(ROD_FINDINGS, Shown("envelope"))
        name = ROD_FINDINGS.books[1].name
        of_one = blocks(ROD_FINDINGS, Shown("combination", name))
        assert len(of_all) == len(of_one) + len(ROD_FINDINGS.books) - 1
        assert name in of_one[0].title
        values = [line.value for line in of_one[0].lines]
        assert values[: len(ROD_FINDINGS.books[1].reactions)] == [
            r.text for r in ROD_FINDINGS.books[1].reactions
        ]
        assert ROD_FINDINGS.books[1].residual_text in values

    def test_the_largest_displacements_are_called_so(self):
        block = blocks(ROD_FINDINGS, Shown("envelope"))[-2]
        assert block.title == "Largest displacements"
        assert [line.value for line in block.lines] == [item.text for item in ROD_FINDINGS.displacements]

    def test_problems_are_rows_too(self):
        assert [row.text for row in problem_rows(("one", "two"))] == ["one", "two"]


class TestScale:
    BAND = Band(-3e7, 6e7, -1.4e8, 1.6e8, "−140", "160")

    def test_reaches_from_allowable_to_allowable(self):
        scale = StressScale.of(self.BAND, 0.0, 300.0)
        assert scale.pixel(-1.4e8) == pytest.approx(0.0)
        assert scale.pixel(1.6e8) == pytest.approx(300.0)
        assert scale.pixel(0.0) == pytest.approx(140.0)

    def test_gives_way_where_the_stress_is_beyond_it(self):
        scale = StressScale.of(replace(self.BAND, high=2e8), 0.0, 300.0)
        assert scale.pixel(1.6e8) < scale.pixel(2e8) < 300.0

    def test_without_an_allowable_still_holds_the_range(self):
        scale = StressScale.of(replace(self.BAND, compression=None), 0.0, 300.0)
        assert 0.0 < scale.pixel(-3e7) < scale.pixel(0.0)
        assert StressScale.of(Band(0.0, 0.0, None, None, "", ""), 0.0, 1.0).pixel(0.0) == pytest.approx(0.5)


class TestChoosing:
    def test_a_click_moves_the_cursor_and_selects(self, qtbot, panel, view):
        first = ROD_FINDINGS.segments[0]
        qtbot.mouseClick(panel.rows[0], Qt.MouseButton.LeftButton)
        assert view.selection == Selection(segments=frozenset({first.segment}))
        assert view.cursor.x == first.position

    @pytest.mark.parametrize("key", [Qt.Key.Key_Return, Qt.Key.Key_Enter, Qt.Key.Key_Space])
    def test_keys_choose_too(self, qtbot, panel, view, key):
        row = panel.rows[1]
        row.setFocus()
        qtbot.keyClick(row, key)
        assert view.selection.segments == row.row.segments

    def test_a_limit_leads_to_its_joints(self, qtbot, panel, view):
        row = next(r for r in panel.rows if r.row.joints)
        qtbot.mouseClick(row, Qt.MouseButton.LeftButton)
        assert view.selection.joints == row.row.joints

    def test_tab_goes_through_the_rows_in_order(self, qtbot, panel):
        with qtbot.waitActive(panel):
            panel.activateWindow()
        panel.rows[0].setFocus()
        for row in panel.rows[1:3]:
            qtbot.keyClick(panel.focusWidget(), Qt.Key.Key_Tab)
            assert row.hasFocus()

    def test_every_row_has_its_sentence_as_name(self, panel):
        assert panel.accessibleName()
        for row in panel.rows:
            assert row.accessibleName() == row.row.spoken
        for block in panel.blocks:
            assert block.block.lines[0].value in block.accessibleName()

    def test_the_selection_lights_its_row(self, panel, view):
        index = ROD_FINDINGS.segments[1].segment
        view.set_selection(Selection(segments=frozenset({index})))
        assert [row.row.segments for row in panel.rows if row.is_lit] == [frozenset({index})]


class TestStates:
    def test_out_of_date_findings_say_so_and_lose_their_colour(self, panel):
        assert LIGHT.over in _colours(panel)
        panel.show_findings(ROD_FINDINGS, (), False)
        assert panel.is_marked_out_of_date
        assert LIGHT.over not in _colours(panel)
        panel.show_findings(ROD_FINDINGS, (), True)
        assert not panel.is_marked_out_of_date

    def test_problems_never_stand_under_an_earlier_verdict(self, panel):
        panel.show_findings(ROD_FINDINGS, ("not held",), False)
        assert panel.headline != ROD_FINDINGS.headline
        assert panel.rows[0].row.text == "not held"
        assert panel.is_marked_out_of_date

    def test_problems_alone(self, panel):
        panel.show_findings(None, ("not held", "and more"), False)
        assert [row.row.text for row in panel.rows] == ["not held", "and more"]
        assert panel.blocks == ()
        assert not panel.is_marked_out_of_date

    def test_nothing_yet_claims_nothing(self, panel):
        panel.show_findings(None, (), False)
        assert panel.headline == ""
        assert panel.rows == ()

    def test_rows_keep_the_focus_when_results_change(self, qtbot, panel):
        with qtbot.waitActive(panel):
            panel.activateWindow()
        panel.rows[2].setFocus()
        panel.show_findings(ROD_FINDINGS, (), True)
        assert panel.rows[2].hasFocus()

    def test_sentences_are_whole_at_every_width(self, qtbot, panel):
        for width in (270, 310, 500):
            panel.resize(width, 600)
            for row in panel.rows:
                qtbot.waitUntil(lambda row=row: row.height() == row.needed_height(row.width()))

    def test_many_findings_scroll(self, qtbot, panel):
        project = busy_member(40)
        panel.show_findings(findings(solve(project), "mm-N-MPa"), (), True)
        qtbot.waitUntil(lambda: panel.verticalScrollBar().maximum() > 500)

    def test_follows_the_palette(self, panel):
        palette = QPalette()
        palette.setColor(QPalette.ColorRole.Window, QColor("#111111"))
        palette.setColor(QPalette.ColorRole.WindowText, QColor("#EEEEEE"))
        panel.setPalette(palette)
        assert QColor(panel.grab().toImage().pixel(3, 3)).name().upper() == DARK.panel


def _colours(panel: FindingsPanel) -> set[str]:
    image = panel.grab().toImage()
    return {
        QColor(image.pixel(x, y)).name().upper()
        for x in range(image.width())
        for y in range(0, image.height(), 2)
    }


@pytest.mark.parametrize("size", [1.0, 1.5, 2.0])
def test_rows_grow_with_the_font_and_keep_short_marks_whole(qtbot, panel, size):
    font = panel.font()
    font.setPointSizeF(size * font.pointSizeF())
    panel.setFont(font)
    pile = read_sample("quay_pile")
    panel.show_findings(findings(solve(pile), pile.display.unit_system), (), True)
    fonts = Fonts(panel.font())
    for row in panel.rows:
        assert row.row is not None
        assert row._mark(row.row) == row.row.mark
        lines = fonts.measure(
            fonts.wrapped(row.row.text, "plain", row._text_rect(row.width()).width()), "plain"
        )
        numbers = fonts.measure("0", "small").height() if row.row.band_named else 0.0
        scale = SCALE_HEIGHT if row.row.band is not None else 0.0
        assert row.height() >= 2 * PAD + lines.height() + scale + numbers
