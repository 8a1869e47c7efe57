"""Sections of members, as a file says them; what they come to is for ``design.sizing.section``."""
