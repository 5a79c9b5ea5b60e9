"""qed/muon-pair: e- e+ -> mu- mu+."""

from __future__ import annotations

from barnwright_qed.pairs import pair

process = pair("muon-pair", "mu", "muon", crossing=("qed/electron-muon",))
