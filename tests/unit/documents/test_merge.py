"""Merging an override into a request."""

from __future__ import annotations

from typing import Any

import pytest

from barnwright.documents import merge, split_key
from barnwright.errors import RequestError

BASE: dict[str, Any] = {
    "beams": {"kind": "collider", "sqrt_s": 10.0, "polarisation": {"e-": 0.5, "e+": 0.1}},
    "masses": {"mu-": 0.1},
    "cuts": [{"observable": "x", "min": 0}, {"name": "b", "observable": "y", "max": 1}],
    "histograms": [{"name": "h", "observables": ["x"], "bins": [{"edges": [0, 1]}]}],
}


@pytest.mark.parametrize(
    ("key", "parts"),
    [
        ("beams.sqrt_s", ("beams", "sqrt_s")),
        ("cuts[0].max", ("cuts", 0, "max")),
        ("masses.mu-", ("masses", "mu-")),
        ('masses."mu-"', ("masses", "mu-")),
        ("beams.energies.nu(mu)~", ("beams", "energies", "nu(mu)~")),
        ("cuts.'a.b'.max", ("cuts", "a.b", "max")),
        ("a[1][2]", ("a", 1, 2)),
        ("unit", ("unit",)),
    ],
)
def test_split_key(key: str, parts: tuple[str | int, ...]) -> None:
    """Paths are written as the findings write them; a part with dots stands in quotes."""
    assert split_key(key) == parts


@pytest.mark.parametrize("key", ["", ".", "a..b", "a.", "a b", "cuts[x]", '"a'])
def test_no_path(key: str) -> None:
    """What is no path is refused with the place where it goes wrong."""
    with pytest.raises(RequestError, match=r"expected a path such as beams\.sqrt_s") as caught:
        split_key(key)
    assert caught.value.violations[0].position is not None


@pytest.mark.parametrize(
    ("override", "path", "value"),
    [
        ({"beams": {"sqrt_s": 20}}, ("beams", "sqrt_s"), 20),
        ({"beams.sqrt_s": 20}, ("beams", "sqrt_s"), 20),
        ({"beams.polarisation": {"e-": -1}}, ("beams", "polarisation"), {"e-": -1, "e+": 0.1}),
        ({"parameters.alpha": 1}, ("parameters",), {"alpha": 1}),
        ({"cuts.b.max": 2}, ("cuts", 1), {"name": "b", "observable": "y", "max": 2}),
        ({"cuts.cut-1.min": 2}, ("cuts", 0, "min"), 2),
        ({"cuts[0].min": 2}, ("cuts", 0, "min"), 2),
        ({"cuts": [{"name": "b", "max": 3}]}, ("cuts", 1, "max"), 3),
        ({"cuts": [{"name": "cut-1", "min": 3}]}, ("cuts", 0, "min"), 3),
        ({"cuts": [{"name": "c", "max": 3}]}, ("cuts", 2), {"name": "c", "max": 3}),
        ({"cuts": [{"max": 3}]}, ("cuts", 2), {"max": 3}),
        ({"histograms": [{"name": "h", "bins": [{"count": 3}]}]}, ("histograms", 0, "bins"), [{"count": 3}]),
        ({"histograms.h.bins[0].edges": [0, 2]}, ("histograms", 0, "bins", 0, "edges"), [0, 2]),
        ({"unit": "nb"}, ("unit",), "nb"),
    ],
)
def test_merge(override: dict[str, Any], path: tuple[str | int, ...], value: Any) -> None:
    """Tables key by key, named lists by name, everything else replaced; the base stays as it was."""
    before = repr(BASE)
    found: Any = merge(BASE, override)
    for part in path:
        found = found[part]
    assert found == value
    assert repr(BASE) == before


@pytest.mark.parametrize(
    ("override", "message"),
    [
        ({"cuts.bb.max": 1}, r"^cuts\.bb: got 1, expected an entry that exists \(cut-1, b\)"),
        ({"cuts[2].max": 1}, r"^cuts\[2\]: got 1, expected an entry that exists \(cut-1, b\)"),
        ({"beams[0]": 1}, r"^beams\[0\]: got 1, expected an entry that exists; beams is no list"),
    ],
)
def test_paths_that_lead_nowhere(override: dict[str, Any], message: str) -> None:
    """An entry that does not exist is a finding that lists those that do."""
    with pytest.raises(RequestError, match=message):
        merge(BASE, override)


def test_an_empty_list_leaves_none() -> None:
    """An empty list of cuts takes all of them away, instead of doing nothing."""
    request = {"cuts": [{"name": "a", "observable": "pt(mu-)", "min": 1.0}], "seed": 2}
    assert merge(request, {"cuts": []}) == {"cuts": [], "seed": 2}
