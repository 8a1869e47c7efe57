"""Straight-line arithmetic recorded once and replayed on a batch.

An operand is a float (a constant) or a register: an int k > 0, or -k for its negative. Recording folds constants,
products with 0, 1 and -1, sums with 0 and all signs, so what is replayed is only the arithmetic that depends on
the pose.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence
from typing import Any

import numpy as np

from linkcalc.parts.pose import Value

Operand = float | int
_Step = tuple[Callable[[Any, Any], Any], int, int, int, tuple[int, ...]]


def is_constant(operand: Operand) -> bool:
    return isinstance(operand, float)


class Tape:
    """A recording. ``inputs`` operands are given at each replay; registers 1..len(inputs) hold them."""

    def __init__(self, inputs: int):
        self.inputs = inputs
        self._width = inputs
        self._constants: dict[float, int] = {}
        self._steps: list[tuple[Any, int, int, int]] = []
        self._done: list[_Step] = []
        self._outputs: tuple[Operand, ...] = ()
        self._blank: list[Any] = []

    # -- recording ---------------------------------------------------------------------------------------

    def times(self, a: Operand, b: Operand) -> Operand:
        if isinstance(a, float):
            a, b = b, a
        if isinstance(b, float):
            return a * b if isinstance(a, float) else self._scaled(a, b)
        assert not isinstance(a, float)
        sign = 1 if (a > 0) == (b > 0) else -1
        return sign * self._record(np.multiply, abs(a), abs(b))

    def _scaled(self, a: int, factor: float) -> Operand:
        if factor == 0.0:
            return 0.0
        if abs(factor) == 1.0:
            return a if factor > 0 else -a
        product = self._record(np.multiply, abs(a), self._constant(factor))
        return product if a > 0 else -product

    def over(self, a: Operand, b: Operand) -> Operand:
        """a / b; a constant b is folded into a product."""
        if isinstance(b, float):
            return self.times(a, 1.0 / b)
        if isinstance(a, float):
            if a == 0.0:
                return 0.0
            return self._record(np.divide, self._constant(a if b > 0 else -a), abs(b))
        sign = 1 if (a > 0) == (b > 0) else -1
        return sign * self._record(np.divide, abs(a), abs(b))

    def less(self, a: Operand, b: Operand) -> Operand:
        """a - b"""
        if isinstance(b, float) and b == 0.0:
            return a
        if isinstance(a, float):
            if isinstance(b, float):
                return a - b
            if a == 0.0:
                return -b
            if b < 0:
                return self._record(np.add, self._constant(a), -b)
            return self._record(np.subtract, self._constant(a), b)
        if isinstance(b, float):
            if a > 0:
                return self._record(np.subtract, a, self._constant(b))
            return -self._record(np.add, -a, self._constant(b))
        if a > 0 and b > 0:
            return self._record(np.subtract, a, b)
        if a > 0:
            return self._record(np.add, a, -b)
        if b < 0:
            return self._record(np.subtract, -b, -a)
        return -self._record(np.add, -a, b)

    def _record(self, ufunc: Any, a: int, b: int) -> int:
        self._width += 1
        self._steps.append((ufunc, self._width, a, b))
        return self._width

    def _constant(self, value: float) -> int:
        register = self._constants.get(value)
        if register is None:
            self._width += 1
            register = self._constants[value] = self._width
        return register

    def finish(self, outputs: Iterable[Operand]) -> Tape:
        """Say what a replay returns; only steps that lead there are kept, and registers are freed after last use."""
        self._outputs = tuple(outputs)
        kept = {abs(o) for o in self._outputs if not isinstance(o, float)}
        needed = set(kept)
        steps: list[_Step] = []
        for ufunc, out, a, b in reversed(self._steps):
            if out not in needed:
                continue
            spent = tuple({r for r in (a, b) if r not in needed and r > self.inputs})
            needed.update((a, b))
            steps.append((ufunc, out, a, b, spent))
        constants = set(self._constants.values())
        self._done = [(f, o, a, b, tuple(r for r in s if r not in constants)) for f, o, a, b, s in reversed(steps)]
        self._steps = []
        self._blank = [None] * (self._width + 1)
        for value, register in self._constants.items():
            self._blank[register] = value
        return self

    # -- replay ------------------------------------------------------------------------------------------

    def __len__(self) -> int:
        return len(self._done)

    def play(self, inputs: Sequence[Value]) -> list[Value]:
        """The outputs for a batch of inputs, floats or arrays that broadcast."""
        r = self._blank.copy()
        r[1 : self.inputs + 1] = inputs
        for ufunc, out, a, b, spent in self._done:
            r[out] = ufunc(r[a], r[b])
            for k in spent:
                r[k] = None
        return [o if isinstance(o, float) else (r[o] if o > 0 else -r[-o]) for o in self._outputs]
