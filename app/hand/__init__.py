"""The hand on the drawing, without a window: what is gripped, typed and put on, as plain values.

Knows neither mouse nor window: `app.drawing.handles` says where a number can be taken hold of, `app.gui.hand`
follows the pointer and the keys. A pull makes a project by `app.edits` alone.
"""
