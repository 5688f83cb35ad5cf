"""The calc sheet: content as data, figures as SVG, layout and PDF by Typst."""
