"""Helicity amplitudes: spinors, polarisation vectors, currents, propagators, electroweak couplings, colour.

    from barnwright.amplitudes import current, dot, external_states, helicity_rows

Arrays have their components first, (4, …), then whatever the batch has; an amplitude of a law is (helicity, flow,
…event). GeV, metric (+, −, −, −), contravariant components, chiral representation. Phases, in `spinors` and
`polarisations`: states of +z turned about the axis (−sin φ, cos φ, 0); spin along +z at rest. Broadcasting only: no
linear algebra library is called in the loop over events, so an answer does not depend on the machine's threads.
"""

from __future__ import annotations

from barnwright.amplitudes.colour import GENERATORS, SINGLET, colour_matrix, quark_line
from barnwright.amplitudes.currents import current, pseudoscalar_current, scalar_current
from barnwright.amplitudes.dirac import GAMMA, GAMMA5, P_LEFT, P_RIGHT, apply_slash, dot, slash
from barnwright.amplitudes.electroweak import (
    electric_charge,
    from_vector_axial,
    higgs_coupling,
    photon_coupling,
    vacuum_value,
    w_coupling,
    weak_isospin,
    z_coupling,
)
from barnwright.amplitudes.polarisations import polarisation_vector
from barnwright.amplitudes.propagators import (
    WIDTH_SCHEMES,
    WidthScheme,
    complex_pole,
    converted_width,
    propagator,
    vector_exchange,
)
from barnwright.amplitudes.spinors import adjoint, spinor_u, spinor_v
from barnwright.amplitudes.states import external_states, helicity_rows
from barnwright.amplitudes.vertices import three_vector_vertex

__all__ = [
    "GAMMA",
    "GAMMA5",
    "GENERATORS",
    "P_LEFT",
    "P_RIGHT",
    "SINGLET",
    "WIDTH_SCHEMES",
    "WidthScheme",
    "adjoint",
    "apply_slash",
    "colour_matrix",
    "complex_pole",
    "converted_width",
    "current",
    "dot",
    "electric_charge",
    "external_states",
    "from_vector_axial",
    "helicity_rows",
    "higgs_coupling",
    "photon_coupling",
    "polarisation_vector",
    "propagator",
    "pseudoscalar_current",
    "quark_line",
    "scalar_current",
    "slash",
    "spinor_u",
    "spinor_v",
    "three_vector_vertex",
    "vacuum_value",
    "vector_exchange",
    "w_coupling",
    "weak_isospin",
    "z_coupling",
]
