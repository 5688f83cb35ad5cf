"""The strips under (or beside) the drawing: what they show, how it is scaled, and the items that paint it."""
