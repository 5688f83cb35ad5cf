"""What a state is called: a case and a combination as the user named them, ours in the user's language."""

from __future__ import annotations

from app.words import tr
from solver.packing import UNLOADED


def state_words(name: str) -> str:
    """The name of a state for eyes; that of a member without load cases is ours."""
    return tr("Unloaded") if name == UNLOADED else name
