"""Sequences that are read by name and by position."""

from __future__ import annotations

import pytest
from pydantic import TypeAdapter, ValidationError

from barnwright.documents import ByName, Note
from barnwright.documents.description import ProcessSummary


def _summary(name: str) -> ProcessSummary:
    return ProcessSummary(name=name, plugin="qed", distribution="barnwright-qed", version="1")


ONE, TWO = _summary("qed/compton"), _summary("qed/muon-pair")


def test_reading() -> None:
    """By position, from the end, by name, by slice; in order."""
    both = ByName([ONE, TWO])
    assert (both[0], both[-1], both["qed/muon-pair"]) == (ONE, TWO, TWO)
    assert both[1:] == ByName([TWO]) != both
    assert list(both) == [ONE, TWO]
    assert both.names == ("qed/compton", "qed/muon-pair")
    assert (len(both), "qed/compton" in both, "x" in both, TWO in both) == (2, True, False, True)
    assert (both.get("qed/compton"), both.get("x")) == (ONE, None)
    assert both != [ONE, TWO]
    assert repr(ByName[ProcessSummary]()) == "ByName([])"


def test_unknown_names() -> None:
    """The error lists the names and the nearest."""
    with pytest.raises(
        KeyError, match="no entry named 'qed/compten' among qed/compton, qed/muon-pair; nearest: qed/comp"
    ):
        ByName([ONE, TWO])["qed/compten"]
    with pytest.raises(KeyError, match="no entry named 'x' among none"):
        ByName[ProcessSummary]()["x"]


def test_names_are_one_of_a_kind() -> None:
    """Two entries of one name are refused."""
    with pytest.raises(ValueError, match=r"^the name 'qed/compton' is there twice$"):
        ByName([ONE, ONE])


def test_as_a_field() -> None:
    """In JSON a list of objects; itself accepted too."""
    adapter = TypeAdapter(ByName[ProcessSummary])
    both = ByName([ONE, TWO])
    assert adapter.validate_json(adapter.dump_json(both)) == both
    assert adapter.validate_python(both) == adapter.validate_python([ONE, TWO]) == both
    with pytest.raises(ValidationError, match="Input should be a valid dictionary or instance of ProcessSummary"):
        adapter.validate_python([Note(code="a", text="b")])


def test_reads_like_a_mapping() -> None:
    """keys, values and items are those of a mapping from names, so that dict() of it works."""
    entries = ByName([ONE, TWO])
    assert entries.keys() == ("qed/compton", "qed/muon-pair")
    assert entries.items() == tuple(zip(entries.keys(), entries.values(), strict=True))
    assert dict(entries) == dict(entries.items())
