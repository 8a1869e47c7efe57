"""Laws: how strong something pushes, from a length or an angle alone. Along which path is no matter of theirs."""

from __future__ import annotations

from typing import Protocol

from linkcalc.parts.contract import Value


class Law(Protocol):
    """Force from length, or moment from angle; plus pushes apart (opens the angle).

    size     [N], [N m] or [N/m]: the figure that tells how strong it is; None: that is what is asked for
    partial  True if there is no force outside some range: it is not a number there
    """

    @property
    def size(self) -> Value | None: ...
    @property
    def partial(self) -> bool: ...

    def force(self, way: Value) -> Value:
        """[N] or [N m] from a length [m] or an angle [rad], elementwise; not asked of the unknown"""
