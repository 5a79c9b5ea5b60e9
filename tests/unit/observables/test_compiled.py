"""The compiled observable: pure data that is hashed, compared, pickled and asked for its form."""

from __future__ import annotations

import math
import pickle

import numpy as np
import pytest
from unit.observables.n_body import three_bodies

from barnwright.beams import BeamSettings, collide
from barnwright.event import Event
from barnwright.kinematics import CM, LAB, TwoBody
from barnwright.observables import AxisForm, compile_observable, table
from barnwright.reaction import parse_reaction

TWO = parse_reaction("e- e+ -> mu- mu+")
PHOTONS = parse_reaction("e- e+ -> gamma gamma")
THREE = parse_reaction("e- e+ -> gamma gamma gamma")
LONG = "+".join(["pt(mu-)"] * 99)


def test_the_same_text_is_compiled_once() -> None:
    """For one reaction; another reaction has another observable."""
    assert compile_observable("pt(1)", TWO) is compile_observable("pt(1)", TWO)
    elsewhere = compile_observable("pt(1)", parse_reaction("e- e+ -> tau- tau+"))
    assert elsewhere == compile_observable("pt(1)", TWO)
    assert compile_observable("cos_theta(mu-)", TWO) != compile_observable("cos_theta(mu+)", TWO)


def test_spaces_make_no_difference() -> None:
    """The text is kept with single spaces, and so are equality and hash."""
    wide, narrow = (compile_observable(text, TWO) for text in ("pt(mu-)\n  + 1 ", "pt(mu-) + 1"))
    assert (wide, hash(wide), wide.text) == (narrow, hash("pt(mu-) + 1"), "pt(mu-) + 1")


@pytest.mark.parametrize(
    ("text", "reaction"),
    [
        ("cos_theta(mu-, frame=rest(mu-, mu+))", TWO),
        ("abs(cos_theta(mu-, frame=cm))", TWO),
        (LONG, TWO),
        ("pt(each(gamma))", THREE),
        ('pt(leading(gamma, by="pt", rank=2))', THREE),
    ],
)
def test_pickling(text: str, reaction: object) -> None:
    """An observable travels to another process and is equal there."""
    observable = compile_observable(text, reaction)  # type: ignore[arg-type]
    again = pickle.loads(pickle.dumps(observable))  # noqa: S301 - our own bytes
    assert again == observable
    assert hash(again) == hash(observable)


@pytest.mark.parametrize(
    ("text", "axis"),
    [
        ("cos_theta(mu-)", AxisForm("cosine", 1, LAB)),
        ("cos_theta(2, frame=cm)", AxisForm("cosine", 2, CM)),
        ("theta(mu+, frame=cm)", AxisForm("angle", 2, CM)),
        ("abs(cos_theta(mu-, frame=cm))", AxisForm("cosine", 1, CM, folded=True)),
        ("abs(theta(mu-))", None),
        ("-cos_theta(mu-)", None),
        ("cos_theta(beam_a)", None),
        ("cos_theta(mu-, frame=rest(mu+))", None),
        ("cos_theta(mu-)**2", None),
        ("sqrt(cos_theta(mu-))", None),
        ("pt(mu-)", None),
        ("sqrt_s", None),
        ("1", None),
    ],
)
def test_the_polar_axis_is_recognised(text: str, axis: AxisForm | None) -> None:
    """The cosine, its absolute value or the angle of one of two bodies."""
    assert compile_observable(text, TWO).axis == axis


def test_selections_and_more_bodies_have_no_polar_axis() -> None:
    """Their angles are no coordinate of the phase space."""
    assert compile_observable("cos_theta(each(gamma))", PHOTONS).axis is None
    assert compile_observable("cos_theta(leading(gamma))", PHOTONS).axis is None
    assert compile_observable("cos_theta(1)", THREE, numbered=True).axis is None


@pytest.mark.parametrize(
    ("text", "interval"),
    [
        ("pt(mu-)", (0.0, math.inf)),
        ("cos_theta(mu-)", (-1.0, 1.0)),
        ("abs(cos_theta(mu-))", (0.0, 1.0)),
        ("abs(rapidity(mu-))", (0.0, math.inf)),
        ("sqrt(energy(mu-))", (0.0, math.inf)),
        ("sqrt(theta(mu-))", (0.0, math.sqrt(math.pi))),
        ("abs(abs(cos_theta(mu-)))", (0.0, 1.0)),
        ("2*cos_theta(mu-)", (-math.inf, math.inf)),
        ("3", (-math.inf, math.inf)),
        ("thrust", (0.5, 1.0)),
    ],
)
def test_ranges(text: str, interval: tuple[float, float]) -> None:
    """What the table tells, also through abs and sqrt."""
    assert compile_observable(text, TWO).range == interval


