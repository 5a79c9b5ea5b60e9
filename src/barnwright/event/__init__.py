"""What laws, closed forms and observables see: the event and the point."""

from barnwright.event.event import Array, Event, Kinematics, LegKey
from barnwright.event.point import Point

__all__ = ["Array", "Event", "Kinematics", "LegKey", "Point"]
