"""The one style sheet of the window's own panels, made from the theme's colours.

It is given to these panels only: on the window itself it would replace the palettes of all that is in it, and
light is told from dark by the palette.
"""

from __future__ import annotations

from app.gui.theme import Theme

_SHEET = """
QMenuBar, QWidget#top_bar, QWidget#status_line {{ background: {panel}; color: {ink}; }}
QMenuBar::item {{ background: transparent; color: {ink}; padding: 4px 9px; }}
QMenuBar::item:selected {{ background: {select_fill}; }}
QWidget#top_bar {{ border-bottom: 1px solid {edge}; }}
QWidget#status_line {{ border-top: 1px solid {edge}; }}
QWidget#top_bar QLabel, QWidget#status_line QLabel {{ color: {ink}; }}
QLabel#quiet, QWidget#top_bar QLabel#quiet, QWidget#status_line QLabel#quiet {{ color: {quiet}; }}
QFrame#rule {{ color: {edge}; }}
QToolButton {{ border: 1px solid transparent; border-radius: 3px; padding: 4px 9px; color: {ink}; }}
QToolButton:hover, QToolButton:pressed {{ background: {select_fill}; }}
QToolButton:focus {{ border: 1px solid {select}; }}
QPushButton#hidden_line {{ color: {quiet}; padding: 2px 14px; text-align: left;
    border: 1px solid transparent; }}
QPushButton#hidden_line:hover {{ background: {select_fill}; }}
QPushButton#hidden_line:focus {{ border: 1px solid {select}; }}
QToolButton:disabled {{ color: {quiet}; }}
QTabWidget::pane {{ border: none; background: {card}; }}
QTabWidget {{ background: {card}; }}
QWidget#corner, QWidget#tables {{ background: {card}; color: {ink}; }}
QWidget#corner QLabel {{ color: {quiet}; }}
QTabBar {{ background: {card}; }}
QTabBar::tab {{ background: {card}; color: {quiet}; padding: 6px 12px; border: none;
    border-bottom: 2px solid transparent; }}
QTabBar::tab:selected {{ color: {ink}; border-bottom: 2px solid {ink}; }}
QTabBar::tab:focus {{ color: {select}; }}
QTableView {{ background: {card}; color: {ink}; border: none; }}
QLineEdit#cell {{ background: {card}; color: {ink}; border: 2px solid {select}; }}
QSplitterHandle {{ background: {edge}; }}
"""


def style_sheet(theme: Theme) -> str:
    """The style sheet in these colours."""
    names = ("panel", "ink", "quiet", "edge", "select", "select_fill", "card")
    return _SHEET.format(**{name: getattr(theme, name) for name in names})
