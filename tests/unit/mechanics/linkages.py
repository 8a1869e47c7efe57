"""Linkages with an answer in closed form, by the triangles that compass and ruler draw. Lengths in mm in the text."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc import parse
from linkcalc.mechanics.prepare import Ready, prepare
from linkcalc.model.sketch import Drawing


def ready(text: str) -> Ready:
    return prepare(Drawing(parse(text)))


@dataclass(frozen=True)
class FourBar:
    """Crank a, coupler b, rocker c, frame d [mm]; the knee is to the left of the line crank end - rocker foot.

    drawn  [deg] crank angle in the drawing pose
    """

    a: float
    b: float
    c: float
    d: float
    drawn: float = 60.0

    def text(self, stroke: str = "") -> str:
        return f"""
[dimensions]
crank = {self.a!r}
coupler = {self.b!r}
rocker = {self.c!r}
[points]
A = [0, 0]
D = [{self.d!r}, 0]
B = {{ from = "A", distance = "crank", angle = {self.drawn!r} }}
C = {{ meets = [["B", "coupler"], ["D", "rocker"]], side = "left" }}
[members]
ground = ["A", "D"]
crank = ["A", "B"]
coupler = ["B", "C"]
rocker = ["D", "C"]
[effort]
torque_on = "crank"
[load]
torque_on = "rocker"
size = -10
{stroke}"""

    def knee(self, angle: np.ndarray, side: float = 1.0) -> np.ndarray:
        """(2, ...) [m] where coupler and rocker meet at crank angles [rad]; NaN where they do not."""
        bx, by = self.a * np.cos(angle), self.a * np.sin(angle)
        f = np.hypot(self.d - bx, by)
        ex, ey = (self.d - bx) / f, -by / f
        along = (f**2 + self.b**2 - self.c**2) / (2 * f)
        with np.errstate(invalid="ignore"):
            off = side * np.sqrt(self.b**2 - along**2)
        return np.array([bx + along * ex - off * ey, by + along * ey + off * ex]) / 1000

    def rocker_angle(self, angle: np.ndarray, side: float = 1.0) -> np.ndarray:
        x, y = self.knee(angle, side) * 1000
        return np.arctan2(y, x - self.d)

    def velocity_ratio(self, angle: np.ndarray) -> np.ndarray:
        """d(rocker)/d(crank): by the parts of the two ends' speeds along the coupler, a sin(q-u) = c sin(q-v) w."""
        x, y = self.knee(angle) * 1000
        bx, by = self.a * np.cos(angle), self.a * np.sin(angle)
        u, v = np.arctan2(y - by, x - bx), np.arctan2(y, x - self.d)
        return self.a * np.sin(u - angle) / (self.c * np.sin(u - v))

    def crank_limits(self) -> list[float]:
        """[rad] crank angles, above zero, at which coupler and rocker stand in line, by the law of cosines."""
        found = []
        for reach in (self.b + self.c, abs(self.b - self.c)):
            cosine = (self.a**2 + self.d**2 - reach**2) / (2 * self.a * self.d)
            if abs(cosine) < 1:
                found.append(float(np.arccos(cosine)))
        return found

    def rocker_limits(self) -> list[float]:
        """[rad] rocker angles, above zero, at which crank and coupler stand in line."""
        found = []
        for reach in (self.b + self.a, abs(self.b - self.a)):
            cosine = (self.c**2 + self.d**2 - reach**2) / (2 * self.c * self.d)
            if abs(cosine) < 1:
                found.append(float(np.pi - np.arccos(cosine)))
        return found


@dataclass(frozen=True)
class SliderCrank:
    """Crank r, rod l [mm], the line of the slide h above the shaft; the slide is on the right."""

    r: float
    l: float  # noqa: E741
    h: float = 0.0
    drawn: float = 50.0

    def text(self, stroke: str = "") -> str:
        x = self.place(np.radians(self.drawn)) * 1000
        return f"""
[points]
A = [0, 0]
B = {{ from = "A", distance = {self.r!r}, angle = {self.drawn!r} }}
C = [{float(x)!r}, {self.h!r}]
H = [0, {self.h!r}]
E = [300, {self.h!r}]
[members]
ground = ["A"]
crank = ["A", "B"]
rod = ["B", "C"]
[slots.guide]
point = "C"
along = ["H", "E"]
[effort]
torque_on = "crank"
[load]
at = "C"
direction = 180
size = 100
{stroke}"""

    def place(self, angle: np.ndarray | float) -> np.ndarray:
        """[m] distance of the slide along its line."""
        with np.errstate(invalid="ignore"):
            out = self.r * np.cos(angle) + np.sqrt(self.l**2 - (self.r * np.sin(angle) - self.h) ** 2)
        return np.asarray(out / 1000)


def twice(linkage: FourBar, stroke: str) -> str:
    """The linkage with its coupler and rocker doubled: two loops alike on one crank."""
    knee = '{ meets = [["B", "coupler"], ["D", "rocker"]], side = "left" }'
    text = linkage.text(stroke).replace("C = {", f"E = {knee}\nC = {{")
    return text.replace('rocker = ["D", "C"]\n', 'rocker = ["D", "C"]\nsecond = ["B", "E"]\nfourth = ["D", "E"]\n')
