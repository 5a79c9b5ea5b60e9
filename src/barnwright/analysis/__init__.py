"""Questions about many predictions at once."""

from barnwright.analysis.sweep import Sweep, scan

__all__ = ["Sweep", "scan"]
