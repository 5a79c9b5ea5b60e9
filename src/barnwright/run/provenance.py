"""Where and with what a prediction was made: versions and the fingerprint of the environment.

Equal bits are promised for equal fingerprints: library versions and the processor's vector features decide how numpy
rounds.
"""

from __future__ import annotations

import hashlib
import platform
import sys
from dataclasses import dataclass
from functools import lru_cache
from importlib import import_module

import numpy as np

from barnwright import __version__
from barnwright.particles import table_version


@dataclass(frozen=True, slots=True)
class Provenance:
    """Versions by name, and the environment's fingerprint (16 hexadecimal digits)."""

    versions: dict[str, str]
    environment: str


@lru_cache(maxsize=1)
def provenance() -> Provenance:
    """The provenance of this process, worked out once."""
    import scipy

    versions = {
        "barnwright": __version__,
        "numpy": np.__version__,
        "particle_table": table_version(),
        "python": ".".join(map(str, sys.version_info[:3])),
        "scipy": scipy.__version__,
    }
    known: dict[str, bool] = import_module("numpy._core._multiarray_umath").__cpu_features__
    features = ",".join(sorted(name for name, present in known.items() if present))
    text = "|".join([platform.machine(), sys.platform, features, *(f"{k}={v}" for k, v in sorted(versions.items()))])
    return Provenance(versions, hashlib.sha256(text.encode()).hexdigest()[:16])
