"""Colour, spin states, baryon and lepton numbers, read off the digits of the PDG's numbering scheme.

Source: "Monte Carlo particle numbering scheme", Review of Particle Physics (PDG 2024), section 45.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from particle import PDGID

_GLUON, _PHOTON = 21, 22
_NEUTRINOS = (12, 14, 16)
_FAMILIES = ((11, 12), (13, 14), (15, 16))


def colour(pdg_id: PDGID) -> int:
    """Number of colour states: quark (and diquark) 3, gluon 8, all others 1."""
    if pdg_id == _GLUON:
        return 8
    return 3 if pdg_id.is_quark or pdg_id.is_diquark else 1


def spin_states(pdg_id: PDGID) -> int | None:
    """Number of physical helicity states; None where the spin is not known.

    Neutrinos are left-handed only, photon and gluon are transverse.
    """
    if abs(pdg_id) in _NEUTRINOS:
        return 1
    if pdg_id in (_GLUON, _PHOTON):
        return 2
    return None if pdg_id.J is None else round(2 * float(pdg_id.J)) + 1


def baryon_number(pdg_id: PDGID) -> float:
    """Baryon number; negative for an antiparticle."""
    sign = 1 if pdg_id > 0 else -1
    if pdg_id.is_quark:
        return sign / 3
    if pdg_id.is_diquark:
        return sign * 2 / 3
    if pdg_id.is_nucleus:
        return float(sign * abs(pdg_id.A or 0))
    return float(sign) if pdg_id.is_baryon or pdg_id.is_pentaquark else 0.0


def lepton_numbers(pdg_id: PDGID) -> tuple[int, int, int]:
    """Lepton numbers of the electron, the muon and the tau family; negative for an antiparticle."""
    sign = 1 if pdg_id > 0 else -1
    electron, muon, tau = (sign * (abs(pdg_id) in family) for family in _FAMILIES)
    return electron, muon, tau
