"""Filter, jump and cures in the real window, with real keys and clicks."""

from __future__ import annotations

from dataclasses import replace

import pytest
from msgspec import UNSET, structs
from PySide6.QtCore import Qt
from PySide6.QtWidgets import QLineEdit, QToolButton

from app import edits
from app.cures import Cures
from app.gui.findings.content import rows
from app.gui.findings.curing import compute_cures
from app.gui.findings.sift import Sift, count_line, sifted
from app.samples import read_sample
from solver.errors import Cancelled
from solver.model import AreaSection
from tests.gui.hand import chord, enter, text_at
from tests.gui.windows import solved


def cured(qtbot, window):
    """Wait until everything that was to be sought is shown."""
    qtbot.waitUntil(lambda: window.showing.current and window.curing.is_settled, timeout=10_000)


def marks(window):
    return [row.row.mark for row in window.findings.rows]


def pick(qtbot, picker, text):
    """Open a picker's list and take an entry by its first letters, as a hand at the keyboard."""
    picker.setFocus()
    qtbot.keyClicks(picker, text)
    assert picker.currentText().startswith(text)


class TestFilter:
    @pytest.mark.parametrize(
        ("kind", "count"),
        [("Does", 2), ("Stress", 8), ("Displ", 1), ("Relat", 1), ("React", 1), ("Notes", 0)],
    )
    def test_a_kind_is_picked(self, qtbot, window, kind, count):
        verdict = window.findings.headline
        picker = window.findings.filter.kind
        picker.setCurrentIndex(next(i for i in range(picker.count()) if picker.itemText(i).startswith(kind)))
        picker.activated.emit(picker.currentIndex())
        assert len(window.findings.rows) == count
        assert window.findings.filter.count.text().startswith(f"{count} of 11 shown")
        assert window.findings.headline == verdict

    def test_typed_marks_count_and_one_click_shows_all(self, qtbot, window):
        panel = window.findings
        panel.filter.marks.setFocus()
        qtbot.keyClicks(panel.filter.marks, "b, D")
        assert marks(window) == ["D", "B"]
        assert panel.filter.count.text() == "2 of 11 shown; 1 that does not pass is hidden"
        qtbot.mouseClick(panel.filter.clear_button, Qt.MouseButton.LeftButton)
        assert len(panel.rows) == 11
        assert panel.filter.count.isHidden()
        assert panel.filter.marks.text() == ""
        qtbot.waitUntil(panel.filter.marks.findChild(QToolButton).isHidden)  # there is nothing to clear

    def test_a_combination_lists_its_own_checks_and_says_what_fails_elsewhere(self, qtbot, window):
        panel = window.findings
        pick(qtbot, panel.filter.state, "Gate")
        assert all("Gate shut" in row.row.spoken for row in panel.rows)
        assert panel.rows[0].row.band.high <= panel.rows[0].row.band.tension
        assert panel.filter.count.text() == "11 of 11 shown; 2 do not pass in another combination"
        assert panel.headline == "Does not pass"

    def test_the_filter_stays_through_an_edit(self, qtbot, window, table):
        qtbot.keyClicks(window.findings.filter.marks, "B")
        enter(table, 2, "section", "d52->39")
        solved(qtbot, window)
        assert marks(window) == ["B"]

    def test_another_project_is_shown_whole(self, qtbot, window):
        qtbot.keyClicks(window.findings.filter.marks, "B")
        window.document.load(read_sample("quay_pile"), None)
        solved(qtbot, window)
        assert window.findings.filter.sift.is_open

    def test_the_selected_by_a_key(self, qtbot, window, table):
        chord(window, Qt.Key.Key_F, Qt.KeyboardModifier.ControlModifier | Qt.KeyboardModifier.ShiftModifier)
        assert "select" in window.status.news.text()
        table.choose_records(frozenset((1, 3)))
        chord(window, Qt.Key.Key_F, Qt.KeyboardModifier.ControlModifier | Qt.KeyboardModifier.ShiftModifier)
        assert marks(window) == ["D", "B"]
        chord(window, Qt.Key.Key_A, Qt.KeyboardModifier.ControlModifier | Qt.KeyboardModifier.ShiftModifier)
        assert len(window.findings.rows) == 11

    def test_every_control_is_reached_by_tab_and_has_a_name(self, qtbot, window):
        bar = window.findings.filter
        qtbot.keyClicks(bar.marks, "D")
        bar.kind.setFocus()
        seen = []
        for _ in range(5):
            seen.append(window.focusWidget())
            qtbot.keyClick(window.focusWidget(), Qt.Key.Key_Tab)
        assert seen[:4] == [bar.kind, bar.state, bar.marks, bar.clear_button]
        assert seen[4] is window.findings.rows[0]
        assert all(part.accessibleName() for part in (bar.kind, bar.state, bar.marks))

    def test_no_name_is_cut_where_the_font_is_large(self, qtbot, window):
        bar = window.findings.filter
        font = bar.font()
        font.setPointSizeF(2 * font.pointSizeF())
        bar.setFont(font)
        qtbot.waitUntil(lambda: bar.state.geometry().top() > bar.kind.geometry().bottom())
        room = bar.state.fontMetrics().horizontalAdvance("Worst of all")
        assert bar.state.width() > room + 20
        order = [bar.kind, bar.state, bar.marks]
        assert [part.geometry().top() for part in order] == sorted(p.geometry().top() for p in order)

    def test_problems_are_never_hidden(self):
        from app.gui.findings.content import problem_rows

        problem = problem_rows(("not held",))
        assert sifted(problem, Sift("stress", None, "B")) == problem
        assert count_line(problem, problem, None) == "0 of 0 shown"

    def test_a_mark_means_itself_before_those_that_begin_so(self, window):
        everything = rows(window.showing.outcome.findings)
        one = replace(everything[0], marks=frozenset({"1"}))
        ten = replace(everything[1], marks=frozenset({"10"}))
        assert sifted((one, ten), Sift(marks="1")) == (one,)
        assert sifted((ten,), Sift(marks="1")) == (ten,)


