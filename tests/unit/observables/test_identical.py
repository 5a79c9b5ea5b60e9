"""Identical particles: which one, all, any, the smallest, the largest."""

from __future__ import annotations

import numpy as np
import pytest
from unit.observables.n_body import three_bodies

from barnwright.beams import BeamSettings, collide
from barnwright.event import Event
from barnwright.kinematics import TwoBody
from barnwright.observables import ObservableError, compile_observable, tied_selections
from barnwright.reaction import parse_reaction

TWO = parse_reaction("e- e+ -> gamma gamma")
THREE = parse_reaction("e- e+ -> gamma gamma gamma")
MIXED = parse_reaction("e- e+ -> gamma gamma pi0 pi0")
ADVICE = "leading(gamma), each(gamma), any(gamma), min(…) or max(…): there are 2 gamma"


def refused(text: str, reaction: object = TWO, numbered: bool = False) -> list[tuple[int, str]]:
    """Positions and expectations of what is wrong with a text."""
    with pytest.raises(ObservableError, match="expected") as caught:
        compile_observable(text, reaction, numbered)  # type: ignore[arg-type]
    return [(finding.position, finding.expected) for finding in caught.value.findings]


@pytest.fixture(scope="module", name="photons")
def _photons() -> tuple[Event, np.ndarray, np.ndarray]:
    """Three photons, with their energies and pt in the lab, shape (3, event)."""
    event, _ = three_bodies(THREE.text, (0.0, 0.0, 0.0))
    vectors = [event[k] for k in (1, 2, 3)]
    return event, np.array([v[0] for v in vectors]), np.array([np.hypot(v[1], v[2]) for v in vectors])


def values(text: str, event: Event) -> np.ndarray:
    """The values of an observable."""
    return compile_observable(text, event.reaction).values(event)


@pytest.mark.parametrize("text", ["pt(gamma)", "pt(1)", "pt(2)", " pt( gamma )"])
def test_a_bare_name_or_number_is_refused_with_the_list(text: str) -> None:
    """Which of the two is not said, so that the ways of saying it are listed where the name stands."""
    ((position, expected),) = refused(text)
    assert expected == ADVICE
    assert position == min(text.index(c) for c in ("gamma", "1", "2") if c in text)


def test_declarations_may_take_them_by_number() -> None:
    """What a process declares counts slots; a bare name is refused there as well."""
    assert compile_observable("cos_theta(1, frame=cm)", TWO, numbered=True).axis is not None
    assert refused("cos_theta(gamma)", TWO, numbered=True) == [(10, ADVICE)]


@pytest.mark.parametrize("rank", [1, 2, 3])
def test_the_leading_one(photons: tuple[Event, np.ndarray, np.ndarray], rank: int) -> None:
    """By energy, which is the default, or by pt, both in the lab; any row of the particle so chosen."""
    event, energies, pts = photons
    by_energy = np.argsort(-energies, axis=0)[rank - 1][None]
    by_pt = np.argsort(-pts, axis=0)[rank - 1][None]
    assert np.any(by_energy != by_pt)
    for text, order in ((f"rank={rank}", by_energy), (f'by="pt", rank={rank}', by_pt)):
        found = values(f"pt(leading(gamma, {text}))", event)
        assert found == pytest.approx(np.take_along_axis(pts, order, 0)[0], rel=1e-12)
        found = values(f"energy(leading(gamma, {text}))", event)
        assert found == pytest.approx(np.take_along_axis(energies, order, 0)[0], rel=1e-12)
    if rank == 1:
        assert np.array_equal(values("energy(leading(gamma))", event), values("max(energy(gamma))", event))


def test_two_leading_ones_in_one_row(photons: tuple[Event, np.ndarray, np.ndarray]) -> None:
    """The mass of the two hardest, whichever they are; the angle between them."""
    event, energies, _ = photons
    order = np.argsort(-energies, axis=0)
    momenta = np.array([event[k] for k in (1, 2, 3)])
    first, second = (momenta[order[k], :, np.arange(event.shape[0])].T for k in (0, 1))
    square = 2 * (first[0] * second[0] - np.sum(first[1:] * second[1:], axis=0))
    assert values("mass(leading(gamma), leading(gamma, rank=2))", event) == pytest.approx(np.sqrt(square), rel=1e-9)
    cosine = np.sum(first[1:] * second[1:], axis=0) / (first[0] * second[0])
    found = values("angle(leading(gamma, rank=2), leading(gamma))", event)
    assert found == pytest.approx(np.arccos(cosine), rel=1e-9)


@pytest.mark.parametrize("quantifier", ["each", "any"])
def test_one_value_for_each(photons: tuple[Event, np.ndarray, np.ndarray], quantifier: str) -> None:
    """As many values as particles, along the first axis."""
    event, _, pts = photons
    observable = compile_observable(f"2*pt({quantifier}(gamma)) + sqrt_s", THREE)
    assert (observable.entries, observable.quantifier, observable.axis) == (3, quantifier, None)
    assert observable.values(event) == pytest.approx(2 * pts + event.sqrt_s, rel=1e-12)


