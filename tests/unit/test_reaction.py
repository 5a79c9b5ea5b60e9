"""Reactions: parsing, every finding with its column, legs, identical particles and conservation."""

from __future__ import annotations

import pickle

import pytest

from barnwright.reaction import LegError, LegKey, ReactionError, parse_reaction


@pytest.mark.parametrize(
    ("text", "incoming", "outgoing"),
    [
        ("e- e+ -> mu- mu+", ("e-", "e+"), ("mu-", "mu+")),
        ("  gamma   e-\t->  gamma e-\n", ("gamma", "e-"), ("gamma", "e-")),
        ("e- e+->nu(mu) nu(mu)~", ("e-", "e+"), ("nu(mu)", "nu(mu)~")),
        ("mu-->e- nu(e)~ nu(mu)", ("mu-",), ("e-", "nu(e)~", "nu(mu)")),
        ("H -> b b~", ("H0",), ("b", "b~")),
        ("e- C12 -> e- C12", ("e-", "C12"), ("e-", "C12")),
        ("p p -> X", ("p", "p"), ("X",)),
        ("Z0 -> X", ("Z0",), ("X",)),
        ("e- e+ -> H0", ("e-", "e+"), ("H0",)),
    ],
)
def test_reactions(text: str, incoming: tuple[str, ...], outgoing: tuple[str, ...]) -> None:
    """Names become canonical, and the text is written out with single spaces."""
    reaction = parse_reaction(text)
    assert (reaction.incoming, reaction.outgoing) == (incoming, outgoing)
    assert reaction.text == f"{' '.join(incoming)} -> {' '.join(outgoing)}"
    assert reaction.inclusive == (outgoing == ("X",))
    assert parse_reaction(reaction.text) == reaction


ARROW = "an arrow between incoming and outgoing particles, as in e- e+ -> mu- mu+"


@pytest.mark.parametrize(
    ("text", "findings"),
    [
        ("e- ex+ -> mu- nu_mu", [(4, "e+"), (15, "nu(mu)")]),
        ("e- e+ mu- mu+", [(None, "->")]),
        ("e- e+ → mu- mu+", [(7, "->")]),
        ("e- e+ --> mu- mu+", [(7, "->")]),
        ("e- -> e- -> e-", [(10, None)]),
        ("-> e- e+", [(1, None)]),
        ("e- e+ e- -> e-", [(10, None)]),
        ("e- -> e-", [(4, None)]),
        ("p p -> " + "p " * 9, [(5, None)]),
        ("X -> e- X", [(1, None), (9, None)]),
        ("", [(None, "->")]),
    ],
)
def test_every_finding_has_its_column_and_nearest(text: str, findings: list[tuple[int | None, str | None]]) -> None:
    """All that is wrong is told at once, with columns counted from 1 and nearest choices."""
    with pytest.raises(ReactionError, match=r"^reaction: got '.*expected ") as caught:
        parse_reaction(text)
    found = caught.value.violations("formula.reaction")
    columns = [None if violation.position is None else violation.position + 1 for violation in found]
    assert list(zip(columns, [violation.nearest for violation in found], strict=True)) == findings
    assert {violation.field for violation in found} == {"formula.reaction"}
    assert (caught.value.expected, caught.value.position) == (found[0].expected, found[0].position)


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        ("e- e+", ARROW),
        ("e- -> e- -> e-", "one arrow only"),
        ("p p p -> p p", "1 or 2 incoming particles before the arrow, not 3"),
        ("Z0 -> Z0", "2 to 8 outgoing particles after the arrow, not 1"),
        ("p p ->", "1 to 8 outgoing particles after the arrow, not 0"),
        ("p X -> p p", "a particle (X may only stand alone after the arrow)"),
        ("p q -> p p", "a particle as the PDG spells it"),
        ("p " * 1000, "a reaction of at most 1000 characters"),
    ],
)
def test_expectations(text: str, expected: str) -> None:
    """Each kind of finding says what was expected."""
    with pytest.raises(ValueError, match=r"^reaction: got '.*expected ") as caught:
        parse_reaction(text)
    assert isinstance(caught.value, ReactionError)
    assert caught.value.expected == expected


def test_identical_particles() -> None:
    """Groups of identical particles count legs from 1, and give 1/(2! 3!)."""
    reaction = parse_reaction("e- e+ -> gamma mu- gamma gamma mu+ mu-")
    assert reaction.identical_groups == ((1, 3, 4), (2, 6))
    assert reaction.symmetry_factor == pytest.approx(1 / 12, rel=1e-15)
    assert parse_reaction("e- e- -> e- p").symmetry_factor == 1.0
    assert parse_reaction("p p -> X").identical_groups == ()


