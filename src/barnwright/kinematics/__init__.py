"""Kinematics: the collision's energy, frames, four-vectors and two-body momenta; knows no process and no cut."""

from barnwright.kinematics.collision import Collision
from barnwright.kinematics.crossed_beams import CrossedBeams
from barnwright.kinematics.four_vector import FourVector, boost_to_rest
from barnwright.kinematics.frame import CM, LAB, Frame
from barnwright.kinematics.many_body import ManyBody
from barnwright.kinematics.two_body import Turn, TwoBody

__all__ = [
    "CM",
    "LAB",
    "Collision",
    "CrossedBeams",
    "FourVector",
    "Frame",
    "ManyBody",
    "Turn",
    "TwoBody",
    "boost_to_rest",
]
