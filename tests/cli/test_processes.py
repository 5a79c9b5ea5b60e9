"""barnwright processes: all of them, or those of a choice."""

from __future__ import annotations

import json
from typing import Any

import pytest

import barnwright
from barnwright import RequestError, api
from barnwright.cli import main
from barnwright.documents.description import ProcessSummary
from barnwright.process import HelicityAmplitudes, Process, SquaredAmplitude, TotalCrossSection
from barnwright.run.choice import Choice
from barnwright.run.kinds import KINDS, kind_word, kinds_of, polarised_beams

PAIR = {"name": "pair", "reaction": "e- e+ -> mu- mu+"}


def law(*_arguments: Any) -> float:
    """A number."""
    return 1.0


def names(**choice: Any) -> list[str]:
    """The processes of a choice."""
    return [entry.name for entry in barnwright.processes(**choice)]


def test_processes_for_people_and_programs(capsys: pytest.CaptureFixture[str]) -> None:
    """The table and the JSON list have the bundled processes."""
    assert main(["processes"]) == 0
    assert "gamma e- -> gamma e-" in capsys.readouterr().out
    assert main(["processes", "--json"]) == 0
    found = [entry["name"] for entry in json.loads(capsys.readouterr().out)]
    assert {"qed/compton", "qed/muon-pair", "qed/tau-pair"} <= set(found)


def test_a_list_can_be_filtered(capsys: pytest.CaptureFixture[str]) -> None:
    """By particles that come in or go out, by plugin, and by kind of reaction or of law, all of which must fit."""
    assert {"qed/compton", "qed/muon-pair"} <= set(names(particle="e-", plugin="qed"))
    assert names(particle=["gamma", "e-"], kind="elastic", plugin="qed") == ["qed/compton"]
    assert {"qed/muon-pair"} <= set(names(kind="closed form", particle="mu+"))
    assert main(["processes", "--particle", "gamma", "--particle", "e-", "--kind", "elastic", "--plugin", "qed"]) == 0
    shown = capsys.readouterr().out
    assert "qed/compton" in shown
    assert "qed/muon-pair" not in shown


def test_every_summary_is_found_by_its_kinds() -> None:
    """What a process says of its kinds is what it can be asked for by."""
    for entry in barnwright.processes():
        assert entry.broken is None
        assert set(entry.kinds) <= set(KINDS)
        assert all(Choice(kind=word).fits(entry.model_dump()) for word in entry.kinds)


def test_nothing_that_fits_is_said(capsys: pytest.CaptureFixture[str]) -> None:
    """With what was asked for."""
    assert main(["processes", "--particle", "Z0", "--particle", "gamma", "--kind", "decay"]) == 0
    assert capsys.readouterr().out.strip() == "no process fits: particle Z0 and gamma, kind decay"


def test_words_that_mean_nothing_are_named_at_once(capsys: pytest.CaptureFixture[str]) -> None:
    """Each with what there is and the nearest; the command ends with 2."""
    assert main(["processes", "--particle", "muon", "--plugin", "qd", "--kind", "totl"]) == 2
    particle, plugin, kind = capsys.readouterr().err.splitlines()
    assert particle == "particle: got 'muon', expected a particle as the PDG spells it, or X; nearest: mu-"
    assert plugin.startswith("plugin: got 'qd', expected an installed plugin: ")
    assert plugin.endswith("; nearest: qed")
    assert kind == f"kind: got 'totl', expected a kind of reaction or of law: {', '.join(KINDS)}; nearest: total"


@pytest.mark.parametrize(
    ("choice", "message"),
    [
        ({"particle": ["e-"] * 11}, r"^particle: got 11 particles, expected at most 10$"),
        ({"particle": "x" * 1000}, r"^particle: got 'x+… 'x*, expected a particle|^particle: got 'x+"),
        ({"particle": [3]}, r"^particle: got 3, expected a particle as the PDG spells it, or X$"),
        ({"kind": 3}, r"^kind: got '3', expected a kind of reaction or of law: scattering, "),
    ],
)
def test_odd_choices_are_refused(choice: dict[str, Any], message: str) -> None:
    """Too many, too long, no text."""
    with pytest.raises(RequestError, match=message):
        barnwright.processes(**choice)


@pytest.mark.parametrize(
    ("text", "word"),
    [
        ("Total", "total"),
        ("closed-form", "closed_form"),
        ("helicity amplitudes", "helicity"),
        ("angular_cross_section", "angular"),
        ("polarized", "polarised"),
    ],
)
def test_words_are_understood_as_people_write_them(text: str, word: str) -> None:
    """Case, hyphens and other names do not matter."""
    assert kind_word(text) == word


@pytest.mark.parametrize(
    ("fields", "kinds"),
    [
        ({"laws": (SquaredAmplitude(law),)}, "scattering annihilation squared_amplitude"),
        (
            {"laws": (SquaredAmplitude(law), HelicityAmplitudes(law)), "singular": ("t",)},
            "scattering annihilation squared_amplitude helicity polarised singular",
        ),
        (
            {"laws": (TotalCrossSection(law),), "reaction": "e- e+ -> X", "contributions": {"z": "z"}},
            "scattering annihilation inclusive total contributions",
        ),
        ({"laws": (SquaredAmplitude(law),), "reaction": "H0 -> mu- mu+"}, "decay squared_amplitude"),
        ({"laws": (SquaredAmplitude(law),), "reaction": "gamma gamma -> gamma gamma"}, "scattering elastic squared_am"),
    ],
)
def test_kinds_of_a_process(fields: dict[str, Any], kinds: str) -> None:
    """What its reaction is and which laws it has."""
    assert " ".join(kinds_of(Process(**{**PAIR, **fields}))).startswith(kinds)


@pytest.mark.parametrize(
    ("reaction", "beams"),
    [
        ("e- e+ -> mu- mu+", ("e-", "e+")),
        ("e- e- -> e- e-", ("beam_a", "beam_b")),
        ("nu(mu) e- -> nu(mu) e-", ("e-",)),
        ("pi+ p -> pi+ p", ("p",)),
        ("H0 -> mu- mu+", ()),
    ],
)
def test_beams_that_may_be_polarised(reaction: str, beams: tuple[str, ...]) -> None:
    """Those with two helicities, as a request would call them."""
    assert polarised_beams(Process(name="pair", reaction=reaction, laws=(HelicityAmplitudes(law),))) == beams
    assert polarised_beams(Process(name="pair", reaction=reaction, laws=(SquaredAmplitude(law),))) == ()


def test_broken_processes_are_listed_with_their_cause(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    """A process that cannot be loaded stands below the others, with where it comes from and why."""
    broken = ProcessSummary(
        name="bad/one", plugin="bad", distribution="barnwright-bad", version="0.2", broken="it does not import"
    )
    monkeypatch.setattr(api, "processes", lambda **_: [broken])
    assert main(["processes"]) == 0
    shown = capsys.readouterr().out
    for text in ("broken", "bad/one", "barnwright-bad 0.2", "it does not import"):
        assert text in shown


def test_a_broken_process_is_left_out_by_its_plugin_only() -> None:
    """Nobody can look into it."""
    broken = {"plugin": "bad", "broken": "it does not import"}
    assert Choice(particles=("mu-",), kind="total").fits(broken)
    assert not Choice(plugin="qed").fits(broken)
