"""Resonances at lowest order: lineshapes in e- e+ annihilation, and the Delta in pion-proton scattering."""
