"""From natural units to the SI, from the defining constants of the SI (SI Brochure, 9th edition, 2019).

They are written out because importing `scipy.constants`, which holds the same numbers, takes a third of a second.
"""

from __future__ import annotations

from math import pi

_PLANCK = 6.62607015e-34  # h, J s, exact
_CHARGE = 1.602176634e-19  # e, C, exact
_LIGHT = 299792458.0  # c, m/s, exact

#: ħ in GeV s: a width of 1 GeV is a lifetime of `HBAR` seconds.
HBAR = _PLANCK / (2 * pi) / (_CHARGE * 1e9)

#: (ħc)² in GeV² b: a cross section of 1 GeV⁻² is `HBARC2` barns.
HBARC2 = (HBAR * _LIGHT) ** 2 * 1e28
