"""Requests that are wrong, and what each must be told: field, value, expectation, nearest choice.

A case changes the good request below; a value of `REMOVE` takes a key away. Every case lists all violations it must
get, as (field, fragments that the one line must contain).
"""

from __future__ import annotations

from typing import Any, NamedTuple

REMOVE = object()

GOOD: dict[str, Any] = {
    "process": "qed/muon-pair",
    "beams": {"kind": "collider", "sqrt_s": 10.0},
    "cuts": [{"name": "acceptance", "observable": "abs(cos_theta(mu-))", "max": 0.95}],
    "histograms": [
        {"name": "angle", "observables": ["cos_theta(mu-)"], "bins": [{"count": 4, "low": -1.0, "high": 1.0}]}
    ],
}


class Case(NamedTuple):
    """A wrong request and the lines it must get; ``kind`` "unknown" when the process is what is unknown."""

    name: str
    change: dict[str, Any]
    lines: tuple[tuple[str, tuple[str, ...]], ...]
    kind: str = "wrong"

    @property
    def request(self) -> dict[str, Any]:
        """The good request with the change."""
        merged = {**GOOD, **self.change}
        return {key: value for key, value in merged.items() if value is not REMOVE}


def one(name: str, change: dict[str, Any], field: str, *fragments: str) -> Case:
    """A case with a single violation."""
    return Case(name, change, ((field, fragments),))


def cut(**fields: Any) -> dict[str, Any]:
    """A change of the only cut."""
    return {"cuts": [{"name": "acceptance", "observable": "pt(mu-)", **fields}]}


def histogram(**fields: Any) -> dict[str, Any]:
    """A change of the only histogram."""
    base = {"name": "angle", "observables": ["cos_theta(mu-)"], "bins": [{"count": 4, "low": -1.0, "high": 1.0}]}
    return {"histograms": [{**base, **fields}]}


def collider(**fields: Any) -> dict[str, Any]:
    """A change of collider beams."""
    return {"beams": {"kind": "collider", **fields}}


def target(**fields: Any) -> dict[str, Any]:
    """Compton scattering on a fixed target, without cuts and histograms."""
    return {"process": "qed/compton", "beams": {"kind": "fixed_target", **fields}, "cuts": [], "histograms": []}


def observable(text: str, *fragments: str) -> Case:
    """A histogram of a wrong observable."""
    return one(f"observable {text[:40]}", histogram(observables=[text]), "histograms[0].observables[0]", *fragments)


def formula(**fields: Any) -> dict[str, Any]:
    """A formula request."""
    base = {
        "reaction": "e- e+ -> mu- mu+",
        "squared_amplitude": "32*pi**2*alpha**2*(t**2 + u**2)/s**2",
        "spin_colour": "averaged",
        "parameters": {"alpha": 0.0072973525643},
    }
    return {"process": REMOVE, "formula": {**base, **fields}}


