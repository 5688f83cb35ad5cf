"""Checks against the outside: each names its source beside it, or says that there is none."""
