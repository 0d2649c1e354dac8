"""Resolving: names bound, dimensions checked, marks turned into bench events."""
