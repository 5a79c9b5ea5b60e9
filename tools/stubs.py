"""Write the gRPC stubs of protos/ into src/, or, with --check, say whether the committed ones are up to date.

Runs in .venv-proto, whose old generator makes code that every supported protobuf can load (`make proto`, `make stubs`).
"""

from __future__ import annotations

import filecmp
import sys
import tempfile
from importlib.resources import files
from pathlib import Path

from grpc_tools import protoc

ROOT = Path(__file__).resolve().parent.parent
PROTOS = ROOT / "protos"
PACKAGE = Path("barnwright/wire/v1")


def generate(target: Path) -> None:
    """Write messages, services and their type stubs under target, or end with the compiler's own message."""
    sources = sorted(str(path) for path in (PROTOS / PACKAGE).glob("*.proto"))
    include = [f"-I{PROTOS}", f"-I{files('grpc_tools') / '_proto'}"]
    out = [f"--{kind}_out={target}" for kind in ("python", "pyi", "grpc_python")]
    if protoc.main(["protoc", *include, *out, *sources]) != 0:
        sys.exit("the protos do not compile")


def stubs(base: Path) -> set[str]:
    """Names of the generated files under base."""
    return {path.name for path in (base / PACKAGE).glob("*_pb2*.py*")}


def drift(fresh: Path) -> list[str]:
    """Names of stubs that are missing, left over or different in src/."""
    ours = ROOT / "src"
    same, _, _ = filecmp.cmpfiles(fresh / PACKAGE, ours / PACKAGE, sorted(stubs(fresh)), shallow=False)
    return sorted((stubs(fresh) | stubs(ours)) - set(same))


def main() -> None:
    """Regenerate, or compare."""
    if "--check" not in sys.argv:
        for name in stubs(ROOT / "src"):
            (ROOT / "src" / PACKAGE / name).unlink()
        generate(ROOT / "src")
        return
    with tempfile.TemporaryDirectory() as folder:
        generate(Path(folder))
        if names := drift(Path(folder)):
            sys.exit(f"stubs differ from protos/ (run: make proto): {', '.join(names)}")
    print("stubs match protos/")


if __name__ == "__main__":
    main()
