"""Pure edits, Project → Project: one function is one undo step, and its result is always well formed.

An edit that would give anything else raises `EditError` with the faults, and nothing changes.
"""

from app.edits.cells import add_record, move_record, remove_records, set_value, value_at
from app.edits.checking import EditError
from app.edits.renaming import (
    rename_case,
    rename_combination,
    rename_joint,
    rename_material,
    rename_segment,
)

__all__ = [
    "EditError",
    "add_record",
    "move_record",
    "remove_records",
    "rename_case",
    "rename_combination",
    "rename_joint",
    "rename_material",
    "rename_segment",
    "set_value",
    "value_at",
]
