"""Where a cell stands in the project, and how a draft finds its cell again after rows came or went.

A place reads like the file's own path: list names, indices, keys (`("segments", 2, "length")`). A cell that
belongs to a load case ends in the case's place (`("segments", 2, "load", "load_cases", 0)`); lists of the
project itself are therefore looked up at the root wherever they stand. Records are frozen and untouched ones
are shared between snapshots, so identity says which rows moved; the alternative, an id in each record, would
have to be kept out of the file.
"""

from __future__ import annotations

from collections.abc import Sequence

from solver.model import Project

Place = tuple[str | int, ...]


def moved_index(index: int, old: Sequence[object], new: Sequence[object]) -> int | None:
    """Where the item at `index` stands in `new`; None where it is gone.

    An item that is no longer there was changed: it is the one of its mark or name, else the one in its place
    where the number is the same, else it was taken out.
    """
    item, name = old[index], _name(old[index])
    same = (place for place, other in enumerate(new) if other is item)
    named = (place for place, other in enumerate(new) if name is not None and _name(other) == name)
    found = next(same, next(named, None))
    return index if found is None and len(old) == len(new) else found


def _name(item: object) -> object:
    """What names a record among its like; None for loads and limits, which have no name of their own."""
    return getattr(item, "mark", getattr(item, "name", None))


def follow(place: Place, old: Project, new: Project) -> Place | None:
    """The same cell's place in `new`; None where its row is gone."""
    found: list[str | int] = []
    old_node: object = old
    new_node: object = new
    for step in place:
        if isinstance(step, int):
            index = _follow_index(step, old_node, new_node)
            if index is None:
                return None
            found.append(index)
            old_node, new_node = _item(old_node, step), _item(new_node, index)
        else:
            found.append(step)
            root = hasattr(old, step) and not hasattr(old_node, step)
            old_node = getattr(old if root else old_node, step, None)
            new_node = getattr(new if root else new_node, step, None)
    return tuple(found)


def _follow_index(index: int, old: object, new: object) -> int | None:
    if not (isinstance(old, tuple) and isinstance(new, tuple)):
        return index
    if index < 0:  # typed while there was no load case: belongs to the first one
        return 0 if new else index
    if index == len(old):  # the row that adds another stands after the last
        return len(new)
    return moved_index(index, old, new)


def _item(node: object, index: int) -> object:
    return node[index] if isinstance(node, tuple) and 0 <= index < len(node) else None
