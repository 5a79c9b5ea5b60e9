"""The values of a scan as typed on the command line."""

from __future__ import annotations

import pytest

from barnwright.cli.over import parse_over, parse_values
from barnwright.errors import RequestError


def test_linear_steps_hold_both_ends() -> None:
    """low:high:count gives so many values, equally spaced, both ends included exactly."""
    values = parse_values("20:200:181")
    assert len(values) == 181
    assert values[0] == 20.0
    assert values[-1] == 200.0
    assert values[1] == 21.0


def test_logarithmic_steps_have_equal_ratios() -> None:
    """log:low:high:count multiplies from one value to the next."""
    assert parse_values("log:1:1000:4") == pytest.approx([1.0, 10.0, 100.0, 1000.0], rel=1e-14)


@pytest.mark.parametrize(
    ("text", "values"),
    [
        ("10,20,30", [10, 20, 30]),
        ("0.5", [0.5]),
        ('"running", "fixed"', ["running", "fixed"]),
        ("true,false", [True, False]),
    ],
)
def test_list_of_toml_values(text: str, values: list[object]) -> None:
    """A list holds TOML values: numbers, truth values, words in quotes."""
    assert parse_values(text) == values


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        ("1:2", "low:high:count with two numbers and a whole number"),
        ("1:2:3.5", "low:high:count with two numbers and a whole number"),
        ("1:2:1", "a count from 2 to 1000000"),
        ("1:2:0", "a count from 2 to 1000000"),
        ("1:2:2000000", "a count from 2 to 1000000"),
        ("log:0:2:3", "low and high greater than 0 for logarithmic steps"),
        ("nan:2:3", "finite numbers"),
        ("running,fixed", r"low:high:count, log:low:high:count, or a list such as 10,20,30 \(words in quotes\)"),
        ("1]\nother=[2", "low:high:count, log:low:high:count, or a list such as 10,20,30"),
    ],
)
def test_wrong_values_say_what_was_expected(text: str, expected: str) -> None:
    """A text that gives no values is refused with the form that was expected."""
    with pytest.raises(ValueError, match=expected):
        parse_values(text)


def test_several_axes_keep_their_order() -> None:
    """Several --over become the axes of a grid in the order they were given."""
    axes = parse_over(["beams.sqrt_s=10,20", "parameters.alpha=0.1:0.2:3"])
    assert list(axes) == ["beams.sqrt_s", "parameters.alpha"]


def test_every_wrong_axis_is_named_at_once() -> None:
    """All findings come in one error, each with the field it is about."""
    with pytest.raises(RequestError, match=r"over\[0\]: got 'beams.sqrt_s', expected KEY=VALUES") as caught:
        parse_over(["beams.sqrt_s", "a=1:2", "b=1", "b=2"])
    assert [violation.field for violation in caught.value.violations] == ["over[0]", "over[1]", "over[3]"]
