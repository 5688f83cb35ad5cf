"""The drawing of the member, laid out once for screen and paper: from a member, a frame and the measure of
texts to plain shapes. Knows neither Qt nor SVG; `app.gui.drawing` and `app.sheet` paint what it makes.
"""
