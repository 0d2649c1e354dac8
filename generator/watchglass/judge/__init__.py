"""Judging: one check a file, each a pure function from what is known to findings."""
