"""What is on the sheet: drawing, strips, joint lines, cursor and readout, all on one ruler.

The scene's coordinates are the widget's pixels. It is told what to show and where; who asks for it (mouse,
keys, other rooms of the window) is the business of `sheet_view`.
"""

from __future__ import annotations

from itertools import accumulate

from PySide6.QtCore import QObject, QPointF, QRectF, QSizeF
from PySide6.QtWidgets import QGraphicsScene

from app.drawing.member import Member
from app.drawing.ruler import Ruler
from app.gui.drawing.member_drawing import MemberDrawing
from app.gui.drawing.results_layer import ResultsOnDrawing
from app.gui.fonts import Fonts
from app.gui.hand.bubble import Bubble
from app.gui.hand.marks import HandMarks
from app.gui.sheet_items import CursorLine, JointLines, Message, Painted
from app.gui.sheet_layout import LINE_EDGES, Place, SheetLayout, sheet_layout
from app.gui.sheet_notice import Notice
from app.gui.sheet_texts import texts_under
from app.gui.shown_results import notice_words, results_to_show
from app.gui.strips.at_cursor import nearest_to, values_at
from app.gui.strips.closer import sampled_window
from app.gui.strips.company import Earlier, earlier_curves
from app.gui.strips.content import contents_of
from app.gui.strips.mode import mode_content
from app.gui.strips.readout import BETWEEN, resting
from app.gui.strips.strip import Strip
from app.gui.theme import Theme, colour, greyed
from app.gui.view import Cursor, Shown
from app.looks import Looks
from app.references import Reference
from app.strip_choice import KINDS, USUAL, StripChoice
from solver.model import Project
from solver.results import Results


