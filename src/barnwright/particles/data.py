"""What is known of one particle."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class ParticleData:
    """One particle of the table, in the units of the program.

    Parameters
    ----------
    name
        As the PDG spells it: ``"mu-"``, ``"nu(mu)~"``, ``"Z0"``.
    pdg_id
        Number of the PDG's numbering scheme; that of an antiparticle is negative.
    mass
        GeV. 0 where the table has none (neutrinos); `mass_known` then is False. The masses of the quarks d, u, s, c
        and b are running masses (MS-bar), not kinematic ones: where a quark's mass matters it is a parameter. A
        nucleus has the mass of the bare nucleus; the table's is that of the neutral atom.
    mass_known
        Whether the table has a mass.
    width
        Total width in GeV; None where the table has none.
    charge
        In units of the elementary charge.
    spin_states
        Number of physical helicity states: 1 for neutrinos, 2 for photon and gluon, 2J + 1 for the others; None where
        the table has no spin (nuclei).
    colour
        Number of colour states: 3 for quarks and diquarks, 8 for the gluon, 1 for the rest.
    baryon_number
        1/3 for a quark, A for a nucleus, with the sign of the particle.
    lepton_numbers
        Of the electron, the muon and the tau family.
    antiparticle
        Name of the antiparticle; the own name when self-conjugate.
    latex
        The name in LaTeX, without dollar signs.
    is_self_conjugate
        Whether particle and antiparticle are one.
    """

    name: str
    pdg_id: int
    mass: float
    mass_known: bool
    width: float | None
    charge: float
    spin_states: int | None
    colour: int
    baryon_number: float
    lepton_numbers: tuple[int, int, int]
    antiparticle: str
    latex: str
    is_self_conjugate: bool
