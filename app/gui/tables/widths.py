"""How wide each column is: what its texts need, towards its usual width, then more in proportion."""

from __future__ import annotations

from collections.abc import Iterable
from typing import TYPE_CHECKING

from app.gui.tables.delegate import BAR_WIDTH, MARGIN

if TYPE_CHECKING:
    from app.gui.tables.view import TableView

MEASURED = 60  # rows whose texts are measured for the widths


class Widths:
    """Shares the width of one table out among the columns that are shown."""

    def __init__(self, view: TableView) -> None:
        self._view = view
        self._owing = True  # whether widths are to be shared out once the table is seen

    def share(self) -> None:
        """Give each column what its texts need, towards its usual width, and then more in proportion.

        A table behind another tab waits until it is seen.
        """
        self._owing = not self._view.isVisible()
        if self._owing:
            return
        shown = self._view.shown_columns()
        needed = [self._needed(place) for place in shown]
        usual = [max(width, self._usual(place)) for place, width in zip(shown, needed, strict=True)]
        room, least, most = self._view.viewport().width(), sum(needed), sum(usual)
        grown = min(max((room - least) / max(1, most - least), 0.0), 1.0)
        share = min(max(room / max(1, most), 1.0), 3.0)
        for place, need, wish in zip(shown, needed, usual, strict=True):
            self._view.setColumnWidth(place, int((need + grown * (wish - need)) * share))

    def widen_if_needed(self) -> None:
        """After a change: share the width out anew only where a text would be cut off."""
        if self._owing:
            self.share()
        else:
            self._widen(self._view.shown_columns())

    def widen_for_figures(self) -> None:
        """The same after new results, which change their own columns only."""
        columns = self._view.table_model.columns
        if self._view.isVisible() and any(column.figure is not None for column in columns):
            shown = self._view.shown_columns()
            self._widen(place for place in shown if columns[place].figure is not None)

    def _widen(self, places: Iterable[int]) -> None:
        view = self._view
        if view.isVisible() and any(view.columnWidth(place) < self._needed(place) for place in places):
            self.share()

    @property
    def needed(self) -> int:
        """The width of the whole table at which none of its texts is cut off."""
        return sum(self._needed(place) for place in self._view.shown_columns())

    def _usual(self, place: int) -> int:
        digits = self._view.table_model.columns[place].width
        return digits * self._view.fontMetrics().horizontalAdvance("0") + 2 * MARGIN

    def _needed(self, place: int) -> int:
        """Wide enough for the heading and the texts, but no text takes more than three usual widths."""
        model, metrics = self._view.table_model, self._view.fontMetrics()
        column = model.columns[place]
        rows = range(min(model.record_rows, MEASURED))
        texts = [model.text_at(row, place) for row in rows]
        widest = max((metrics.horizontalAdvance(text) for text in texts), default=0)
        if column.figure is not None:  # room for results before they are there, so that nothing jumps
            widest = max(widest, column.width * metrics.horizontalAdvance("0"))
        bar = BAR_WIDTH + 10 if column.bar is not None else 0
        heading = max(metrics.horizontalAdvance(text) for text in model.heading(place))
        return max(min(widest, 3 * self._usual(place)) + bar, heading) + 2 * MARGIN + 2
