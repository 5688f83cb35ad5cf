"""The sheet: the member's drawing and four strips on one ruler, with one cursor across everything.

A thin widget: it is given a project and results, asks plain objects for curves, places and words, and hands
them to its items. Zoom and pan make another ruler; turning the sheet makes another layout.
"""

from __future__ import annotations

import bisect

import pyqtgraph as pg
from PySide6.QtCore import QEvent, QPointF, QRectF, Qt
from PySide6.QtGui import QFocusEvent, QKeyEvent, QResizeEvent
from PySide6.QtWidgets import QFrame, QWidget

from app.gui.drawing.member_drawing import Member, MemberDrawing
from app.gui.drawing.shapes import Part
from app.gui.fonts import Fonts
from app.gui.ruler import Ruler
from app.gui.sheet_items import CursorLine, JointLines, Message, SheetGround
from app.gui.sheet_layout import Place, SheetLayout, sheet_layout
from app.gui.strips.content import StripContent, envelope_contents, state_contents
from app.gui.strips.readout import envelope_readout, state_readout
from app.gui.strips.strip import Strip
from app.gui.theme import Theme, colour, greyed, theme_for
from app.gui.view import Cursor, Selection, Shown, View
from app.words import tr
from solver.model import Orientation, Project
from solver.results import Results

SNAP = 4.0  # pixels within which the mouse takes the joint itself
STEPS = 200  # arrow-key steps across the window
ZOOM_STEP = 1.25


