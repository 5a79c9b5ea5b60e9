"""Values of a tree: one body per row of the table, with numpy, on arrays of any shape that broadcasts."""

from __future__ import annotations

from collections.abc import Callable
from functools import partial
from itertools import combinations

import numpy as np
from numpy.typing import NDArray

from barnwright.event import Event
from barnwright.kinematics import CM, LAB, FourVector, Frame
from barnwright.observables.scales import SCALES
from barnwright.observables.tree import Constant, Leading, Leaf, Tree

Array = NDArray[np.float64]

_KEYS = {-1: "beam_a", -2: "beam_b"}


def evaluate(tree: Tree, event: Event) -> Array:
    """The values of a tree whose legs are codes or `Leading`; infinite and undefined ones are left to the caller."""
    if isinstance(tree, Constant):
        return np.asarray(tree.value)
    if isinstance(tree, Leaf):
        return _leaf(tree, event)
    return _OPERATIONS[tree.function](*[evaluate(operand, event) for operand in tree.operands])


def _leaf(leaf: Leaf, event: Event) -> Array:
    for place, leg in enumerate(leaf.legs):
        if isinstance(leg, Leading):
            return _of_leading(leaf, place, leg, event)
    return _ROWS[leaf.function](leaf, event)


def _of_leading(leaf: Leaf, place: int, leading: Leading, event: Event) -> Array:
    """The leaf for whichever particle is the leading one, event by event."""
    order = [evaluate(Leaf(leading.by, (code,), LAB), event) for code in leading.codes]
    ranked = np.argsort(-np.stack(np.broadcast_arrays(*order)), axis=0, kind="stable")[leading.rank - 1]
    found = []
    for code in leading.codes:
        legs = (*leaf.legs[:place], code, *leaf.legs[place + 1 :])
        found.append(_leaf(Leaf(leaf.function, legs, leaf.frame, leaf.of), event))
    stacked = np.stack(np.broadcast_arrays(*found, ranked)[:-1])
    return np.asarray(np.take_along_axis(stacked, np.broadcast_to(ranked, stacked.shape[1:])[None], axis=0)[0])


def _vectors(leaf: Leaf, event: Event) -> list[FourVector]:
    return [event.vector(_code(leg), leaf.frame or LAB) for leg in leaf.legs]


def _code(leg: object) -> int:
    assert isinstance(leg, int)
    return leg


def _key(leg: object) -> str | int:
    code = _code(leg)
    return _KEYS.get(code, code)


def _single(name: str) -> Callable[[Leaf, Event], Array]:
    def of_one(leaf: Leaf, event: Event) -> Array:
        return np.asarray(getattr(event.vector(_code(leaf.legs[0]), leaf.frame or LAB), name))

    return of_one


def _mass(leaf: Leaf, event: Event) -> Array:
    """√(Σm² + 2Σ p·q), from four-products that do not cancel; √s itself for all outgoing particles."""
    keys = [_key(leg) for leg in leaf.legs]
    if len(keys) == 1:
        return np.asarray(event.mass(keys[0]))
    if len(set(keys)) == len(event.reaction.outgoing) and all(_code(leg) > 0 for leg in leaf.legs):
        return event.sqrt_s
    square: Array = np.asarray(sum(event.mass(key) ** 2 for key in keys))
    for first, second in combinations(keys, 2):
        square = square + 2 * event.dot(first, second)
    return np.sqrt(np.maximum(square, 0.0))


def _recoil_mass(leaf: Leaf, event: Event) -> Array:
    """The mass of all the other outgoing particles: what is missing to the collision's momentum."""
    others = tuple(code for code in range(1, len(event.reaction.outgoing) + 1) if code not in leaf.legs)
    return _mass(Leaf("mass", others), event) if others else np.asarray(0.0)


def _transfer(leaf: Leaf, event: Event) -> Array:
    return event.transfer(_key(leaf.legs[0]), _key(leaf.legs[1]))


def _angle_parts(first: FourVector, second: FourVector) -> tuple[Array, Array]:
    """|a × b| and a · b."""
    cross = (
        first.py * second.pz - first.pz * second.py,
        first.pz * second.px - first.px * second.pz,
        first.px * second.py - first.py * second.px,
    )
    product = first.px * second.px + first.py * second.py + first.pz * second.pz
    return np.sqrt(sum(np.square(c) for c in cross)), product


def _angle(leaf: Leaf, event: Event) -> Array:
    return np.arctan2(*_angle_parts(*_vectors(leaf, event)))


