"""Words for what a process is: the kind of its reaction, and the kinds of its laws."""

from __future__ import annotations

from collections.abc import Iterator

from barnwright.particles import find
from barnwright.process import HelicityAmplitudes, Process, can_be_polarised

#: Every word with what it means, those of reactions first.
KINDS = {
    "scattering": "two particles collide",
    "elastic": "the same particles come out",
    "annihilation": "a particle meets its antiparticle",
    "inclusive": "anything comes out (X)",
    "decay": "one particle falls apart",
    "closed_form": "an antiderivative answers exactly",
    "squared_amplitude": "|M|² as a function",
    "helicity": "helicity amplitudes",
    "expression": "|M|² as a formula",
    "angular": "dσ/dΩ in the cm",
    "total": "σ(s), without a final state to ask about",
    "polarised": "a beam may be polarised",
    "contributions": "parts can be switched on and off",
    "singular": "diverges where cuts do not keep away",
}
_LAWS = {"helicity_amplitudes": "helicity", "angular_cross_section": "angular", "total_cross_section": "total"}
_OTHER_WORDS = {**_LAWS, "polarized": "polarised", "helicities": "helicity", "formula": "expression"}


def kind_word(text: str) -> str:
    """The word that a text means: case, spaces and hyphens do not matter, other names of a word are known."""
    word = text.strip().lower().replace("-", "_").replace(" ", "_")
    return _OTHER_WORDS.get(word, word)


def kinds_of(process: Process) -> tuple[str, ...]:
    """The words that fit a process, in the order of `KINDS`."""
    found = {*_of_reaction(process), *(_LAWS.get(law.kind, law.kind) for law in process.laws)}
    facts = {
        "closed_form": process.closed_forms,
        "polarised": polarised_beams(process),
        "contributions": process.contributions,
        "singular": process.singular,
    }
    found.update(word for word, fact in facts.items() if fact)
    return tuple(word for word in KINDS if word in found)


def polarised_beams(process: Process) -> tuple[str, ...]:
    """The beams that a request may polarise, as it would call them; none where no law has helicities."""
    incoming = process.legs.incoming
    if len(incoming) != 2 or not any(isinstance(law, HelicityAmplitudes) for law in process.laws):
        return ()
    names = ("beam_a", "beam_b") if incoming[0] == incoming[1] else incoming
    return tuple(name for name, particle in zip(names, incoming, strict=True) if can_be_polarised(particle))


def _of_reaction(process: Process) -> Iterator[str]:
    legs = process.legs
    if len(legs.incoming) == 1:
        yield "decay"
        return
    yield "scattering"
    if legs.inclusive:
        yield "inclusive"
    if sorted(legs.incoming) == sorted(legs.outgoing):
        yield "elastic"
    first, second = (find(name) for name in legs.incoming)
    if first.antiparticle == second.name and not first.is_self_conjugate:
        yield "annihilation"
