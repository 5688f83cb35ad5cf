"""The calc sheet: content as data, figures as SVG, layout and PDF by Typst."""

from app.sheet.build import build_sheet

__all__ = ["build_sheet"]