class SheetScene(QGraphicsScene):
    """The items, what they show, and the ruler they are drawn by."""

    def __init__(self, theme: Theme, fonts: Fonts, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._theme, self._fonts = theme, fonts
        self._project: Project | None = None
        self._results: Results | None = None  # what is shown of those given
        self._given: Results | None = None
        self._reference: Reference | None = None
        self._earlier: Earlier | None = None  # the reference's curves, made once for each state
        self._near: tuple[float, float] | None = None  # the window whose curves have points of their own
        self._current = False
        self._waiting = False
        self._upright = False
        self._size = QSizeF(900.0, 500.0)
        self._shown = Shown("envelope")
        self._choice = StripChoice()
        self._together = False
        self._pointer: QPointF | None = None
        self._values = ""  # of the readout, before what the pointer adds
        self._looks = Looks()
        self._cursor: Cursor | None = None
        self._held = False  # while something is pulled by hand, the ruler stays
        self._positions: tuple[float, ...] = (0.0, 1.0)
        self._make_items()
        self._layout = self._laid_out()
        self._ruler = Ruler.whole(1.0, self._layout.begin, self._layout.end)
        self.dress(theme)

    def _make_items(self) -> None:
        self.drawing = MemberDrawing(self._theme)
        self.on_drawing = ResultsOnDrawing(self._theme, self.drawing)
        self._strips = {kind: Strip(self._theme) for kind in KINDS}
        self.joint_lines = JointLines(self._theme)
        self.cursor_line = CursorLine(self._theme)
        self.hand_marks = HandMarks(self._theme, self.drawing)
        self.bubble = Bubble(self._theme)
        self._readout = Message(self._theme)
        self.notice_box = Notice(self._theme)
        self.notice_box.moved.connect(self._draw_cursor)
        labels = [strip.label_layer for strip in self._strips.values()]
        on_drawing = self.on_drawing.items
        for item in (self.drawing, *on_drawing, *self._strips.values(), *labels, *self._over()):
            self.addItem(item)

    def _over(self) -> tuple[Painted, ...]:
        told = self._readout, self.notice_box
        hand = self.hand_marks.ghost_layer, self.hand_marks, self.bubble
        return (self.joint_lines, self.cursor_line, *told, *hand)

    @property
    def strips(self) -> tuple[Strip, ...]:
        """The strips that are shown, in order."""
        return tuple(self._strips[kind] for kind in self._choice.shown)

    @property
    def ruler(self) -> Ruler:
        """The ruler that everything is drawn by."""
        return self._ruler

    @property
    def places(self) -> SheetLayout:
        """Where the parts lie."""
        return self._layout

    @property
    def shown_state(self) -> int | None:
        """The index of the state whose curves are shown; None for the envelope."""
        return None if self._results is None else self._state(self._results)

    @property
    def positions(self) -> tuple[float, ...]:
        """The positions of the joints, m."""
        return self._positions

    @property
    def is_empty(self) -> bool:
        """Whether there is no project yet."""
        return self._project is None

    @property
    def readout(self) -> str:
        """The readout line."""
        return self._readout.text

    @property
    def readout_box(self) -> QRectF:
        """Where the readout stands."""
        return self._readout.boundingRect()

    @property
    def notice(self) -> str:
        """Why the strips show nothing, or that they are out of date; else empty."""
        return self.notice_box.text

    @property
    def fonts(self) -> Fonts:
        """The fonts that everything is written with."""
        return self._fonts

    # What is shown

    def show_results(
        self, project: Project, results: Results | None, *, current: bool, waiting: bool
    ) -> None:
        """Show the project, and results of it (`current`) or of an earlier edit, or none (yet, `waiting`)."""
        self._waiting = waiting
        before = self._results
        self._current = current and results is not None
        self._given, self._results = results, results_to_show(results, self._shown, current=self._current)
        self._take(project)
        if self._results is not before:
            self._show_curves()
        self._hand_out_colours()
        self._place_all()

    def show_member(self, project: Project) -> None:
        """Draw a member at once, before there are results of it; the curves stay as they are until then."""
        self._take(project)
        self._place_drawing()
        self._draw_cursor()

    def _take(self, project: Project) -> None:
        if project is not self._project:
            self._project = project
            lengths = (segment.length for segment in project.segments)
            self._positions = tuple(accumulate(lengths, initial=0.0))
            self.drawing.show_member(Member.of(project, self._shown))
        if self._held:
            self._ruler = self._ruler.held(self._positions[-1])
        else:
            self._ruler = self._ruler.of(self._positions)

    def hold(self) -> None:
        """Keep ruler, rows and proportions, so that what is pulled stays under the pointer."""
        self._held = True
        self.drawing.hold()

    def let_go(self) -> None:
        """Fit the sheet to the member again."""
        if self._held:
            self._held = False
            self.drawing.let_go()
            self._ruler = self._ruler.of(self._positions)
            self._place_all()

    def show_state(self, shown: Shown) -> None:
        """Show the curves and loads of another state."""
        self._shown = shown
        self._results = results_to_show(self._given, shown, current=self._current)
        self._earlier = self._earlier_curves()
        self._show_curves()
        if self._project is not None:
            self.drawing.show_member(Member.of(self._project, shown))
        self._place_all()

    def set_looks(self, looks: Looks) -> None:
        """Show other results on the drawing, or another scale along."""
        self._looks = looks
        self._ruler = self._ruler.truly(true=looks.true)
        self._show_on_drawing()
        self._place_all()

    def _show_on_drawing(self) -> None:
        self.on_drawing.show(self._looks, self._results, self.shown_state)

    def set_strips(self, choice: StripChoice) -> None:
        """Show these strips in their order."""
        self._choice = choice
        for kind, strip in self._strips.items():
            strip.setVisible(kind in choice.shown)
            strip.label_layer.setVisible(kind in choice.shown)
        self._show_mode()
        self._place_all()

    def set_together(self, together: bool) -> None:
        """Draw single states with the envelope, and the envelope around a single state, or not."""
        self._together = together
        self._show_curves()
        self._place_all()

    def set_reference(self, reference: Reference | None) -> None:
        """Show a reference's curves as well, or none."""
        if reference is not self._reference:
            self._reference = reference
            self._earlier = self._earlier_curves()
            self._show_curves()
            self._place_all()

    def _earlier_curves(self) -> Earlier | None:
        """Those of the shown state, by its name; of no other one where the reference does not have it."""
        if self._reference is None:
            return None
        name, results = self._reference.name, self._reference.results
        state, whole = self._state(results), self._shown.kind == "envelope"
        return earlier_curves(name, results, state, self._near, whole=whole)

    def _show_curves(self) -> None:
        self._show_on_strips()
        self._show_on_drawing()

    def _show_on_strips(self) -> None:
        contents = None
        if self._results is not None:
            contents = contents_of(
                self._results, self.shown_state, self._earlier, together=self._together, near=self._near
            )
        for kind, content in zip(USUAL, contents or (None,) * len(USUAL), strict=True):
            self._strips[kind].show_content(content)
        self._show_mode()

    def _show_mode(self) -> None:
        """The mode shape, where its strip is shown: nobody else waits for it."""
        if "mode" not in self._choice.shown:
            return
        content = None
        if self._results is not None:
            kept = self._reference.results if self._reference else None
            before = None if kept is None else (kept, self._state(kept))
            other = self._strips["displacement"].content
            content = mode_content(self._results, self.shown_state, before, other, near=self._near)
        self._strips["mode"].show_content(content)

    def _state(self, results: Results) -> int | None:
        """The index of the shown state; None for the envelope, and for a state the results do not have."""
        for index, state in enumerate(results.states):
            if (state.kind, state.name) == (self._shown.kind, self._shown.name):
                return index
        return None

    # Places and colours

    def set_size(self, size: QSizeF) -> None:
        """Lay the sheet out on other pixels."""
        self._size = size
        self.setSceneRect(QRectF(QPointF(), size))
        self._place_all()

    def set_upright(self, *, upright: bool) -> None:
        """Turn the sheet."""
        if upright != self._upright:
            self._upright = upright
            self._ruler = self._ruler.fitted()
            self._place_all()

    def set_ruler(self, ruler: Ruler) -> None:
        """Show another window of the member."""
        if ruler != self._ruler:
            self._ruler = ruler
            self._place_all()

    def set_fonts(self, fonts: Fonts) -> None:
        """Write with another font."""
        self._fonts = fonts
        self._place_all()

    def _laid_out(self) -> SheetLayout:
        size, text_height = self._size, self._fonts.text_height
        return sheet_layout(size.width(), size.height(), self._upright, text_height, self._choice.shown)

    def _place_all(self) -> None:
        self._layout = layout = self._laid_out()
        self._ruler = ruler = self._ruler.on(layout.begin, layout.end)
        self._look_closer(ruler)
        self._place_drawing()
        for strip, rect in zip(self.strips, layout.strips, strict=True):
            strip.set_legend(shown=strip is self.strips[0])
            strip.set_place(Place(rect, ruler, layout.axes, self._fonts))
            strip.refresh()
        self._say_notice()
        self.show_cursor(self._cursor)

    def _look_closer(self, ruler: Ruler) -> None:
        """Give the curves the points that what is shown needs."""
        near = sampled_window(ruler, self._near)
        if near != self._near:
            self._near = near
            self._earlier = self._earlier_curves()
            self._show_on_strips()

    def _place_drawing(self) -> None:
        layout, ruler = self._layout, self._ruler
        place = Place(layout.drawing, ruler, layout.axes, self._fonts)
        self.drawing.set_place(place)
        if self.drawing.member is not None:
            self.on_drawing.place(self.drawing.member, place)
        self.hand_marks.set_rect(layout.drawing)
        self.joint_lines.set_joints(self._positions, ruler, layout, self.drawing.chain_edge)

    def _say_notice(self) -> None:
        drawn = self._project is not None
        text = notice_words(
            self._given, self._shown, current=self._current, waiting=self._waiting, drawn=drawn
        )
        layout = self._layout
        self.notice_box.say(text, self._fonts, layout.strips, layout.readout.width())

    def dress(self, theme: Theme) -> None:
        """Give everything its colours; results that are out of date have none."""
        self._theme = theme
        self.setBackgroundBrush(colour(theme.paper))
        self._hand_out_colours()
        for strip in self.strips:
            strip.refresh()

    def _hand_out_colours(self) -> None:
        theme = self._theme
        of_results = theme if self._current else greyed(theme)
        for item in (self.drawing, *self._over()):
            item.set_theme(theme)
        for item in (*self._strips.values(), self._readout, self.on_drawing):
            item.set_theme(of_results)

    # The cursor

    def show_cursor(self, cursor: Cursor | None) -> None:
        """Draw the cursor, where it is in the window, and read the values there."""
        self._cursor = cursor
        self._draw_cursor()
        self._values = "" if self._results is None else self._values_at(self._results, cursor)
        self._say_values()

    def _draw_cursor(self) -> None:
        x = None if self._cursor is None else self._cursor.x
        along = self._ruler.pixel(x) if x is not None and self._ruler.holds(x) else None
        labels = [label.rect for strip in self.strips for label in strip.labels] + self.notice_box.boxes
        gaps = texts_under(along, self._layout.axes, self.drawing.picture.texts, labels)
        self.cursor_line.set_pixel(along, self._layout, gaps)

    def set_pointer(self, point: QPointF | None) -> None:
        """Where the mouse is: of states drawn with their envelope the nearest is named."""
        self._pointer = point
        if self._together:
            self._say_values()

    def _nearest(self) -> str:
        """The state drawn nearest to the pointer, where it is on a strip of an envelope."""
        point, cursor, results = self._pointer, self._cursor, self._results
        if point is None or cursor is None or results is None or self.shown_state is not None:
            return ""
        if not self._together:
            return ""
        return nearest_to(point, self.strips, results, cursor.x, self._ruler, self._layout.axes)

    def _say_values(self) -> None:
        """At the foot of the sheet, in as many lines as it takes."""
        text = BETWEEN.join(part for part in (self._values, self._nearest()) if part)
        room = self._layout.readout
        text = self._fonts.wrapped(text, "plain", room.width() - 16.0, BETWEEN)
        size = self._fonts.measure(text, "plain")
        height = size.height() + LINE_EDGES * self._fonts.text_height
        self._readout.set_text(text, self._fonts)
        self._readout.set_rect(QRectF(room.left(), room.bottom() - height, room.width(), height))

    def _values_at(self, results: Results, cursor: Cursor | None) -> str:
        if cursor is None:
            return resting()
        return values_at(results, self.shown_state, cursor.x, self._choice, current=self._current)
