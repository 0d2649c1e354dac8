"""Watchglass: a compiler and static site generator for laboratory procedures."""

__version__ = "0.1.0"
