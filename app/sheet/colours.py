"""The colours of paper: those of the window's light theme, with white ground. Meaning never rests on them."""

from __future__ import annotations

from typing import Final

INK: Final = "#1F2A33"
QUIET: Final = "#5D6972"
RULE: Final = "#C9CDD0"
BAND: Final = "#F4F5F4"
BODY: Final = "#E9EDF0"
LOAD: Final = "#DFE3E6"
TENSION: Final = "#0072B2"
TENSION_FILL: Final = "#D3E4EF"
COMPRESSION: Final = "#C24E00"
COMPRESSION_FILL: Final = "#F5E2D6"
DISPLACEMENT: Final = "#007A59"
OVER: Final = "#A8487F"
