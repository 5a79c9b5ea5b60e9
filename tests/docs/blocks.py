"""Fenced blocks of a Markdown page, run in order as a reader would: one folder, one Python session, one shell.

toml      the first line names a file (`# request.toml`): it is written
python    executed, or written where the first line names a file (`# package/module.py`)
pycon     executed, and its outputs are compared ("..." stands for anything)
console   `$ command` lines are run and their outputs compared; a command that ends in & runs until the page ends
sh, text  only shown
"""

from __future__ import annotations

import doctest
import math
import os
import re
import socket
import subprocess
import sys
from collections.abc import Iterator
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any

FENCE = re.compile(r"^```(\w*)\n(.*?)^```$", re.MULTILINE | re.DOTALL)
PORT = "50551"
OPTIONS = doctest.ELLIPSIS | doctest.NORMALIZE_WHITESPACE
NUMBER = re.compile(r"(?<!\w)[+-]?\d+(?:\.\d*)?(?:e[+-]?\d+)?(?:\(\d+\))?")
CLOSE = 1e-10
PLAIN = {"COLUMNS": "100", "NO_COLOR": "1"}
# what a page installs goes into its folder, made of what is here already (pip reads "0" as: no isolation)
INSTALLING = {
    "PIP_NO_BUILD_ISOLATION": "0",
    "PIP_NO_DEPS": "1",
    "PIP_NO_INDEX": "1",
    "PIP_ROOT_USER_ACTION": "ignore",
    "PIP_DISABLE_PIP_VERSION_CHECK": "1",
}


class Checker(doctest.OutputChecker):
    """Outputs are the same when their texts are and their numbers agree to 1e-10: last digits depend on the machine."""

    def check_output(self, want: str, got: str, optionflags: int) -> bool:
        """Whether what was shown is what came."""
        return super().check_output(want, got, optionflags) or (_bare(want) == _bare(got) and _close(want, got))


def _bare(text: str) -> str:
    """The text without its numbers; rules of tables, which are as wide as the numbers, all of one width."""
    return " ".join(re.sub("─+", "─", NUMBER.sub("#", text)).split())


def _numbers(text: str) -> list[float]:
    return [float(number.partition("(")[0]) for number in NUMBER.findall(text)]


def _close(want: str, got: str) -> bool:
    return all(math.isclose(*pair, rel_tol=CLOSE) for pair in zip(_numbers(want), _numbers(got), strict=True))


@dataclass(frozen=True, slots=True)
class Block:
    """A fenced block: its language, its text and the line where the text begins (1-based)."""

    language: str
    text: str
    line: int


def blocks(page: str) -> Iterator[Block]:
    """The fenced blocks of a page in order."""
    for match in FENCE.finditer(page):
        yield Block(match[1], match[2], page.count("\n", 0, match.start(2)) + 1)


def free_port() -> str:
    """A port of this machine on which nobody listens."""
    with socket.create_server(("127.0.0.1", 0)) as listener:
        return str(listener.getsockname()[1])


@dataclass
class Reader:
    """Somebody who types a page's blocks into a folder; ``port`` stands in for the page's own."""

    page: Path
    folder: Path
    port: str = field(default_factory=free_port)
    names: dict[str, Any] = field(default_factory=lambda: {"__name__": "__page__"})
    servers: list[subprocess.Popen[str]] = field(default_factory=list)

    def read(self) -> None:
        """Run every block; an AssertionError or the block's own error names the line."""
        try:
            for block in blocks(self.page.read_text(encoding="utf-8").replace(PORT, self.port)):
                getattr(self, f"_{block.language}")(block)
        finally:
            self.close()

    def close(self) -> None:
        """End what still runs."""
        for server in self.servers:
            server.terminate()
            server.communicate(timeout=30)

    def _sh(self, block: Block) -> None:
        """Only shown: installing, or what takes minutes."""

    _text = _sh

    def _toml(self, block: Block) -> None:
        assert self._written(block), f"{self.page.name}:{block.line}: a toml block names its file in its first line"

    def _written(self, block: Block) -> bool:
        """Write the block into the file that its first line names; whether it names one."""
        name = re.match(rf"# (\S+\.{'py' if block.language == 'python' else block.language})\n", block.text)
        if name:
            (self.folder / name[1]).parent.mkdir(parents=True, exist_ok=True)
            (self.folder / name[1]).write_text(block.text, encoding="utf-8")
        return bool(name)

    def _python(self, block: Block) -> None:
        if not self._written(block):
            text = "\n" * (block.line - 1) + block.text
            exec(compile(text, self.page.name, "exec", dont_inherit=True), self.names)  # noqa: S102

    def _pycon(self, block: Block) -> None:
        test = doctest.DocTestParser().get_doctest(block.text, self.names, self.page.name, None, block.line - 1)
        report: list[str] = []
        doctest.DocTestRunner(Checker(), optionflags=OPTIONS, verbose=False).run(
            test, out=report.append, clear_globs=False
        )
        assert not report, "".join(report)
        self.names.update(test.globs)

    def _console(self, block: Block) -> None:
        for entry in re.split(r"^\$ ", block.text, flags=re.MULTILINE)[1:]:
            command, _, expected = re.sub(r"\\\n", "", entry).partition("\n")
            run = self._start if command.endswith("&") else self._shell
            got = run(command.rstrip("& "))
            same = Checker().check_output(expected.strip() + "\n", got.strip() + "\n", OPTIONS)
            assert same, f"{self.page.name}:{block.line}: $ {command}\nexpected:\n{expected}\ngot:\n{got}"

    def _environment(self) -> dict[str, str]:
        path = f"{Path(sys.executable).parent}{os.pathsep}{os.environ['PATH']}"
        site = str(self.folder / "site")
        return {**os.environ, **INSTALLING, "PIP_TARGET": site, "PYTHONPATH": site, "PATH": path, **PLAIN}

    def _shell(self, command: str) -> str:
        shell = ["bash", "-c", command]
        run = subprocess.run(
            shell, cwd=self.folder, env=self._environment(), capture_output=True, text=True, timeout=100, check=False
        )
        return run.stdout + run.stderr

    def _start(self, command: str) -> str:
        """Start a server and wait for its first line."""
        server = subprocess.Popen(
            command.split(),
            cwd=self.folder,
            env=self._environment(),
            stdout=subprocess.PIPE,
            stderr=subprocess.STDOUT,
            text=True,
        )
        self.servers.append(server)
        assert server.stdout is not None
        return server.stdout.readline()
