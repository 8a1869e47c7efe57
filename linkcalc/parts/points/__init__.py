"""Constructions: ways to say where a point is drawn, with compass and ruler.

A construction names other points (``needs``) and places its own from theirs (``place``); a changed dimension so
redraws all that hangs on it. Places are [m], float or (1, variant, 1). A construction that cannot be drawn raises
``NoPlace`` with the reason.
"""


class NoPlace(ValueError):
    """The construction gives no point: arcs that do not meet, a line of no length."""
