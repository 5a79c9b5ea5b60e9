"""What a process says about itself, as sentences for its description."""

from __future__ import annotations

from collections.abc import Iterator

from barnwright.documents.description import Alternative, Condition, ParameterDescription
from barnwright.process import HelicityAmplitudes, Law, Process, facts_of, is_interference
from barnwright.run.kinds import polarised_beams


def laws(process: Process) -> Iterator[str]:
    """The kinds of laws, the cheapest first, with the masses that must be 0 and the beams that may be polarised."""
    for form in process.closed_forms:
        yield f"closed form in {form.observable}{_conditions(process, form.massless, False)}"
    for law in process.laws:
        yield f"{_kind(law)}{_conditions(process, law.massless, isinstance(law, HelicityAmplitudes))}"


def _kind(law: Law) -> str:
    return law.kind.replace("_", " ")


def _conditions(process: Process, massless: tuple[str, ...], has_helicities: bool) -> str:
    texts = [f"for massless {', '.join(massless)}"] if massless else []
    beams = polarised_beams(process) if has_helicities else ()
    if beams:
        texts.append(f"{' and '.join(beams)} may be polarised")
    return f" ({'; '.join(texts)})" if texts else ""


def signed_contributions(process: Process) -> Iterator[str]:
    """The contributions that may be negative: interferences, or all of a signed process."""
    for name, keyword in process.contributions.items():
        if process.signed or is_interference(keyword):
            yield name


def claims(process: Process) -> Iterator[str]:
    """Symmetries, crossings, gauge invariance and limits, a sentence each."""
    if process.claims is None:
        return
    for pair in process.claims.exchange:
        first, second = (_leg(process, leg) for leg in pair)
        yield f"the same when {first} and {second} are exchanged"
    for name in process.claims.crossing:
        yield f"{name} with legs moved to the other side"
    for leg in process.claims.gauge_legs:
        yield f"0 when the polarisation vector of {_leg(process, leg)} is replaced by its momentum"
    yield from process.claims.limits


def _leg(process: Process, leg: str | int) -> str:
    """The particle, and which it is where it stands on both sides or more than once."""
    legs = process.legs
    code = legs.leg(leg)
    name = legs.name_of(code)
    if (*legs.incoming, *legs.outgoing).count(name) == 1:
        return name
    return f"{name} ({ {-1: 'beam_a', -2: 'beam_b'}.get(code, f'leg {code}') })"


def parameters(process: Process) -> Iterator[ParameterDescription]:
    """Every parameter, with the values of others with which it is used."""
    for fact in facts_of(process.parameters):
        yield ParameterDescription.build(
            name=fact.name,
            type=fact.type,
            choices=fact.choices,
            unit=fact.unit,
            default=fact.default,
            meaning=fact.meaning,
            source=fact.source,
            required=fact.required,
            used_with=tuple(Condition.build(name=name, values=values) for name, values in fact.used_with),
        )


def alternatives(process: Process) -> Iterator[Alternative]:
    """The named sets of parameter values."""
    for name, values in process.alternatives.items():
        yield Alternative.build(name=name, values=dict(values))
