"""The drawing as an item of the scene: paints what `app.drawing` lays out, and is clicked."""
