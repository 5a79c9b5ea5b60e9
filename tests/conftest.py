"""Settings that every group of tests shares."""

from __future__ import annotations

import os

from hypothesis import settings

settings.register_profile("default", derandomize=True, deadline=None, database=None)
settings.register_profile("statistics", max_examples=5000, deadline=None, print_blob=True)
settings.load_profile(os.environ.get("HYPOTHESIS_PROFILE", "default"))
