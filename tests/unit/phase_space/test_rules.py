"""Which channels a reaction gets: the rules of docs/channels.md."""

from __future__ import annotations

from math import inf

import pytest
from unit.phase_space.cases import CASES, RADIATION, channels

from barnwright.peaks import Peak
from barnwright.phase_space import Limits, channels_of
from barnwright.phase_space.parts import AngleMap, InvariantMap
from barnwright.reaction import parse_reaction

Z = {"at": 91.1876, "width": 2.4952}


def names(text: str, masses: tuple[float, ...], *peaks: Peak) -> list[str]:
    """The names of the channels beside the flat one."""
    flat, *others = channels_of(parse_reaction(text), masses, peaks)
    assert flat.name == "flat"
    return [channel.name for channel in others]


def test_no_peaks_no_channels() -> None:
    """Without declared peaks there is the flat channel."""
    assert names("mu- -> e- nu(e)~ nu(mu)", (0.1, 0.0, 0.0, 0.0)) == []


def test_radiation() -> None:
    """A photon by itself, along either beam, beside the pair's peak or soft; and with each muon, soft."""
    assert names("e- e+ -> mu- mu+ gamma", (0.0,) * 5, *RADIATION) == [
        "(gamma[along a or b] (mu- mu+)[logarithm])",
        "(mu+ (gamma[soft] mu-)[collinear])",
        "(mu- (gamma[soft] mu+)[collinear])",
        "(gamma[along a or b] (mu- mu+)[soft])",
    ]


def test_two_photons_stay_below_sixteen() -> None:
    """At most 16 channels, and every photon with every muon and every beam among the first."""
    found = [channel.name for channel in channels("two photons")]
    assert len(found) == 16
    first = " ".join(found[:8])
    for pair in ("(gamma.1[soft] mu-)", "(gamma.2[soft] mu-)", "(gamma.1[soft] mu+)", "(gamma.2[soft] mu+)"):
        assert pair in first


def test_identical_particles_are_permuted() -> None:
    """Two pairs of identical leptons make two pairs of resonances."""
    assert names("H0 -> e- e+ e- e+", (125.0, 0.0, 0.0, 0.0, 0.0), Peak("e- e+", "resonance", **Z)) == [
        "((e-.1 e+.1)[resonance] (e-.2 e+.2)[resonance])",
        "((e-.1 e+.2)[resonance] (e+.1 e-.2)[resonance])",
    ]


def test_compatible_resonances_share_a_tree() -> None:
    """Nested and separate systems stand in one tree."""
    assert [channel.name for channel in channels("a top and its W")[1:]] == [
        "(b (b~ (mu- nu(mu)~)[resonance])[resonance])"
    ]


def test_overlapping_resonances_have_trees_of_their_own() -> None:
    """Systems that share a leg contradict each other."""
    peaks = Peak("pi+ pi-", "resonance", at=0.77, width=0.15), Peak("pi- pi0", "resonance", at=0.77, width=0.15)
    assert names("D0 -> pi+ pi- pi0", (1.86, 0.14, 0.14, 0.13), *peaks) == [
        "(pi0 (pi+ pi-)[resonance])",
        "(pi+ (pi- pi0)[resonance])",
    ]


def test_several_peaks_of_one_system_are_channels_of_their_own() -> None:
    """A photon's pole and the Z's line in one pair: two trees that differ in the map."""
    peaks = Peak("mu- mu+", "power"), Peak("mu- mu+", "resonance", **Z), Peak("mu- mu+", "power", power=2.0)
    assert names("e- e+ -> H0 mu- mu+", (0.0, 0.0, 125.0, 0.1, 0.1), *peaks) == [
        "(H0 (mu- mu+)[logarithm])",
        "(H0 (mu- mu+)[resonance])",
        "(H0 (mu- mu+)[power])",
    ]


def test_t_and_u_of_two_bodies() -> None:
    """t is the transfer from beam a to leg 1, u that to leg 2; the mass of a leg may be given by its name."""
    reaction, masses = parse_reaction("e- e+ -> gamma gamma"), (0.01, 0.01, 0.0, 0.0)
    _, t, u = channels_of(reaction, masses, [Peak("t", "power", at="e-"), Peak("u", "power", at="e-", power=2.0)])
    assert (t.name, u.name) == ("(gamma.1[along a] gamma.2)", "(gamma.2[along a] gamma.1)")
    assert t.splittings[0].angle == AngleMap("transfer", "a", (0.01, 0.0), 1.0)
    assert u.splittings[0].angle == AngleMap("transfer", "a", (0.01, 0.0), 2.0)


def test_exchanges_from_both_beams() -> None:
    """Legs that leave along different beams do so one after the other."""
    assert [channel.name for channel in channels("two exchanges")[1:]] == [
        "(e-[along a] (e+[along b] (mu- mu+)[logarithm]))"
    ]


