"""The drawing of the member: a plain layout in pixels, and the scene item that paints it and is clicked."""
