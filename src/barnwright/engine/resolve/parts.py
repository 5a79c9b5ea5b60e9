"""Contributions of a request: which parts of the law count, and which are reported."""

from __future__ import annotations

from collections.abc import Iterator

from barnwright.documents import Request
from barnwright.engine.plan import Note
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.setting import WHOLE
from barnwright.errors import nearest
from barnwright.process import Parts, Process, is_interference

PartList = tuple[tuple[str, Parts | None], ...]


def resolve_parts(request: Request, process: Process) -> PartList:
    """All parts that are asked for together, named "", then each by itself; unknown names are left out."""
    if not process.contributions:
        return WHOLE
    names = process.contributions if request.contributions is None else request.contributions
    chosen = {name: process.contributions[name] for name in names if name in process.contributions}
    return (("", frozenset(chosen.values())), *((name, frozenset((key,))) for name, key in chosen.items()))


def check_contributions(request: Request, process: Process, findings: Findings) -> None:
    """Refuse names that the process does not declare."""
    known = tuple(process.contributions)
    for index, name in enumerate(request.contributions or ()):
        if name not in known:
            expected = (
                f"a contribution of {process.name}: {', '.join(known)}"
                if known
                else f"no contributions: {process.name} declares none"
            )
            findings.add(f"contributions[{index}]", name, expected, nearest(name, known))


def signed_notes(parts: PartList) -> Iterator[Note]:
    """A note for each reported contribution that may be negative."""
    for name, keywords in parts:
        if name and keywords is not None and any(map(is_interference, keywords)):
            yield Note("signed", f"contribution {name} is an interference and may be negative")
