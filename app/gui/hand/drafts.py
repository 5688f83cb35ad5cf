"""Which parts of the drawing wear the mark of a draft: their cells hold a text that was not taken in."""

from __future__ import annotations

from app.drawing.shapes import Part
from app.gui.document import Snapshot
from app.hand.cells import part_at
from app.words import tr


def drafts_on_drawing(snapshot: Snapshot) -> dict[Part, str]:
    """Each such part with the sentence for its tooltip."""
    found: dict[Part, str] = {}
    for place, draft in snapshot.drafts.items():
        part = part_at(place, snapshot.project)
        if part is not None:
            words = tr("{text}, not taken in: {reason}")
            found[part] = words.format(text=draft.text, reason=draft.reason)
    return found
