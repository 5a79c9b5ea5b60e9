"""Scattering on nucleons: elastic electron-proton scattering, the proton point-like or with form factors."""
