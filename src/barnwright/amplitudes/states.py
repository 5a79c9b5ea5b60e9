"""The wave functions of all legs of an event at once, and the amplitude's way back to (helicity, flow, …).

    electron, positron, muon, antimuon = external_states(event)
    amplitude = dot(current(positron, electron), current(muon, antimuon)) / event.s
    return helicity_rows(event, amplitude)

Every leg brings its own helicity axis, so that plain broadcasting makes the product of helicities.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence

import numpy as np

from barnwright.amplitudes.arrays import Complex
from barnwright.amplitudes.directions import direction
from barnwright.amplitudes.polarisations import polarisation_in
from barnwright.amplitudes.spinors import adjoint, frame, u_in, v_in
from barnwright.event import Event
from barnwright.kinematics import FourVector
from barnwright.particles import ParticleData, find

_MASSLESS_VECTORS = (21, 22)


def external_states(event: Event, helicities: Sequence[Sequence[int]] | None = None) -> tuple[Complex, ...]:
    """The wave functions of all legs in written order, in the centre of mass.

    An incoming particle has u, an incoming antiparticle v̄, an outgoing particle ū, an outgoing antiparticle v (adjoints
    are made already); an incoming vector boson ε, an outgoing one ε*; a scalar 1.

    Parameters
    ----------
    event : Event
    helicities : combinations, optional
        Rows as the core hands them over in ``helicities``: one helicity a leg. Left away: all physical helicities.

    Returns
    -------
    tuple of arrays
        Without ``helicities`` of shape (4, h_a, 1, 1, 1, …event) for the first of four legs, (4, 1, h_b, 1, 1, …event)
        for the second and so on (a scalar without the 4), so that a product of all has one axis a leg, rising
        helicities, ready for `helicity_rows`. With them (4, row, …event).

    Raises
    ------
    ValueError
        For a particle of spin other than 0, ½, 1.
    """
    incoming = event.reaction.incoming
    names, legs = (*incoming, *event.reaction.outgoing), _leg_keys(event)
    states = []
    for place, (leg, name) in enumerate(zip(legs, names, strict=True)):
        wave = _wave(name, place < len(incoming), event.cm_vector(leg))
        if helicities is None:
            waves = [wave(value) for value in _physical_helicities(find(name))]
            states.append(_laid_out(waves, event, place, len(legs) - place - 1))
        else:
            rows = [combination[place] for combination in helicities]
            known = {value: wave(value) for value in set(rows)}
            states.append(_laid_out([known[value] for value in rows], event, 0, 0))
    return tuple(states)


def helicity_rows(event: Event, *flows: Complex) -> Complex:
    """Amplitudes with one helicity axis a leg as (helicity, flow, …event), the last leg's helicity fastest.

    Parameters
    ----------
    event : Event
    flows : arrays of shape (h_a, h_b, h_1, …, …event)
        One for each colour flow, made from `external_states` without ``helicities``.
    """
    legs = len(_leg_keys(event))
    spread = np.broadcast_arrays(*flows)
    stacked = [flow.reshape(-1, *flow.shape[legs:]) for flow in spread]
    return np.stack(stacked, axis=1)


def _leg_keys(event: Event) -> tuple[str | int, ...]:
    incoming = ("beam_a", "beam_b")[: len(event.reaction.incoming)]
    return (*incoming, *range(1, len(event.reaction.outgoing) + 1))


def _is_fermion(particle: ParticleData) -> bool:
    if particle.spin_states == 1:
        return any(particle.lepton_numbers)
    return particle.spin_states == 2 and particle.pdg_id not in _MASSLESS_VECTORS


def _physical_helicities(particle: ParticleData) -> tuple[int, ...]:
    """Rising: (−1, 1), neutrinos (−1,), antineutrinos (1,), W and Z (−1, 0, 1), scalars (0,)."""
    if particle.spin_states == 1:
        return (-1 if particle.pdg_id > 0 else 1,) if _is_fermion(particle) else (0,)
    return (-1, 1) if particle.spin_states == 2 else (-1, 0, 1)


def _wave(name: str, incoming: bool, vector: FourVector) -> Callable[[int], Complex]:
    """The wave function of a leg, by its helicity; what its helicities share is worked out once."""
    particle = find(name)
    if particle.spin_states not in (1, 2, 3):
        raise ValueError(f"leg: got {name}, expected a particle of spin 0, 1/2 or 1")
    if _is_fermion(particle):
        spinor, known = u_in if particle.pdg_id > 0 else v_in, frame(vector)
        if incoming == (particle.pdg_id > 0):
            return lambda helicity: spinor(known, helicity)
        return lambda helicity: adjoint(spinor(known, helicity))
    if particle.spin_states == 1:
        return lambda _helicity: np.ones((), dtype=complex)
    towards = direction(vector)
    if incoming:
        return lambda helicity: polarisation_in(vector, towards, helicity)
    return lambda helicity: np.conj(polarisation_in(vector, towards, helicity))


def _laid_out(waves: list[Complex], event: Event, before: int, after: int) -> Complex:
    """Waves of one leg with their helicity axis between those of the other legs."""
    scalar = waves[0].ndim == 0
    head = () if scalar else (4,)
    batch = waves[0].shape[len(head) :]
    padded = (1,) * (len(event.shape) - len(batch)) + batch
    stacked = np.stack(waves, axis=len(head))
    return stacked.reshape(*head, *(1,) * before, len(waves), *(1,) * after, *padded)
