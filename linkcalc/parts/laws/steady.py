"""Steady: the same force at every length."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts.contract import Value


@dataclass(frozen=True, eq=False)
class Steady:
    """size  [N] or [N m]; None: what is asked for"""

    size: Value | None
    partial = False

    def force(self, way: Value) -> Value:  # noqa: ARG002
        assert self.size is not None
        return self.size
