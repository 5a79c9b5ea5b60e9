"""The channels of a reaction, from its declared peaks; the rules stand in `docs/channels.md`."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import islice, zip_longest

from barnwright.peaks import Peak
from barnwright.phase_space.channel import Channel
from barnwright.phase_space.demands import Scene, demands_of
from barnwright.phase_space.families import families_of
from barnwright.phase_space.flat import flat_channel
from barnwright.phase_space.limits import Limits
from barnwright.phase_space.parts import Part, Splitting
from barnwright.phase_space.trees import Grower, Tree
from barnwright.reaction import Reaction

MANY = 16
"""The most channels; those that serve a peak that no earlier one serves come first."""


def channels_of(
    reaction: Reaction,
    masses: Sequence[float],
    peaks: Sequence[Peak] = (),
    limits: Limits | None = None,
    running: bool = True,
) -> tuple[Channel, ...]:
    """The channels of a reaction, the flat one first; at most 16.

    Parameters
    ----------
    reaction : Reaction
        With one or two incoming and two to eight outgoing legs.
    masses : floats, GeV
        Of the incoming legs, then of the outgoing ones.
    peaks : Peak
        Masses and widths as numbers in GeV, or a mass as the name of a leg: names of parameters are resolved before.
    limits : Limits
        What the cuts say in the centre of mass.
    running : bool
        Whether masses and widths of resonances are those of the running-width form.

    Raises
    ------
    LookupError
        For a leg that the reaction lacks; it names the candidates.
    ValueError
        For a resonance without a width, or a peak whose legs do not fit its shape.
    """
    count, bounds = len(reaction.incoming), Limits() if limits is None else limits
    scene = Scene(reaction, tuple(masses[:count]), tuple(masses[count:]), bounds, running)
    demands = demands_of(peaks, scene)
    grown = [list(islice(Grower(f, demands, scene).trees(), MANY)) for f in families_of(demands)] if demands else []
    flat = flat_channel(scene.incoming, scene.outgoing, bounds)
    in_turn = dict.fromkeys(tree for trees in zip_longest(*grown) for tree in trees if tree is not None)
    in_turn.pop(flat.splittings, None)
    named = [Channel(name_of(tree, reaction), scene.incoming, scene.outgoing, tree) for tree in in_turn]
    return (flat, *named)[:MANY]


_WAYS = {
    ("uniform", "flight"): "",
    ("soft", "flight"): "soft",
    ("transfer", "a"): "along a",
    ("transfer", "b"): "along b",
    ("two_sided", "flight"): "along a or b",
}


def name_of(tree: Tree, reaction: Reaction) -> str:
    """A tree as a person reads it: ``(gamma[along a] (mu- mu+)[resonance])``; maps that favour nothing go unnamed."""
    splittings = {splitting.mother: splitting for splitting in tree}

    def written(part: Part, angle: str) -> str:
        maps: list[str] = [part.map.shape] if part.map and part.map.shape != "volume" else []
        maps += [angle] if angle else []
        text = _leg(part.legs[0], reaction) if part.single else inside(splittings[part.legs])
        return f"{text}[{', '.join(maps)}]" if maps else text

    def inside(splitting: Splitting) -> str:
        way = _WAYS[splitting.angle.shape, splitting.angle.axis]
        return f"({written(splitting.first, way)} {written(splitting.second, '')})"

    return inside(tree[0])


def _leg(leg: int, reaction: Reaction) -> str:
    """A particle's name; of identical ones with its place among them."""
    name = reaction.name_of(leg)
    alike = next((group for group in reaction.identical_groups if leg in group), (leg,))
    return name if len(alike) == 1 else f"{name}.{alike.index(leg) + 1}"
