"""Observables: the table, what is made of a text, cuts and bins."""

from barnwright.observables.bins import edges_of
from barnwright.observables.compile import angle_in_degrees, compile_observable
from barnwright.observables.cuts import Cut
from barnwright.observables.errors import ObservableError
from barnwright.observables.observable import AxisForm, Observable, tied_selections
from barnwright.observables.rows import Row, table

__all__ = [
    "AxisForm",
    "Cut",
    "Observable",
    "ObservableError",
    "Row",
    "angle_in_degrees",
    "compile_observable",
    "edges_of",
    "table",
    "tied_selections",
]
