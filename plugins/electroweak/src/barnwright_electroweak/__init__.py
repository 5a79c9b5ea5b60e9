"""The electroweak interaction at lowest order: photon, Z, W and Higgs, beams polarised."""
