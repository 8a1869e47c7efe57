"""Coordinates: what can be stepped through a stroke."""
