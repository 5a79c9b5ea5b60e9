"""How much text the small language takes: enough for any formula on a page, little enough for anything hostile."""

from __future__ import annotations

LONGEST_TEXT = 10_000
"""Characters."""

DEEPEST = 50
"""Parentheses and calls inside one another."""

MOST_NODES = 2_000
"""Numbers, names, operators and calls."""

LARGEST_EXPONENT = 100
"""Of a power whose exponent is a number."""

MOST_FINDINGS = 50
"""Told of one text: whoever made more mistakes starts with these."""