DOCUMENT = [
    one("misspelt key", {"beems": 1}, "beems", "1", "beams"),
    one("misspelt key of beams", collider(sqrts=10.0, sqrt_s=10.0), "beams.sqrts", "nearest", "sqrt_s"),
    one("misspelt key of a cut", cut(max=1.0, mx=2.0), "cuts[0].mx", "max"),
    one("no beams", {"beams": REMOVE}, "beams", "nothing"),
    one("no process", {"process": REMOVE}, "process", "exactly one of process"),
    one("process and formula", {**formula(), "process": "qed/muon-pair"}, "formula", "exactly one of"),
    one("schema of the future", {"schema": "barnwright.request/9"}, "schema", "barnwright.request/1"),
    one("seed too small", {"seed": -1}, "seed", "-1", "a whole number"),
    one("seed not whole", {"seed": 1.5}, "seed", "1.5", "a whole number"),
    one("number as text", collider(sqrt_s="10"), "beams.sqrt_s", "'10'", "a finite number greater than 0"),
    one("truth value as number", collider(sqrt_s=True), "beams.sqrt_s", "True", "number"),
    one("kind of beams", {"beams": {"kind": "colider", "sqrt_s": 10.0}}, "beams.kind", "'colider'", "collider"),
    one("negative energy", collider(sqrt_s=-10.0), "beams.sqrt_s", "-10.0", "greater than 0"),
    one(
        "two energies of beams", collider(sqrt_s=10.0, energies={"e-": 5.0, "e+": 5.0}), "beams.energies", "exactly one"
    ),
    one("no energy", collider(), "beams.sqrt_s", "nothing", "exactly one of"),
    one("three energies", collider(energies={"e-": 5.0, "e+": 5.0, "mu-": 1.0}), "beams.energies", "two beams"),
    one("cut without limits", cut(), "cuts[0].min", "at least one of min, max and outside"),
    one("cut turned round", cut(min=2.0, max=1.0), "cuts[0].max", "1.0", "greater than min = 2.0"),
    one("crack turned round", cut(outside=[1.5, 1.3]), "cuts[0].outside", "the lower first"),
    one("cut of infinity", cut(min=float("inf")), "cuts[0].min", "inf", "a finite number"),
    one("no bins", histogram(bins=[{"count": 0, "low": 0.0, "high": 1.0}]), "histograms[0].bins[0].count", "0"),
    one(
        "too many bins",
        histogram(bins=[{"count": 10001, "low": 0.0, "high": 1.0}]),
        "histograms[0].bins[0].count",
        "10001",
        "10000",
    ),
    one(
        "bins turned round",
        histogram(bins=[{"count": 4, "low": 1.0, "high": -1.0}]),
        "histograms[0].bins[0].high",
        "-1.0",
        "greater than low",
    ),
    one(
        "logarithmic from 0",
        histogram(bins=[{"count": 4, "low": 0.0, "high": 1.0, "spacing": "log"}]),
        "histograms[0].bins[0].low",
        "greater than 0",
        "logarithmic",
    ),
    one(
        "spacing",
        histogram(bins=[{"count": 4, "low": 0.1, "high": 1.0, "spacing": "lg"}]),
        "histograms[0].bins[0].spacing",
        "'lg'",
        "log",
    ),
    one("edges that fall", histogram(bins=[{"edges": [0.0, 0.5, 0.4]}]), "histograms[0].bins[0].edges[2]", "0.4"),
    one("one edge", histogram(bins=[{"edges": [0.0]}]), "histograms[0].bins[0].edges"),
    one("per", histogram(per="bins"), "histograms[0].per", "'bins'", "bin"),
    one("bins without an observable", histogram(observables=["pt(mu-)", "pt(mu+)"]), "histograms[0].bins", "2"),
    one("three observables", histogram(observables=["pt(mu-)"] * 3), "histograms[0].observables", "one or two"),
    one("relative accuracy of 0", {"accuracy": {"relative": 0.0}}, "accuracy.relative", "greater than 0"),
    one("rounds", {"accuracy": {"rounds": 25}}, "accuracy.rounds", "25", "24"),
    one("method", {"accuracy": {"method": "quad"}}, "accuracy.method", "'quad'", "quadrature"),
    one("derived kind", {"derived": [{"name": "A", "kind": "asym"}]}, "derived[0].kind", "'asym'", "asymmetry"),
    one(
        "asymmetry of nothing",
        {"derived": [{"name": "A", "kind": "asymmetry", "at": 0.0}]},
        "derived[0].observable",
        "nothing",
    ),
    one("variation of the process", {"variations": [{"name": "v", "process": "qed/compton"}]}, "variations[0].process"),
    Case(
        "two cuts of one name",
        {"cuts": [GOOD["cuts"][0], GOOD["cuts"][0]]},
        (("cuts[1].name", ("'acceptance'", "cuts[0]")),),
    ),
]

