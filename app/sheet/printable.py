"""Text made safe for paper: what the embedded fonts cannot show is replaced visibly, never dropped.

A PDF/A file needs a glyph for every character, so one emoji in a project's title would stop the export. The
table of what Libertinus Serif and DejaVu Sans Mono cover was measured with Typst's own fonts and is checked
by a test. Control characters, combining marks that do not compose and characters that turn the direction of
writing are shown by their number as well, since they could hide or reorder what a checker reads.
"""

from __future__ import annotations

import re
import unicodedata
from bisect import bisect_right
from typing import Final

_COVERED: Final = """
20-2FF 374-377 37A-37F 384-38A 38C 38E-3A1 3A3-3CE 3D0-3E1 3F0-477 47C-47F 48C-4C4 4C7-4CC 4CF-4F9
510-511 51A-51D 531-556 559-55F 561-587 589-58A 5BE-5C6 5D0-5EA 5F0-5F4 606-607 609-60A 60C 61B 61F
621-63A 640-66D 674 679-67B 67E-680 683-684 686-687 691 698 6A4 6A9 6AF 6BE 6CC 6F0-6F9 E3F E81-E82
E84 E87-E88 E8A E8D E94-E97 E99-E9F EA1-EA3 EA5 EA7 EAA-EAB EAD-EB3 10D0-10FC 1D02 1D08-1D09
1D14-1D17 1D1D-1D1F 1D2C-1D2E 1D30-1D3C 1D3E-1D5F 1D62-1D67 1D77-1D78 1D7B 1D85 1D9B-1DB7 1DB9-1F15
1F18-1F1D 1F20-1F45 1F48-1F4D 1F50-1F57 1F59 1F5B 1F5D 1F5F-1F7D 1F80-1FB4 1FB6-1FC4 1FC6-1FD3
1FD6-1FDB 1FDD-1FEF 1FF2-1FF4 1FF6-1FFE 2009 200C-2037 2039-203F 2042 2044-204B 204F 2070-2071
2074-208E 2090-209C 20A0-20B5 20B8-20BA 20BD 20BF 2100-2103 2105-2106 2109 210C-210F 2111 2113
2115-2117 2119-211A 211C-211D 2120 2122 2124 2126-2127 212A-212B 212E 2132 2135-2139 2148 214F-2151
2153-2184 2189 2190-222E 2234-223D 2241-226B 226D-228B 228D-22A6 22AC 22B2-22B8 22C2-22C6 22CD-22D1
22DA-22EF 2300-2306 2308-2315 2318-2319 231C-2321 2325-232B 2335-237A 237D 2380-2383 2388-238B 2395
239B-23AE 23CE-23CF 23D3 2423 2460-2487 24B6-262F 2638-268B 2690-269C 26A0-26A7 26AC-26B1 2701-2704
2706-2709 270C-2727 2729-274B 274D 274F-2752 2756 2758-275E 2761-277F 2794 2798-27AF 27B1-27BE 27C2
27C5-27C6 27DC 27E0 27E6-27EB 27F5-27F7 2987-2988 2997-2998 29EB 29FA-29FB 2A00 2A2F 2A6A-2A6B
2B05-2B0D 2B12-2B1A 2C60-2C70 2C74-2C77 2C79-2C7A 2C7C-2C7F 2E02-2E05 2E08-2E0A 2E17-2E18 2E1F
2E22-2E25 2E2E FB01-FB02 FB1D-FB20 FB29-FB36 FB38-FB3C FB3E FB40-FB41 FB43-FB44 FB46-FB4E FFFD
"""
# What figures may hold: one font in all its styles, nothing from right to left. Where the SVG reader has to
# mix fonts or directions in one text it loses characters, and on some mixtures it fails as a whole.
_COVERED_IN_FIGURES: Final = """
20-241 243 247 249 24D 250-2E4 2EA-2FF 375 37A-37D 384-386 388-38A 38C 38E-3A1 3A3-3CE 3D0-3E1
3F0-3F6 3F8-3F9 3FB 3FD-45F 462-463 470-477 490-4C4 4C7-4CC 4D0-4F9 1D35 1D43-1D44 1D47-1D4B 1D4D
1D4F-1D53 1D56-1D58 1D5A-1D5B 1D9C 1DA0 1DA4 1DB6 1DBB 1E00-1E9B 1E9E 1EA0-1EF9 1F00-1F15 1F18-1F1D
1F20-1F45 1F48-1F4D 1F50-1F57 1F59 1F5B 1F5D 1F5F-1F70 1F72 1F74 1F76 1F78 1F7A 1F7C 1F80-1FB4
1FB6-1FBA 1FBC-1FBD 1FBF-1FC4 1FC6-1FC8 1FCA 1FCC-1FD2 1FD6-1FDA 1FDD-1FE2 1FE4-1FEA 1FEC-1FED
1FF2-1FF4 1FF6-1FF8 1FFA 1FFC 1FFE 2009 2010-2037 2039-203E 2042 2044 2047-204B 204F 2070-2071
2074-208E 2090-209C 20A2-20A4 20A7-20A8 20AB-20AC 20AF 20B1 20BF 2100-2103 2105-2106 2109 210C-210F
2111 2113 2115-2116 2119-211A 211C-211D 2120 2122 2124 2127 212E 2135-2139 2153-2184 2190-2199
2200-2203 2205-2208 220A-220B 220D 220F-221C 221E-221F 2223 2225 2227-222B 2236 223C 2248 2260
2264-2265 25A0-25A1
"""
_REFUSED: Final = frozenset({"Cc", "Cf", "Cn", "Co", "Cs", "Mc", "Me", "Mn", "Zl", "Zp"})
_BREAK: Final = "\u200b"  # a place where a line may break, without width
_RIGHT_TO_LEFT: Final = re.compile(
    "[\u0590-\u08ff\ufb1d-\ufb4f](?:.*[\u0590-\u08ff\ufb1d-\ufb4f])?", re.DOTALL
)
_LEFT_TO_RIGHT_MARK: Final = "\u200e"
_RUN: Final = 6
_DRAFTING: Final = str.maketrans("⌀▭", "ø□")  # where accents forbid the second font that has these signs


