"""Observables without a value for the kinematics of a request: ties among identical particles, massless rest frames."""

from __future__ import annotations

import numpy as np

from barnwright.beams import collide
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.resolve.questions import asked_observables
from barnwright.engine.setting import Layout, Setting
from barnwright.observables import Observable, tied_selections
from barnwright.observables.tree import leaves
from barnwright.reaction import Reaction


def check_kinematics(reaction: Reaction, layout: Layout, settings: tuple[Setting, ...], findings: Findings) -> None:
    """Refuse leading(x, by="energy") where the lab is the cm, and rest frames of what has no mass."""
    nominal = settings[0]
    collision = collide(nominal.beams, nominal.masses[:2])
    head_on = collision.crossed is None
    lab_is_cm = collision.lab_is_cm or (head_on and bool(np.all(collision.stretch == 1.0)))
    for where, observable in asked_observables(nominal.cuts, layout):
        if lab_is_cm and tied_selections(observable):
            expected = "each(...), any(...), min(...) or max(...): in the cm both particles have the same energy"
            findings.add(where, observable.text, expected)
        for setting in settings:
            code = _massless_rest_frame(observable, setting)
            if code is not None:
                name = reaction.name_of(code)
                expected = f"particles that can be at rest in frame=rest(…); {name} has no mass here"
                findings.add(where, observable.text, expected, "frame=cm")
                break


def _massless_rest_frame(observable: Observable, setting: Setting) -> int | None:
    """The leg alone at whose rest a frame is asked, when it has no mass."""
    for tree in observable.trees:
        for leaf in leaves(tree):
            if leaf.frame is not None and len(leaf.frame.legs) == 1 and setting.masses[1 + leaf.frame.legs[0]] == 0:
                return leaf.frame.legs[0]
    return None