PHYSICS = [
    Case(
        "unknown process",
        {"process": "qed/muonpair"},
        (("process", ("'qed/muonpair'", "nearest: qed/muon-pair")),),
        "unknown",
    ),
    Case("unknown plugin", {"process": "quantum/compton"}, (("process", ("'quantum/compton'",)),), "unknown"),
    one("unit of energy", {"unit": "GeV"}, "unit", "'GeV'", "pb"),
    one("unit misspelt", {"unit": "pbarn"}, "unit", "'pbarn'", "pb"),
    one("unknown parameter", {"parameters": {"alfa": 0.007}}, "parameters.alfa", "alpha"),
    one("parameter as text", {"parameters": {"alpha": "big"}}, "parameters.alpha", "'big'"),
    one("mass of a stranger", {"masses": {"tau-": 1.7}}, "masses.tau-", "1.7", "mu-"),
    one("beam that is not there", collider(energies={"e-": 7.0, "p": 4.0}), "beams.energies.p", "e-, e+"),
    one("along an outgoing leg", collider(sqrt_s=10.0, along_z="mu-"), "beams.along_z", "'mu-'", "e-"),
    one(
        "polarised without helicities",
        {**formula(), **collider(sqrt_s=10.0, polarisation={"e-": -0.8})},
        "beams.polarisation.e-",
        "-0.8",
        "0",
    ),
    one(
        "angle of beams without energies",
        collider(sqrt_s=10.0, crossing_angle=0.083),
        "beams.crossing_angle",
        "0.083",
    ),
    one(
        "angle to a beam at rest",
        {"masses": {"e-": 0.25}, **collider(energies={"e-": 7.0, "e+": 0.25}, crossing_angle=0.083)},
        "beams.energies.e+",
        "greater than the mass of e+, 0.25",
        "both move",
    ),
    one("decay of two beams", {"beams": {"kind": "decay"}}, "beams.kind", "decay"),
    one("contributions of none", {"contributions": ["photon"]}, "contributions[0]", "'photon'", "none"),
    one("monte carlo", {"accuracy": {"method": "monte_carlo"}}, "accuracy.method", "closed_form or quadrature"),
    one("energy below the mass", {**target(energy=1e-4, target="gamma")}, "beams.target", "gamma"),
    one(
        "electron slower than at rest",
        {
            **target(energy=1e-4, target="e-"),
            "process": "qed/compton",
            "beams": {"kind": "collider", "energies": {"e-": 1e-4, "gamma": 1e-9}},
        },
        "beams.energies.e-",
        "0.0001",
        "mass",
    ),
    one("beams at rest against each other", collider(sqrt_s=0.001), "beams.sqrt_s", "0.001", "0.00102199"),
    one("z along the target", target(energy=0.001, along_z="e-"), "beams.along_z", "'e-'", "gamma"),
    one("target misspelt", target(energy=0.001, target="e+"), "beams.target", "'e+'", "e-"),
    one(
        "solid angle of pt",
        histogram(observables=["pt(mu-)"], per="solid_angle", bins=[{"count": 2, "low": 0.0, "high": 1.0}]),
        "histograms[0].per",
        "cos_theta",
    ),
    one(
        "solid angle beyond 1",
        histogram(per="solid_angle", bins=[{"count": 2, "low": -1.0, "high": 1.5}]),
        "histograms[0].bins[0]",
        "1",
    ),
    one(
        "between variations that are not there",
        {
            "derived": [{"name": "R", "kind": "ratio", "between": ["a", "b"]}],
            "variations": [{"name": "a", "parameters": {"alpha": 0.008}}],
        },
        "derived[0].between[1]",
        "'b'",
        "a",
    ),
    Case(
        "wrong parameter in a variation",
        {"variations": [{"name": "v", "parameters": {"alhpa": 0.008}}]},
        (("variations[0].parameters.alhpa", ("alpha",)),),
    ),
]

