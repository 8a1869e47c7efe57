"""Loads: what pushes."""
