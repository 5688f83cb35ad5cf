"""A recorded walk: the hoist shaft is built by hand on the real window, from `File > New`, step by step.

`hands` moves mouse and keys, the chapters (`shaping`, `loading`, `proving`, `looking`) say what is done,
`steps` waits for the results after each step and looks at what has come of it, `camera` takes the pictures.
"""
