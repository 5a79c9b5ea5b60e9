"""What is wrong with a formula."""

from __future__ import annotations

from barnwright.grammar import GrammarError


class FormulaError(GrammarError):
    """A text or expression that is no formula of the reaction; every finding with its column."""
