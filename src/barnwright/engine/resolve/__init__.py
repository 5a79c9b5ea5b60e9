"""From a request to a plan: names and physics checked, every finding in one answer."""

from barnwright.engine.resolve.formula import formula_process
from barnwright.engine.resolve.resolve import Loaded, Lookup, resolve

__all__ = ["Loaded", "Lookup", "formula_process", "resolve"]
