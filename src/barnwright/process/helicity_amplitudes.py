"""Laws given as helicity amplitudes: complex numbers, one a combination of helicities and a colour flow."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from itertools import product
from typing import Any, ClassVar

import numpy as np
from numpy.typing import ArrayLike, NDArray

from barnwright.event import Event
from barnwright.process.contributions import Parts, factors, is_interference, plain, takes
from barnwright.process.parameters import Parameters
from barnwright.process.polarisation import UNPOLARISED, Combination, Polarisation, all_combinations, weight
from barnwright.reaction import Reaction

Array = NDArray[np.float64]
Complex = NDArray[np.complex128]
AmplitudeFunction = Callable[..., ArrayLike]


@dataclass(frozen=True, slots=True)
class HelicityAmplitudes:
    """|M|² = Σ weight · A_i C_ij A_j* over helicities and flows, averaged over the initial states by the core.

    Attributes
    ----------
    amplitudes : function ``(event, parameters)``, also with ``parts`` and ``helicities``
        Complex, shape (helicity, flow, …) with ``event.shape`` last (or what broadcasts to it), in GeV^(4 − N). All
        diagrams of one combination are added already. With ``parts`` (a set of plain keywords) where the process has
        contributions. With ``helicities`` (a tuple of combinations), when it has a parameter of that name: the rows
        that are wanted, in that order.
    helicities : tuple of combinations, or of the helicities of each leg, optional
        A combination has one helicity a leg in written order, twice its value for fermions, its value for bosons; given
        are those that do not vanish, which are the rows of the answer. Of the helicities of each leg the rows are the
        product, the last leg fastest. Left away: all physical helicities of each leg.
    colour : square matrix, optional
        C, the sum over colours of flow i times the conjugate of flow j; ((1,),) where nothing is coloured.
    massless : particles or legs
        The law is skipped when one of these masses is not 0.
    compiled : bool
        Whether the function is a compiled kernel that releases the interpreter's lock.
    """

    kind: ClassVar[str] = "helicity_amplitudes"

    amplitudes: AmplitudeFunction
    helicities: tuple[Combination, ...] | None = None
    colour: tuple[tuple[complex, ...], ...] = ((1.0,),)
    massless: tuple[str, ...] = ()
    compiled: bool = False

    def combinations(self, reaction: Reaction) -> tuple[Combination, ...]:
        """The rows of a whole answer."""
        if self.helicities is None:
            return all_combinations(reaction)
        legs = len(reaction.incoming) + len(reaction.outgoing)
        by_leg = len(self.helicities) == legs and all(len(entry) < legs for entry in self.helicities)
        return tuple(product(*self.helicities)) if by_leg else self.helicities

    def squared(
        self,
        event: Event,
        parameters: Parameters,
        parts: Parts | None = None,
        polarisation: Polarisation = UNPOLARISED,
    ) -> Array:
        """|M|² in GeV^(2(4 − N)), averaged over the initial states of beams so polarised; broadcasts to the event.

        Raises what the function raises, and ValueError where its answer has not the shape (helicity, flow, …).
        """
        rows = self.combinations(event.reaction)
        weights = np.array([weight(event.reaction, row, polarisation) for row in rows])
        if parts is None:
            return self._summed(self._amplitudes(event, parameters, None, weights), None, weights)
        known = {key: self._amplitudes(event, parameters, key, weights) for key in plain(parts)}
        if _is_whole(parts):
            return self._summed(np.asarray(sum(known.values())), None, weights)
        found = np.zeros((1,) * len(event.shape))
        for keyword in sorted(parts):
            if is_interference(keyword):
                first, second = (known[key] for key in factors(keyword))
                found = found + 2 * self._summed(first, second, weights)
            else:
                found = found + self._summed(known[keyword], None, weights)
        return found

    def _amplitudes(self, event: Event, parameters: Parameters, key: str | None, weights: Array) -> Complex:
        """The rows with a weight, once for each event and set of diagrams."""
        wanted = np.nonzero(weights)[0]
        name = (self.amplitudes, parameters, key, wanted.tobytes())
        found: Complex = event.once(name, lambda: self._asked(event, parameters, key, wanted))
        return found

    def _asked(self, event: Event, parameters: Parameters, key: str | None, wanted: NDArray[np.intp]) -> Complex:
        rows = self.combinations(event.reaction)
        keywords: dict[str, Any] = {} if key is None else {"parts": frozenset((key,))}
        chooses = takes(self.amplitudes, "helicities")
        if chooses:
            keywords["helicities"] = tuple(rows[index] for index in wanted)
        found = np.asarray(self.amplitudes(event, parameters, **keywords), dtype=complex)
        count = len(wanted) if chooses else len(rows)
        if found.ndim < 2 or found.shape[:2] != (count, len(self.colour)):
            expected = f"(helicity, flow, …) with {count} helicities and {len(self.colour)} flows"
            raise ValueError(f"amplitudes: got an array of shape {found.shape}, expected {expected}")
        return found if chooses or len(wanted) == len(rows) else found[wanted]

    def _summed(self, first: Complex, second: Complex | None, weights: Array) -> Array:
        """Σ weight · Re A_i C_ij B_j*, helicity after helicity and flow after flow."""
        used = weights[weights != 0]
        total: Array = np.zeros((1,) * (first.ndim - 2))
        for row, share in enumerate(used):
            total = total + share * self._contracted(first[row], first[row] if second is None else second[row])
        return total

    def _contracted(self, first: Sequence[Complex] | Complex, second: Sequence[Complex] | Complex) -> Array:
        total: Any = 0.0
        for i, line in enumerate(self.colour):
            for j, entry in enumerate(line):
                if entry:
                    total = total + _real_product(complex(entry), first[i], second[j])
        return np.asarray(total)


def _real_product(entry: complex, first: Complex, second: Complex) -> Array:
    """Re(entry · first · second*), in real numbers where the entry is one."""
    if entry.imag:
        return np.asarray(np.real(entry * first * np.conj(second)))
    return np.asarray(entry.real * (first.real * second.real + first.imag * second.imag))


def _is_whole(parts: Parts) -> bool:
    """Whether the set is that of the squared sum: its plain keywords and all their interferences."""
    base = plain(parts)
    pairs = {frozenset(factors(keyword)) for keyword in parts if is_interference(keyword)}
    return set(base) <= parts and len(pairs) == len(base) * (len(base) - 1) // 2
