"""Beams: from what a request says about them to the collision and its flux."""

from barnwright.beams.beam_settings import BeamSettings
from barnwright.beams.collide import collide, kinetic_from_energy, kinetic_from_momentum
from barnwright.beams.flux import flux

__all__ = ["BeamSettings", "collide", "flux", "kinetic_from_energy", "kinetic_from_momentum"]
