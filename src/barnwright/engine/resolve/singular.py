"""Declared divergences: refused by name where the cuts leave the pole in the cross section."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.beams import collide
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.setting import Setting
from barnwright.event import Event
from barnwright.kinematics import TwoBody
from barnwright.process import Process, TotalCrossSection
from barnwright.reaction import Reaction

ENOUGH = 0.95
"""|cos θ| of the cut that a message gives as an example."""


def check_singular(process: Process, setting: Setting, findings: Findings) -> None:
    """One finding for each pole of the angle, t → M² or u → M², that lies on the axis and passes all cuts.

    M is the mass of the declared peak in the same invariant; a pole that the masses keep off the axis is none.
    """
    if setting.law is not None and isinstance(process.laws[setting.law], TotalCrossSection):
        return
    for channel in ("t", "u"):
        if channel in process.singular and _is_open(process.legs, setting, channel):
            names = ", ".join(cut.name for cut in setting.cuts)
            leg = 1 if channel == "t" else 2
            momentum = f"(p_a - p_{leg})^2"
            pole = f"{min(_masses(setting, channel), default=0.0) ** 2:g}"
            expected = f"a cut that keeps {channel} = {momentum} away from {pole}, where the cross section diverges"
            findings.add("cuts", names or "none", expected, _example(process.legs, channel))


def _masses(setting: Setting, channel: str) -> list[float]:
    return [mass for of, mass in setting.peaks if of == channel]


def _is_open(reaction: Reaction, setting: Setting, channel: str) -> bool:
    """Whether the pole is reached and passes the cuts, at any point of the scan."""
    collision = collide(setting.beams, setting.masses[:2])
    open_points = np.nonzero(collision.above(sum(setting.masses[2:]))[:, 0] > 0)[0]
    if open_points.size == 0:
        return False
    collision = collision.take(open_points)
    near, far = np.zeros_like(collision.sqrt_s), np.full_like(collision.sqrt_s, 2.0)
    masses = (setting.masses[0], setting.masses[1], setting.masses[2], setting.masses[3])
    two_body = TwoBody(collision, masses, *((near, far) if channel == "t" else (far, near)))
    transfer = two_body.t if channel == "t" else two_body.u
    mass = min(_masses(setting, channel), default=0.0)
    reached: NDArray[np.bool_] = np.asarray(mass * mass - transfer <= 0)
    event = Event(reaction, two_body)
    with np.errstate(all="ignore"):
        for cut in setting.cuts:
            reached = reached & cut.accepts(cut.observable.values(event))
    return bool(reached.any())


def _example(reaction: Reaction, channel: str) -> str:
    """A cut that closes it, as a request would write it."""
    leg = reaction.outgoing[0 if channel == "t" else 1]
    if reaction.outgoing.count(leg) > 1:
        return f'{{ observable = "abs(cos_theta(each({leg}), frame=cm))", max = {ENOUGH} }}'
    return f'{{ observable = "cos_theta({leg}, frame=cm)", max = {ENOUGH} }}'
