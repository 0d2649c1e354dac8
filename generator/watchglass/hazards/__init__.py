"""Hazards of substances and mixtures: the place of the classification engine."""