def test_the_smallest_and_the_largest(photons: tuple[Event, np.ndarray, np.ndarray]) -> None:
    """min(…) and max(…) of one argument run over the particles that it names."""
    event, energies, pts = photons
    assert values("min(pt(gamma))", event) == pytest.approx(pts.min(axis=0), rel=1e-12)
    assert values("max(energy(gamma) - pt(gamma))", event) == pytest.approx((energies - pts).max(axis=0), rel=1e-9)
    found = values("max(pt(gamma)) - min(pt(gamma))", event)
    assert found == pytest.approx(pts.max(axis=0) - pts.min(axis=0), rel=1e-9)
    found = values("max(min(pt(gamma)), max(energy(gamma)), 2)", event)
    assert found == pytest.approx(np.maximum(energies.max(axis=0), 2), rel=1e-12)


@pytest.mark.parametrize(
    ("text", "position", "expected"),
    [
        ("energy(leading(gamma, rank=3))", 7, "a rank of at most 2"),
        ('pt(leading(gamma, by="pt"))', 3, "an order that decides: two bodies share their pt exactly"),
        ("pt(leading(beam_a))", 3, "leading(…) of identical particles; beam_a is not one of several"),
        ("pt(each(mu-))", 8, "a leg of e- e+ -> gamma gamma"),
        ("pt(each(gamma)) + pt(any(gamma))", 21, "one each(…) or any(…) over the same particles"),
        ("angle(each(gamma), each(gamma))", 0, "angle of different particles"),
        ("angle(leading(gamma), leading(gamma))", 0, "angle of different particles"),
        ("angle(leading(gamma), each(gamma))", 0, "angle of different particles"),
        ("min(angle(gamma, gamma))", 4, "angle of different particles"),
        ("min(sqrt_s)", 0, "min of at least two quantities, or identical particles"),
        ("max(pt(each(gamma)))", 0, "max of at least two quantities, or identical particles"),
        ("max(energy(gamma) + min(pt(gamma)))", 20, "no min over identical particles within another one"),
        ("energy(leading(gamma), frame=rest(gamma))", 34, "a particle that comes out once; there are 2 gamma"),
        ("energy(leading(gamma), frame=rest(1))", 34, "a particle that comes out once; there are 2 1"),
        ("helicity_angle(leading(gamma), of=(gamma, 2))", 35, "a particle that comes out once; there are 2 gamma"),
    ],
)
def test_what_is_refused(text: str, position: int, expected: str) -> None:
    """Ties, ranks beyond the last, doubles of one particle, quantifiers that contradict."""
    where, what = refused(text)[0]
    assert (where, expected in what) == (position, True)


def test_two_kinds_of_identical_particles() -> None:
    """A quantity runs over one kind, once."""
    two_kinds = [(0, "min of identical particles of one kind")]
    assert refused("min(pt(gamma) + pt(pi0))", MIXED) == two_kinds
    assert refused("pt(each(gamma)) + pt(each(pi0))", MIXED) == [(21, "one each(…) or any(…) over the same particles")]
    both = compile_observable("min(pt(gamma)) + max(pt(pi0)) + pt(each(gamma))", MIXED)
    assert both.entries == 2


def test_leading_by_pt_and_by_energy_may_be_one_particle() -> None:
    """Whether they are depends on the event, so a row cannot take both."""
    text = 'angle(leading(gamma), leading(gamma, by="pt", rank=2))'
    assert refused(text, THREE) == [(0, "angle of different particles")]


def test_nested_minima_cannot_grow_a_tree() -> None:
    """Forty minima inside one another are refused before anything is multiplied."""
    refused("min(pt(gamma)+" * 40 + "0" + ")" * 40)
    wide = "+".join(["pt(each(gamma))"] * 95)
    many = parse_reaction("e- e+ -> " + " ".join(["gamma"] * 8))
    assert compile_observable(wide, many).entries == 8
    thick = "+".join([f"min({', '.join(['pt(each(gamma))'] * 50)})"] * 11)
    assert "counted for each of identical particles" in refused(thick, many)[0][1]


def test_undecided_orders_are_told() -> None:
    """An order by energy is listed, for the cases where the lab is the cm of two bodies."""
    assert len(tied_selections(compile_observable("pt(leading(gamma))", TWO))) == 1
    assert tied_selections(compile_observable("pt(each(gamma)) + max(energy(gamma))", TWO)) == ()
    assert tied_selections(compile_observable('pt(leading(gamma, by="pt"))', THREE)) == ()


def test_the_leading_of_two_bodies_in_a_moving_lab() -> None:
    """With 7 on 4 GeV the photon along the stronger beam has more energy."""
    collision = collide(BeamSettings("kinetic", (7.0,), (4.0,)), (0.0, 0.0))
    cosine = np.array([[-0.8, -0.1, 0.1, 0.8]])
    event = Event(TWO, TwoBody(collision, (0.0, 0.0, 0.0, 0.0), 1 - cosine, 1 + cosine))
    assert values("cos_theta(leading(gamma), frame=cm)", event) == pytest.approx(np.abs(cosine))
    assert values("cos_theta(leading(gamma, rank=2), frame=cm)", event) == pytest.approx(-np.abs(cosine))
