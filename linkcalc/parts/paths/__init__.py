"""Paths: along what a force runs from place to place, how long that is, and who is pulled which way."""
