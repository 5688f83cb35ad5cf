"""Tests, mirroring the rooms they test; `python3 -m tests` sets everything up and runs them all."""