class SheetView(pg.GraphicsView):
    """Drawing, strips and cursor; listens to `View` and sets its cursor and selection."""

    def __init__(self, view: View, parent: QWidget | None = None) -> None:
        super().__init__(parent, background=None)
        self._view = view
        self._theme = theme_for(self.palette())
        self._fonts = Fonts(self.font())
        self._project: Project | None = None
        self._results: Results | None = None
        self._current = False
        self._upright = False
        self._contents: tuple[StripContent, ...] | None = None
        self._positions: tuple[float, ...] = (0.0, 1.0)
        self._ruler = Ruler.whole(1.0)
        self._layout = self._laid_out()
        self._make_items()
        self._connect()
        self.setFrameShape(QFrame.Shape.NoFrame)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self.setMinimumSize(420, 320)
        self.setAccessibleName(tr("Sheet: drawing and strips"))
        self._dress()

    def _make_items(self) -> None:
        self._ground = SheetGround()
        self._drawing = MemberDrawing(self._theme)
        self._strips = tuple(Strip(self._theme) for _ in range(4))
        self._joints = JointLines(self._theme)
        self._cursor_line = CursorLine(self._theme)
        self._readout = Message(self._theme)
        self._notice = Message(self._theme, ground="paper", ink="quiet")
        for item in (self._ground, self._drawing, *self._strips, *self._painted()):
            self.addItem(item)

    def _painted(self) -> tuple[JointLines, CursorLine, Message, Message]:
        return self._joints, self._cursor_line, self._readout, self._notice

    def _connect(self) -> None:
        self._ground.hovered.connect(self._on_hovered)
        self._ground.clicked.connect(self._on_ground_clicked)
        self._ground.dragged.connect(self._on_dragged)
        self._ground.wheeled.connect(self._on_wheeled)
        self._ground.double_clicked.connect(self.fit)
        self._drawing.clicked.connect(self._on_part_clicked)
        self._view.shown_changed.connect(self._on_shown_changed)
        self._view.cursor_changed.connect(self._on_cursor_changed)
        self._view.selection_changed.connect(self._on_selection_changed)

    # What is shown

    @property
    def ruler(self) -> Ruler:
        """The ruler that everything is drawn by."""
        return self._ruler

    @property
    def sheet_places(self) -> SheetLayout:
        """Where the parts lie."""
        return self._layout

    @property
    def drawing(self) -> MemberDrawing:
        """The interactive drawing."""
        return self._drawing

    @property
    def strips(self) -> tuple[Strip, ...]:
        """The strips for u, N, σ and utilisation."""
        return self._strips

    @property
    def readout(self) -> str:
        """The readout line."""
        return self._readout.text

    @property
    def notice(self) -> str:
        """Why the strips show nothing, or that they are out of date; else empty."""
        return self._notice.text

    def show_results(self, project: Project, results: Results | None, current: bool) -> None:
        """Show the project, and results of it (`current`) or of an earlier edit, or none."""
        fresh = results is not self._results
        self._project, self._results = project, results
        self._current = current and results is not None
        self._positions = _positions(project)
        self._ruler = self._ruler.of(self._positions[-1])
        if fresh:
            self._make_contents()
        self._show_member()
        self._place_all()
        self._dress()

    def set_orientation(self, orientation: Orientation) -> None:
        """Across for "horizontal", upright for "vertical"."""
        self._upright = orientation == "vertical"
        self._ruler = self._ruler.fitted()
        self._place_all()

    def _make_contents(self) -> None:
        self._contents = None
        if self._results is not None:
            state = self._state()
            self._contents = (
                envelope_contents(self._results) if state is None else state_contents(self._results, state)
            )
        for index, strip in enumerate(self._strips):
            strip.show_content(None if self._contents is None else self._contents[index])

    def _state(self) -> int | None:
        """The index of the shown state; None for the envelope, and for a state the results do not have."""
        shown = self._view.shown
        for index, state in enumerate(self._results.states if self._results else ()):
            if (state.kind, state.name) == (shown.kind, shown.name):
                return index
        return None

    def _show_member(self) -> None:
        if self._project is not None:
            self._drawing.show_member(Member.of(self._project, self._view.shown))

    # Places and colours

    def _laid_out(self) -> SheetLayout:
        size = self.viewport().size()
        return sheet_layout(size.width(), size.height(), self._upright, self._fonts.text_height)

    def _place_all(self) -> None:
        self._layout = layout = self._laid_out()
        self._ruler = ruler = self._ruler.on(layout.begin, layout.end)
        self._ground.set_rect(QRectF(self.viewport().rect()))
        self._drawing.set_place(Place(layout.drawing, ruler, layout.axes, self._fonts))
        for strip, rect in zip(self._strips, layout.strips, strict=True):
            strip.set_place(Place(rect, ruler, layout.axes, self._fonts))
        self._joints.set_joints(self._positions, ruler, layout, self._drawing.chain_edge)
        self._readout.set_rect(layout.readout)
        self._say_notice()
        self._show_cursor()

    def _say_notice(self) -> None:
        text = ""
        if self._results is None:
            text = tr("No results yet: the findings say what is missing.") if self._project else ""
        elif not self._current:
            text = tr("out of date")
        self._notice.set_text(text, self._fonts)
        strip = self._layout.strips[0]
        width = min(self._fonts.measure(text, "plain").width() + 20.0, self._layout.readout.width())
        box = QRectF(0.0, 0.0, width, 1.7 * self._fonts.text_height)
        box.moveCenter(QPointF(strip.center()))
        self._notice.set_rect(box)

    def _dress(self) -> None:
        """Give everything its colours: those of the palette, greyed where the results are out of date."""
        self._theme = theme_for(self.palette())
        self.setBackgroundBrush(colour(self._theme.paper))
        results_theme: Theme = self._theme if self._current else greyed(self._theme)
        self._drawing.set_theme(self._theme)
        for strip in self._strips:
            strip.set_theme(results_theme)
        for item in self._painted():
            item.set_theme(self._theme)
        self._readout.set_theme(results_theme)

    # Zoom and pan

    def fit(self) -> None:
        """Show the whole member."""
        self._set_ruler(self._ruler.fitted())

    def zoom(self, factor: float, pixel: float | None = None) -> None:
        """Zoom about a pixel along the axis; about the cursor or the middle where none is given."""
        if pixel is None:
            cursor = self._view.cursor
            held = cursor is not None and self._ruler.holds(cursor.x)
            pixel = self._ruler.pixel(cursor.x) if held else 0.5 * (self._ruler.begin + self._ruler.end)
        self._set_ruler(self._ruler.zoomed(factor, pixel))

    def _set_ruler(self, ruler: Ruler) -> None:
        if ruler != self._ruler:
            self._ruler = ruler
            self._place_all()

    # The cursor

    def _show_cursor(self) -> None:
        cursor = self._view.cursor
        held = cursor is not None and self._ruler.holds(cursor.x)
        self._cursor_line.set_pixel(self._ruler.pixel(cursor.x) if held else None, self._layout)
        self._readout.set_text(self._readout_text(cursor), self._fonts)

    def _readout_text(self, cursor: Cursor | None) -> str:
        if cursor is None or self._results is None:
            return ""
        x = min(max(cursor.x, 0.0), float(self._results.position[-1]))
        state = self._state()
        text = envelope_readout(self._results, x) if state is None else state_readout(self._results, state, x)
        return text if self._current else tr("{values}  (out of date)").format(values=text)

    def _move_cursor(self, x: float) -> None:
        self._view.set_cursor(Cursor(min(max(x, 0.0), self._positions[-1])))

    def _step(self, direction: int) -> None:
        """A step of the arrow keys; it halts at every joint."""
        start = self._view.cursor.x if self._view.cursor else 0.0
        step = direction * self._ruler.position(self._ruler.last - self._ruler.first) / STEPS
        low, high = sorted((start, start + step))
        passed = [x for x in self._positions if low < x < high]
        self._move_cursor(passed[0 if direction > 0 else -1] if passed else start + step)
        self._follow_cursor()

    def _to_joint(self, direction: int) -> None:
        """The next joint in a direction."""
        start = self._view.cursor.x if self._view.cursor else 0.0
        find = bisect.bisect_right if direction > 0 else bisect.bisect_left
        index = find(self._positions, start) - (0 if direction > 0 else 1)
        self._move_cursor(self._positions[min(max(index, 0), len(self._positions) - 1)])
        self._follow_cursor()

    def _follow_cursor(self) -> None:
        """Pan so far that the cursor is in the window."""
        if self._view.cursor is not None and not self._ruler.holds(self._view.cursor.x):
            away = self._ruler.pixel(self._view.cursor.x) - 0.5 * (self._ruler.begin + self._ruler.end)
            self._set_ruler(self._ruler.panned(-away))

    # What happened

    def _on_hovered(self, point: QPointF | None) -> None:
        if point is None or self._project is None:
            return
        pixel = self._layout.axes.along(point)
        low, high = sorted((self._ruler.begin, self._ruler.end))
        if low - SNAP <= pixel <= high + SNAP:
            nearest = min(self._positions, key=lambda x: abs(self._ruler.pixel(x) - pixel))
            near = abs(self._ruler.pixel(nearest) - pixel) <= SNAP
            self._move_cursor(nearest if near else self._ruler.position_at(pixel))

    def _on_ground_clicked(self, point: QPointF) -> None:
        if self._layout.drawing.contains(point):
            self._view.set_selection(Selection())

    def _on_part_clicked(self, part: Part) -> None:
        if part.kind in ("segment", "length", "distributed"):
            self._view.set_selection(Selection(segments=frozenset((part.index,))))
        elif part.kind in ("joint", "support", "force"):
            self._view.set_selection(Selection(joints=frozenset((part.index,))))

    def _on_dragged(self, step: QPointF) -> None:
        self._set_ruler(self._ruler.panned(self._layout.axes.along(step)))

    def _on_wheeled(self, point: QPointF, factor: float) -> None:
        self.zoom(factor, self._layout.axes.along(point))

    def _on_shown_changed(self, _shown: Shown) -> None:
        self._make_contents()
        self._show_member()
        self._place_all()

    def _on_cursor_changed(self, _cursor: Cursor | None) -> None:
        self._follow_cursor()
        self._show_cursor()

    def _on_selection_changed(self, selection: Selection) -> None:
        self._drawing.set_selection(selection)

    # Qt's own

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Arrows move the cursor, with Ctrl from joint to joint; Home, End; + and − zoom; 0 fits."""
        action = self._key_action(event)
        if action is None:
            event.ignore()
            return
        action()
        event.accept()

    def _key_action(self, event: QKeyEvent):
        forward, back = (
            (Qt.Key.Key_Up, Qt.Key.Key_Down) if self._upright else (Qt.Key.Key_Right, Qt.Key.Key_Left)
        )
        move = self._to_joint if event.modifiers() & Qt.KeyboardModifier.ControlModifier else self._step
        actions = {
            forward: lambda: move(1),
            back: lambda: move(-1),
            Qt.Key.Key_Home: lambda: self._move_cursor(0.0),
            Qt.Key.Key_End: lambda: self._move_cursor(self._positions[-1]),
            Qt.Key.Key_Plus: lambda: self.zoom(ZOOM_STEP),
            Qt.Key.Key_Minus: lambda: self.zoom(1.0 / ZOOM_STEP),
            Qt.Key.Key_0: self.fit,
            Qt.Key.Key_Space: self._select_at_cursor,
        }
        return actions.get(Qt.Key(event.key()))

    def _select_at_cursor(self) -> None:
        """Select the segment the cursor is in."""
        if self._view.cursor is not None:
            index = bisect.bisect_right(self._positions, self._view.cursor.x) - 1
            index = min(max(index, 0), len(self._positions) - 2)
            self._view.set_selection(Selection(segments=frozenset((index,))))

    def resizeEvent(self, event: QResizeEvent) -> None:
        """Lay the sheet out anew."""
        super().resizeEvent(event)
        if hasattr(self, "_notice"):  # pyqtgraph resizes once before our items exist
            self._place_all()

    def changeEvent(self, event: QEvent) -> None:
        """Follow the palette and the font."""
        super().changeEvent(event)
        if not hasattr(self, "_notice"):
            return
        if event.type() == QEvent.Type.PaletteChange:
            self._dress()
        elif event.type() == QEvent.Type.FontChange:
            self._fonts = Fonts(self.font())
            self._place_all()

    def focusInEvent(self, event: QFocusEvent) -> None:
        """Show the cursor when the sheet takes the keyboard."""
        super().focusInEvent(event)
        if self._view.cursor is None and self._project is not None:
            self._move_cursor(0.0)


def _positions(project: Project) -> tuple[float, ...]:
    """Positions of the joints along the member, m."""
    positions = [0.0]
    for segment in project.segments:
        positions.append(positions[-1] + segment.length)
    return tuple(positions)
