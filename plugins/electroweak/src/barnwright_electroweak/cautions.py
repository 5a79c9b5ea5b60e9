"""Cautions that several processes of this plugin carry."""

from __future__ import annotations

RADIATION = (
    "Cross sections feed shielding, dose and beam-safety estimates: this one holds at lowest order within its range of "
    "validity; work that can hurt someone follows local rules and a qualified radiation-protection expert."
)
BOUND_ELECTRONS = "Electrons in matter are bound and move: recoils of less than about 10 keV feel it."
