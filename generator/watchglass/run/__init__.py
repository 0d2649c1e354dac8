"""Running: events in the order they happen, and what they take from the materials."""