class _Table:
    """Ranges of characters, written as hexadecimal numbers."""

    def __init__(self, ranges: str) -> None:
        pairs = [part.partition("-") for part in ranges.split()]
        self._ends = [int(high or low, 16) for low, _, high in pairs]
        self._starts = [int(low, 16) for low, _, _ in pairs]

    def __contains__(self, character: str) -> bool:
        if unicodedata.category(character) in _REFUSED:
            return False
        index = bisect_right(self._starts, ord(character)) - 1
        return index >= 0 and ord(character) <= self._ends[index]


TABLE: Final = _Table(_COVERED)
FIGURE_TABLE: Final = _Table(_COVERED_IN_FIGURES)


def printable(text: str) -> str:
    """The text with every character that paper cannot show written as its number, such as [U+1F600].

    Line breaks stay. Right-to-left letters stay and are closed by a mark, so that a number behind them keeps
    its place and its sign.
    """
    shown = _shown(text.replace("\r\n", "\n"), TABLE)
    return _RIGHT_TO_LEFT.sub(lambda run: run.group() + _LEFT_TO_RIGHT_MARK, shown)


def printable_in_figure(text: str) -> str:
    """The text on one line as a figure may hold it, every other character written as its number."""
    line = text.replace("\r\n", " ").replace("\n", " ").replace("\t", " ")
    plain = unicodedata.normalize("NFD", line) == line
    return _shown(line if plain else line.translate(_DRAFTING), FIGURE_TABLE, spare="⌀▭" if plain else "")


def _shown(text: str, table: _Table, spare: str = "\n") -> str:
    composed = unicodedata.normalize("NFC", text.replace("\t", " "))
    return "".join(c if c in spare or c in table else f"[U+{ord(c):04X}]" for c in composed)


def breakable(text: str, longest: int) -> str:
    """The text with places to break in runs of more than `longest` characters without a space.

    So a long word stays inside its cell or line. Shorter ones are left as they are, to be copied whole.
    """
    return re.sub(rf"\S{{{longest + 1},}}", lambda run: _with_breaks(run.group()), text)


def _with_breaks(run: str) -> str:
    return _BREAK.join(["", *(run[start : start + _RUN] for start in range(0, len(run), _RUN)), ""])


def shortened(text: str, length: int) -> str:
    """The text on one line, cut to `length` characters with an ellipsis where it is longer."""
    line = " ".join(text.split())
    return line if len(line) <= length else line[: length - 1] + "…"
