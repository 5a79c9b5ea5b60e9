"""Overrides, and requests from files and standard input."""

from __future__ import annotations

import io
from pathlib import Path

import pytest

import barnwright
from barnwright.cli.reading import parse_overrides, read_fields
from barnwright.documents import Request
from barnwright.errors import RequestError

TOML = """
process = "qed/muon-pair"
[beams]
kind = "collider"
sqrt_s = 10.0
[[cuts]]
name = "acceptance"
observable = "abs(cos_theta(mu-, frame=cm))"
max = 0.95
"""


def test_override_is_a_path_and_a_toml_value() -> None:
    """A key may be a path into tables and named lists; the value is TOML."""
    changes = parse_overrides(["beams.sqrt_s=20", 'masses."mu-"=0.0', "cuts.acceptance.max=0.9", 'unit="nb"'])
    assert changes == [("beams.sqrt_s", 20), ('masses."mu-"', 0.0), ("cuts.acceptance.max", 0.9), ("unit", "nb")]


def test_word_without_quotes_is_answered_with_the_quoted_one() -> None:
    """The usual slip, a word without quotes, gets the right line as the nearest choice."""
    with pytest.raises(RequestError, match=r"got .unit=nb., expected KEY=VALUE with a TOML value; nearest: unit=.nb."):
        parse_overrides(["unit=nb"])


def test_every_wrong_override_is_named_at_once() -> None:
    """All wrong overrides are listed in one error."""
    with pytest.raises(RequestError, match=r"override\[0\]") as caught:
        parse_overrides(["beams", "seed=2", "=3", "a=1]\nb=[2"])
    assert [violation.field for violation in caught.value.violations] == ["override[0]", "override[2]", "override[3]"]


def test_file_with_overrides(tmp_path: Path) -> None:
    """Overrides are merged into the file's request, tables key by key and cuts by name."""
    file = tmp_path / "request.toml"
    file.write_text(TOML)
    request = Request.model_validate(read_fields(str(file), ["beams.sqrt_s=20", "cuts.acceptance.max=0.5", "seed=7"]))
    assert request.beams.sqrt_s == 20.0
    assert request.cuts[0].max == 0.5
    assert request.seed == 7


@pytest.mark.parametrize("text", [TOML, '{"process": "qed/muon-pair", "beams": {"kind": "collider", "sqrt_s": 10.0}}'])
def test_standard_input_is_toml_or_json(text: str, monkeypatch: pytest.MonkeyPatch) -> None:
    """A dash reads standard input and tells TOML from JSON by itself."""
    monkeypatch.setattr("sys.stdin", io.StringIO(text))
    assert read_fields("-", [])["process"] == "qed/muon-pair"


def test_missing_file_names_the_nearest(tmp_path: Path) -> None:
    """A file that is not there is answered with the file that was probably meant."""
    (tmp_path / "request.toml").write_text(TOML)
    with pytest.raises(RequestError, match=r"request: got .*expected a file that exists; nearest: request.toml"):
        read_fields(str(tmp_path / "reqest.toml"), [])


def test_a_kept_prediction_is_asked_again(tmp_path: Path) -> None:
    """A prediction's document stands for the request it holds: in Python, in a file, with an override."""
    kept = barnwright.predict(process="electroweak/muon-pair", beams={"kind": "collider", "sqrt_s": 60.0})
    file = tmp_path / "kept.json"
    file.write_text(kept.model_dump_json(), encoding="utf-8")
    assert barnwright.predict(kept).same_bits(kept)
    assert barnwright.predict(file).same_bits(kept)
    assert read_fields(str(file), ["beams.sqrt_s=70.0"])["beams"]["sqrt_s"] == 70.0
