"""The sheet as a widget: mouse and keys move the cursor, zoom, pan and select; the scene shows it."""

from __future__ import annotations

import bisect
from collections.abc import Callable, Collection

from PySide6.QtCore import QEvent, QPointF, QRectF, QSizeF, Qt, Signal
from PySide6.QtGui import QFocusEvent, QKeyEvent, QMouseEvent, QResizeEvent, QWheelEvent
from PySide6.QtWidgets import QApplication, QFrame, QGraphicsView, QWidget

from app.drawing.ruler import Ruler
from app.drawing.shapes import Box, Part, body_of
from app.gui.at_cursor import choices_at, next_of, selection_of
from app.gui.drawing.member_drawing import MemberDrawing
from app.gui.fonts import Fonts
from app.gui.one_picture import OnePicture
from app.gui.sheet_layout import SheetLayout, least_height
from app.gui.sheet_scene import SheetScene
from app.gui.strips.strip import Strip
from app.gui.theme import theme_for
from app.gui.view import Cursor, Selection, View
from app.hand.owners import kind_of, whole
from app.references import Reference
from app.words import tr
from solver.model import Orientation, Project
from solver.results import Results

SNAP = 4.0  # pixels within which the mouse takes the joint itself
STEPS = 200  # arrow-key steps across the window
ZOOM_STEP = 1.25
SMALLEST = 10.0  # pixels; a segment below is zoomed to when one goes there
WHEEL_STEP = 1.0015  # zoom for each eighth of a degree that the wheel turns


class Drag:
    """A drag of the sheet: begins once the mouse has moved a little, so that a click stays a click."""

    def __init__(self, start: QPointF) -> None:
        self._start = self._last = start
        self.began = False

    def was_click(self, point: QPointF) -> bool:
        """Whether the mouse has come up where it went down; it may have moved under a hand on the drawing."""
        away = (point - self._start).manhattanLength()
        return not self.began and away < QApplication.startDragDistance()

    def step(self, point: QPointF) -> QPointF:
        """How far the sheet goes along with the mouse since the last step."""
        step = point - self._last
        if not self.began and step.manhattanLength() < QApplication.startDragDistance():
            return QPointF()
        self.began, self._last = True, point
        return step