@pytest.mark.parametrize(
    ("key", "code", "name"),
    [
        ("beam_a", -1, "gamma"),
        ("beam_b", -2, "e-"),
        ("e-", 3, "e-"),
        (1, 1, "gamma"),
        (("gamma", 2), 2, "gamma"),
        (("e-", 1), 3, "e-"),
        ("H", 4, "H0"),
    ],
)
def test_legs(key: LegKey, code: int, name: str) -> None:
    """A bare name is the outgoing particle, never a beam; codes and names answer to each other."""
    reaction = parse_reaction("gamma e- -> gamma gamma e- H0")
    assert reaction.leg(key) == code
    assert reaction.name_of(code) == name


ALL = "a leg of e- mu+ -> gamma gamma e-: gamma, e-, 1 to 3, beam_a, beam_b"


@pytest.mark.parametrize(
    ("key", "message"),
    [
        (
            "gamma",
            """leg: got 'gamma', expected one particle; 2 gamma come out, so take ("gamma", 1) or ("gamma", 2)""",
        ),
        (("gamma", 3), "leg: got ('gamma', 3), expected a number from 1 to 2, since 2 gamma come out"),
        (("gama", 1), f"leg: got ('gama', 1), expected {ALL}; nearest: gamma"),
        ("mu+", f"leg: got 'mu+', expected {ALL}; nearest: beam_b"),
        ("beam_c", f"leg: got 'beam_c', expected {ALL}; nearest: beam_b"),
        ("gama", f"leg: got 'gama', expected {ALL}; nearest: gamma"),
        (0, f"leg: got 0, expected {ALL}"),
        (4, f"leg: got 4, expected {ALL}"),
        (-1, f"leg: got -1, expected {ALL}"),
    ],
)
def test_legs_that_are_not_there(key: LegKey, message: str) -> None:
    """A leg that is missing or ambiguous is an error with the candidates."""
    with pytest.raises(LookupError, match=r"^leg: got ") as caught:
        parse_reaction("e- mu+ -> gamma gamma e-").leg(key)
    assert str(caught.value) == message


def test_legs_of_a_decay_and_of_anything() -> None:
    """A decay has no second beam, and anything has no legs."""
    with pytest.raises(
        LegError, match=r"^leg: got 'beam_b', expected a leg of .*: mu-, mu\+, 1 to 2, beam_a; nearest: beam_a$"
    ):
        parse_reaction("Z0 -> mu- mu+").leg("beam_b")
    for key in ("X", 1):
        with pytest.raises(LegError, match=r"expected a leg of p p -> X: beam_a, beam_b$"):
            parse_reaction("p p -> X").leg(key)
    with pytest.raises(LegError, match=r"^leg: got -2, expected the code of a leg: -1, 1, 2$"):
        parse_reaction("Z0 -> mu- mu+").name_of(-2)


@pytest.mark.parametrize(
    ("text", "notes"),
    [
        ("e- e+ -> mu- mu+", ()),
        ("mu- -> e- nu(e)~ nu(mu)", ()),
        ("u d~ -> W+", ()),
        ("p p -> X", ()),
        ("n -> p e- nu(e)~", ()),
        (
            "mu- -> e- gamma",
            (
                "electron number is not conserved: 0 before, 1 after",
                "muon number is not conserved: 1 before, 0 after",
            ),
        ),
        (
            "p -> u u e+",
            (
                "charge is not conserved: 1 before, 7/3 after",
                "baryon number is not conserved: 1 before, 2/3 after",
                "electron number is not conserved: 0 before, -1 after",
            ),
        ),
        ("tau- -> pi- gamma", ("tau number is not conserved: 1 before, 0 after",)),
    ],
)
def test_conservation_is_noted_and_never_refused(text: str, notes: tuple[str, ...]) -> None:
    """Forbidden reactions parse; a note says what they do not conserve."""
    assert parse_reaction(text).conservation_notes() == notes


def test_reactions_and_errors_cross_processes() -> None:
    """Reactions and their errors survive pickling."""
    reaction = parse_reaction("e- e+ -> mu- mu+")
    assert pickle.loads(pickle.dumps(reaction)) == reaction  # noqa: S301
    for error in (ReactionError("a b", ((ARROW, "->", None),)), LegError("'mu'", "a leg", "mu-")):
        back = pickle.loads(pickle.dumps(error))  # noqa: S301
        assert (str(back), back.__dict__) == (str(error), error.__dict__)
