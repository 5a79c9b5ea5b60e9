"""Quantum electrodynamics at lowest order: lepton pairs and Compton scattering, masses exact."""
