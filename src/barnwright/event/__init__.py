"""What laws, closed forms and observables see: the event and the point."""

from .event import Array, Event, Kinematics, LegKey
from .point import Point

__all__ = ["Array", "Event", "Kinematics", "LegKey", "Point"]
