"""electroweak/up-pair, down-pair, strange-pair, charm-pair and bottom-pair: e- e+ into quarks of one flavour."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from barnwright.plugin import Process
from barnwright_electroweak import cautions, inputs
from barnwright_electroweak.exchange import Fermion
from barnwright_electroweak.pair_process import Kind, pair

UP_TYPE, DOWN_TYPE = Fermion(2 / 3, 0.5, 3), Fermion(-1 / 3, -0.5, 3)
LOWEST = 12.0
"""Above the Υ resonances, GeV."""
JETS = "Quarks are seen as jets, and hadrons blur their direction; a request with several `processes` adds flavours."


class CharmInputs(inputs.ElectroweakInputs):
    """Photon and Z, and the charm quark's mass."""

    charm_mass: inputs.NotNegative = inputs.charm_mass()


class BottomInputs(inputs.ElectroweakInputs):
    """Photon and Z, and the bottom quark's mass."""

    bottom_mass: inputs.NotNegative = inputs.bottom_mass()


def _light(word: str, quark: str, fermion: Fermion) -> Process:
    return _quarks(word, quark, fermion, {quark: 0.0}, (cautions.GLUONS, JETS))


def _heavy(word: str, quark: str, fermion: Fermion, parameters: type[inputs.ElectroweakInputs]) -> Process:
    notes = (cautions.GLUONS, cautions.QUARK_MASS, JETS)
    return _quarks(word, quark, fermion, {quark: f"{word}_mass"}, notes, parameters=parameters)


def _quarks(
    word: str, quark: str, fermion: Fermion, masses: Mapping[str, float | str], notes: tuple[str, ...], **more: Any
) -> Process:
    kind = Kind(quark, f"{quark}~", f"{word} quark", fermion, LOWEST)
    return pair(f"{word}-pair", kind, masses, notes, **more)


up_pair = _light("up", "u", UP_TYPE)
down_pair = _light("down", "d", DOWN_TYPE)
strange_pair = _light("strange", "s", DOWN_TYPE)
charm_pair = _heavy("charm", "c", UP_TYPE, CharmInputs)
bottom_pair = _heavy("bottom", "b", DOWN_TYPE, BottomInputs)
