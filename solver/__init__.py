"""The mechanics of a member under axial load: a frozen Project in, frozen Results out.

Imports the standard library, numpy, scipy and msgspec only; knows no screen, no file and no display unit.
Everything is in SI base units. Positive: displacement, force and load along +x, axial force and stress in
tension, temperature as the rise above the stress-free state.
"""
