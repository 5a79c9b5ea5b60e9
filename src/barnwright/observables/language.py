"""The language of observables: the rows of the table, and arithmetic."""

from __future__ import annotations

from barnwright.grammar import Language, Signature
from barnwright.observables.rows import ROWS, Row
from barnwright.observables.scales import SCALES

SELECTIONS = ("leading", "each", "any")
ARITHMETIC = ("abs", "sqrt", "min", "max")
MANY = 100


def _signature(row: Row) -> Signature:
    match row.shape:
        case "one":
            return Signature("selection", 1, 1, {"frame": "frame"})
        case "pair":
            return Signature("selection", 2, 2, {"frame": "frame"})
        case "several":
            return Signature("selection", 1, MANY)
        case "transfer":
            return Signature("selection", 2, 2)
        case _:
            return Signature("selection", 1, 1, {"of": "legs"})


LANGUAGE = Language(
    functions={
        **{name: _signature(row) for name, row in ROWS.items() if row.shape != "none"},
        "abs": Signature("expression"),
        "sqrt": Signature("expression"),
        "min": Signature("expression", 1, MANY),
        "max": Signature("expression", 1, MANY),
    },
    names=frozenset({*(name for name, row in ROWS.items() if row.shape == "none"), *SCALES, "pi"}),
    selections=frozenset(SELECTIONS),
)
