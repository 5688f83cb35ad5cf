"""The hand on the drawing: editors, symbols and gestures over the sheet."""
