"""Plugins made for one test."""

from __future__ import annotations

from pathlib import Path

_MODULE = '''"""Made for a test."""

import os
import time
from pathlib import Path

from barnwright.plugin import Process, SquaredAmplitude


def squared(event, parameters):
    """A constant, after something that only happens outside of the checks at load."""
    if event.shape[-1] > 4:
        {body}
    return 1.0


process = Process(name="pair", reaction="e- e+ -> mu- mu+", laws=(SquaredAmplitude(squared),))
'''


def plugin(folder: Path, name: str, *statements: str) -> Path:
    """A folder for the import path with a plugin whose process ``name/pair`` runs these statements in its law."""
    module = name.replace("-", "_")
    home = folder / module
    metadata = home / f"{module}-1.0.dist-info"
    metadata.mkdir(parents=True)
    (home / f"{module}.py").write_text(_MODULE.format(body="\n        ".join(statements)))
    (metadata / "METADATA").write_text(f"Metadata-Version: 2.1\nName: {name}\nVersion: 1.0\n")
    (metadata / "entry_points.txt").write_text(f"[barnwright.processes.v1]\npair = {module}:process\n")
    return home
