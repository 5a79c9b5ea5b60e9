"""barnwright describe: one process in full, for people and for programs."""

from __future__ import annotations

import io
import json

import pytest

from barnwright import PluginError, api
from barnwright.cli import main


def test_description_for_people(capsys: pytest.CaptureFixture[str]) -> None:
    """Laws, parameters with source, masses, observables with units, validity, cautions and references are shown."""
    assert main(["describe", "qed/muon-pair"]) == 0
    shown = capsys.readouterr().out
    for text in (
        "e- e+ -> mu- mu+",
        "closed form in cos_theta(1, frame=cm), squared amplitude",
        "CODATA",
        "0.1056583755",
        "pt(mu-) [GeV]",
        "sqrt_s from 0 GeV up to 30 GeV; lowest order in alpha",
        "radiation-protection expert",
        "Peskin",
        'process = "qed/muon-pair"',
    ):
        assert text in shown


@pytest.mark.parametrize("name", ["qed/muon-pair", "qed/tau-pair", "qed/compton"])
def test_ready_request_runs(name: str, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]) -> None:
    """What --request prints can be piped into predict."""
    assert main(["describe", name, "--request"]) == 0
    monkeypatch.setattr("sys.stdin", io.StringIO(capsys.readouterr().out))
    assert main(["predict", "-"]) == 0


def test_description_for_programs(capsys: pytest.CaptureFixture[str]) -> None:
    """--json prints the document."""
    assert main(["describe", "qed/compton", "--json"]) == 0
    assert json.loads(capsys.readouterr().out)["masses"]["gamma"] == 0.0


def test_unknown_process_is_exit_code_2(capsys: pytest.CaptureFixture[str]) -> None:
    """The nearest name is offered."""
    assert main(["describe", "qed/compto"]) == 2
    assert "nearest: qed/compton" in capsys.readouterr().err


def test_broken_process_is_exit_code_3(monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]) -> None:
    """The cause reaches who asks."""

    def describe(_: str) -> None:
        raise PluginError("barnwright-bad", "bad/one", "it does not import")

    monkeypatch.setattr(api, "describe", describe)
    assert main(["describe", "bad/one"]) == 3
    assert capsys.readouterr().err == "plugin barnwright-bad, process bad/one: it does not import\n"
