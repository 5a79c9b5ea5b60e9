"""What nobody foresaw."""

from __future__ import annotations


class UnforeseenError(Exception):
    """An error of another process that is no BarnwrightError; its text is a traceback, for the log only."""