def _acollinearity(leaf: Leaf, event: Event) -> Array:
    cross, product = _angle_parts(*_vectors(leaf, event))
    return np.arctan2(cross, -product)


def _delta_phi(leaf: Leaf, event: Event) -> Array:
    """In (−π, π]; two bodies are back to back across a beam along z, whatever rounding says."""
    along_z = leaf.frame == CM or (leaf.frame == LAB and not event.kinematics.turns)
    if len(event.reaction.outgoing) == 2 and along_z:
        return np.full(event.shape, np.pi)
    first, second = _vectors(leaf, event)
    difference = np.asarray(first.phi - second.phi)
    wrapped = np.where(difference > np.pi, difference - 2 * np.pi, difference)
    return np.where(wrapped <= -np.pi, wrapped + 2 * np.pi, wrapped)


def _acoplanarity(leaf: Leaf, event: Event) -> Array:
    return np.pi - np.abs(_delta_phi(leaf, event))


def _difference(name: str) -> Callable[[Leaf, Event], Array]:
    def of_two(leaf: Leaf, event: Event) -> Array:
        first, second = _vectors(leaf, event)
        return np.asarray(getattr(first, name) - getattr(second, name))

    return of_two


def _delta_r(leaf: Leaf, event: Event) -> Array:
    return np.hypot(_difference("pseudorapidity")(leaf, event), _delta_phi(leaf, event))


def _energy_fraction(leaf: Leaf, event: Event) -> Array:
    return np.asarray(2 * event.vector(_code(leaf.legs[0]), leaf.frame or CM).energy / event.sqrt_s)


def _helicity_angle(leaf: Leaf, event: Event) -> Array:
    """Between x in the rest frame of the system, axes of the cm, and the flight of the system in the cm."""
    system = event.vector(leaf.of[0], CM)
    for code in leaf.of[1:]:
        system = system + event.vector(code, CM)
    inside = event.vector(_code(leaf.legs[0]), Frame("rest", leaf.of))
    return np.arctan2(*_angle_parts(inside, system))


def _thrust(leaf: Leaf, event: Event) -> Array:
    """Brandt and others, Phys. Lett. 12 (1964) 57: twice the largest |Σp| of any subset over Σ|p|, from memory."""
    del leaf
    codes = range(1, len(event.reaction.outgoing) + 1)
    if len(codes) == 2:
        return np.ones(event.shape)
    vectors = [event.vector(code, CM) for code in codes]
    best: Array = np.asarray(0.0)
    for size in range(1, len(vectors) // 2 + 1):
        for chosen in combinations(vectors, size):
            parts = [sum(getattr(v, name) for v in chosen) for name in ("px", "py", "pz")]
            best = np.maximum(best, np.sqrt(sum(np.square(p) for p in parts)))
    return np.asarray(2 * best / sum(v.momentum for v in vectors))


def _scale(size: float, leaf: Leaf, event: Event) -> Array:
    del leaf, event
    return np.asarray(size)


_ROWS: dict[str, Callable[[Leaf, Event], Array]] = {
    **{
        name: _single(name)
        for name in ("energy", "kinetic_energy", "momentum", "pt", "theta", "cos_theta", "phi", "rapidity")
    },
    "pseudorapidity": _single("pseudorapidity"),
    "energy_fraction": _energy_fraction,
    "mass": _mass,
    "recoil_mass": _recoil_mass,
    "transfer": _transfer,
    "q2": lambda leaf, event: -_transfer(leaf, event),
    "angle": _angle,
    "acollinearity": _acollinearity,
    "delta_phi": _delta_phi,
    "acoplanarity": _acoplanarity,
    "delta_eta": _difference("pseudorapidity"),
    "delta_rapidity": _difference("rapidity"),
    "delta_r": _delta_r,
    "helicity_angle": _helicity_angle,
    "sqrt_s": lambda _, event: event.sqrt_s,
    "thrust": _thrust,
    **{name: partial(_scale, size) for name, (_, size) in SCALES.items()},
}

_OPERATIONS: dict[str, Callable[..., Array]] = {
    "+": np.add,
    "-": np.subtract,
    "*": np.multiply,
    "/": np.divide,
    "**": np.power,
    "negative": np.negative,
    "abs": np.abs,
    "sqrt": np.sqrt,
    "min": lambda *values: _reduced(np.minimum, values),
    "max": lambda *values: _reduced(np.maximum, values),
}


def _reduced(function: np.ufunc, values: tuple[Array, ...]) -> Array:
    found = values[0]
    for value in values[1:]:
        found = function(found, value)
    return found
