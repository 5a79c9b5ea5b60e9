"""A real server in a process of its own."""

from __future__ import annotations

import os
import signal
import subprocess
import sys
import time
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import grpc
from grpc_health.v1 import health_pb2, health_pb2_grpc

from barnwright.client import Client
from barnwright.client.channel import OPTIONS

PLUGINS = Path(__file__).parent.parent / "fixtures" / "plugins"
SERVICE = "barnwright.wire.v1.CrossSectionService"
PATIENCE = 60.0
"""Seconds after which something that must happen has not; a test waits for the event, never for the time."""

_CODE = """
import os, sys, threading
from barnwright.service.server import run
from barnwright.service.settings import Limits, Settings
threading.Thread(target=lambda: (sys.stdin.read(), os._exit(1)), daemon=True).start()  # the tests are gone
limits, workers, address = eval(sys.argv[1]), int(sys.argv[2]), sys.argv[3]
sys.exit(run(Settings(address, workers=workers, limits=Limits(**limits))))
"""


def until(condition: Callable[[], Any]) -> Any:
    """What the condition gives once it is true."""
    ends = time.monotonic() + PATIENCE
    while not (found := condition()):
        assert time.monotonic() < ends, "it never happened"
        time.sleep(0.01)
    return found


@dataclass(frozen=True)
class Running:
    """A server that listens, and where."""

    process: subprocess.Popen[str]
    address: str

    def client(self, **options: Any) -> Client:
        """A client of it."""
        return Client(self.address, **options)

    def channel(self) -> grpc.Channel:
        """A bare connection to it."""
        return grpc.insecure_channel(self.address, options=[*OPTIONS, ("grpc.enable_retries", 0)])

    def health(self, service: str = "") -> int:
        """Its status now."""
        with self.channel() as channel:
            stub = health_pb2_grpc.HealthStub(channel)
            return int(stub.Check(health_pb2.HealthCheckRequest(service=service), wait_for_ready=True).status)

    def tell(self, number: int = signal.SIGTERM) -> None:
        """Send it a signal."""
        self.process.send_signal(number)

    def family(self) -> dict[str, list[int]]:
        """Process numbers of the server's descendants: the scheduler, the fork server, the workers, the tracker."""
        schedulers = children(self.process.pid)
        below = [pid for scheduler in schedulers for pid in children(scheduler)]
        forkserver = [pid for pid in below if "forkserver" in command(pid)]
        workers = [worker for pid in forkserver for worker in children(pid)]
        tracker = [pid for pid in below if pid not in forkserver]
        return {"scheduler": schedulers, "forkserver": forkserver, "workers": workers, "tracker": tracker}


def children(pid: int) -> list[int]:
    """The processes that this one started."""
    try:
        text = Path(f"/proc/{pid}/task/{pid}/children").read_text()
    except OSError:
        return []
    return [int(word) for word in text.split()]


def command(pid: int) -> str:
    """How a process was started."""
    try:
        return Path(f"/proc/{pid}/cmdline").read_text().replace("\0", " ")
    except OSError:
        return ""


def is_alive(pid: int) -> bool:
    """Whether a process is there and no zombie."""
    try:
        return Path(f"/proc/{pid}/stat").read_text().rpartition(")")[2].split()[0] != "Z"
    except OSError:
        return False


@contextmanager
def serving(
    *plugins: str | Path, workers: int = 2, address: str = "127.0.0.1:0", log: Path | None = None, **limits: Any
) -> Iterator[Running]:
    """A server with these plugins (folders, or names of those in fixtures) beside the installed ones."""
    folders = [str(PLUGINS / plugin) for plugin in plugins]
    path = os.pathsep.join([*folders, *filter(None, [os.environ.get("PYTHONPATH")])])
    command_line = [sys.executable, "-c", _CODE, repr(limits), str(workers), address]
    stderr = None if log is None else log.open("w")
    process = subprocess.Popen(
        command_line,
        stdin=subprocess.PIPE,
        stdout=subprocess.PIPE,
        stderr=stderr,
        text=True,
        env={**os.environ, "PYTHONPATH": path},
    )
    try:
        assert process.stdout is not None
        line = process.stdout.readline()
        assert line.startswith("barnwright is listening on "), line
        yield Running(process, line.split()[-1])
    finally:
        if process.poll() is None and not _ends_when_told(process):
            process.kill()
        process.wait()
        for pipe in (process.stdin, process.stdout, stderr):
            if pipe is not None:
                pipe.close()


def _ends_when_told(process: subprocess.Popen[str]) -> bool:
    """Two signals, so that nothing is waited for; whether the server ends."""
    for _ in range(2):
        process.send_signal(signal.SIGTERM)
        time.sleep(0.05)
    try:
        process.wait(PATIENCE)
    except subprocess.TimeoutExpired:
        return False
    return True
