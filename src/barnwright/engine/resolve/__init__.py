"""From a request to a plan: names and physics checked, every finding in one answer."""

from resolve.resolve import Loaded, Lookup, resolve

__all__ = ["Loaded", "Lookup", "resolve"]
