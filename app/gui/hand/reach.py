"""The end of the member stays on the sheet while it is pulled: the sheet is looked at from farther instead.

Everywhere else a sheet keeps still under the hand; beyond what the ruler shows an end could not be seen.
"""

from __future__ import annotations

from app.drawing.layout import sketched
from app.drawing.member import Member
from app.gui.sheet_scene import SheetScene


def follow_end(paper: SheetScene, before: Member) -> bool:
    """Show all up to an end that has left the sheet; whether it had. The ghost is that of `before`."""
    if paper.ruler.holds(paper.positions[-1]):
        return False
    paper.drawing.let_go()
    paper.set_ruler(paper.ruler.reaching(paper.positions))
    paper.drawing.hold()
    paper.hand_marks.show_ghost(sketched(before, paper.drawing.frame, paper.drawing.sketch))
    return True
