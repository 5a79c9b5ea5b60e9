"""What every scan offers: points of its grid, and arrays of totals, parts and derived quantities."""

from __future__ import annotations

import pickle
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

import numpy as np
import pytest
from unit.made import prediction

from barnwright.documents import ByName, Curves, Derived, Part, Prediction, Scanned, Total


@dataclass(frozen=True)
class Made(Scanned):
    """A scan made by hand that counts how often a prediction is made."""

    over: Mapping[str, tuple[Any, ...]]
    made: list[int]

    def __getitem__(self, index: Any) -> Any:
        """The prediction at a point: total 10 times its place, and parts of it."""
        if index >= len(self):
            raise IndexError(index)
        self.made.append(index)
        return at_place(index)


def at_place(place: int) -> Prediction:
    """A prediction whose numbers all tell its place; at place 1 the asymmetry is not known."""

    def derived(value: float) -> ByName[Derived]:
        known = None if place == 1 else value
        asymmetry = Derived.build(name="A_FB", value=known, error=known, error_kind="numerical_bound")
        ends = {"low": 9.0 * place, "high": 11.0 * place}
        envelope = Derived.build(name="scale", value=10.0, error=0.0, unit="pb", error_kind="numerical_bound", **ends)
        return ByName([asymmetry, envelope])

    def part(name: str, share: float) -> Part:
        total = Total.build(value=share * place, error=0.5, unit="pb", error_kind="numerical_bound")
        return Part.build(name=name, total=total, derived=derived(share))

    total = Total.build(value=10.0 * place, error=1.0 * place, unit="pb", error_kind="numerical_bound")
    return prediction(
        [1.0],
        total=total,
        derived=derived(0.1),
        contributions=ByName([part("photon", 6.0), part("z", 4.0)]),
        processes=ByName([part("one", 3.0)]),
        variations=ByName([part("up", 12.0)]),
    )


@pytest.fixture
def sweep() -> Made:
    """Two keys with two and three values."""
    return Made({"beams.sqrt_s": (10.0, 20.0), "parameters.n": (1, 2, 3)}, [])


def test_points_in_the_order_of_the_grid(sweep: Made) -> None:
    """The first key varies slowest."""
    assert (sweep.shape, len(sweep)) == ((2, 3), 6)
    assert sweep.points[1] == {"beams.sqrt_s": 10.0, "parameters.n": 2}
    assert sweep.points[3] == {"beams.sqrt_s": 20.0, "parameters.n": 1}


def test_arrays_of_parts_and_derived_quantities(sweep: Made) -> None:
    """Every quantity is an array shaped like the grid, by the names that a prediction has."""
    places = np.arange(6.0).reshape(2, 3)
    assert np.array_equal(sweep.curves.total.values, 10 * places)
    assert np.array_equal(sweep.curves.total.errors, places)
    assert sweep.contributions.names == ("photon", "z")
    assert np.array_equal(sweep.contributions["z"].values, 4 * places)
    assert np.array_equal(sweep.processes["one"].errors, np.full((2, 3), 0.5))
    assert np.array_equal(sweep.variations["up"].values, 12 * places)
    assert (sweep.variations["up"].unit, sweep.derived["A_FB"].unit) == ("pb", "")


def test_what_is_not_known_is_nan(sweep: Made) -> None:
    """An asymmetry that has no value at one point is NaN there, and known at the others."""
    values = sweep.derived["A_FB"].values
    assert np.isnan(values).nonzero() == (np.array([0]), np.array([1]))
    assert sweep.contributions["z"].derived["A_FB"].values[1, 2] == 4.0


def test_envelopes_have_their_ends(sweep: Made) -> None:
    """The lowest and the highest values are arrays as well; what is no envelope has none."""
    places = np.arange(6.0).reshape(2, 3)
    scale = sweep.derived["scale"]
    assert np.array_equal(scale.low, 9 * places)
    assert np.array_equal(scale.high, 11 * places)
    assert sweep.derived["A_FB"].low is sweep.derived["A_FB"].high is None


def test_predictions_are_made_once_and_arrays_are_safe(sweep: Made) -> None:
    """All arrays are made together when the first is asked for, and cannot be changed."""
    assert sweep.derived["A_FB"] is sweep.derived["A_FB"]
    assert sweep.made == list(range(6))
    with pytest.raises(ValueError, match="read-only"):
        sweep.variations["up"].values[0, 0] = 1.0


def test_no_prediction_has_no_curves() -> None:
    """A scan has one point at least."""
    with pytest.raises(ValueError, match="a scan has at least one point"):
        Curves.of([], (0,))


def test_an_unpickled_prediction_can_be_drawn() -> None:
    """Whoever has a prediction from another process can draw it."""
    again = pickle.loads(pickle.dumps(at_place(1)))  # noqa: S301, our own bytes
    assert again.plot().axes[0].get_title() == "angle"