class TestJump:
    def test_enter_goes_to_the_section_and_back(self, qtbot, window):
        row = window.findings.rows[0]
        row.setFocus()
        qtbot.keyClick(row, Qt.Key.Key_Return)
        view = window.tables.views["segments"]
        assert view.hasFocus()
        index = view.currentIndex()
        assert (text_at(view, index.row(), "mark"), view.table_model.columns[index.column()].key) == (
            "D",
            "section",
        )
        chord(window, Qt.Key.Key_G)
        assert row.hasFocus()
        chord(window, Qt.Key.Key_G)
        assert view.hasFocus()

    def test_a_double_click_on_a_limit_goes_to_it(self, qtbot, window):
        row = next(row for row in window.findings.rows if row.row.kind == "relative")
        window.findings.ensureWidgetVisible(row)
        qtbot.mouseDClick(row, Qt.MouseButton.LeftButton)
        qtbot.mouseRelease(row, Qt.MouseButton.LeftButton)
        view = window.tables.views["limits relative"]
        assert view.isVisible()
        assert view.hasFocus()
        assert view.table_model.columns[view.currentIndex().column()].key == "limit"

    def test_what_is_not_checked_leads_to_the_allowable_that_is_missing(self, qtbot, window):
        project = window.document.project
        bare = tuple(structs.replace(material, allowable_tension=UNSET) for material in project.materials)
        window.document.commit(structs.replace(project, materials=bare), "Test")
        solved(qtbot, window)
        row = next(row for row in window.findings.rows if row.row.tone == "not_made")
        row.setFocus()
        qtbot.keyClick(row, Qt.Key.Key_Enter)
        view = window.tables.views["materials"]
        assert view.hasFocus()
        assert view.table_model.columns[view.currentIndex().column()].key == "allowable_tension"

    def test_choosing_brings_the_place_into_view(self, qtbot, window):
        sheet = window.sheet
        sheet.bring_into_view((7,), ())
        assert sheet.ruler.whole_shown, "all is seen already"
        sheet.zoom(20.0, sheet.ruler.pixel(0.0))
        row = next(row for row in window.findings.rows if row.row.mark == "D")
        qtbot.mouseClick(row, Qt.MouseButton.LeftButton)
        positions = (1.380, 1.500)
        assert all(sheet.ruler.holds(x) for x in positions)