@pytest.mark.parametrize(
    ("text", "azimuthal"),
    [("phi(mu-)", True), ("1 + abs(phi(mu-))", True), ("delta_phi(mu-, mu+)", False), ("pt(mu-)", False)],
)
def test_which_ones_know_the_azimuth(text: str, azimuthal: bool) -> None:
    """What changes when everything is turned about the beam."""
    assert compile_observable(text, TWO).azimuthal is azimuthal


TURNED = [row for row in table() if row.shape in ("one", "pair", "several", "within", "none")]


@pytest.mark.parametrize("row", TURNED, ids=lambda row: row.name)
def test_turning_about_the_beam(row: object) -> None:
    """Every row but those marked keeps its value when three bodies are turned about the beam, in every frame."""
    event, _ = three_bodies("e- e+ -> mu- mu+ gamma", (0.1, 0.1, 0.0), events=4)
    turned, _ = three_bodies("e- e+ -> mu- mu+ gamma", (0.1, 0.1, 0.0), events=4)
    _turn(turned, 0.4)
    arguments = {"one": "1", "pair": "1, 2", "several": "1, 2", "within": "1, of=(1, 2)"}
    name, shape = row.name, row.shape  # type: ignore[attr-defined]
    text = name if shape == "none" else f"{name}({arguments[shape]})"
    frames = ["", ", frame=cm", ", frame=rest(1, 3)"] if row.frame else [""]  # type: ignore[attr-defined]
    for frame in frames:
        observable = compile_observable(text.replace(")", f"{frame})") if frame else text, event.reaction)
        same = np.allclose(observable.values(event), observable.values(turned), rtol=1e-9, atol=1e-9)
        assert same is not observable.azimuthal


def _turn(event: Event, by: float) -> None:
    """Turn an event's momenta about z."""
    original = event.kinematics.vector

    def vector(code: int, frame: object) -> object:
        found = original(code, frame)  # type: ignore[arg-type]
        phi = np.arctan2(np.sin(found.phi + by), np.cos(found.phi + by))
        return type(found)(found.plus, found.minus, found.pt, phi, found.mass)

    event.kinematics.vector = vector  # type: ignore[method-assign, assignment]


@pytest.mark.parametrize("text", ["sqrt(cos_theta(mu-))", "1/cos_theta(mu-)", "(0*pt(mu-))/0", "1e300**2", "9e99**9"])
def test_arithmetic_without_a_value_is_no_warning(text: str) -> None:
    """Values are infinite or not a number, and left to whoever bins them."""
    collision = collide(BeamSettings("sqrt_s", (10.0,)), (0.0, 0.0))
    cosine = np.array([[-0.5, 0.0]])
    event = Event(TWO, TwoBody(collision, (0.0, 0.0, 0.0, 0.0), 1 - cosine, 1 + cosine))
    values = np.broadcast_to(compile_observable(text, TWO).values(event), event.shape)
    assert not np.all(np.isfinite(values)) or text.startswith("sqrt")


def test_shapes() -> None:
    """Values broadcast to the event's shape; entries come first."""
    collision = collide(BeamSettings("sqrt_s", (10.0, 20.0, 30.0)), (0.0, 0.0))
    cosine = np.linspace(-0.9, 0.9, 5)[None]
    event = Event(PHOTONS, TwoBody(collision, (0.0, 0.0, 0.0, 0.0), 1 - cosine, 1 + cosine))
    assert event.shape == (3, 5)
    for text in ("sqrt_s", "1", "max(pt(gamma))", "thrust", "energy(leading(gamma))", "energy(beam_a)"):
        assert np.broadcast_shapes(compile_observable(text, PHOTONS).values(event).shape, (3, 5)) == (3, 5)
    assert compile_observable("pt(each(gamma))", PHOTONS).values(event).shape == (2, 3, 5)


def test_the_table_is_complete() -> None:
    """Every row has a meaning and arguments that compile as they are written."""
    reaction = parse_reaction("e- e+ -> mu- mu+ gamma")
    for row in table():
        text = row.name + row.arguments.replace("(x, …)", "(x, y)").replace("x", "mu-").replace("y", "mu+")
        observable = compile_observable(text, reaction)
        assert row.meaning
        assert (observable.unit, observable.range, observable.azimuthal) == (row.unit, row.range, row.azimuthal)
