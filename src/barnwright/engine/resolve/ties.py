"""Selections among identical particles that kinematics leaves undecided."""

from __future__ import annotations

from barnwright.beams import collide
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.setting import Layout, Setting
from barnwright.observables import tied_selections


def check_ties(layout: Layout, settings: tuple[Setting, ...], findings: Findings) -> None:
    """Refuse leading(x, by="energy") where the lab is the cm: two identical bodies share their energy there exactly."""
    nominal = settings[0]
    if not collide(nominal.beams, nominal.masses[:2]).lab_is_cm:
        return
    asked = [(f"cuts[{k}].observable", cut.observable) for k, cut in enumerate(nominal.cuts)]
    asked += [(f"histograms[{k}].observables", o) for k, h in enumerate(layout.histograms) for o in h.observables]
    asked += [(f"derived.{a.name}.observable", a.observable) for a in layout.asymmetries]
    for where, observable in asked:
        if tied_selections(observable):
            expected = "each(...), any(...), min(...) or max(...): in the cm both particles have the same energy"
            findings.add(where, observable.text, expected)