OBSERVABLES = [
    one(
        "rest frame of the massless",
        {**histogram(observables=["energy(mu+, frame=rest(mu-))"]), "masses": {"mu-": 0.0}},
        "histograms[0].observables[0]",
        "mu-",
        "no mass",
    ),
    one(
        "leading of two equals",
        {
            **formula(reaction="e- e+ -> gamma gamma", squared_amplitude="1", parameters={}),
            "beams": {"kind": "collider", "energies": {"e-": 5.0, "e+": 5.0}},
            "cuts": [{"name": "hard", "observable": "energy(leading(gamma))", "min": 1.0}],
            "histograms": [],
        },
        "cuts[0].observable",
        "each(...)",
    ),
    observable("cos_thta(mu-)", "cos_theta"),
    observable("cos_theta(tau-)", "mu-"),
    observable("cos_theta(e-)", "beam_a"),
    observable("cos_theta(mu-, frame=rest)", "rest"),
    observable("cos_theta(mu-, frame=lb)", "lab"),
    observable("cos_theta(mu-, fram=lab)", "frame"),
    observable("cos_theta(mu-", "column"),
    observable("cos_theta()", "cos_theta"),
    observable("pt(mu-) +", "column"),
    observable("pt(mu-) + theta(mu-)", "GeV", "rad"),
    observable("mass(mu-).real", "column"),
    observable("__import__('os')", "column"),
]

FORMULAS = [
    one("name that nobody declared", formula(squared_amplitude="beta*t**2"), "formula.squared_amplitude", "beta"),
    one("function that does not exist", formula(squared_amplitude="lgo(s)"), "formula.squared_amplitude", "log"),
    one("formula cut off", formula(squared_amplitude="alpha*(t + "), "formula.squared_amplitude", "column"),
    one("power with a hat", formula(squared_amplitude="t^2"), "formula.squared_amplitude", "column", "**"),
    one("reaction without an arrow", formula(reaction="e- e+ mu- mu+"), "formula.reaction", "->"),
    one("particle misspelt", formula(reaction="e- e+ -> mu- muu+"), "formula.reaction", "mu+"),
    one("three bodies", formula(reaction="e- e+ -> mu- mu+ gamma", squared_amplitude="1"), "formula.reaction", "two"),
    one("spin neither way", formula(spin_colour="sumed"), "formula.spin_colour", "summed"),
    one("parameter of the formula misspelt", {**formula(), "parameters": {"alhpa": 0.01}}, "parameters.alhpa", "alpha"),
    one("attribute", formula(squared_amplitude="s.__class__"), "formula.squared_amplitude", "column"),
    one("look-alike letter", formula(squared_amplitude="\u0430lpha*s"), "formula.squared_amplitude", "column 1"),
    one("deep nesting", formula(squared_amplitude="(" * 5000 + "s" + ")" * 5000), "formula.squared_amplitude"),
    one("a megabyte", formula(squared_amplitude="s+" * 500_000 + "s"), "formula.squared_amplitude", "10000"),
    one("power tower", formula(squared_amplitude="9**9**9**9"), "formula.squared_amplitude", "100"),
]

SEVERAL = [
    Case(
        "everything at once",
        {
            "unit": "pbarn",
            "parameters": {"alfa": 0.007},
            "masses": {"tau-": 1.0},
            "cuts": [{"name": "c", "observable": "ptt(mu-)", "min": 1.0}],
            **histogram(observables=["cos_theta(nobody)"]),
        },
        (
            ("unit", ("pb",)),
            ("parameters.alfa", ("alpha",)),
            ("masses.tau-", ("mu-",)),
            ("cuts[0].observable", ("pt",)),
            ("histograms[0].observables[0]", ("nobody",)),
        ),
    ),
    Case(
        "syntax in several places",
        {"seed": -1, "beams": {"kind": "collider", "sqrt_s": -1.0}, "accuracy": {"relative": 2.0}},
        (("seed", ()), ("beams.sqrt_s", ()), ("accuracy.relative", ())),
    ),
]

CASES = [*DOCUMENT, *PHYSICS, *OBSERVABLES, *FORMULAS, *SEVERAL]
