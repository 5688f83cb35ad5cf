"""Pure edits, Project → Project: one function is one undo step, and its result is always well formed.

An edit that would give anything else raises `EditError` with the faults, and nothing changes.
"""

from app.edits.cases import remove_case, remove_combinations, set_factor
from app.edits.cells import add_record, remove_records, set_value, value_at
from app.edits.checking import EditError
from app.edits.companions import (
    add_companion,
    companions_at,
    extend_companion,
    fit_companion,
    is_unfit,
    missing_length,
    remove_companion_segments,
    remove_companions,
    span_joints,
)
from app.edits.lateral import hold_sideways
from app.edits.loads import set_joint_load, set_segment_load
from app.edits.member import delete_segments, insert_segment, move_segments, reverse_member
from app.edits.mirroring import mirror_member
from app.edits.parts import join_segments, split_segment
from app.edits.renaming import (
    number_joints,
    rename_case,
    rename_combination,
    rename_joint,
    rename_material,
    rename_segment,
)
from app.edits.repeating import repeat_segments
from app.edits.supports import free_joints, hold_joint, moving_joints, without_support
from app.edits.uniting import join_equal_neighbours

__all__ = [
    "EditError",
    "add_companion",
    "add_record",
    "companions_at",
    "delete_segments",
    "extend_companion",
    "fit_companion",
    "free_joints",
    "hold_joint",
    "hold_sideways",
    "insert_segment",
    "is_unfit",
    "join_equal_neighbours",
    "join_segments",
    "mirror_member",
    "missing_length",
    "move_segments",
    "moving_joints",
    "number_joints",
    "remove_case",
    "remove_combinations",
    "remove_companion_segments",
    "remove_companions",
    "remove_records",
    "rename_case",
    "rename_combination",
    "rename_joint",
    "rename_material",
    "rename_segment",
    "repeat_segments",
    "reverse_member",
    "set_factor",
    "set_joint_load",
    "set_segment_load",
    "set_value",
    "span_joints",
    "split_segment",
    "value_at",
    "without_support",
]