class SheetView(QGraphicsView):
    """Drawing, strips and cursor; listens to `View` and sets its cursor and selection."""

    opened = Signal(object, object)  # Part, Box: to be typed in place

    def __init__(self, view: View, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._view = view
        self._drag: Drag | None = None
        self._narrowed: Selection | None = None  # several that the last click made one; a second brings back
        self._sheet = SheetScene(theme_for(self.palette()), Fonts(self.font()), self)
        self._sheet.show_state(view.shown)
        self._upright = False
        self._set_up()
        self.one_picture = OnePicture(self)
        self._sheet.drawing.clicked.connect(self._on_part_clicked)
        view.shown_changed.connect(self._sheet.show_state)
        view.strips_changed.connect(self._sheet.set_strips)
        view.together_changed.connect(self._sheet.set_together)
        view.cursor_changed.connect(self._on_cursor_changed)
        view.selection_changed.connect(self._sheet.drawing.set_selection)
        view.looks_changed.connect(self._sheet.set_looks)

    def _set_up(self) -> None:
        self.setScene(self._sheet)
        self.setFrameShape(QFrame.Shape.NoFrame)
        self.setAlignment(Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignTop)
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.setVerticalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self.setMouseTracking(True)
        self._set_least_size()
        self.setAccessibleName(tr("Sheet: drawing and strips"))
        self.viewport().setAccessibleName(self.accessibleName())

    def _set_least_size(self) -> None:
        """As small as its texts can still be read, but never so large as to push all else off a screen."""
        height = min(max(round(least_height(Fonts(self.font()).text_height)), 320), 490)
        self.setMinimumSize(420, height)

    @property
    def ruler(self) -> Ruler:
        """The ruler that everything is drawn by."""
        return self._sheet.ruler

    @property
    def places(self) -> SheetLayout:
        """Where the parts lie."""
        return self._sheet.places

    @property
    def paper(self) -> SheetScene:
        """The scene itself, for what is put over the sheet."""
        return self._sheet

    @property
    def positions(self) -> tuple[float, ...]:
        """The positions of the joints, m."""
        return self._sheet.positions

    @property
    def drawing(self) -> MemberDrawing:
        """The interactive drawing."""
        return self._sheet.drawing

    @property
    def strips(self) -> tuple[Strip, ...]:
        """The strips that are shown, in order."""
        return self._sheet.strips

    @property
    def shown_state(self) -> int | None:
        """The index of the state whose curves are shown; None for the envelope."""
        return self._sheet.shown_state

    @property
    def readout(self) -> str:
        """The readout line."""
        return self._sheet.readout

    @property
    def readout_box(self) -> QRectF:
        """Where the readout stands."""
        return self._sheet.readout_box

    @property
    def notice(self) -> str:
        """Why the strips show nothing, or that they are out of date; else empty."""
        return self._sheet.notice

    def show_results(
        self, project: Project, results: Results | None, current: bool, waiting: bool = False
    ) -> None:
        """Show the project, and results of it (`current`) or of an earlier edit, or none (yet, `waiting`)."""
        self._sheet.show_results(project, results, current=current, waiting=waiting)
        self.one_picture.paint()

    def set_reference(self, reference: Reference | None) -> None:
        """Show a reference's curves dashed beside those of the results, or none."""
        self._sheet.set_reference(reference)

    def set_orientation(self, orientation: Orientation) -> None:
        """Across for "horizontal", upright for "vertical"."""
        self._upright = orientation == "vertical"
        self._sheet.set_upright(upright=self._upright)

    # Zoom and pan

    def fit(self) -> None:
        """Show the whole member."""
        self._sheet.set_ruler(self.ruler.fitted())

    def zoom(self, factor: float, pixel: float | None = None) -> None:
        """Zoom about a pixel along the axis; about the cursor or the middle where none is given."""
        if pixel is None:
            cursor = self._view.cursor
            held = cursor is not None and self.ruler.holds(cursor.x)
            pixel = self.ruler.pixel(cursor.x) if held else 0.5 * (self.ruler.begin + self.ruler.end)
        self._sheet.set_ruler(self.ruler.zoomed(factor, pixel))

    def bring_into_view(self, segments: Collection[int], joints: Collection[int]) -> None:
        """Zoom or pan where not all of these parts are seen, or too small to be looked at."""
        positions = self._sheet.positions
        numbers = [*joints, *segments, *(index + 1 for index in segments)]
        places = [positions[index] for index in numbers if index < len(positions)]
        if not places:
            return
        low, high = min(places), max(places)
        seen = self.ruler.holds(low) and self.ruler.holds(high)
        small = low < high and abs(self.ruler.pixel(high) - self.ruler.pixel(low)) < SMALLEST
        if (not seen or small) and low < high:
            self._sheet.set_ruler(self.ruler.showing(low, high, air=1.0))
        elif not seen:
            away = self.ruler.pixel(low) - 0.5 * (self.ruler.begin + self.ruler.end)
            self._sheet.set_ruler(self.ruler.panned(-away))

    def zoom_to_selection(self) -> None:
        """Show what is selected as large as it goes, a joint with its segments; else that at the cursor."""
        if self._view.selection == Selection():
            self._select_at_cursor()
        chosen, positions = self._view.selection, self._sheet.positions
        last = len(positions) - 1
        ends = [end for index in chosen.segments for end in (index, index + 1)]
        ends += [end for index in chosen.joints for end in (index - 1, index + 1)]
        ends += self.drawing.joints_beside(chosen.companions)
        if ends:
            places = [positions[min(max(end, 0), last)] for end in ends]
            self._sheet.set_ruler(self.ruler.showing(min(places), max(places)))

    # The cursor

    def _move_cursor(self, x: float) -> None:
        self._view.set_cursor(Cursor(min(max(x, 0.0), self._sheet.positions[-1])))

    def _step(self, direction: int) -> None:
        """A step of the arrow keys; it halts at every joint."""
        start = self._view.cursor.x if self._view.cursor else 0.0
        ruler = self.ruler
        target = ruler.position_at(ruler.pixel(start) + direction * (ruler.end - ruler.begin) / STEPS)
        low, high = sorted((start, target))
        passed = [x for x in self._sheet.positions if low < x < high]
        self._move_cursor(passed[0 if direction > 0 else -1] if passed else target)

    def _to_joint(self, direction: int) -> None:
        """The next joint in a direction."""
        start = self._view.cursor.x if self._view.cursor else 0.0
        positions = self._sheet.positions
        find = bisect.bisect_right if direction > 0 else bisect.bisect_left
        index = find(positions, start) - (0 if direction > 0 else 1)
        self._move_cursor(positions[min(max(index, 0), len(positions) - 1)])

    def segment_at(self, x: float) -> int:
        """The segment at a position; at a joint the one behind it, if there is one."""
        positions = self._sheet.positions
        return min(max(bisect.bisect_right(positions, x) - 1, 0), len(positions) - 2)

    def joint_near(self, pixel: float) -> int:
        """The joint nearest to a pixel along the axis."""
        ruler, positions = self.ruler, self._sheet.positions
        return min(range(len(positions)), key=lambda joint: abs(ruler.pixel(positions[joint]) - pixel))

    def _select_at_cursor(self) -> None:
        """Select the segment the cursor is in, at a joint first that joint; then what lies beside."""
        if self._view.cursor is None:
            return
        x, positions = self._view.cursor.x, self._sheet.positions
        joints = [i for i, place in enumerate(positions) if place == x]
        choices = choices_at(joints, self.segment_at(x), self.drawing.companions_at(x))
        self._view.set_selection(next_of(choices, self._view.selection))

    def _open_selected(self) -> None:
        """Type the selected part in place: a length, a support; else of the segment at the cursor."""
        if self._view.selection == Selection():
            self._select_at_cursor()
        chosen = self._view.selection
        parts = [Part("length", index) for index in sorted(chosen.segments)]
        parts += [Part("companion_length", index) for index in sorted(chosen.companions)]
        parts += [Part("support", index) for index in sorted(chosen.joints)]
        if parts:
            self.opened.emit(parts[0], self.box_of(parts[0]))

    def box_of(self, part: Part) -> Box:
        """Where a part is drawn; else its segment or joint, else the middle of the drawing."""
        found = self.drawing.picture.box_of(part) or self.drawing.picture.box_of(body_of(part))
        middle = self.places.drawing.center()
        return found or Box.around((middle.x(), middle.y()), 0.0, 0.0)

    # What happened

    def _on_cursor_changed(self, cursor: Cursor | None) -> None:
        """Show the cursor, and pan so far that it is in the window."""
        self._sheet.show_cursor(cursor)
        if cursor is not None and not self.ruler.holds(cursor.x):
            away = self.ruler.pixel(cursor.x) - 0.5 * (self.ruler.begin + self.ruler.end)
            self._sheet.set_ruler(self.ruler.panned(-away))

    def _on_hovered(self, point: QPointF) -> None:
        """The cursor follows the mouse; near a joint it takes the joint."""
        ruler, pixel = self.ruler, self.places.axes.along(point)
        low, high = sorted((ruler.begin, ruler.end))
        if not self._sheet.is_empty and low - SNAP <= pixel <= high + SNAP:
            nearest = self._joint_near(ruler.position_at(pixel), pixel)
            near = abs(ruler.pixel(nearest) - pixel) <= SNAP
            self._move_cursor(nearest if near else ruler.position_at(pixel))
        self._sheet.set_pointer(point)

    def _joint_near(self, x: float, pixel: float) -> float:
        """The position of the joint nearest to a pixel, which is one of the two around it."""
        positions = self._sheet.positions
        after = bisect.bisect_left(positions, x)
        around = positions[max(after - 1, 0) : after + 1]
        return min(around, key=lambda joint: abs(self.ruler.pixel(joint) - pixel))

    def _on_part_clicked(self, part: Part, modifiers: Qt.KeyboardModifier) -> None:
        """Select the part; with Ctrl in or out, with Shift all up to it as well; mean a load by itself."""
        thing = whole(part) if kind_of(part) is not None and not modifiers else None
        clicked = selection_of(part)
        if clicked is None:
            self._view.set_thing(thing)
            return
        chosen = self._view.selection
        self._narrowed = chosen if chosen.holds(clicked) and not modifiers else None
        if modifiers & Qt.KeyboardModifier.ControlModifier:
            clicked = chosen.toggled(clicked)
        elif modifiers & Qt.KeyboardModifier.ShiftModifier:
            clicked = chosen.extended(clicked)
        self._view.set_selection(clicked)
        self._view.set_thing(thing)

    # Qt's own

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        """Pan while the sheet is dragged, else take the cursor along."""
        super().mouseMoveEvent(event)
        if self._drag is not None:
            step = self._drag.step(event.position())
            self._sheet.set_ruler(self.ruler.panned(self.places.axes.along(step)))
        elif event.buttons() == Qt.MouseButton.NoButton:
            self._on_hovered(event.position())

    def mousePressEvent(self, event: QMouseEvent) -> None:
        """Where no part of the drawing takes the mouse, a drag of the sheet may begin."""
        self._narrowed = None
        super().mousePressEvent(event)
        taken = self.scene().mouseGrabberItem() is not None
        if not taken and event.button() in (Qt.MouseButton.LeftButton, Qt.MouseButton.MiddleButton):
            self._drag = Drag(event.position())
        event.accept()

    def mouseReleaseEvent(self, event: QMouseEvent) -> None:
        """A click beside every part of the drawing selects nothing."""
        super().mouseReleaseEvent(event)
        drag, self._drag = self._drag, None
        clicked = drag is not None and drag.was_click(event.position())
        if clicked and self.places.drawing.contains(event.position()):
            self._view.set_selection(Selection())
        event.accept()

    def mouseDoubleClickEvent(self, event: QMouseEvent) -> None:
        """Type what is shown there; show the whole member where nothing is."""
        found = self.drawing.label_at(event.position())
        if found is None:
            self.fit()
        elif event.button() == Qt.MouseButton.LeftButton:
            if self._narrowed is not None:  # it is typed for all that was selected
                self._view.set_selection(self._narrowed)
            self.opened.emit(found.part, found.box)
        event.accept()

    def wheelEvent(self, event: QWheelEvent) -> None:
        """Zoom about the pointer."""
        self.zoom(WHEEL_STEP ** event.angleDelta().y(), self.places.axes.along(event.position()))
        event.accept()

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Arrows move the cursor, with Ctrl from joint to joint; Home, End; + and − zoom; 0 fits."""
        action = self._key_action(event)
        if action is None:
            event.ignore()
            return
        action()
        event.accept()

    def _key_action(self, event: QKeyEvent) -> Callable[[], None] | None:
        forward, back = (
            (Qt.Key.Key_Up, Qt.Key.Key_Down) if self._upright else (Qt.Key.Key_Right, Qt.Key.Key_Left)
        )
        move = self._to_joint if event.modifiers() & Qt.KeyboardModifier.ControlModifier else self._step
        actions: dict[int, Callable[[], None]] = {
            forward: lambda: move(1),
            back: lambda: move(-1),
            Qt.Key.Key_Home: lambda: self._move_cursor(0.0),
            Qt.Key.Key_End: lambda: self._move_cursor(self._sheet.positions[-1]),
            Qt.Key.Key_Plus: lambda: self.zoom(ZOOM_STEP),
            Qt.Key.Key_Minus: lambda: self.zoom(1.0 / ZOOM_STEP),
            Qt.Key.Key_0: self.fit,
            Qt.Key.Key_Space: self._select_at_cursor,
            Qt.Key.Key_F2: self._open_selected,
            Qt.Key.Key_Return: self._open_selected,
            Qt.Key.Key_Enter: self._open_selected,
        }
        return actions.get(event.key())

    def resizeEvent(self, event: QResizeEvent) -> None:
        """Lay the sheet out anew."""
        super().resizeEvent(event)
        self._sheet.set_size(QSizeF(self.viewport().size()))

    def changeEvent(self, event: QEvent) -> None:
        """Follow the palette and the font."""
        super().changeEvent(event)
        if event.type() == QEvent.Type.PaletteChange:
            self._sheet.dress(theme_for(self.palette()))
        elif event.type() == QEvent.Type.FontChange:
            self._set_least_size()
            self._sheet.set_fonts(Fonts(self.font()))

    def focusInEvent(self, event: QFocusEvent) -> None:
        """Show the cursor when the sheet takes the keyboard."""
        super().focusInEvent(event)
        if self._view.cursor is None and not self._sheet.is_empty:
            self._move_cursor(0.0)
