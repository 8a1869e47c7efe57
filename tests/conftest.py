"""How hard hypothesis tries, and the names that examples in docstrings may use."""

from __future__ import annotations

import os
from typing import Any

import pytest
from hypothesis import HealthCheck, settings

# fast: the same machines in every run, so that a failure in CI is a failure at the desk
settings.register_profile(
    "fast", max_examples=25, deadline=None, derandomize=True, suppress_health_check=[HealthCheck.too_slow]
)
settings.register_profile(
    "full", max_examples=500, deadline=None, print_blob=True, suppress_health_check=[HealthCheck.too_slow]
)
settings.load_profile(os.environ.get("LINKCALC_PROPERTIES", "fast"))


@pytest.fixture(autouse=True)
def _names(doctest_namespace: dict[str, Any]) -> None:
    from linkcalc.parts.pose import Poses, Site

    doctest_namespace.update(Poses=Poses, Site=Site)
