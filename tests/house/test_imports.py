"""What `import barnwright` must not pull in: it starts a command line and every worker."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

PACKAGE = Path(__file__).resolve().parents[2] / "src" / "barnwright"
LATE = {"registry", "run", "analysis", "wire", "service", "client", "api", "cli", "plot", "plugin", "testing"}
HEAVY = ("grpc", "matplotlib", "numba", "sympy", "vegas", "gvar", "scipy.stats", "scipy.integrate")


def loaded_by(statement: str, names: tuple[str, ...]) -> list[str]:
    """Which of the modules a fresh interpreter holds after a statement."""
    code = f"import sys\n{statement}\nprint(*[name for name in {names!r} if name in sys.modules])"
    run = subprocess.run([sys.executable, "-c", code], check=True, capture_output=True, text=True, timeout=60)
    return run.stdout.split()


def test_the_package_imports_nothing_heavy() -> None:
    """`import barnwright` loads none of the libraries that only some requests need."""
    assert loaded_by("import barnwright", HEAVY) == []


def test_every_public_name_exists() -> None:
    """Each name of `barnwright.__all__` can be imported, and is one of dir()."""
    statement = "import barnwright\nassert set(barnwright.__all__) <= set(dir(barnwright))\nfrom barnwright import *"
    assert loaded_by(statement, ("barnwright.api",)) == ["barnwright.api"]


def test_a_local_prediction_needs_no_network_picture_or_compiler() -> None:
    """A prediction calculated here by quadrature loads neither grpc nor matplotlib nor numba."""
    beams = {"kind": "collider", "sqrt_s": 10.0}
    statement = (
        "import barnwright\n"
        f"barnwright.predict(process='qed/muon-pair', beams={beams!r}, accuracy={{'method': 'quadrature'}})"
    )
    assert loaded_by(statement, ("grpc", "matplotlib", "numba", "vegas", "gvar")) == []


def test_early_rows_look_up_no_distribution() -> None:
    """Rows 0 to 6 do not ask what is installed (import-linter cannot tell importlib.metadata from importlib)."""
    rooms = [path for path in sorted(PACKAGE.iterdir()) if path.name.removesuffix(".py") not in LATE]
    files = [file for room in rooms for file in ([room] if room.suffix == ".py" else room.rglob("*.py"))]
    assert len(files) > len(rooms)
    assert [str(file) for file in files if "importlib.metadata" in file.read_text(encoding="utf-8")] == []
