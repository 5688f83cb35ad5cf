"""From a project and its results to the PDF of the calc sheet, by Typst.

The contents go to Typst as a JSON file, figures as SVG files: user text is data and never markup. No fonts of
the system, no clock and no folder are read, so the same project and date give the same bytes everywhere. The
file is tagged (PDF/UA-1) and archival (PDF/A-3a) and carries the project itself as an attachment.
"""

from __future__ import annotations

import datetime as dt
import json
from importlib import resources
from typing import Final

from app.project_file import dump, sha256
from app.sheet.blocks import Value
from app.sheet.content import sheet_content
from app.sheet.printable import breakable, printable
from app.sheet.short_names import with_short_names
from app.sheet.title import Origin
from app.version import PROGRAM
from solver.model import Project
from solver.results import Results

STANDARDS: Final = ("a-3a", "ua-1")
_LINE: Final = 38  # characters without a space that every line has room for
_LONGEST_RUN: Final = {"rows": 12, "fingerprint": 64}  # less in the cells of tables, a whole SHA-256


def build_sheet(
    project: Project, results: Results, *, file_name: str, date: dt.date | None = None, changed: bool = False
) -> bytes:
    """The calc sheet as a PDF; `date` is that of the sheet, today where it is left out.

    `results` are those of `project`, which is `changed` where the file of that name (empty: none yet) does
    not hold it. The same arguments give the same bytes.
    """
    import typst

    day = date or dt.datetime.now(dt.UTC).astimezone().date()
    origin = Origin(file_name, day.isoformat(), PROGRAM, sha256(project), changed)
    shown = with_short_names(results)
    content = sheet_content(shown.project, shown, origin)
    files = _files(content) | {"project.json": dump(project)}
    stamp = int(dt.datetime(day.year, day.month, day.day, tzinfo=dt.UTC).timestamp())
    pdf = typst.compile(  # type: ignore[call-overload]  # the stubs do not know a dict of files as input
        input=files,
        format="pdf",
        pdf_standards=list(STANDARDS),
        ignore_system_fonts=True,
        timestamp=stamp,
    )
    if not isinstance(pdf, bytes):
        raise TypeError(pdf)
    return pdf


def _files(content: dict[str, Value]) -> dict[str, bytes]:
    """The layout, the contents with printable strings, and each figure as a file of its own."""
    figures: dict[str, bytes] = {}
    ready = _ready(content, figures)
    data = json.dumps(ready, ensure_ascii=False, allow_nan=False).encode()
    return {"main.typ": layout(), "data.json": data} | figures


def layout() -> bytes:
    """The Typst source that lays the contents out."""
    return (resources.files("app.sheet") / "sheet.typ").read_bytes()


def _ready(value: Value, figures: dict[str, bytes], longest: int = _LINE) -> Value:
    """The value with printable strings; runs longer than `longest` without a space may break."""
    if isinstance(value, str):
        return breakable(printable(value), longest)
    if isinstance(value, list):
        return [_ready(item, figures, longest) for item in value]
    if isinstance(value, dict):
        return {key: _entry(key, item, figures) for key, item in value.items()}
    return value


def _entry(key: str, value: Value, figures: dict[str, bytes]) -> Value:
    """SVG becomes a file and its name stands for it; everything else is made printable."""
    if key == "svg" and isinstance(value, str):
        name = f"figure-{len(figures)}.svg"
        figures[name] = value.encode()
        return name
    return _ready(value, figures, _LONGEST_RUN.get(key, _LINE))
