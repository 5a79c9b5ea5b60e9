"""Which processes of a list are wanted: by particle, by plugin, by kind."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from typing import Any

from barnwright.errors import RequestError, Violation, nearest, show
from barnwright.particles import UnknownParticleError, find
from barnwright.run.kinds import KINDS, kind_word

ANYTHING = "X"
MOST_PARTICLES = 10
"""As many as a reaction can have."""
LONGEST_NAME = 100


@dataclass(frozen=True, slots=True)
class Choice:
    """What a process must be like: these particles in it, of this plugin, of this kind; "" for any.

    A broken process cannot be looked into, so it is left out by its plugin only.
    """

    particles: tuple[str, ...] = ()
    plugin: str = ""
    kind: str = ""

    @classmethod
    def of(
        cls, particles: str | Sequence[str] | None, plugin: str | None, kind: str | None, plugins: Iterable[str]
    ) -> Choice:
        """The choice of these words, where ``plugins`` are those that are installed.

        Raises
        ------
        RequestError
            With every word that means nothing, and the nearest that does.
        """
        found: list[Violation] = []
        names = [particles] if isinstance(particles, str) else list(particles or ())
        if len(names) > MOST_PARTICLES:
            found.append(Violation("particle", f"{len(names)} particles", f"at most {MOST_PARTICLES}"))
        chosen = cls(
            tuple(_particle(name, found) for name in names[:MOST_PARTICLES]),
            _plugin(str(plugin), sorted(set(plugins)), found) if plugin else "",
            _kind(str(kind), found) if kind else "",
        )
        if found:
            raise RequestError(found)
        return chosen

    def fits(self, summary: Mapping[str, Any]) -> bool:
        """Whether a process is wanted, by the fields of its summary."""
        if self.plugin and summary["plugin"] != self.plugin:
            return False
        if summary.get("broken") is not None:
            return True
        legs = str(summary["reaction"]).split()
        return all(name in legs for name in self.particles) and (not self.kind or self.kind in summary["kinds"])

    def __str__(self) -> str:
        """What was asked for, in words."""
        words = [f"particle {name}" for name in self.particles]
        words += [f"plugin {self.plugin}"] * bool(self.plugin) + [f"kind {self.kind}"] * bool(self.kind)
        return ", ".join(words)


def _particle(name: str, found: list[Violation]) -> str:
    if name == ANYTHING:
        return name
    near = None
    try:
        if isinstance(name, str) and len(name) <= LONGEST_NAME:
            return find(name).name
    except UnknownParticleError as error:
        near = error.nearest
    found.append(Violation("particle", show(name), "a particle as the PDG spells it, or X", near))
    return name


def _plugin(name: str, plugins: Sequence[str], found: list[Violation]) -> str:
    short = name.strip().lower().removeprefix("barnwright-")
    if short not in plugins:
        expected = f"an installed plugin: {', '.join(plugins) or 'there is none'}"
        found.append(Violation("plugin", show(name), expected, nearest(short, plugins)))
    return short


def _kind(text: str, found: list[Violation]) -> str:
    word = kind_word(text)
    if word not in KINDS:
        expected = f"a kind of reaction or of law: {', '.join(KINDS)}"
        found.append(Violation("kind", show(text), expected, nearest(word, KINDS)))
    return word
