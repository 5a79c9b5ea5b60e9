"""The server's end of the line to the scheduler."""

from __future__ import annotations

import asyncio
import os
import pickle
import socket
import struct
import subprocess
import sys
from collections.abc import AsyncGenerator, Callable
from itertools import count
from typing import Any

from barnwright.errors import ServerError
from barnwright.service.fault import UnforeseenError
from barnwright.service.frames import Call, Cancel, Failed, Fault, More, Ready, Reply, Stop
from barnwright.service.settings import Settings

_HEADER = struct.Struct("!i")
_ONE_THREAD = ("OMP_NUM_THREADS", "OPENBLAS_NUM_THREADS", "MKL_NUM_THREADS", "VECLIB_MAXIMUM_THREADS")
_CODE = "import sys; from barnwright.service.boot import main; main(int(sys.argv[1]))"

LOST = "the scheduler of the server was lost; another one is starting, try again"
DRAINING = "the server is ending"


class Link:
    """A scheduler process, and the calls that wait for its answers.

    ``on_ready`` and ``on_lost`` are called when its workers are ready, and when it is gone without having been asked.
    """

    def __init__(self, settings: Settings, on_ready: Callable[[], None], on_lost: Callable[[], None]) -> None:
        self._settings = settings
        self._on_ready = on_ready
        self._on_lost = on_lost
        self._numbers = count(1)
        self._waiting: dict[int, asyncio.Queue[Reply | Failed | Fault]] = {}
        self._process: subprocess.Popen[bytes] | None = None
        self._writer: asyncio.StreamWriter | None = None
        self._listening: asyncio.Task[None] | None = None

    async def start(self) -> None:
        """Start the scheduler, its workers with one BLAS thread each; ``on_ready`` follows."""
        ours, theirs = socket.socketpair()
        with theirs:
            command = [sys.executable, "-P", "-c", _CODE, str(theirs.fileno())]
            environment = {**os.environ, **dict.fromkeys(_ONE_THREAD, "1")}
            self._process = subprocess.Popen(  # noqa: S603
                command, pass_fds=(theirs.fileno(),), env=environment, stdin=subprocess.DEVNULL, stdout=sys.stderr
            )
        reader, self._writer = await asyncio.open_unix_connection(sock=ours)
        self._say(self._settings)
        self._listening = asyncio.create_task(self._listen(reader))

    async def answers(self, method: str, message: bytes) -> AsyncGenerator[bytes, None]:
        """The messages of the answer to a call; leaving early cancels it.

        Raises:
            BarnwrightError: as the scheduler or a worker raised it.
            UnforeseenError: what nobody foresaw, for the log.
        """
        if self._writer is None or self._writer.is_closing():
            raise ServerError(LOST, "UNAVAILABLE", 1.0)
        number, queue = next(self._numbers), asyncio.Queue[Reply | Failed | Fault]()
        self._waiting[number] = queue
        has_ended = False
        try:
            self._say(Call(number, method, message))
            while not has_ended:
                frame = await queue.get()
                has_ended = not isinstance(frame, Reply) or frame.last
                if isinstance(frame, Failed):
                    raise frame.error
                if isinstance(frame, Fault):
                    raise UnforeseenError(frame.traceback)
                yield frame.message
                if not has_ended:
                    self._say(More(number))
        finally:
            del self._waiting[number]
            if not has_ended:
                self._say(Cancel(number))

    async def close(self) -> None:
        """End the scheduler and its workers; those who still wait are told that the server ends."""
        self._tell_all(DRAINING)
        if self._listening is not None:
            self._listening.cancel()
        self._say(Stop())
        if self._writer is not None:
            self._writer.close()
        if self._process is not None:
            await asyncio.to_thread(_bury, self._process)

    def _say(self, frame: Any) -> None:
        if self._writer is not None and not self._writer.is_closing():
            data = pickle.dumps(frame)
            self._writer.write(_HEADER.pack(len(data)) + data)

    async def _listen(self, reader: asyncio.StreamReader) -> None:
        try:
            while True:
                (length,) = _HEADER.unpack(await reader.readexactly(_HEADER.size))
                self._hear(pickle.loads(await reader.readexactly(length)))  # noqa: S301  (from our own child)
        except (asyncio.IncompleteReadError, OSError):
            self._tell_all(LOST)
            if self._writer is not None:
                self._writer.close()
            if self._process is not None:
                await asyncio.to_thread(_bury, self._process)
            self._on_lost()

    def _hear(self, frame: Ready | Reply | Failed | Fault) -> None:
        if isinstance(frame, Ready):
            self._on_ready()
        elif (queue := self._waiting.get(frame.number)) is not None:
            queue.put_nowait(frame)

    def _tell_all(self, message: str) -> None:
        for number, queue in self._waiting.items():
            queue.put_nowait(Failed(number, ServerError(message, "UNAVAILABLE", 1.0)))


def _bury(process: subprocess.Popen[bytes]) -> None:
    """Wait for a process that has been told to end, or lost its line; end it if it does not."""
    try:
        process.wait(5)
    except subprocess.TimeoutExpired:
        process.kill()
        process.wait()
