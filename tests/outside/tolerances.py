"""Comparing a computed figure with a published one, within the tolerance stated beside it."""

from __future__ import annotations

from typing import Any


def within(value: float, expected: float, tolerance: object) -> bool:
    """Tell whether a value is as near to what is expected as its tolerance asks.

    Args:
        value: The computed figure.
        expected: The published or derived one, in the same unit.
        tolerance: `"exact"`, or a mapping with `rel`, `abs` or both; the larger of the two counts.
    """
    if tolerance == "exact":
        return value == expected
    if not isinstance(tolerance, dict) or not tolerance.keys() & {"rel", "abs"}:
        raise ValueError(f"{tolerance!r} is no tolerance")
    allowed: float = max(tolerance.get("rel", 0.0) * abs(expected), tolerance.get("abs", 0.0))
    return abs(value - expected) <= allowed


def tolerance_of(case: dict[str, Any], key: str) -> object:
    """Find the tolerance that a case states for one of its expected keys."""
    tolerance = case["tolerance"]
    if tolerance == "exact" or "rel" in tolerance or "abs" in tolerance:
        return tolerance
    return tolerance[key]


def wrong(case: dict[str, Any], computed: dict[str, float]) -> dict[str, tuple[float, float]]:
    """List what is out of tolerance: key, then computed and expected; empty where all is well."""
    expected = case["expected"]
    return {
        key: (value, expected[key])
        for key, value in computed.items()
        if key in expected and not within(value, expected[key], tolerance_of(case, key))
    }
