"""The one table of colours, light and dark, and the choice between them by the palette of the system.

After Okabe and Ito, darkened where contrast asks for it; a test computes every contrast. Fills are opaque
mixtures with the paper: on a raster they paint several times faster than translucent ones. What is out of
date is drawn with the same theme after `greyed`, so that nothing needs a second way of painting.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import lru_cache

from PySide6.QtGui import QColor, QPalette


@dataclass(frozen=True, slots=True)
class Theme:
    """Colours as #RRGGBB. Those of text and marks are named by what they mean, fills end in `_fill`."""

    paper: str
    panel: str
    card: str
    ink: str
    quiet: str
    joint: str  # joint lines, frames of strips: thin, but still 3:1
    edge: str  # separators that carry no meaning
    tension: str
    compression: str
    displacement: str
    over: str
    select: str  # the edge of what is selected, the cursor, the focus
    tension_fill: str
    compression_fill: str
    over_fill: str
    body_fill: str
    select_fill: str
    band_fill: str  # between the allowables
    load_fill: str

    @property
    def is_dark(self) -> bool:
        """Whether the paper is dark."""
        return luminance(self.paper) < 0.2


def _theme(paper: str, panel: str, card: str, inks: dict[str, str]) -> Theme:
    """The theme whose fills are the inks thinned with the paper."""
    return Theme(
        paper=paper,
        panel=panel,
        card=card,
        **inks,
        tension_fill=mixed(inks["tension"], paper, 0.17),
        compression_fill=mixed(inks["compression"], paper, 0.17),
        over_fill=mixed(inks["over"], paper, 0.12),
        body_fill=mixed(inks["quiet"], paper, 0.14),
        select_fill=mixed(inks["select"], paper, 0.09),
        band_fill=mixed(inks["quiet"], paper, 0.05),
        load_fill=mixed(inks["quiet"], paper, 0.22),
    )


def mixed(colour: str, ground: str, share: float) -> str:
    """`share` (0…1) of the colour on the ground, as an opaque colour."""
    parts = zip(_channels(colour), _channels(ground), strict=True)
    return "#" + "".join(f"{round(255 * (share * a + (1 - share) * b)):02X}" for a, b in parts)


def _channels(colour: str) -> tuple[float, float, float]:
    """Red, green and blue in 0…1."""
    red, green, blue = (int(colour[i : i + 2], 16) / 255 for i in (1, 3, 5))
    return red, green, blue


def luminance(colour: str) -> float:
    """Relative luminance 0…1 (WCAG 2.2)."""
    linear = [c / 12.92 if c <= 0.04045 else ((c + 0.055) / 1.055) ** 2.4 for c in _channels(colour)]
    return 0.2126 * linear[0] + 0.7152 * linear[1] + 0.0722 * linear[2]


def contrast(one: str, other: str) -> float:
    """Contrast ratio 1…21 of two colours (WCAG 2.2)."""
    low, high = sorted((luminance(one), luminance(other)))
    return (high + 0.05) / (low + 0.05)


LIGHT = _theme(
    paper="#FBFAF7",
    panel="#F3F1EB",
    card="#FFFFFF",
    inks={
        "ink": "#1F2A33",
        "quiet": "#5D6972",
        "joint": "#707A82",
        "edge": "#D9D5CB",
        "tension": "#0072B2",
        "compression": "#C24E00",
        "displacement": "#007A59",
        "over": "#A8487F",
        "select": "#0072B2",
    },
)

DARK = _theme(
    paper="#14191D",
    panel="#1B2227",
    card="#232C32",
    inks={
        "ink": "#E8E6E0",
        "quiet": "#A3AEB6",
        "joint": "#7D8992",
        "edge": "#38434B",
        "tension": "#56B4E9",
        "compression": "#E69F00",
        "displacement": "#009E73",
        "over": "#CC79A7",
        "select": "#56B4E9",
    },
)


def theme_for(palette: QPalette) -> Theme:
    """Dark where the system's text is lighter than its window, else light."""
    text = palette.color(QPalette.ColorRole.WindowText).lightnessF()
    return DARK if text > palette.color(QPalette.ColorRole.Window).lightnessF() else LIGHT


def greyed(theme: Theme) -> Theme:
    """The theme of what is out of date: no colour speaks any more, only shapes."""
    grey, thin = theme.quiet, mixed(theme.quiet, theme.paper, 0.12)
    names = ("tension", "compression", "displacement", "over", "ink")
    fills = ("tension_fill", "compression_fill", "over_fill")
    return replace(theme, **dict.fromkeys(names, grey), **dict.fromkeys(fills, thin))


@lru_cache(256)  # everything that is painted asks for some of a few
def colour(name: str) -> QColor:
    """The colour for Qt; it is shared, so nobody changes it."""
    return QColor(name)
