"""What holds joints sideways: pure edits of one of its two halves, translation or rotation."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Literal

from msgspec import UNSET, UnsetType, structs

from app.edits.checking import consistent
from solver.model import Joint, Lateral, LateralHold, Project


def hold_sideways(
    project: Project,
    indexes: Iterable[int],
    key: Literal["translation", "rotation"],
    hold: LateralHold | UnsetType,
) -> Project:
    """The project with these joints held so; UNSET frees them, and takes away a record that says nothing."""
    chosen = set(indexes)
    joints = tuple(
        _held(joint, key, hold) if index in chosen else joint for index, joint in enumerate(project.joints)
    )
    return consistent(structs.replace(project, joints=joints), project)


def _held(joint: Joint, key: str, hold: LateralHold | UnsetType) -> Joint:
    old = Lateral() if isinstance(joint.lateral, UnsetType) else joint.lateral
    fresh = structs.replace(old, **{key: hold})
    return structs.replace(joint, lateral=UNSET if fresh == Lateral() else fresh)
