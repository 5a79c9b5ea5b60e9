"""Cautions that several processes of this plugin carry."""

from __future__ import annotations

RADIATION = (
    "Cross sections feed shielding, dose and beam-safety estimates: this one holds at lowest order within its range of "
    "validity; work that can hurt someone follows local rules and a qualified radiation-protection expert."
)
BOUND_ELECTRONS = "Electrons in matter are bound and move: recoils of less than about 10 keV feel it."
BEAM_RADIATION = (
    "Radiation from the beams is left out. At the Z it matters most: exponentiated, it lowers the peak to 0.740 of "
    "this one and moves it up by 0.11 GeV; above the Z, collisions return to it, and cuts on the pair's mass decide."
)
WEAK_CORRECTIONS = (
    "One alpha serves all energies, and weak loops enter through the inputs alone: a few per cent away from the Z."
)
GLUONS = "Gluons are left out: 1 + α_s/π, about 4 %, is missing from the total of light quarks."
QUARK_MASS = "The kinematic mass of a quark is not measured; the default is the running mass of the PDG at itself."
POLARISED_LEGS = "Polarisation is by helicity in the cm; that of a massive particle depends on the frame."

HEAVY_BEAMS = (
    "With a mass given to the electron, the part of the Z with spin 0 (q^mu q^nu/M^2) has no width; the part with "
    "spin 1 has it."
)
