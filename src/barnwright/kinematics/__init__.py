"""Kinematics: the collision's energy, frames, four-vectors and two-body momenta; knows no process and no cut."""

from .collision import Collision
from .four_vector import FourVector, boost_to_rest
from .frame import CM, LAB, Frame
from .two_body import TwoBody

__all__ = ["CM", "LAB", "Collision", "FourVector", "Frame", "TwoBody", "boost_to_rest"]
