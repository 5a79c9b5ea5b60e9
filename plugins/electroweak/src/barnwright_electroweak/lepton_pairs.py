"""electroweak/muon-pair, tau-pair and neutrino-pair: e- e+ into heavier leptons and muon neutrinos."""

from __future__ import annotations

from barnwright_electroweak import cautions, inputs
from barnwright_electroweak.exchange import Fermion
from barnwright_electroweak.pair_process import Kind, pair

CHARGED, NEUTRINO = Fermion(-1.0, -0.5), Fermion(0.0, 0.5)
UNSEEN = "Neutrinos are not seen: an experiment counts a radiated photon, which is another process."
ELECTRON_NEUTRINOS = "Pairs of electron neutrinos have the exchange of a W besides; muon and tau neutrinos are alike."


class NeutrinoInputs(inputs.ElectroweakInputs):
    """The Z alone: the scheme `alpha` makes its coupling of alpha, the others do not read it."""

    scheme: inputs.Scheme = inputs.scheme("alpha", photons=False)
    alpha: inputs.Positive = inputs.alpha({"scheme": ("alpha",)})


muon_pair = pair("muon-pair", Kind("mu-", "mu+", "muon", CHARGED, 10.0), {}, (cautions.POLARISED_LEGS,))
tau_pair = pair("tau-pair", Kind("tau-", "tau+", "tau", CHARGED, 10.0), {}, (cautions.POLARISED_LEGS,))
neutrino_pair = pair(
    "neutrino-pair",
    Kind("nu(mu)", "nu(mu)~", "muon neutrino", NEUTRINO, 0.0),
    {"nu(mu)": 0.0},
    (UNSEEN, ELECTRON_NEUTRINOS),
    parameters=NeutrinoInputs,
)
