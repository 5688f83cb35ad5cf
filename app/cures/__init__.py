"""Cures: which one number of the member, changed, makes a check pass that fails.

Since the member may be statically indeterminate, every change moves the forces too; so nothing is scaled
here. A cure is sought among round numbers by solving the changed project anew (`seek`), and it is said only
where the project with exactly that number was solved and the check passes in it in every combination. What
else fails in that very solve is told with it. A limit or an allowable is never a cure.
"""

from app.cures.changes import Change
from app.cures.seek import Cure, Cures, failing, is_small, seek

__all__ = ["Change", "Cure", "Cures", "failing", "is_small", "seek"]
