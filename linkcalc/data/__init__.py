"""Tables that come with the package: materials, bush materials, series of sizes, a sample list of bearings."""

from __future__ import annotations

import tomllib
from functools import cache
from typing import Any


def text(name: str) -> str:
    """A file of this folder."""
    from importlib.resources import files  # slow to load, and most commands need no table

    return files(__name__).joinpath(name).read_text(encoding="utf-8")


@cache
def table(name: str) -> dict[str, Any]:
    """A TOML file of this folder; not to be changed by who reads it."""
    return tomllib.loads(text(name))
