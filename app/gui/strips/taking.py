"""Takes strips elsewhere: as a picture or as numbers, to the clipboard or to a file.

A picture of the whole sheet or of one strip is what the window shows, twice as fine; a file that ends in .svg
is drawn by the writer of the calc sheet's figures, as lines. Numbers are given only of current results, since
a spreadsheet cannot say that they are out of date.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path
from typing import Protocol

from PySide6.QtCore import QBuffer, QIODevice, QMimeData, QObject, QRectF, Signal
from PySide6.QtGui import QGuiApplication, QImage, QPainter
from PySide6.QtWidgets import QFileDialog, QWidget

from app.atomic import write_bytes
from app.gui.outcome import Outcome
from app.gui.settings import Settings
from app.gui.sheet_layout import GAP
from app.gui.sheet_view import SheetView
from app.gui.shown_results import results_to_show
from app.gui.strips.hand import Grips
from app.gui.tables.clipboard import block_text
from app.gui.theme import colour, theme_for
from app.gui.view import View
from app.mode_shape import why_no_shape
from app.strip_choice import Kind
from app.strip_numbers import csv_text, number_rows
from app.words import tr
from solver.results import Results

FINENESS = 2.0  # pixels of a picture for one of the window
ROOM = 0.5 * GAP  # around a strip, for what reaches over its edges


class Shown(Protocol):
    """What the window shows."""

    @property
    def outcome(self) -> Outcome | None:
        """The results."""

    @property
    def current(self) -> bool:
        """Whether they are of everything that has been typed."""


@dataclass(frozen=True, slots=True)
class FileKind:
    """A kind of file: how it is offered, and its ending."""

    words: str
    ending: str


class StripTaking(QObject):
    """Copies and saves the strips of a window."""

    told = Signal(str)

    def __init__(
        self, window: QWidget, sheet: SheetView, view: View, showing: Shown, settings: Settings
    ) -> None:
        super().__init__(window)
        self._window, self._sheet, self._view = window, sheet, view
        self._showing, self._settings = showing, settings

    # Numbers

    def copy_numbers(self, kinds: tuple[Kind, ...]) -> None:
        """To the clipboard, as spreadsheets exchange cells."""
        results = self._drawn(kinds)
        if results is not None:
            rows = number_rows(results, self._sheet.shown_state, kinds)
            QGuiApplication.clipboard().setText(block_text(rows))
            self.told.emit(tr("{count} rows of numbers copied").format(count=len(rows) - 1))

    def save_numbers(self, kinds: tuple[Kind, ...]) -> None:
        """To a file that is asked for."""
        if self._drawn(kinds) is not None:
            self._ask(tr("Save numbers"), (FileKind("CSV", "csv"),), lambda to: self.write_numbers(to, kinds))

    def write_numbers(self, target: Path, kinds: tuple[Kind, ...]) -> None:
        """With a mark at its start by which spreadsheets know the letters."""
        results = self._drawn(kinds)
        if results is not None:
            rows = number_rows(results, self._sheet.shown_state, kinds)
            self._write(target, csv_text(rows).encode("utf-8-sig"))

    # Pictures

    def copy_picture(self, kinds: tuple[Kind, ...] = ()) -> None:
        """Of these strips, of the whole sheet where none is named, to the clipboard."""
        data = QMimeData()
        data.setImageData(self.picture(kinds))
        QGuiApplication.clipboard().setMimeData(data)
        self.told.emit(tr("picture copied"))

    def save_picture(self, kinds: tuple[Kind, ...] = ()) -> None:
        """To a file that is asked for."""
        offered = (FileKind(tr("Picture"), "png"), FileKind(tr("Picture as lines"), "svg"))
        self._ask(tr("Save picture"), offered, lambda target: self.write_picture(target, kinds))

    def write_picture(self, target: Path, kinds: tuple[Kind, ...] = ()) -> None:
        """As what the name ends in."""
        if target.suffix.lower() != ".svg":
            self._write(target, png_of(self.picture(kinds)))
            return
        results = self._drawn(kinds)
        svg = "" if results is None else self._svg(results, kinds)
        if svg:
            self._write(target, svg.encode())

    def _svg(self, results: Results, kinds: tuple[Kind, ...]) -> str:
        """The calc sheet's figure of these strips, where none is named of the drawing and all that are shown.

        Empty, with a word why, where there is no such figure.
        """
        from app.sheet.strip_figure import envelope_figure, state_figure

        state = self._sheet.shown_state
        if kinds == ("utilisation",) and state is not None and not results.states[state].checked:
            self.told.emit(tr("No picture saved: this state is not checked, so it has no utilisation"))
            return ""
        chosen, drawing = kinds or self._view.strips.shown, not kinds
        if state is None:
            return envelope_figure(results, chosen, drawing=drawing).svg
        return state_figure(results, state, chosen, drawing=drawing).svg

    def picture(self, kinds: tuple[Kind, ...] = ()) -> QImage:
        """What the sheet shows of these strips, or all of it, finer than on the screen."""
        scene, area = self._sheet.scene(), self._area(kinds)
        size = area.size() * FINENESS
        image = QImage(size.toSize(), QImage.Format.Format_RGB32)
        image.fill(colour(theme_for(self._sheet.palette()).paper))
        painter = QPainter(image)
        scene.render(painter, QRectF(image.rect()), area)
        painter.end()
        return image

    def _area(self, kinds: tuple[Kind, ...]) -> QRectF:
        if not kinds:
            return self._sheet.scene().sceneRect()
        grips, area = Grips(self._sheet.places), QRectF()
        for index, kind in enumerate(self._view.strips.shown):
            if kind in kinds:
                area |= grips.grip(index) | self._sheet.places.strips[index]
        return area.adjusted(-ROOM, -ROOM, ROOM, ROOM) & self._sheet.scene().sceneRect()

    # Both

    def _current(self) -> Results | None:
        """The results that are shown, if they are current; else says why nothing is taken."""
        outcome = self._showing.outcome
        given = outcome.results if outcome else None
        results = results_to_show(given, self._view.shown, current=self._showing.current)
        if results is None:
            self.told.emit(tr("Nothing to take: there are no results"))
            return None
        if not self._showing.current:
            self.told.emit(tr("Nothing taken: the results are out of date"))
            return None
        return results

    def _drawn(self, kinds: tuple[Kind, ...]) -> Results | None:
        """The current results; none, and a word why, if only the mode shape is wanted and there is none."""
        results = self._current()
        if results is None or kinds != ("mode",):
            return results
        why = why_no_shape(results, self._sheet.shown_state)
        if why:
            self.told.emit(tr("Nothing to take: {why}").format(why=why))
        return None if why else results

    def _ask(self, title: str, kinds: tuple[FileKind, ...], write: Callable[[Path], None]) -> None:
        filters = ";;".join(f"{kind.words} (*.{kind.ending})" for kind in kinds)
        dialog = QFileDialog(self._window, title, str(self._settings.last_folder), filters)
        dialog.setAcceptMode(QFileDialog.AcceptMode.AcceptSave)
        dialog.setDefaultSuffix(kinds[0].ending)
        endings = {f"{kind.words} (*.{kind.ending})": kind.ending for kind in kinds}
        dialog.filterSelected.connect(lambda chosen: dialog.setDefaultSuffix(endings[chosen]))
        dialog.fileSelected.connect(lambda name: write(Path(name)))
        dialog.finished.connect(dialog.deleteLater)
        dialog.open()

    def _write(self, target: Path, data: bytes) -> None:
        try:
            write_bytes(target, data)
        except OSError as error:
            words = tr("{name} not written: {reason}")
            self.told.emit(words.format(name=target.name, reason=error.strerror or str(error)))
        else:
            self.told.emit(tr("{name} written").format(name=target.name))


def png_of(image: QImage) -> bytes:
    """The picture as a file."""
    buffer = QBuffer()
    buffer.open(QIODevice.OpenModeFlag.WriteOnly)
    image.save(buffer, "PNG")
    return bytes(buffer.data().data())
