"""Help: pages written for this program, in the user's language, with keys and words taken from the program.

`pages` lists and reads them, `markup` fills in what must not go stale. Neither knows Qt; the window shows the
pages and makes their pictures.
"""
