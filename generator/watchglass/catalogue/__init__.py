"""Substances, stock solutions, glassware, indicators: types, decoding, look-up."""