def test_rivals_for_a_beam_take_turns() -> None:
    """Two exchanges from one beam: each leg has its turn to leave first."""
    peaks = Peak("beam_a e-", "power"), Peak("beam_a mu-", "power")
    assert names("e- mu- -> e- mu- gamma", (0.0, 0.1, 0.0, 0.1, 0.0), *peaks) == [
        "(e-[along a] (mu- gamma))",
        "(mu-[along a] (e- gamma))",
    ]


def test_a_leg_by_its_number() -> None:
    """Declarations may use leg numbers."""
    assert names("H0 -> b b~ gamma", (125.0, 4.0, 4.0, 0.0), Peak("1 3", "collinear")) == ["(b~ (b gamma)[collinear])"]


def test_a_peak_in_the_whole_changes_nothing() -> None:
    """A line in √s is no matter of phase space; nor is t in a decay."""
    assert names("e- e+ -> mu- mu+", (0.0,) * 4, Peak("mu- mu+", "resonance", **Z)) == []
    assert names("Z0 -> mu- mu+", (91.0, 0.0, 0.0), Peak("t", "power")) == []


def test_the_form_of_the_width() -> None:
    """A running width moves the centre of the line by M²/(1 + Γ²/M²), a fixed one does not."""
    reaction, masses, peaks = (
        parse_reaction("H0 -> e- e+ gamma"),
        (125.0, 0.0, 0.0, 0.0),
        [Peak("e- e+", "resonance", **Z)],
    )
    running, fixed = (
        channels_of(reaction, masses, peaks, running=form)[1].splittings[0].second.map for form in (True, False)
    )
    mass, width = Z["at"], Z["width"]
    assert fixed == InvariantMap("resonance", mass**2, pytest.approx(mass * width))
    assert running == InvariantMap(
        "resonance", pytest.approx(mass**2 - width**2, rel=1e-5), pytest.approx(mass * width, rel=1e-3)
    )


def test_limits_reach_every_part() -> None:
    """Bounds on a leg, a pair and an angle stand in the splittings."""
    limits = Limits(energy={3: (1.0, inf)}, cosine={3: (-0.9, 0.9)}, mass={(1, 2): (1.0, inf)}, angle={(1, 3): 0.1})
    found = channels_of(parse_reaction("e- e+ -> mu- mu+ gamma"), (0.0,) * 5, RADIATION, limits)
    photon, pair = found[1].splittings[0].first, found[1].splittings[0].second
    assert (photon.energy, photon.cosine, pair.square) == ((1.0, inf), (-0.9, 0.9), (1.0, inf))
    assert found[2].splittings[0].second.map == InvariantMap("collinear", 1.0, 0.1)
    assert all(channel.limited for channel in found)


def test_no_reaction_has_more_than_sixteen() -> None:
    """Six photons and a pair: 16 channels, found in a moment."""
    text = "e- e+ -> mu- mu+ " + " ".join(["gamma"] * 6)
    assert len(channels_of(parse_reaction(text), (0.0,) * 10, RADIATION)) == 16


@pytest.mark.parametrize(
    ("peak", "error", "message"),
    [
        (
            Peak("mu- mu+", "resonance", at=91.0),
            ValueError,
            r"^the resonance of 'mu- mu\+' needs a mass and a width above 0, ",
        ),
        (
            Peak("gamma", "power"),
            ValueError,
            r"^a power needs two outgoing legs or more, or a leg and a beam, not 'gamma'$",
        ),
        (
            Peak("gamma", "collinear"),
            ValueError,
            r"^a collinear needs two outgoing legs or more, or a leg and a beam, ",
        ),
        (
            Peak("beam_a mu-", "resonance", at=1.0, width=1.0),
            ValueError,
            r"^a resonance needs two outgoing legs or more, ",
        ),
        (
            Peak("tau- mu+", "power"),
            LookupError,
            r"^leg: got 'tau-', expected a leg of e- e\+ -> mu- mu\+ gamma: mu-, ",
        ),
        (Peak("mu- mu+", "power", at="z_mass"), LookupError, r"^leg: got 'z_mass', expected a leg of e- e\+ -> "),
    ],
    ids=lambda value: value.of if isinstance(value, Peak) else None,
)
def test_peaks_that_do_not_fit(peak: Peak, error: type[Exception], message: str) -> None:
    """A peak that names no legs of its own, or a resonance without a width, is refused by name."""
    with pytest.raises(error, match=message):
        channels_of(parse_reaction("e- e+ -> mu- mu+ gamma"), (0.0,) * 5, [peak])


def test_a_tree_for_every_case() -> None:
    """Every case has a channel for its peaks, and 3n − 4 axes."""
    for name, case in CASES.items():
        found = channels(name)
        assert len(found) > 1
        assert {channel.axes for channel in found} == {3 * len(case.outgoing) - 4}
