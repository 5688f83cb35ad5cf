"""What is seen on the drawing beside the member: results, and whether all of it is to scale."""

from __future__ import annotations

from typing import Final, Literal, TypeAlias, get_args

from msgspec import Struct

from app.words import later

Colour: TypeAlias = Literal["none", "force", "stress"]
COLOURS: Final[tuple[Colour, ...]] = get_args(Colour)
COLOUR_WORDS: Final[dict[Colour, str]] = {
    "none": later("&No colour"),
    "force": later("Colour: axial &force"),
    "stress": later("Colour: &stress"),
}


class Looks(Struct, frozen=True):
    """What a person has chosen to see on the drawing."""

    colour: Colour = "none"
    displaced: bool = False
    true: bool = False  # to one scale along, however narrow a segment gets

    @classmethod
    def of_text(cls, text: str) -> Looks:
        """Those that were remembered as `text`; as at first where it cannot be read."""
        words = text.split()
        colour = next((name for name in COLOURS if name in words), COLOURS[0])
        return cls(colour, "displaced" in words, "true" in words)

    @property
    def text(self) -> str:
        """For remembering."""
        flags = [name for name, on in (("displaced", self.displaced), ("true", self.true)) if on]
        return " ".join([self.colour, *flags])
