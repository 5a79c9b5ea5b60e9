"""From a text to a reaction, with every finding at once."""

from __future__ import annotations

import re
from functools import lru_cache

from barnwright.errors import BarnwrightError, Violation, show
from barnwright.particles import UnknownParticleError, find

from .reaction import ANYTHING, Reaction

MAX_INCOMING = 2
MAX_OUTGOING = 8
MAX_LENGTH = 1000

Word = tuple[str, int]
Finding = tuple[str, str | None, int | None]

_WORD = re.compile(r"(?<!\S)--+>(?!\S)|->|\S+?(?=->|\s|$)")
_OTHER_ARROWS = ("→", "⟶", "-->", "=>", ">", "to")


class ReactionError(BarnwrightError, ValueError):
    """A text that is no reaction.

    `expected`, `nearest` and `position` (a column, counted from 0) are those of the first finding; `violations` gives
    all of them.

    Parameters
    ----------
    text
        The text as it was written.
    findings
        What is wrong: (expected, nearest, position) of each; at least one.
    """

    def __init__(self, text: str, findings: tuple[Finding, ...]) -> None:
        self.text = text
        self.findings = findings
        self.expected, self.nearest, self.position = findings[0]
        super().__init__(text, findings)

    def violations(self, field: str) -> list[Violation]:
        """Every finding, as a violation of this field of a request."""
        return [Violation(field, show(self.text), *finding) for finding in self.findings]

    def __str__(self) -> str:
        return "\n".join(str(violation) for violation in self.violations("reaction"))


@lru_cache(maxsize=512)
def parse_reaction(text: str) -> Reaction:
    """The reaction that a text describes: ``"e- e+ -> mu- mu+"``.

    Raises
    ------
    ReactionError
        A ValueError with every finding, their columns and the nearest names.
    """
    if len(text) > MAX_LENGTH:
        raise ReactionError(text, ((f"a reaction of at most {MAX_LENGTH} characters", None, MAX_LENGTH),))
    words = [(match[0], match.start()) for match in _WORD.finditer(text)]
    arrows = [place for word, place in words if word == "->"]
    if len(arrows) != 1:
        raise ReactionError(text, (_about_arrow(words, arrows),))
    before = [(word, place) for word, place in words if place < arrows[0]]
    after = [(word, place) for word, place in words if place > arrows[0]]
    findings = (*_about_counts(before, after, arrows[0]), *_about_names(before, after))
    if findings:
        raise ReactionError(text, findings)
    incoming, outgoing = (tuple(_canonical(word) for word, _ in side) for side in (before, after))
    return Reaction(f"{' '.join(incoming)} -> {' '.join(outgoing)}", incoming, outgoing)


def _canonical(word: str) -> str:
    return word if word == ANYTHING else find(word).name


def _about_arrow(words: list[Word], arrows: list[int]) -> Finding:
    if arrows:
        return "one arrow only", None, arrows[1]
    other = next((place for word, place in words if word in _OTHER_ARROWS), None)
    return "an arrow between incoming and outgoing particles, as in e- e+ -> mu- mu+", "->", other


def _about_counts(before: list[Word], after: list[Word], arrow: int) -> list[Finding]:
    found: list[Finding] = []
    if not 1 <= len(before) <= MAX_INCOMING:
        found.append((f"1 or {MAX_INCOMING} incoming particles before the arrow, not {len(before)}", None, arrow))
    fewest = 2 if len(before) == 1 and [word for word, _ in after] != [ANYTHING] else 1
    if not fewest <= len(after) <= MAX_OUTGOING:
        found.append((f"{fewest} to {MAX_OUTGOING} outgoing particles after the arrow, not {len(after)}", None, arrow))
    return found


def _about_names(before: list[Word], after: list[Word]) -> list[Finding]:
    """Findings about single words; words beyond the largest number of particles are not looked at."""
    found: list[Finding] = []
    for word, place in (*before[:MAX_INCOMING], *after[:MAX_OUTGOING]):
        if word == ANYTHING:
            if len(after) > 1 or place < after[0][1]:
                found.append((f"a particle ({ANYTHING} may only stand alone after the arrow)", None, place))
            continue
        try:
            find(word)
        except UnknownParticleError as error:
            found.append(("a particle as the PDG spells it", error.nearest, place))
    return found
