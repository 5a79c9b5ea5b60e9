"""``python -m barnwright``: the command line."""

from __future__ import annotations

import sys

from barnwright.cli import main

sys.exit(main())
