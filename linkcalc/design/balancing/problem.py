"""The whole problem in numbers: the effort at the sampled poses, as the sum of what all blocks do to it."""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import cached_property

import numpy as np

from linkcalc.design.balancing.block import Block, Unknown
from linkcalc.design.balancing.convex import Linear
from linkcalc.design.balancing.influence import Influence
from linkcalc.parts.pose import Array, Mask


@dataclass(frozen=True)
class Stay:
    """The mechanism must stay at an end of its stroke by itself.

    pose    0 or -1
    margin  [N] or [N m] effort that it takes to leave it
    """

    pose: int
    margin: float


@dataclass(frozen=True, eq=False)
class Problem:
    """Blocks in a stroke.

    by     the stroke without what is put in
    cases  (case) True for those that count
    base   (case, pose) effort without what is put in; what friction and settling make of it, as of the last solution
    """

    by: Influence
    blocks: tuple[Block, ...]
    cases: Mask
    stays: tuple[Stay, ...]
    base: Array

    @cached_property
    def searched(self) -> tuple[Unknown, ...]:
        return tuple(one for block in self.blocks for one in block.searched)

    @cached_property
    def rows(self) -> Mask:
        """(case, pose) True for what counts"""
        return self.by.sound & self.cases[:, None]

    @property
    def ages(self) -> tuple[tuple[float, ...], ...]:
        """Force of each block, new and, if one of them ages, aged."""
        new = tuple(1.0 for _ in self.blocks)
        aged = tuple(1.0 - block.loss for block in self.blocks)
        return (new,) if new == aged else (new, aged)

    def linear(self, t: Array) -> list[Linear]:
        """For each variant of t (unknowns, variant) what is linear."""
        variants = t.shape[1]
        each, limits, start = [], [], 0
        for block in self.blocks:
            part = t[start : start + len(block.searched)]
            start += len(block.searched)
            each.append(np.stack([self.whole(c, variants) for c in block.columns(part, self.by)]))
            limits.append(block.limits(part, self.by))
        rows = self.rows
        A = np.concatenate([
            np.concatenate([age * c[:, rows] for age, c in zip(ages, each, strict=True)]) for ages in self.ages
        ], axis=1)  # fmt: skip
        b = np.tile(self.base[rows], len(self.ages))
        G, g = self._limits(each, limits, variants)
        bounds = [bound for block in self.blocks for bound in block.linear]
        low, high = (np.array([b[k] for b in bounds], float) for k in (0, 1))
        return [Linear(A[:, :, k].T, b, G[:, :, k], g[:, k], low, high, self.price) for k in range(variants)]

    @cached_property
    def price(self) -> Array:
        """(unknowns) 1 for the mass, rate or force of each block, 0 for products with places and lengths"""
        return np.array([float(k == 0) for block in self.blocks for k in range(len(block.linear))])

    def whole(self, column: Array, variants: int) -> Array:
        """(case, pose, variant) a column over the whole batch"""
        cases, poses = self.by.shape
        return np.moveaxis(np.broadcast_to(column, (cases, variants, poses)), 1, 2)

    def _limits(self, each: list[Array], limits: list[tuple[Array, Array]], variants: int) -> tuple[Array, Array]:
        count = sum(len(c) for c in each)
        G, g, start = [np.zeros((0, count, variants))], [np.zeros((0, variants))], 0
        size = max(float(np.abs(self.base[self.rows]).max(initial=0.0)), 1e-300)
        for (part, alone), columns in zip(limits, each, strict=True):
            wide = np.zeros((part.shape[0], count, variants))
            wide[:, start : start + len(columns)] = part
            # limits that hang on z are told as parts of what z may come to, by the first of the variants
            most = np.array([np.abs(c[self.rows][:, 0]).max(initial=0.0) for c in columns])
            row = np.abs(part[:, :, 0] * size / np.maximum(most, 1e-300)).max(axis=1, initial=0.0)
            row = np.where(row > 0, row, 1.0)
            G.append(wide / row[:, None, None])
            g.append(alone / row[:, None])
            start += len(columns)
        for stay in self.stays:
            way = (-1.0 if stay.pose else 1.0) * np.sign(self.by.effort_speed[:, stay.pose]) * self.by.forward
            for ages in self.ages:
                for case in np.flatnonzero(self.rows[:, stay.pose]):
                    row = [way[case] * age * c[:, case, stay.pose] for age, c in zip(ages, each, strict=True)]
                    G.append(np.concatenate(row)[None] / size)
                    alone = way[case] * self.base[case, stay.pose] - stay.margin
                    g.append(np.full((1, variants), alone / size))
        return np.concatenate(G), np.concatenate(g)

    def found(self, t: Array, z: Array) -> list[dict[str, float]]:
        """For each block its sizes by name, for one t (unknowns) and z."""
        out, first, start = [], 0, 0
        for block in self.blocks:
            n, m = len(block.searched), len(block.linear)
            out.append(block.found(t[first : first + n], z[start : start + m]))
            first, start = first + n, start + m
        return out

    def efforts(self, t: Array, z: Array) -> Array:
        """(age, case, pose) the effort with what is put in, new and, if something ages, aged."""
        out = np.repeat(self.base[None], len(self.ages), axis=0)
        start = first = 0
        for k, block in enumerate(self.blocks):
            n, m = len(block.searched), len(block.linear)
            columns = block.columns(t[first : first + n].reshape(n, 1), self.by)
            added = sum(self.whole(c, 1)[:, :, 0] * size for c, size in zip(columns, z[start : start + m], strict=True))
            out += np.array([ages[k] for ages in self.ages])[:, None, None] * added
            first, start = first + n, start + m
        return out

    def with_blocks(self, blocks: tuple[Block, ...]) -> Problem:
        return replace(self, blocks=blocks)
