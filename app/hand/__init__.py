"""The hand on the drawing, without a window: what is gripped, typed and put on, as plain values."""
