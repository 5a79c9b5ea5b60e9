"""Run the tests in groups, each with a budget of seconds on two cores: python tools/run_tests.py [GROUP ...].

A group over its budget is pointed out; one that takes three times as long hangs, and has failed.
"""

from __future__ import annotations

import os
import signal
import subprocess
import sys
import time
from contextlib import suppress
from pathlib import Path

ROOT = Path(__file__).resolve().parent.parent

# folder under tests/ -> budget in seconds; together under 10 minutes
BUDGETS = {
    "house": 30,
    "unit": 90,
    "engine": 150,
    "physics": 90,
    "cli": 30,
    "faces": 45,
    "service": 180,
    "docs": 60,
    "plugin": 45,
}
GRACE = 20
HANGS = 3


def forgotten() -> list[str]:
    """Test files that no group would run."""
    found = {path.relative_to(ROOT / "tests") for path in (ROOT / "tests").rglob("test_*.py")}
    return sorted(str(path) for path in found if path.parts[0] not in BUDGETS)


def run(group: str) -> tuple[bool, float]:
    """Run one group; whether it passed in time, and its seconds."""
    began = time.monotonic()
    command = [sys.executable, "-m", "pytest", "-q", "--durations=3", f"tests/{group}"]
    with subprocess.Popen(command, cwd=ROOT, start_new_session=True) as tests:
        try:
            passed = tests.wait(HANGS * BUDGETS[group]) == 0
        except BaseException as cause:
            end(tests)
            if not isinstance(cause, subprocess.TimeoutExpired):
                raise
            print(f"tests/{group} did not end within {HANGS} times its budget of {BUDGETS[group]} s")
            passed = False
    return passed, time.monotonic() - began


def end(tests: subprocess.Popen[bytes]) -> None:
    """Interrupt the tests, so that they say where they are and end what they started; then end what is left."""
    tests.send_signal(signal.SIGINT)
    with suppress(subprocess.TimeoutExpired):
        tests.wait(GRACE)
    with suppress(ProcessLookupError):
        os.killpg(tests.pid, signal.SIGKILL)


def main() -> None:
    """Run the groups asked for, or all; exit 1 when one fails or a test belongs to none."""
    if lost := forgotten():
        sys.exit(f"these tests belong to no group of tools/run_tests.py: {', '.join(lost)}")
    signal.signal(
        signal.SIGINT, signal.default_int_handler
    )  # in the background of a shell it is ignored, and tests need it
    results = {}
    for group in sys.argv[1:] or BUDGETS:
        print(f"\n== tests/{group} (budget {BUDGETS[group]} s)", flush=True)
        results[group] = run(group)
    print()
    for group, (passed, seconds) in results.items():
        over = "  over its budget" if seconds > BUDGETS[group] else ""
        print(f"{'passed' if passed else 'FAILED'}  {group:10} {seconds:6.1f} s of {BUDGETS[group]} s{over}")
    sys.exit(not all(passed for passed, _ in results.values()))


if __name__ == "__main__":
    main()
