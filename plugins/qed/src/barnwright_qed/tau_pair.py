"""qed/tau-pair: e- e+ -> tau- tau+."""

from __future__ import annotations

from barnwright_qed.pairs import pair

process = pair("tau-pair", "tau", "tau")
