"""The whole window: from keys to results, files, questions, faults, and a clean end."""

import json
import threading

import pytest
from msgspec import UNSET
from msgspec.structs import replace
from PySide6.QtCore import QItemSelectionModel, QMimeData, QPoint, QPointF, Qt, QUrl
from PySide6.QtGui import QAccessible, QColor, QDropEvent, QPalette, QWheelEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import (
    QAbstractButton,
    QAbstractItemView,
    QComboBox,
    QFileDialog,
    QLineEdit,
    QMessageBox,
    QWidget,
)
from shiboken6 import isValid

from app import edits, project_file, samples
from app.gui import log
from app.gui.dialogs import TextDialog
from app.gui.document import Draft
from app.gui.main import is_sample, offer_recovery, open_window
from app.gui.outcome import first_shown, governing
from app.gui.recovery import encode, left_behind
from app.gui.show import GRACE
from app.gui.tables.delegate import BAR_WIDTH, MARGIN
from app.gui.view import Shown
from app.sheet.title import Origin, title_block
from app.units import SYSTEM_NAMES
from solver.errors import Cancelled
from solver.model import SheetTexts
from tests.gui.hand import begin, cell, chord, editor, enter, go_to
from tests.gui.windows import dialog_of, end, finish, solved

KEY = Qt.Key
SHIFT = Qt.KeyboardModifier.ShiftModifier
CONTROL = Qt.KeyboardModifier.ControlModifier


# Results follow


def test_a_file_opens_solved_and_unmodified(window, rod):
    assert window.document.path == rod
    assert not window.isWindowModified()
    assert window.windowTitle() == "rod.barwright.json[*] – Barwright"
    assert "Solved in" in window.status.solver.text()
    assert "umerical error" in window.status.solver.text()


def test_each_keystroke_shows_its_own_results(qtbot, window, table):
    go_to(table, 1, "length")
    line = begin(table, "9")
    solved(qtbot, window)
    assert window.showing.outcome.project.segments[0].length == pytest.approx(0.009)
    QTest.keyClicks(line, "9")
    solved(qtbot, window)
    assert window.showing.outcome.project.segments[0].length == pytest.approx(0.099)
    QTest.keyClick(line, KEY.Key_Escape)
    solved(qtbot, window)
    assert window.showing.outcome.project == window.document.project
    assert not window.isWindowModified()


def test_what_is_not_taken_in_makes_the_results_out_of_date(qtbot, window, table):
    go_to(table, 1, "length")
    line = begin(table, "abc")
    assert not window.showing.current
    assert "out of date" in window.status.solver.text()
    assert window.sheet.notice, "the sheet says that it is out of date"
    QTest.keyClick(line, KEY.Key_Return)
    assert not window.showing.current
    assert "Length of A" in window.status.solver.text()
    chord(window, KEY.Key_Z)
    solved(qtbot, window)
    assert not window.sheet.notice


def test_a_paste_that_is_taken_in_only_in_part_is_out_of_date_at_once(qapp, window, table):
    qapp.clipboard().setText("900\nabc")
    go_to(table, 1, "length")
    window.actions_by_key["paste"].trigger()
    assert "out of date" in window.status.solver.text()
    assert window.sheet.notice


def test_a_result_on_its_way_is_not_shown_as_current(qtbot, window, table):
    enter(table, 1, "length", "900")
    assert not window.showing.current
    window.showing.on_late()
    assert "Solving" in window.status.solver.text()
    assert window.sheet.notice
    solved(qtbot, window)


def test_undo_and_redo_of_everything_by_keys_with_their_names(qtbot, window, table):
    before = window.document.project
    enter(table, 1, "length", "900")
    window.on_units_picked("m-kN-MPa")
    window.on_layout_picked("vertical")
    names = []
    for _ in range(3):
        names.append(window.actions_by_key["undo"].text())
        chord(window, KEY.Key_Z)
    assert names == ["&Undo Lay", "&Undo Units", "&Undo Length of A"]
    assert window.document.project is before
    assert not window.actions_by_key["undo"].isEnabled()
    QTest.keyClick(window, KEY.Key_Z, CONTROL | SHIFT)
    QTest.keyClick(window, KEY.Key_Control)
    assert window.document.project.segments[0].length == 0.9


