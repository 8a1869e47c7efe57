"""How hard hypothesis tries: LINKCALC_PROPERTIES=full for a long search, else a few fixed examples of each law."""

from __future__ import annotations

import os

from hypothesis import HealthCheck, settings

# fast: the same machines in every run, so that a failure in CI is a failure at the desk
settings.register_profile(
    "fast", max_examples=25, deadline=None, derandomize=True, suppress_health_check=[HealthCheck.too_slow]
)
settings.register_profile(
    "full", max_examples=500, deadline=None, print_blob=True, suppress_health_check=[HealthCheck.too_slow]
)
settings.load_profile(os.environ.get("LINKCALC_PROPERTIES", "fast"))
