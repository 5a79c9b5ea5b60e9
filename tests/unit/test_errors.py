"""Errors: one rendering, short values, near choices, and a way across processes."""

from __future__ import annotations

import pickle

import numpy as np
import pytest

from barnwright.errors import (
    BarnwrightError,
    CalculationError,
    PluginError,
    RequestError,
    ServerError,
    UnknownProcessError,
    Violation,
    nearest,
    show,
)

NEGATIVE = Violation("beams.sqrt_s", show(-3), "a number greater than 0 (GeV)")
TYPO = Violation("cuts[0].observable", show("cos_thta(mu-)"), "an observable", "cos_theta", 0)


def test_violation_is_one_line_with_field_value_and_expectation() -> None:
    """A violation names the field, the value and what was expected."""
    assert str(NEGATIVE) == "beams.sqrt_s: got -3, expected a number greater than 0 (GeV)"


def test_violation_gives_column_and_nearest_choice() -> None:
    """A violation in a text says where, counted from 1, and what may have been meant."""
    expected = "cuts[0].observable: got 'cos_thta(mu-)' (at column 1), expected an observable; nearest: cos_theta"
    assert str(TYPO) == expected


def test_request_error_tells_every_finding() -> None:
    """All findings are told at once, one line each, in the order given."""
    error = RequestError(iter([NEGATIVE, TYPO]))
    assert error.violations == (NEGATIVE, TYPO)
    assert str(error).splitlines() == [str(NEGATIVE), str(TYPO)]


@pytest.mark.parametrize(
    "error",
    [
        RequestError([NEGATIVE, TYPO]),
        UnknownProcessError([Violation("process", "'qed/comptn'", "an installed process", "qed/compton")]),
        PluginError("barnwright-qed", "qed/compton", "gave nan at s = 4 GeV^2"),
        CalculationError("block 3 was counted twice with different sums"),
        ServerError("the server is away; start one with barnwright serve", "UNAVAILABLE", 2.5),
        NEGATIVE,
    ],
    ids=lambda error: type(error).__name__,
)
def test_errors_cross_processes(error: BarnwrightError | Violation) -> None:
    """Errors keep type, text and facts through pickling, as they come back from workers."""
    back = pickle.loads(pickle.dumps(error))  # noqa: S301
    assert type(back) is type(error)
    assert str(back) == str(error)
    assert getattr(back, "__dict__", None) == getattr(error, "__dict__", None)


def test_unknown_process_is_a_request_error() -> None:
    """Whoever catches wrong requests catches unknown processes as well."""
    with pytest.raises(RequestError, match=r"^process: got 'a/b', expected an installed process$"):
        raise UnknownProcessError([Violation("process", "'a/b'", "an installed process")])


@pytest.mark.parametrize(
    ("error", "text"),
    [
        (
            PluginError("barnwright-qed", "qed/compton", "gave nan"),
            "plugin barnwright-qed, process qed/compton: gave nan",
        ),
        (PluginError("", "formula", "gave nan"), "process formula: gave nan"),
        (PluginError("stranger", "", "no module named x"), "plugin stranger: no module named x"),
        (PluginError("", "", "gave nan"), "gave nan"),
    ],
)
def test_plugin_error_names_the_culprit(error: PluginError, text: str) -> None:
    """The message names plugin and process, as far as there are any."""
    assert str(error) == text


def test_server_error_keeps_code_and_wait() -> None:
    """A client can tell the status and when to come back."""
    error = ServerError("busy", "RESOURCE_EXHAUSTED", 3.0)
    assert (str(error), error.code, error.retry_after) == ("busy", "RESOURCE_EXHAUSTED", 3.0)


@pytest.mark.parametrize(
    ("value", "text"),
    [
        (-3, "-3"),
        (1e-7, "1e-07"),
        ("mu-", "'mu-'"),
        ("two\nlines", r"'two\nlines'"),
        (None, "None"),
        (np.float64(1.5), "1.5"),
        ([1, 2], "[1, 2]"),
        ("a" * 500, "'" + "a" * 78 + "…"),
        (10**30, "1" + "0" * 30),
    ],
)
def test_show_is_what_a_person_reads(value: object, text: str) -> None:
    """Values are shown like their repr; numpy numbers as numbers."""
    assert show(value) == text


@pytest.mark.parametrize(
    "value",
    ["x" * 10**6, list(range(10**6)), {"a": [[[[[[1]]]]]] * 50}, 10**20_000, -(10**20_000), np.zeros((40, 40))],
    ids=["text", "list", "nest", "large", "negative", "array"],
)
def test_show_is_short_whatever_comes(value: object) -> None:
    """Even hostile values are shown on one line of at most 80 characters."""
    shown = show(value)
    assert len(shown) <= 80
    assert "\n" not in shown


def test_nearest_ignores_case_and_gives_up_on_strangers() -> None:
    """The nearest choice is found whatever its case; a word that is like none of them has none."""
    choices = ("cos_theta", "Compton", "pt")
    assert nearest("COS_THTA", choices) == "cos_theta"
    assert nearest("compton", choices) == "Compton"
    assert nearest("zzzz", choices) is None
    assert nearest("pt", ()) is None
    assert nearest("c" * 10**6, choices) is None
