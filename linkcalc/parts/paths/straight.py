"""Straight: from one point to another, as a spring, a cylinder or a screw reaches."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.parts.contract import Mark, Poses, Push, Site, Sketch, Value


@dataclass(frozen=True, eq=False)
class Straight:
    """The distance of two points, and a pair of forces that pushes them apart.

    pins  of each end: the name of the pin that takes it, "" if a member does
    """

    first: Site
    second: Site
    pins: tuple[str, str]
    kind = "length"
    strength = "force"

    @property
    def on_pins(self) -> tuple[str, ...]:
        return self.pins

    @property
    def sites(self) -> tuple[Site, ...]:
        return self.first, self.second

    def value(self, at: Poses) -> Value:
        """[m]"""
        (ax, ay), (bx, by) = at.spot(self.first), at.spot(self.second)
        length: Value = np.hypot(bx - ax, by - ay)
        return length

    def push(self, at: Poses) -> tuple[Push, ...]:
        """For 1 N apart."""
        (ax, ay), (bx, by) = at.spot(self.first), at.spot(self.second)
        length = np.hypot(bx - ax, by - ay)
        fx, fy = (bx - ax) / length, (by - ay) / length
        (a0, b0), (a1, b1) = at.arm(self.first), at.arm(self.second)
        return (
            (self.first.member, -fx, -fy, b0 * fx - a0 * fy),
            (self.second.member, fx, fy, a1 * fy - b1 * fx),
        )

    def mark(self, at: Poses, shape: str, name: str) -> Mark:
        (ax, ay), (bx, by) = at.spot(self.first), at.spot(self.second)
        return Mark(shape, ((float(ax), float(ay)), (float(bx), float(by))), name=name)


def straight(sketch: Sketch, points: tuple[str, str], on: tuple[str, str] | None) -> Straight:
    """Between two points, on the members that carry them; where several meet, on the pin itself unless one is named."""
    members = on or (None, None)
    first, second = (sketch.site(p, m) for p, m in zip(points, members, strict=True))
    pins = ["" if m or len(sketch.carriers(p)) < 2 else p for p, m in zip(points, members, strict=True)]
    return Straight(first, second, (pins[0], pins[1]))


def drawn_length(sketch: Sketch, points: tuple[str, str]) -> Value:
    """[m] in the drawing pose."""
    (ax, ay), (bx, by) = sketch.point(points[0]), sketch.point(points[1])
    length: Value = np.hypot(bx - ax, by - ay)
    return length if np.ndim(length) else float(length)