class TestCures:
    def test_a_cure_is_shown_and_applied_as_one_step(self, qtbot, window):
        cured(qtbot, window)
        first, second = window.findings.cure_lines
        assert first.sentence.replace("\u00a0", " ") == "D, F pass with A 860 mm² each, 1.00"
        assert second.sentence == first.sentence, "under F as well"
        assert first.accessibleName().startswith("Apply: D, F pass with")
        window.findings.ensureWidgetVisible(first)
        qtbot.mouseClick(first, Qt.MouseButton.LeftButton, pos=first._control().center().toPoint())
        sections = [window.document.project.segments[index].section for index in (3, 5)]
        assert sections == [AreaSection(area=8.6e-4)] * 2
        assert window.document.undo_name == "Section of D, F"
        assert window.findings.cure_lines == (), "of the member before"
        cured(qtbot, window)
        assert window.findings.cure_lines == ()
        assert window.findings.headline != "Does not pass"
        window.on_undo()
        assert window.document.project == read_sample("tie_rod")

    def test_where_none_are_sought_that_is_said(self, qtbot, window, monkeypatch):
        cured(qtbot, window)
        said = window.findings._uncured
        assert said.isHidden()
        monkeypatch.setattr("app.gui.findings.curing.is_small", lambda _results: False)
        window.document.commit(edits.set_value(window.document.project, ("title",), "Rod"), "Title")
        cured(qtbot, window)
        assert said.isVisible()
        assert "too many checks" in said.text()
        window.document.load(read_sample("hoist_shaft"), None)
        cured(qtbot, window)
        assert said.isHidden()

    def test_the_sentence_itself_is_no_button(self, qtbot, window):
        cured(qtbot, window)
        line = window.findings.cure_lines[0]
        qtbot.mouseClick(line, Qt.MouseButton.LeftButton, pos=line._text_rect().topLeft().toPoint())
        assert window.document.undo_name is None

    def test_by_the_keyboard_and_the_focus_stays_at_the_finding(self, qtbot, window):
        cured(qtbot, window)
        row = window.findings.rows[0]
        row.setFocus()
        qtbot.keyClick(row, Qt.Key.Key_Tab)
        assert window.focusWidget() is window.findings.cure_lines[0]
        qtbot.keyClick(window.focusWidget(), Qt.Key.Key_Return)
        assert window.document.undo_name == "Section of D, F"
        assert row.hasFocus()

    def test_an_edit_takes_the_cures_away_at_once_and_new_ones_come(self, qtbot, window, table):
        cured(qtbot, window)
        enter(table, 4, "section", "A 800")
        assert window.findings.cure_lines == ()
        cured(qtbot, window)
        texts = [line.cure.change.text for line in window.findings.cure_lines if line.cure]
        assert "A 860 mm²" in texts

    def test_nothing_is_sought_while_a_cell_is_being_typed(self, qtbot, window, table):
        cured(qtbot, window)
        table.setCurrentIndex(table.table_model.index(4, 2))
        qtbot.keyClicks(table, "9")
        solved(qtbot, window)
        assert window.document.preview is not None
        assert window.curing.is_settled
        assert window.findings.cure_lines == ()
        (line,) = [line for line in table.findChildren(QLineEdit) if line.isVisible()]
        qtbot.keyClick(line, Qt.Key.Key_Escape)
        cured(qtbot, window)
        assert len(window.findings.cure_lines) == 2

    def test_out_of_date_findings_have_none(self, qtbot, window, table):
        cured(qtbot, window)
        enter(table, 4, "section", "nonsense")
        assert window.findings.is_marked_out_of_date
        assert window.findings.cure_lines == ()

    def test_the_search_sees_a_cancel(self, window):
        results = window.showing.outcome.results
        subject = window.findings.rows[0].row.about
        assert isinstance(compute_cures((results, subject), lambda: False), Cures)
        with pytest.raises(Cancelled):
            compute_cures((results, subject), lambda: True)

    def test_closing_while_it_seeks_is_clean(self, qtbot, window):
        cured(qtbot, window)
        results, subject = window.showing.outcome.results, window.findings.rows[0].row.about
        window.curing.solver.request((results, subject))
        assert window.curing.solver.busy
        window.curing.close()
        assert not window.curing.solver.busy

    def test_a_fault_of_ours_goes_to_the_log_and_the_next_is_sought(self, qtbot, window, monkeypatch):
        cured(qtbot, window)
        logged = []
        monkeypatch.setattr(
            "app.gui.findings.curing.log.log_error", lambda where, error: logged.append(where)
        )
        real = window.curing.solver._compute
        worst = window.findings.rows[0].row.about

        def fails_first(job, cancelled):
            if job[1] == worst:
                raise ZeroDivisionError("a fault of ours")
            return real(job, cancelled)

        window.curing.solver._compute = fails_first
        window.document.commit(edits.set_value(window.document.project, ("title",), "Rod"), "Title")
        cured(qtbot, window)
        assert logged == ["cures"]
        assert [line.cure.change.marks for line in window.findings.cure_lines] == [("D", "F")]

    def test_a_cure_for_an_earlier_member_is_not_made(self, qtbot, window):
        cured(qtbot, window)
        cure = window.findings.cure_lines[0].cure
        project = edits.set_value(window.document.project, ("segments", 0, "length"), 0.2)
        window.document.commit(project, "Test")
        window.curing.on_wanted(cure)
        assert window.document.project is project
        cured(qtbot, window)
        window.curing.on_wanted(cure)
        assert window.document.project is project
        assert window.status.news.text()

    def test_no_cure_stands_under_other_or_older_findings(self, qtbot, window):
        cured(qtbot, window)
        panel, findings = window.findings, window.showing.outcome.findings
        panel.show_findings(findings, (), False)
        assert panel.cure_lines == ()
        panel.show_cures(window.curing._found)
        assert panel.cure_lines == ()
        panel.show_findings(findings, (), True)
        panel.show_cures(window.curing._found)
        assert len(panel.cure_lines) == 2
        panel.show_findings(replace(findings), (), True)
        assert panel.cure_lines == ()


def test_a_band_named_once_stays_named_when_the_first_is_hidden(window):
    everything = rows(window.showing.outcome.findings)
    scales = [row for row in everything if row.band is not None]
    hidden_first = sifted(everything, Sift(marks="F"))
    assert [row.mark for row in hidden_first] == ["F"]
    assert scales[0].band_named
    assert window.findings.rows
    window.findings.filter.ask_for_marks(["F"])
    (row,) = window.findings.rows
    assert row.row.band_named
    assert replace(row.row, band_named=False) == replace(hidden_first[0], band_named=False)
