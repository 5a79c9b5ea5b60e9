"""The plugin of contract version 1, built into a wheel and installed into a fresh environment, as a stranger would."""

from __future__ import annotations

import json
import os
import subprocess
import sys
import sysconfig
from collections.abc import Sequence
from pathlib import Path

import pytest

PLUGIN = Path(__file__).resolve().parents[1] / "fixtures" / "frozen_plugin_v1"

QUESTION = """
import json
from barnwright.registry import catalogue
import barnwright

names = [name for name in catalogue().names() if name.startswith("frozen-v1/")]
identity = catalogue().load("frozen-v1/muon-pair").identity
totals = {}
for name in names:
    for method in ("closed_form", "quadrature")[name.endswith("text"):]:
        prediction = barnwright.predict(
            process=name,
            unit="nb",
            beams={"kind": "collider", "sqrt_s": 10.0},
            parameters={"coupling": 0.0072973525643},
            accuracy={"method": method},
        )
        totals[f"{name} {method}"] = prediction.total.value
print(json.dumps({"names": names, "version": identity.version, "digest": identity.digest, "totals": totals}))
"""


def run(command: Sequence[str | Path]) -> str:
    """The output of a command, which must succeed."""
    clean = {k: v for k, v in os.environ.items() if k not in ("PYTHONPATH", "PYTHONHOME")}
    done = subprocess.run([str(part) for part in command], check=False, capture_output=True, text=True, env=clean)
    assert done.returncode == 0, done.stderr
    return done.stdout


@pytest.fixture(scope="module")
def wheel(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The plugin's wheel, built from its folder without a network."""
    folder = tmp_path_factory.mktemp("wheel")
    pip = [sys.executable, "-m", "pip", "--disable-pip-version-check", "wheel", "-q"]
    run([*pip, "--no-deps", "--no-build-isolation", "-w", folder, PLUGIN])
    (made,) = folder.glob("*.whl")
    return made


@pytest.fixture(scope="module")
def python(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The interpreter of a fresh environment that sees this one's packages behind its own."""
    folder = tmp_path_factory.mktemp("fresh")
    run([sys.executable, "-m", "venv", "--without-pip", folder])
    interpreter = folder / "bin" / "python"
    site = run([interpreter, "-c", "import sysconfig; print(sysconfig.get_path('purelib'))"]).strip()
    parent = sysconfig.get_path("purelib")
    Path(site, "parent.pth").write_text(f"import site; site.addsitedir({parent!r})\n", encoding="utf-8")
    return interpreter


@pytest.mark.timeout(45)
def test_a_plugin_of_the_first_contract_is_served(wheel: Path, python: Path) -> None:
    """Both its processes give 4πα²/3s = 0.8685 nb at 10 GeV by every law, and its identity has version and digest."""
    pip = [sys.executable, "-m", "pip", "--disable-pip-version-check", "--python", python, "install", "-q"]
    run([*pip, "--no-deps", "--no-index", wheel])
    answer = json.loads(run([python, "-c", QUESTION]))
    assert answer["names"] == ["frozen-v1/muon-pair", "frozen-v1/muon-pair-text"]
    assert (answer["version"], len(answer["digest"])) == ("1.0.0", 64)
    assert len(answer["totals"]) == 3
    for total in answer["totals"].values():
        assert total == pytest.approx(0.8685, rel=1e-4)
