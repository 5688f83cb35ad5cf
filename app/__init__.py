"""What a person meets: files, units, words, terminal, calc sheet and (only in app.gui) the window."""
