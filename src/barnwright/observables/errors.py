"""What is wrong with an observable."""

from __future__ import annotations

from barnwright.grammar import GrammarError


class ObservableError(GrammarError):
    """A text that is no observable of the reaction; every finding with its column."""
