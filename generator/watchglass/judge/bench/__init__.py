"""Checks of what happened at the bench: one fault a file, each from a `Run` to findings."""
