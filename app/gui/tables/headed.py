"""What the headings of a table say: each column's title, its unit, and the load case it belongs to."""

from __future__ import annotations

from typing import Any

from PySide6.QtCore import Qt

from app.gui.tables.rows import RowsModel
from app.units import symbol
from app.words import tr

LONGEST_CASE = 14  # letters of a load case's name in a heading; its tip has all


class HeadedModel(RowsModel):
    """Rows and columns with their headings; the cells are for whoever builds on it."""

    def headerData(
        self, section: int, orientation: Qt.Orientation, role: int = Qt.ItemDataRole.DisplayRole
    ) -> Any:
        """The column's title over its unit; a row's name is for screen readers only."""
        if orientation == Qt.Orientation.Vertical and self.is_record(section):
            name = self.table.row_name(self._document.project, self.record_of(section), self._sight)
            return name if role == Qt.ItemDataRole.AccessibleTextRole else None
        if orientation != Qt.Orientation.Horizontal or not 0 <= section < len(self._columns):
            return None
        if role == Qt.ItemDataRole.DisplayRole:
            return "\n".join(self.heading(section))
        if role in (Qt.ItemDataRole.AccessibleTextRole, Qt.ItemDataRole.ToolTipRole):
            return self._whole_heading(section)
        if role == Qt.ItemDataRole.TextAlignmentRole:
            return int(Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignTop)
        return None

    def heading(self, column: int) -> tuple[str, str]:
        """The two lines of a column's heading: its title, and its unit with the load case it belongs to."""
        case, unit = self._case_of(column), self.unit_of(column)
        if len(case) > LONGEST_CASE:
            case = case[: LONGEST_CASE - 1] + "…"
        return self._columns[column].words, ", ".join(filter(None, (unit, case)))

    def unit_of(self, column: int) -> str:
        """The unit of a column's numbers, empty for texts."""
        quantity = self._columns[column].quantity
        return symbol(quantity, self._sight.system) if quantity else ""

    def _case_of(self, column: int) -> str:
        """The load case whose loads the column's cells are; empty for other columns."""
        case = self._sight.load_case(self._document.project) if self._columns[column].of_case else None
        return "" if case is None else case.name

    def _whole_heading(self, column: int) -> str:
        """Title, unit and load case in one line."""
        case, titled = self._case_of(column), self.titled(column)
        return tr("{column}, load case {case}").format(column=titled, case=case) if case else titled

    def titled(self, column: int) -> str:
        """Both in one line."""
        title, unit = self._columns[column].words, self.unit_of(column)
        return f"{title} ({unit})" if unit else title
