"""Quantum electrodynamics at lowest order: two-body scattering, annihilation and pairs, masses exact."""
