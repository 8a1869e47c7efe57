"""A mechanism as drawn: names, sizes, cases; no solving."""
