"""The end of the member stays on the sheet while it is pulled: the sheet is looked at from farther instead.

Everywhere else a sheet keeps still under the hand; an end that has left it could not be seen any more.
"""

from __future__ import annotations

from app.drawing.layout import sketched
from app.drawing.member import Member
from app.gui.sheet_scene import SheetScene

EDGE = 6.0  # px from the edge of the sheet


def follow_end(paper: SheetScene, before: Member) -> bool:
    """Show all up to an end that has left the sheet; whether it had. The ghost is that of `before`."""
    low, high = paper.places.axes.along_of(paper.places.drawing)
    if low + EDGE <= paper.ruler.pixel(paper.positions[-1]) <= high - EDGE:
        return False
    paper.drawing.let_go()
    paper.set_ruler(paper.ruler.reaching(paper.positions))
    paper.drawing.hold()
    paper.hand_marks.show_ghost(sketched(before, paper.drawing.frame, paper.drawing.sketch))
    return True
