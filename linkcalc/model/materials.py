"""Names of materials: those of the model file, which come first, and those of the table of the package."""

from __future__ import annotations

from collections.abc import Iterable

from linkcalc import data

TABLE = "materials.toml"


def material_names(own: Iterable[str] = ()) -> tuple[str, ...]:
    """Every name that a model may give: its own, then those of the table."""
    return tuple(dict.fromkeys([*own, *data.table(TABLE)]))
