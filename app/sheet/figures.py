"""The figures of the sheet as plain SVG: the member drawn to scale, and the strips of a state or envelope."""

from app.sheet.member_figure import Figure, member_figure
from app.sheet.strip_figure import envelope_figure, state_figure

__all__ = ["Figure", "envelope_figure", "member_figure", "state_figure"]
