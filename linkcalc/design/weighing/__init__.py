"""Lever scales and weighing beams: what stands where, how it tilts, how wrong it may be."""
