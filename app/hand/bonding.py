"""Putting a bonded part on a segment: of which material it begins with."""

from __future__ import annotations

from app import edits
from app.section_entry import parse_section
from app.typical_materials import not_in
from app.words import tr
from solver.model import BondedPart, Material, Project


def bond(project: Project, index: int, section: str) -> Project:
    """The project with a part of another material bonded to a segment; a typical one is added if need be."""
    segment = project.segments[index]
    material = _other_than(project, segment.material)
    if all(known.name != material.name for known in project.materials):
        project = edits.add_record(project, ("materials",), material)
    part = BondedPart(material.name, parse_section(section, project.display.unit_system))
    return edits.set_value(project, ("segments", index, "bonded"), (*segment.bonded, part))


def _other_than(project: Project, name: str) -> Material:
    """Another material of the project; where it has but one, the first typical one that it has not."""
    others = (material for material in (*project.materials, *not_in(project)) if material.name != name)
    return next(others, project.materials[0])


def materials_added(old: Project, project: Project) -> str:
    """What was added for it, in words; empty where nothing was."""
    name = project.materials[-1].name if len(project.materials) > len(old.materials) else ""
    note = tr("{name} added with typical values, verify; it has no allowable stresses yet")
    return note.format(name=name) if name else ""
