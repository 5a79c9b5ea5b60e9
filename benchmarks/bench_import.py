"""How long a fresh interpreter takes to import barnwright, and its Python face, beside one that imports nothing."""

from __future__ import annotations

import subprocess
import sys
import time
from statistics import median

REPEATS = 9
AT_MOST = 0.35
STATEMENTS = {
    "nothing": "pass",
    "numpy": "import numpy",
    "barnwright": "import barnwright",
    "barnwright.predict": "import barnwright; barnwright.predict",
}


def seconds(statement: str) -> float:
    """The seconds of one fresh interpreter that runs a statement."""
    began = time.perf_counter()
    subprocess.run([sys.executable, "-c", statement], check=True)
    return time.perf_counter() - began


def main() -> None:
    """Medians, interleaved so that a busy moment falls on all alike; the first run of each warms the file cache."""
    runs = [{name: seconds(code) for name, code in STATEMENTS.items()} for _ in range(REPEATS + 1)][1:]
    typical = {name: median(run[name] for run in runs) for name in STATEMENTS}
    print(f"imports, median of {REPEATS}: seconds beyond an empty interpreter (barnwright: at most {AT_MOST} s)")
    for name, value in typical.items():
        print(f"  {name:20} {value - typical['nothing']:6.3f} s")


if __name__ == "__main__":
    main()
