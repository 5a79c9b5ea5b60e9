"""Filled histograms: contents, covariance, and the way to the package hist."""

from __future__ import annotations

import builtins
from typing import Any

import numpy as np
import pytest

from barnwright.documents import ByName, Histogram, Prediction
from barnwright.errors import BarnwrightError, CalculationError

from .conftest import make_histogram, make_prediction


def _two_dimensional(**changes: Any) -> Histogram:
    edges = (np.array([0.0, 1.0, 3.0]), np.array([0.0, 0.5, 1.0, 2.0]))
    values = np.arange(6.0).reshape(2, 3)
    return make_histogram(edges=edges, observables=("x", "y"), values=values, errors=values / 10, **changes)


def test_arrays_are_read_only() -> None:
    """A histogram cannot be changed by accident, and the arrays it was made from stay writeable."""
    values = np.ones(4)
    histogram = make_histogram(values=values)
    with pytest.raises(ValueError, match="assignment destination is read-only"):
        histogram.values[0] = 2.0
    values[0] = 2.0


def test_one_axis_is_an_array() -> None:
    """Python has the array of the one axis, or a tuple of two; JSON a list of axes."""
    one, two = make_histogram(), _two_dimensional()
    assert isinstance(one.edges, np.ndarray)
    assert [axis.shape for axis in two.edges] == [(3,), (4,)]
    assert Histogram.model_validate_json(two.model_dump_json()) == two
    assert Histogram.model_validate(one.model_dump()) == one


def test_contents() -> None:
    """Densities times the size of the bin; solid angles are handed over by who knows them."""
    assert make_histogram().contents.tolist() == [2.0, 1.0, 1.0, 2.0]
    assert make_histogram(per="bin").contents.tolist() == [4.0, 2.0, 2.0, 4.0]
    assert _two_dimensional().contents.tolist() == [[0.0, 0.5, 2.0], [3.0, 4.0, 10.0]]
    solid = make_histogram(per="solid_angle", solid_angles=np.full(4, np.pi))
    assert solid.contents == pytest.approx(np.pi * solid.values)
    assert np.isnan(make_histogram().content_errors[2])
    with pytest.raises(CalculationError, match=r"^histogram 'angle' does not say the solid angles of its bins$"):
        make_histogram(per="solid_angle").contents  # noqa: B018


def test_covariance_of_replicates(prediction: Prediction) -> None:
    """The covariance of the mean of the replicates, of densities, with its rank."""
    covariance = prediction.histograms["angle"].covariance()
    assert prediction.replicates is not None
    densities = prediction.replicates[:, 1:5] / 0.5
    assert np.asarray(covariance) == pytest.approx(np.cov(densities.T) / 16)
    assert covariance.rank == 4
    again = Prediction.from_json(prediction.model_dump_json())
    assert np.array_equal(again.histograms["angle"].covariance().matrix, covariance.matrix)


def test_rank_is_below_the_number_of_replicates(prediction: Prediction) -> None:
    """Three replicates give rank two, however many bins there are."""
    replicates = np.random.default_rng(1).random((3, 9))
    few = make_prediction(prediction.request, replicates=replicates)
    covariance = few.histograms[0].covariance()
    assert covariance.rank == 2 == np.linalg.matrix_rank(covariance.matrix)


def test_second_histogram_has_its_own_replicates(prediction: Prediction) -> None:
    """Columns: the total, then bins, underflow and overflow of each histogram in turn."""
    replicates = np.random.default_rng(1).random((16, 13))
    histograms = ByName([make_histogram(), make_histogram(name="other", per="bin")])
    two = make_prediction(prediction.request, histograms=histograms, replicates=replicates)
    assert np.asarray(two.histograms["other"].covariance()) == pytest.approx(np.cov(replicates[:, 7:11].T) / 16)


@pytest.mark.parametrize(
    ("kind", "why"), [("numerical_bound", "its errors are numerical bounds"), ("statistical", "it")]
)
def test_no_covariance_without_replicates(kind: str, why: str) -> None:
    """The error says why there is none and what makes one."""
    message = (
        rf"^histogram 'angle' has no covariance: {why}.*; a covariance comes with replicates, which accuracy\.method"
    )
    with pytest.raises(CalculationError, match=message):
        make_histogram(error_kind=kind).covariance()


@pytest.mark.parametrize("made", [make_histogram(errors=np.ones(4)), _two_dimensional()], ids=["1-D", "2-D"])
def test_to_hist(made: Histogram) -> None:
    """Contents, variances and the flow arrive in the package hist, which sums them to the total."""
    filled = made.to_hist()
    assert filled.values() == pytest.approx(made.contents)
    assert filled.variances() == pytest.approx(made.content_errors**2)
    assert filled.sum(flow=True).value == pytest.approx(made.contents.sum() + 0.25)
    assert [axis.label for axis in filled.axes] == list(made.observables)


def test_to_hist_says_what_is_missing(monkeypatch: pytest.MonkeyPatch) -> None:
    """Without the package the message names it."""
    real = builtins.__import__

    def refuse(name: str, *rest: Any) -> Any:
        if name == "hist":
            raise ImportError(name)
        return real(name, *rest)

    monkeypatch.setattr(builtins, "__import__", refuse)
    with pytest.raises(BarnwrightError, match=r"^to_hist needs the package hist: pip install hist$"):
        make_histogram().to_hist()


def test_texts() -> None:
    """Name, shape and unit."""
    assert str(make_histogram()) == "<Histogram 'angle': 4 bins, pb>"
    assert repr(_two_dimensional()) == "<Histogram 'angle': 2 x 3 bins, pb>"
