"""The language of formulas: invariants, four-products, declared parameters, elementary functions."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
from numpy.typing import NDArray

from barnwright.grammar import Language, Signature

Array = NDArray[np.float64]
MANY = 100

INVARIANTS = ("s", "t", "u")
OF_LEGS = {
    "dot": Signature("leg", 2, 2),
    "invariant_mass": Signature("leg", 1, MANY),
    "rest_mass": Signature("leg"),
}
ELEMENTARY: dict[str, Callable[[Array], Array]] = {
    "abs": np.abs,
    "sqrt": np.sqrt,
    "exp": np.exp,
    "log": np.log,
    "sin": np.sin,
    "cos": np.cos,
    "tan": np.tan,
    "asin": np.arcsin,
    "acos": np.arccos,
    "atan": np.arctan,
    "sinh": np.sinh,
    "cosh": np.cosh,
    "tanh": np.tanh,
}
LANGUAGE = Language(functions={**OF_LEGS, **dict.fromkeys(ELEMENTARY, Signature("expression"))})
RESERVED = (*INVARIANTS, "pi", *OF_LEGS, *ELEMENTARY)
