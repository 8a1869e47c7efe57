"""How a figure is told beside its target."""

from __future__ import annotations


def target(text: str, value: float, wanted: float, *, at_least: bool) -> bool:
    """Print a figure with its target; True if it is met."""
    met = value >= wanted if at_least else value <= wanted
    sign = "at least" if at_least else "at most"
    print(f"  {'met   ' if met else 'MISSED'} {text}: {value:.3g} ({sign} {wanted:g})")
    return met


def head(text: str) -> None:
    print(f"\n{text}")
