"""Print requirements for the oldest versions that pyproject.toml allows, and for whatever tests need (make lowest)."""

from __future__ import annotations

import re
import tomllib
from pathlib import Path

PROJECT = Path(__file__).resolve().parent.parent / "pyproject.toml"


def main() -> None:
    """What a user installs at its floor; the tools of the tests as new as they come."""
    project = tomllib.loads(PROJECT.read_text(encoding="utf-8"))["project"]
    extras = project["optional-dependencies"]
    for requirement in (*project["dependencies"], *extras["service"], *extras["plot"]):
        print(re.sub(">=(.+)$", r"==\1.*", requirement))
    print(*extras["dev"], sep="\n")


if __name__ == "__main__":
    main()
