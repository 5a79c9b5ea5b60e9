"""The contract's face: names that plugins import, and the plugin that pins them."""

from __future__ import annotations

import hashlib
import subprocess
import sys
from pathlib import Path

import pytest

import barnwright.plugin
from barnwright.testing import check_process

FROZEN = Path(__file__).resolve().parents[1] / "fixtures" / "frozen_plugin_v1"
FROZEN_FILES = (
    "README.md",
    "pyproject.toml",
    "src/frozen_plugin_v1/__init__.py",
    "src/frozen_plugin_v1/py.typed",
    "src/frozen_plugin_v1/scale.txt",
)
FROZEN_DIGEST = "83f20975de2e168b77ccd4236fafe24d4f9e4827158de60b0f2ec2324f9aa70e"


def test_every_name_of_the_contract_exists() -> None:
    """Each name of ``__all__`` can be imported, and ``dir`` lists it."""
    assert dir(barnwright.plugin) == barnwright.plugin.__all__
    assert all(getattr(barnwright.plugin, name) is not None for name in barnwright.plugin.__all__)


def test_another_name_is_no_part_of_it() -> None:
    """The face shows nothing by accident."""
    with pytest.raises(AttributeError, match=r"module 'barnwright\.plugin' has no attribute 'resolve'"):
        barnwright.plugin.resolve  # noqa: B018 - the access is the test


def test_the_face_imports_nothing_until_it_is_used() -> None:
    """Importing it alone loads no library, and of the house only who draws pictures."""
    code = "import sys, barnwright.plugin; print(*(m for m in sys.modules if m.startswith(('barnwright', 'numpy'))))"
    run = subprocess.run([sys.executable, "-c", code], check=True, capture_output=True, text=True, timeout=60)
    allowed = {"barnwright", "barnwright.errors", "barnwright.pictures", "barnwright.plugin"}
    assert set(run.stdout.split()) == allowed


def test_the_frozen_plugin_is_frozen() -> None:
    """A change of the contract that breaks it is a break for every plugin there is: mend the core, not the plugin."""
    digest = hashlib.sha256()
    for name in FROZEN_FILES:
        digest.update(name.encode() + b"\0" + (FROZEN / name).read_bytes())
    assert digest.hexdigest() == FROZEN_DIGEST


def test_the_frozen_plugin_passes_the_conformance_kit(monkeypatch: pytest.MonkeyPatch) -> None:
    """Both its processes keep the contract as it is checked today."""
    monkeypatch.syspath_prepend(FROZEN / "src")
    from frozen_plugin_v1 import from_text, process

    check_process(process)
    check_process(from_text)