def test_before_the_first_result_the_sheet_says_that_it_is_solved(qtbot, store, rod, tmp_path):
    made = open_window(rod, store, tmp_path / "recovery")
    assert made.sheet.notice == "Solving…", "the findings are empty and say nothing yet"
    solved(qtbot, made)
    assert made.sheet.notice == ""
    end(qtbot, made)


def test_a_fault_before_the_first_result_is_no_endless_solving(
    qtbot, store, rod, tmp_path, monkeypatch, caplog
):
    def broken(*_args, **_keys):
        raise ZeroDivisionError("planted")

    with monkeypatch.context() as patch, caplog.at_level("CRITICAL", logger=log.LOGGER.name):
        patch.setattr("solver.solve.solve", broken)
        made = open_window(rod, store, tmp_path / "recovery")
        qtbot.waitUntil(lambda: "planted" in made.status.solver.text(), timeout=5000)
    assert "findings" in made.sheet.notice
    assert "planted" in made.findings.rows[0].row.text
    end(qtbot, made)


def test_a_member_that_is_not_held_says_what_is_missing(qtbot, window, table):
    for row in range(table.table_model.rowCount() - 1):
        table.table_model.setData(cell(table, row, "support"), "free")
    qtbot.waitUntil(lambda: window.showing.current, timeout=5000)
    assert window.showing.outcome.results is None
    assert window.showing.outcome.problems[0] in window.status.solver.text()
    assert "Solved" not in window.status.solver.text()


def test_a_fault_in_the_solver_is_told_and_logged_and_the_next_edit_works(
    qtbot, window, table, monkeypatch, caplog
):
    def broken(*_args, **_keys):
        raise ZeroDivisionError("planted")

    with monkeypatch.context() as patch, caplog.at_level("ERROR", logger=log.LOGGER.name):
        patch.setattr("solver.solve.solve", broken)
        enter(table, 1, "length", "900")
        qtbot.waitUntil(lambda: "planted" in window.status.solver.text(), timeout=5000)
        assert not window.showing.current
    assert "planted" in caplog.text
    enter(table, 1, "length", "901")
    solved(qtbot, window)
    assert "Solved" in window.status.solver.text()


@pytest.fixture
def endless_solver(window, monkeypatch):
    """From now on the solver ends only when it is told to."""
    started = threading.Event()

    def endless(_project, *, cancelled):
        started.set()
        while not cancelled():
            threading.Event().wait(0.001)
        raise Cancelled

    monkeypatch.setattr("solver.solve.solve", endless)
    return started


def test_closing_while_the_solver_runs_is_clean(qtbot, window, table, tmp_path, endless_solver):
    enter(table, 1, "length", "900")
    qtbot.waitUntil(endless_solver.is_set, timeout=5000)
    end(qtbot, window)
    assert list((tmp_path / "recovery").iterdir()) == []


