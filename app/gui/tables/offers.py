"""The names that a cell offers while it is typed into: what a reference can name, and typical materials.

Those of the project come first. An offered name is only a text: it is taken in as if it had been typed.
"""

from __future__ import annotations

from collections.abc import Iterable

from app.edits.companions import segment_marks
from app.gui.tables.column import Offer, Sight
from app.hand.kinds import KINDS
from app.support_entry import parse_supports, supports_entry
from app.typical_materials import not_in
from app.units import format_value
from app.words import tr
from solver.model import Material, Project, supports_of


def materials(project: Project, sight: Sight) -> tuple[Offer, ...]:
    """The project's materials, then typical ones that it has not."""
    own = (Offer(material.name, _modulus(material, sight)) for material in project.materials)
    return (*own, *new_materials(project, sight))


def new_materials(project: Project, sight: Sight) -> tuple[Offer, ...]:
    """Typical materials that the project has not yet, marked as such."""
    marked = tr("{modulus}, typical, verify")
    return tuple(Offer(one.name, marked.format(modulus=_modulus(one, sight))) for one in not_in(project))


def _modulus(material: Material, sight: Sight) -> str:
    return format_value(material.modulus, "modulus", sight.system, with_unit=True, strip=True)


def segments(project: Project, _sight: Sight) -> tuple[Offer, ...]:
    """The marks of the segments, of the companions' behind those of the member."""
    return _named(segment_marks(project))


def joints(project: Project, _sight: Sight) -> tuple[Offer, ...]:
    """The marks of the joints."""
    return _named(joint.mark for joint in project.joints)


def held_joints(project: Project, _sight: Sight) -> tuple[Offer, ...]:
    """The marks of the joints that have a support."""
    return _named(joint.mark for joint in project.joints if supports_of(joint))


def combinations(project: Project, _sight: Sight) -> tuple[Offer, ...]:
    """The names of the combinations."""
    return _named(combination.name for combination in project.combinations)


def supports(_project: Project, sight: Sight) -> tuple[Offer, ...]:
    """What can hold a joint, as it is typed; the numbers are there to be typed over."""
    begins = {kind.key: kind.begins_in(sight.system) for kind in KINDS if kind.part == "support"}
    both = begins["stop"].replace("+", "±")
    texts = (
        (begins["free"], tr("no support")),
        (begins["fixed"], tr("holds both ways")),
        (begins["spring"], tr("pulls back both ways")),
        (begins["stop"], tr("pushes back beyond the gap, on this side")),
        (both, tr("on either side")),
        (f"{begins['spring']} and {begins['stop']}", tr("several at one joint")),
    )
    return tuple(
        Offer(supports_entry(parse_supports(text, sight.system), sight.system), remark)
        for text, remark in texts
    )


def _named(names: Iterable[str]) -> tuple[Offer, ...]:
    return tuple(Offer(name) for name in names)


def matching(offers: Iterable[Offer], text: str) -> tuple[Offer, ...]:
    """Those with a word that begins with the text; none where that is the text itself and nothing more."""
    wanted = text.strip().casefold()
    found = tuple(offer for offer in offers if f" {wanted}" in f" {offer.name.casefold()}")
    return () if [offer.name for offer in found] == [text.strip()] else found
