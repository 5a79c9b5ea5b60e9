"""The type: names of what goes in and comes out."""

from __future__ import annotations

from dataclasses import dataclass
from math import factorial

from barnwright.errors import show

from .conservation import unbalanced
from .legs import LegError, LegKey, code_of

ANYTHING = "X"


@dataclass(frozen=True, slots=True)
class Reaction:
    """A reaction with canonical names; `parse_reaction` makes it from text.

    Parameters
    ----------
    text
        The reaction written out, one space between words.
    incoming
        Names of the one or two incoming particles.
    outgoing
        Names of the outgoing particles, or ``("X",)``.
    """

    text: str
    incoming: tuple[str, ...]
    outgoing: tuple[str, ...]

    @property
    def inclusive(self) -> bool:
        """Whether the final state is anything."""
        return self.outgoing == (ANYTHING,)

    @property
    def identical_groups(self) -> tuple[tuple[int, ...], ...]:
        """The outgoing legs of each kind of particle that comes out more than once."""
        kinds = dict.fromkeys(self.outgoing)
        groups = (tuple(i for i, name in enumerate(self.outgoing, 1) if name == kind) for kind in kinds)
        return tuple(group for group in groups if len(group) > 1)

    @property
    def symmetry_factor(self) -> float:
        """1/Πk! over the groups of k identical outgoing particles."""
        factor = 1.0
        for group in self.identical_groups:
            factor /= factorial(len(group))
        return factor

    def leg(self, key: LegKey) -> int:
        """The code of a leg: -1 and -2 for the beams, 1 to n for the outgoing particles.

        Parameters
        ----------
        key
            A number 1 to n, ``"beam_a"``, ``"beam_b"``, the name of an outgoing particle, or ``(name, k)`` for the
            k-th (from 1) of identical ones.

        Raises
        ------
        LegError
            A LookupError, for a leg that is not there or a name that several share; it names the candidates.
        """
        return code_of(self, key)

    def name_of(self, code: int) -> str:
        """The particle of a leg, by code.

        Raises
        ------
        LegError
            For a code that the reaction lacks.
        """
        if 1 <= code <= len(self.outgoing):
            return self.outgoing[code - 1]
        if -len(self.incoming) <= code <= -1:
            return self.incoming[-1 - code]
        codes = (*range(-1, -1 - len(self.incoming), -1), *range(1, 1 + len(self.outgoing)))
        raise LegError(show(code), f"the code of a leg: {', '.join(map(str, codes))}")

    def conservation_notes(self) -> tuple[str, ...]:
        """A sentence for each of charge, baryon number and lepton numbers that the reaction does not conserve.

        Never a reason to refuse: whoever studies a forbidden reaction knows that it is one. An inclusive reaction has
        no notes.
        """
        return () if self.inclusive else unbalanced(self.incoming, self.outgoing)
