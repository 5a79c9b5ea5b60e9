"""The installed processes: found by entry points, named, identified by their sources, loaded and checked."""

from .catalogue import Catalogue, LoadedProcess, catalogue, refresh
from .checks import findings_of
from .entries import GROUP, Entry
from .identity import ProcessIdentity

__all__ = [
    "GROUP",
    "Catalogue",
    "Entry",
    "LoadedProcess",
    "ProcessIdentity",
    "catalogue",
    "findings_of",
    "refresh",
]