def test_in_a_burst_of_edits_what_is_shown_is_soon_marked_as_out_of_date(
    qtbot, window, table, endless_solver
):
    go_to(table, 1, "length")
    line = begin(table, "1")
    for _ in range(4):
        qtbot.wait(GRACE // 2)  # each keystroke comes before the grace of the one before has passed
        QTest.keyClicks(line, "1")
    assert window.sheet.notice
    assert "Solving" in window.status.solver.text()
    QTest.keyClick(line, KEY.Key_Escape)


# Pickers


def test_it_opens_on_the_state_that_governs(qtbot, window):
    assert window.view.shown == governing(window.showing.outcome.results)
    assert window.top_bar.show_picker.currentText() == window.view.shown.name
    window.samples_menu.aboutToShow.emit()
    for action in window.samples_menu.actions():
        action.trigger()
        assert window.view.shown == first_shown(window.document.project), "with loads while it is solved"
        solved(qtbot, window)
        assert window.view.shown == governing(window.showing.outcome.results)


def test_what_a_person_has_picked_is_not_left_when_results_arrive(qtbot, window, table):
    window.samples_menu.aboutToShow.emit()
    window.samples_menu.actions()[0].trigger()
    window.top_bar.show_picker.picked.emit(Shown("envelope"))
    solved(qtbot, window)
    assert window.view.shown == Shown("envelope")


def test_another_edit_does_not_change_what_is_looked_at(qtbot, window, table):
    shown = window.view.shown
    other = next(c.name for c in window.document.project.combinations if c.name != shown.name)
    window.view.set_shown(Shown("combination", other))
    enter(table, 1, "length", "900")
    solved(qtbot, window)
    assert window.view.shown == Shown("combination", other)


def test_renaming_what_is_looked_at_also_letter_by_letter_keeps_looking_at_it(qtbot, window):
    name = window.document.project.combinations[0].name
    window.view.set_shown(Shown("combination", name))
    window.tables.tabs.setCurrentIndex(3)
    names = window.tables.views["combinations"]
    go_to(names, 0, "name")
    line = begin(names, "Wi")
    assert window.top_bar.show_picker.currentText() == "Wi"
    QTest.keyClick(line, KEY.Key_Escape)
    assert window.view.shown == Shown("combination", name)
    enter(names, 0, "name", "Winter")
    assert window.view.shown == Shown("combination", "Winter")
    solved(qtbot, window)


@pytest.mark.parametrize("system", SYSTEM_NAMES)
def test_every_unit_system_is_shown_and_remembered(qtbot, window, store, system):
    window.top_bar.units_picker.picked.emit(system)
    assert window.document.project.display.unit_system == system
    assert window.tables.sight.system == system
    assert store.units == system
    solved(qtbot, window)


def test_the_show_picker_sets_what_the_strips_show_and_is_no_undo_step(qtbot, window):
    picker = window.top_bar.show_picker
    picker.setFocus()
    QTest.keyClick(picker, KEY.Key_Home)
    assert window.view.shown == Shown("envelope")
    QTest.keyClick(picker, KEY.Key_Down)
    name = window.document.project.combinations[0].name
    assert window.view.shown == Shown("combination", name)
    assert window.document.undo_name is None
    window.view.set_shown(Shown("envelope"))
    assert picker.currentText() == "Envelope"


def test_laying_the_sheet_upright_is_a_step_of_the_project(window):
    picker = window.top_bar.layout_picker
    picker.setFocus()
    QTest.keyClick(picker, KEY.Key_End)
    assert window.document.project.display.layout == "vertical"
    assert window.document.undo_name == "Lay"


def test_picking_what_is_already_so_is_no_step(qtbot, window):
    bare = edits.set_value(window.document.project, ("display",), UNSET)
    window.document.load(bare, window.document.path)
    window.top_bar.units_picker.picked.emit(bare.display.unit_system)
    window.top_bar.layout_picker.picked.emit(bare.display.layout)
    assert window.document.undo_name is None
    assert not window.isWindowModified()


def wheel(qapp, widget, turn):
    """Turn the mouse wheel over a widget."""
    point, none = QPointF(5, 5), Qt.KeyboardModifier.NoModifier
    event = QWheelEvent(
        point,
        QPointF(widget.mapToGlobal(point.toPoint())),
        QPoint(),
        QPoint(0, turn),
        Qt.MouseButton.NoButton,
        none,
        Qt.ScrollPhase.NoScrollPhase,
        False,
    )
    qapp.sendEvent(widget, event)


@pytest.mark.parametrize("of", ["case", "units"])
def test_the_wheel_changes_a_picker_only_while_it_has_the_keyboard(qapp, window, table, of):
    picker = window.tables.case_picker if of == "case" else window.top_bar.units_picker
    table.setFocus()
    wheel(qapp, picker, -120)
    assert picker.currentIndex() == 0
    picker.setFocus()
    wheel(qapp, picker, -120)
    assert picker.currentIndex() == 1


def test_tab_goes_from_the_findings_through_filter_rows_and_cures_and_only_then_on(qtbot, window):
    def focused():
        return window.focusWidget()

    findings = window.findings
    rows = [row for row in findings.rows if row.row.leads_somewhere]
    assert len(rows) > 2
    qtbot.waitUntil(lambda: len(findings.cure_lines) == 2, timeout=10_000)
    cured = dict(zip(rows, findings.cure_lines, strict=False))  # the worst two fail
    bar = findings.filter
    findings.setFocus()
    for part in (bar.kind, bar.state, bar.marks, *(p for row in rows for p in (row, cured.get(row)) if p)):
        QTest.keyClick(focused(), KEY.Key_Tab)
        assert focused() is part
    QTest.keyClick(focused(), KEY.Key_Tab)
    assert not findings.isAncestorOf(focused())
    QTest.keyClick(focused(), KEY.Key_Backtab)
    assert focused() is rows[-1]


# Member commands


def test_segments_are_inserted_split_joined_reversed_and_deleted_by_commands(window, table):
    count = len(window.document.project.segments)
    go_to(table, 2, "length")
    for key, expected in (("insert_after", count + 1), ("delete_segments", count), ("split", count + 1)):
        window.actions_by_key[key].trigger()
        assert len(window.document.project.segments) == expected
        go_to(table, 3, "length")
    before = window.document.project
    window.actions_by_key["reverse"].trigger()
    window.actions_by_key["reverse"].trigger()
    assert window.document.project == before
    go_to(table, 3, "length")
    window.actions_by_key["split"].trigger()
    go_to(table, 3, "length")
    window.actions_by_key["join"].trigger()
    assert len(window.document.project.segments) == count + 1


def test_a_segment_inserted_after_the_start_row_is_the_first(window, table):
    go_to(table, 0, "support")
    window.actions_by_key["insert_after"].trigger()
    assert window.document.project.segments[0].mark == "I"


@pytest.mark.parametrize("key", [KEY.Key_Backspace, KEY.Key_Delete])
def test_deleting_a_word_in_a_cell_deletes_no_segment(window, table, key):
    count = len(window.document.project.segments)
    go_to(table, 2, "length")
    line = begin(table, "90 mm")
    chord(line, key)
    assert line.isVisible()
    assert line.text() == ("90 " if key == KEY.Key_Backspace else "90 mm")
    QTest.keyClick(line, KEY.Key_Escape)
    assert len(window.document.project.segments) == count
    assert window.document.undo_name is None


def test_a_segment_is_split_in_the_middle_of_the_length_being_typed(window, table):
    go_to(table, 2, "length")
    begin(table, "900")
    window.actions_by_key["split"].trigger()
    assert [s.length for s in window.document.project.segments[1:3]] == [0.45, 0.45]


def test_only_segments_side_by_side_are_joined(window, table):
    table.clearSelection()
    for row in (1, 3):
        table.selectionModel().select(cell(table, row, "length"), QItemSelectionModel.SelectionFlag.Select)
    window.actions_by_key["join"].trigger()
    assert window.document.undo_name is None
    assert "side by side" in window.status.news.text()


def test_rows_are_deleted_in_the_table_that_last_had_the_keyboard(window):
    window.tables.tabs.setCurrentIndex(2)
    loads = window.tables.views["segment_loads"]
    window.tables.views["load_cases"].setCurrentIndex(window.tables.views["load_cases"].model().index(0, 0))
    loads.setFocus()
    loads.setCurrentIndex(loads.model().index(0, 0))
    cases = window.document.project.load_cases
    window.sheet.setFocus()
    window.actions_by_key["delete_rows"].trigger()
    assert len(window.document.project.load_cases) == len(cases)
    assert len(window.document.project.load_cases[0].segment_loads) == len(cases[0].segment_loads) - 1


def test_the_last_segment_cannot_be_deleted_and_the_status_says_so(window, table):
    table.selectAll()
    window.actions_by_key["delete_segments"].trigger()
    assert "at least one segment" in window.status.news.text()
    assert window.document.undo_name is None


def test_rows_of_the_table_with_the_keyboard_are_deleted(window):
    window.tables.tabs.setCurrentIndex(3)
    view = window.tables.views["combinations"]
    view.setFocus()
    view.setCurrentIndex(view.table_model.index(0, 0))
    count = len(window.document.project.combinations)
    chord(view, KEY.Key_Backspace)
    assert len(window.document.project.combinations) == count - 1


# Files


def test_saving_by_key_takes_in_the_open_editor_and_writes_the_canonical_bytes(window, table, rod):
    go_to(table, 1, "length")
    begin(table, "900")
    window.actions_by_key["save"].trigger()
    assert project_file.read(rod).segments[0].length == 0.9
    assert rod.read_bytes() == project_file.dump(window.document.project)
    assert not window.isWindowModified()


def test_saving_with_a_draft_names_the_cell_and_stays_changed(window, table, rod):
    enter(table, 2, "length", "900")
    enter(table, 1, "length", "abc")
    window.actions_by_key["save"].trigger()
    assert "Length of A “abc”" in window.status.news.text()
    assert window.isWindowModified()
    assert project_file.read(rod).segments[1].length == 0.9


def test_save_as_asks_for_a_file_with_its_full_suffix(qtbot, window, tmp_path):
    window.actions_by_key["save_as"].trigger()
    dialog = dialog_of(window, QFileDialog)
    assert dialog.defaultSuffix() == "barwright.json"
    finish(qtbot, dialog, lambda: dialog.done(0))
    assert window.files.write(tmp_path / "other.barwright.json")
    assert window.document.path == tmp_path / "other.barwright.json"
    assert window.store.recent[0] == tmp_path / "other.barwright.json"


def test_a_save_that_fails_says_why_and_keeps_the_work(qtbot, window, table, tmp_path):
    enter(table, 1, "length", "900")
    assert not window.files.write(tmp_path / "no such folder" / "x.barwright.json")
    dialog = dialog_of(window, TextDialog)
    assert "there is no such file or folder" in dialog.body.toPlainText()
    assert window.isWindowModified()
    finish(qtbot, dialog, dialog.reject)


@pytest.mark.parametrize("write_over", [True, False])
def test_a_file_that_another_program_changed_is_not_written_over_unasked(
    qtbot, window, table, rod, write_over
):
    enter(table, 1, "length", "900")
    window.actions_by_key["save"].trigger()
    theirs = edits.set_value(window.document.project, ("title",), "theirs")
    rod.write_bytes(project_file.dump(theirs))
    enter(table, 1, "length", "901")
    window.actions_by_key["save"].trigger()
    question = dialog_of(window, QMessageBox)
    assert project_file.read(rod) == theirs
    button = next(b for b in question.buttons() if (b.text() == "Write over it") == write_over)
    finish(qtbot, question, button.click)
    assert window.isWindowModified() != write_over
    assert (project_file.read(rod) == theirs) != write_over


def test_a_file_that_was_removed_is_written_again(window, table, rod):
    enter(table, 1, "length", "900")
    rod.unlink()
    window.actions_by_key["save"].trigger()
    assert project_file.read(rod) == window.document.project


def test_a_file_with_faults_lists_them_all_and_changes_nothing(qtbot, qapp, window, tmp_path):
    before = window.document.project
    broken = json.loads(samples.sample_path().read_text("utf-8"))
    broken["segments"][0]["length"] = -1
    broken["segments"][1]["material"] = "Nowhere"
    path = tmp_path / "broken.barwright.json"
    path.write_text(json.dumps(broken), "utf-8")
    window.files.open_path(path)
    dialog = dialog_of(window, TextDialog)
    text = dialog.body.toPlainText()
    assert "segments[0].length" in text
    assert "Nowhere" in text
    assert len(text.splitlines()) >= 2
    dialog.copy.click()
    assert qapp.clipboard().text() == text
    assert window.document.project is before
    finish(qtbot, dialog, dialog.reject)


def drop(window, path):
    data = QMimeData()
    data.setUrls([QUrl.fromLocalFile(str(path))])
    action, button = Qt.DropAction.CopyAction, Qt.MouseButton.LeftButton
    event = QDropEvent(QPointF(50, 50), action, data, button, Qt.KeyboardModifier.NoModifier)
    window.dropEvent(event)
    return event


def test_a_dropped_file_is_opened(qtbot, window, tmp_path):
    path = tmp_path / "pile.barwright.json"
    path.write_bytes(samples.sample_path("quay_pile").read_bytes())
    assert drop(window, path).isAccepted()
    assert window.document.path == path


def test_new_is_blank_valid_and_solves_in_the_units_chosen_last(qtbot, window, store):
    store.set_units("in-lbf-psi")
    window.actions_by_key["new"].trigger()
    assert window.document.path is None
    assert window.document.project.display.unit_system == "in-lbf-psi"
    solved(qtbot, window)
    assert window.showing.outcome.results is not None


def test_a_sample_is_opened_as_a_new_project_and_never_written_over(qtbot, window, store, tmp_path):
    assert is_sample(samples.sample_path())
    assert not is_sample(tmp_path / samples.sample_path().name)
    window.samples_menu.aboutToShow.emit()
    window.samples_menu.actions()[0].trigger()
    assert window.document.path is None
    assert window.document.project == samples.read_sample()


def test_recent_files_stand_in_their_menu(window, rod):
    window.recent_menu.aboutToShow.emit()
    assert window.recent_menu.actions()[0].text() == str(rod)


# The question about unsaved changes


@pytest.mark.parametrize(
    ("button", "closes", "saved"),
    [
        (QMessageBox.StandardButton.Save, True, True),
        (QMessageBox.StandardButton.Discard, True, False),
        (QMessageBox.StandardButton.Cancel, False, False),
    ],
)
def test_closing_with_changes_asks(qtbot, window, table, rod, button, closes, saved):
    enter(table, 1, "length", "900")
    window.close()
    assert window.isVisible()
    question = dialog_of(window, QMessageBox)
    assert question.defaultButton() is question.button(QMessageBox.StandardButton.Save)
    finish(qtbot, question, question.button(button).click)
    qtbot.waitUntil(lambda: isValid(window) != closes, timeout=2000)
    assert (project_file.read(rod).segments[0].length == 0.9) == saved


def test_escape_answers_the_question_with_cancel(qtbot, window, table):
    enter(table, 1, "length", "900")
    window.actions_by_key["new"].trigger()
    question = dialog_of(window, QMessageBox)
    finish(qtbot, question, lambda: QTest.keyClick(question, KEY.Key_Escape))
    assert window.document.project.segments[0].length == 0.9


def test_a_save_that_fails_cancels_the_closing(qtbot, window, table, monkeypatch):
    def full(*_args):
        raise OSError(28, "No space left on device")

    monkeypatch.setattr("app.project_file.write_bytes", full)
    enter(table, 1, "length", "900")
    window.close()
    question = dialog_of(window, QMessageBox)
    finish(qtbot, question, question.button(QMessageBox.StandardButton.Save).click)
    told = dialog_of(window, TextDialog)
    assert "No space left" in told.body.toPlainText()
    finish(qtbot, told, told.reject)
    assert window.isVisible()
    assert window.isWindowModified()


def test_there_is_one_question_at_a_time(qtbot, window, table, rod):
    enter(table, 1, "length", "900")
    window.close()
    window.close()
    drop(window, rod)
    question = dialog_of(window, QMessageBox)
    finish(qtbot, question, question.button(QMessageBox.StandardButton.Cancel).click)
    drop(window, rod)
    question = dialog_of(window, QMessageBox)
    finish(qtbot, question, question.button(QMessageBox.StandardButton.Discard).click)
    assert not window.isWindowModified()
    assert window.document.project == project_file.read(rod)


def test_save_before_closing_does_not_lose_a_draft_unasked(qtbot, window, table):
    enter(table, 1, "length", "abc")
    window.close()
    question = dialog_of(window, QMessageBox)
    finish(qtbot, question, question.button(QMessageBox.StandardButton.Save).click)
    assert window.isVisible()
    assert "abc" in window.status.news.text()


# Recovery, faults, dialogs


def test_work_left_behind_is_offered_and_opened_with_its_drafts(qtbot, window, tmp_path, rod):
    folder = tmp_path / "left"
    folder.mkdir()
    window.document.commit_draft(("segments", 0, "length"), Draft("abc", "not a number", "Length of A"), "x")
    (folder / "1.recovery.json").write_bytes(encode(window.document.snapshot, rod))
    window.document.undo()
    offer_recovery(window, left_behind(folder))
    question = dialog_of(window, QMessageBox)
    assert "rod.barwright.json" in question.text()
    finish(qtbot, question, lambda: QTest.keyClick(question, KEY.Key_Return))
    assert window.document.path == rod
    assert window.isWindowModified()
    assert [draft.text for draft in window.document.snapshot.drafts.values()] == ["abc"]
    assert list(folder.glob("*.recovery.json")) == []
    assert window.recovery.copy.exists(), "the work is safe again before the old copy goes"


def test_the_old_copy_is_kept_where_no_new_one_can_be_written(qtbot, window, tmp_path, rod, monkeypatch):
    def full(*_args):
        raise OSError(28, "No space left on device")

    folder = tmp_path / "left"
    folder.mkdir()
    (folder / "1.recovery.json").write_bytes(encode(window.document.snapshot, rod))
    monkeypatch.setattr("app.gui.recovery.write_bytes", full)
    offer_recovery(window, left_behind(folder))
    question = dialog_of(window, QMessageBox)
    finish(qtbot, question, lambda: QTest.keyClick(question, KEY.Key_Return))
    assert len(list(folder.glob("*.recovery.json"))) == 1
    assert "No space left" in window.status.news.text()


def test_where_no_recovery_copy_can_be_kept_the_window_works(qtbot, store, rod, tmp_path):
    blocked = tmp_path / "a file"
    blocked.write_text("in the way")
    window = open_window(rod, store, blocked / "recovery")
    solved(qtbot, window)
    window.document.commit_draft(("segments", 0, "length"), Draft("abc", "not a number", "Length of A"), "x")
    assert not window.recovery.write()
    assert "no recovery copy" in window.status.news.text()
    end(qtbot, window)


def test_a_fault_is_told_also_over_another_text(qtbot, window):
    window.actions_by_key["log"].trigger()
    other = dialog_of(window, TextDialog)
    window.help.show_fault("Traceback …")
    texts = {dialog.body.toPlainText() for dialog in window.findChildren(TextDialog)}
    assert "Traceback …" in texts
    for dialog in window.findChildren(TextDialog):
        finish(qtbot, dialog, dialog.reject)
    assert other


def test_an_uncaught_fault_is_told_once_with_its_report(qtbot, window):
    window.help.show_fault("Traceback …")
    window.help.show_fault("another")
    dialog = dialog_of(window, TextDialog)
    assert dialog.body.toPlainText() == "Traceback …"
    finish(qtbot, dialog, dialog.reject)


def test_the_title_block_is_one_step(qtbot, window):
    window.actions_by_key["title_block"].trigger()
    from app.gui.title_block import TitleBlockDialog

    dialog = dialog_of(window, TitleBlockDialog)
    printed = [name for name, _ in title_block(window.document.project, Origin("", "", "", ""))["fields"]]
    asked = [field.accessibleName() for field in dialog.fields.values()]
    assert asked == printed[: len(asked)], "the form calls its fields what the sheet calls them"
    dialog.title.selectAll()
    QTest.keyClicks(dialog.title, "Mooring rod")
    QTest.keyClicks(dialog.fields["checker"], "H. Lind")
    finish(qtbot, dialog, dialog.accept)
    project = window.document.project
    assert (project.title, project.sheet.checker) == ("Mooring rod", "H. Lind")
    window.document.undo()
    assert not window.isWindowModified()


@pytest.mark.parametrize("key", ["about", "log"])
def test_help_can_be_read_and_copied(qtbot, window, key):
    window.actions_by_key[key].trigger()
    dialog = dialog_of(window, TextDialog)
    assert len(dialog.body.toPlainText()) > 10
    finish(qtbot, dialog, dialog.reject)


# The calc sheet


def test_the_calc_sheet_is_written_in_the_background_under_the_files_name(qtbot, window, tmp_path):
    window.actions_by_key["sheet"].trigger()
    dialog = dialog_of(window, QFileDialog)
    name = dialog.findChild(QLineEdit)
    assert name is None or name.text() == "rod.pdf"
    finish(qtbot, dialog, lambda: dialog.done(0))
    target = tmp_path / "rod.pdf"
    with qtbot.waitSignal(window.printing._worker.ready, timeout=20000):
        window.printing.write(target)
    assert target.read_bytes().startswith(b"%PDF")
    assert "rod.pdf written" in window.status.news.text()


@pytest.mark.parametrize(
    ("texts", "told"), [({}, True), ({"job": " "}, True), ({"checker": "E. Lund"}, False)]
)
def test_a_calc_sheet_with_an_empty_title_block_says_where_it_is(qtbot, window, tmp_path, texts, told):
    window.document.commit(replace(window.document.project, sheet=SheetTexts(**texts)), "Title block")
    with qtbot.waitSignal(window.printing._worker.ready, timeout=20000):
        window.printing.write(tmp_path / "rod.pdf")
    assert "rod.pdf written" in window.status.news.text()
    assert ("empty: File > Title block…" in window.status.news.text()) is told


def test_one_calc_sheet_at_a_time_and_none_is_dropped_unsaid(qtbot, window, tmp_path):
    with qtbot.waitSignal(window.printing._worker.ready, timeout=20000):
        window.printing.write(tmp_path / "a.pdf")
        window.printing.write(tmp_path / "b.pdf")
        assert "still being written" in window.status.news.text()
    assert (tmp_path / "a.pdf").exists()
    assert not (tmp_path / "b.pdf").exists()


def test_a_sheet_that_cannot_be_written_says_why(qtbot, window, tmp_path):
    with qtbot.waitSignal(window.printing._worker.failed, timeout=20000):
        window.printing.write(tmp_path / "no such folder" / "rod.pdf")
    assert "No calc sheet written" in window.status.news.text()


# Reaching everything


def test_every_control_has_an_accessible_name(window):
    kinds = (QAbstractButton, QComboBox, QLineEdit, QAbstractItemView)
    nameless = [
        widget
        for kind in kinds
        for widget in window.findChildren(kind)
        if widget.isVisible() and not spoken(widget)
    ]
    assert nameless == []


def spoken(widget: QWidget) -> str:
    interface = QAccessible.queryAccessibleInterface(widget)
    return interface.text(QAccessible.Text.Name) if interface else ""


def test_f6_goes_round_the_panes_and_back(window):
    start = window.focusWidget()
    seen = []
    for _ in range(5):
        QTest.keyClick(window, KEY.Key_F6)
        seen.append(window.focusWidget())
    assert len({id(widget) for widget in seen}) == 5
    assert seen[-1] is start
    QTest.keyClick(window, KEY.Key_F6, SHIFT)
    assert window.focusWidget() is seen[-2]


def test_geometry_and_splitters_come_back(qtbot, window, store, rod, tmp_path):
    window.resize(1000, 580)  # the screen that the tests have is small
    window.panes.down.setSizes([200, 300])
    share = window.panes.down.sizes()[0] / sum(window.panes.down.sizes())
    end(qtbot, window)
    again = open_window(rod, store, tmp_path / "recovery")
    assert again.height() == 580
    assert again.panes.down.sizes()[0] / sum(again.panes.down.sizes()) == pytest.approx(share, abs=0.02)
    end(qtbot, again)


def test_nothing_is_cut_off_in_the_bars_at_the_least_usual_size(window):
    window.resize(1280, 800)
    for button in window.top_bar.findChildren(QAbstractButton):
        assert button.width() >= button.minimumSizeHint().width()
    for picker in window.top_bar.findChildren(QComboBox):
        widest = max(
            picker.fontMetrics().horizontalAdvance(picker.itemText(i)) for i in range(picker.count())
        )
        assert picker.width() >= widest + 20
    assert window.top_bar.minimumSizeHint().width() <= 1280


@pytest.mark.parametrize("system", SYSTEM_NAMES)
def test_every_utilisation_can_be_read_at_the_least_usual_size(qtbot, window, table, system):
    window.on_units_picked(system)
    window.resize(1280, 800)
    solved(qtbot, window)
    column = cell(table, 1, "utilisation").column()
    room = table.columnWidth(column) - BAR_WIDTH - 10 - 2 * MARGIN
    for row in range(1, table.table_model.record_rows):
        text = table.table_model.index(row, column).data()
        assert text
        assert table.fontMetrics().horizontalAdvance(text) <= room
    assert table.horizontalHeader().length() <= table.viewport().width()


def test_light_and_dark_follow_the_system(qapp, window):
    light, dark = qapp.palette(), QPalette(QColor("#202020"))
    assert not window._theme.is_dark
    try:
        qapp.setPalette(dark)
        qapp.processEvents()
        assert window._theme.is_dark
        assert window.tables.views["segments"]._cells.theme.is_dark
    finally:
        qapp.setPalette(light)
        qapp.processEvents()
    assert not window._theme.is_dark


def test_an_editor_left_open_is_the_first_thing_undone(window, table):
    go_to(table, 1, "length")
    begin(table, "900")
    window.on_undo()
    assert window.document.redo_name == "Length of A"
    assert not [line for line in table.findChildren(QLineEdit) if line.isVisible()]
    QTest.keyClick(table, KEY.Key_F2)
    assert editor(table).text() != "900"
    QTest.keyClick(editor(table), KEY.Key_Escape)
