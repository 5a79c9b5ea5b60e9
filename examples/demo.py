"""Start a server on a free port, ask it for a prediction over gRPC, print it, draw it, end the server.

python examples/demo.py FOLDER        (make demo)
"""

from __future__ import annotations

import re
import subprocess
import sys
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path

from rich.console import Console

import barnwright
from barnwright.cli.tables import prediction_view
from barnwright.plot import draw

REQUEST = Path(__file__).resolve().parent / "caesium.toml"
READY = re.compile(r"127\.0\.0\.1:[1-9]\d*")


@contextmanager
def server() -> Iterator[str]:
    """A running `barnwright serve` at a free port of this machine: its address. Ended with SIGTERM."""
    command = [sys.executable, "-m", "barnwright", "serve", "--address", "127.0.0.1:0"]
    process = subprocess.Popen(command, stdout=subprocess.PIPE, stderr=subprocess.STDOUT, text=True)
    assert process.stdout is not None
    said = []
    try:
        for line in process.stdout:
            said.append(line)
            if found := READY.search(line):
                break
        else:
            sys.exit("the server did not start; it said:\n" + "".join(said))
        yield found[0]
    finally:
        process.terminate()
        process.communicate(timeout=30)


def main(folder: Path) -> None:
    """Write request, prediction and pictures into folder, and say so."""
    folder.mkdir(parents=True, exist_ok=True)
    console = Console()
    with server() as address, barnwright.connect(address) as client:
        console.print(f"a server answers at {address}; asking it for {REQUEST.name} over gRPC\n")
        prediction = client.predict(REQUEST)
    console.print(prediction_view(prediction))
    (folder / "prediction.json").write_text(prediction.model_dump_json(indent=2) + "\n", encoding="utf-8")
    draw(prediction).savefig(folder / "prediction.png", dpi=160)
    console.print("\nThe server has ended. What was asked, and the files written:", highlight=False)
    for file in (REQUEST, folder / "prediction.json", folder / "prediction.png"):
        console.print(f"  {file}", highlight=False, soft_wrap=True)


if __name__ == "__main__":
    main(Path(sys.argv[1] if len(sys.argv) > 1 else "out/demo"))
