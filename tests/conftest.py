"""Property tests judge the figures, not how busy the machine is; CI draws the same examples every time."""

from __future__ import annotations

import os

from hypothesis import settings

settings.register_profile("unhurried", deadline=None)
settings.register_profile("repeatable", deadline=None, derandomize=True)
settings.load_profile("repeatable" if os.environ.get("CI") else "unhurried")
