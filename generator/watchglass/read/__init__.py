"""Reading: text to a syntax tree with spans. Never fails; never knows what a name means."""
