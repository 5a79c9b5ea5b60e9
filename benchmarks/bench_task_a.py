"""Task A: e- e+ -> mu- mu+ by photon and Z, total and 100 bins of cos theta, against what is written in an afternoon.

By squared amplitude and by helicity amplitudes with the answer of the whole alone, as the comparators have it, and as
the process is installed: with photon, Z and interference reported as well, which are four answers in the place of one.

Every contender is timed in turn, again and again, and the medians are compared, so that a busy machine slows all of
them. The answers are compared first: a ratio of two different numbers says nothing.
"""

from __future__ import annotations

import re
import subprocess
import sys
import time
from collections.abc import Callable, Iterator, Mapping
from contextlib import contextmanager
from dataclasses import dataclass, replace
from statistics import median
from typing import Any

import numpy as np
from comparators import ALPHA, MIXING, MUON, Z_MASS, Z_WIDTH, GaussLegendre, quad_bins

import barnwright
from barnwright.engine import evaluate, resolve
from barnwright.engine.calculate import calculate
from barnwright.integrate.ledger import Ledger
from barnwright.process import Process
from barnwright.registry import catalogue
from barnwright.run.objects import loaded_object

BINS, POINTS, REPEATS, SCAN_REPEATS = 100, 1000, 51, 7
NAME = "electroweak/muon-pair"
SQRT_S = 60.0
EDGES = np.linspace(-1.0, 1.0, BINS + 1)
ENERGIES = np.linspace(20.0, 200.0, POINTS)
KINDS = ("squared_amplitude", "helicity_amplitudes", "closed_form")
WORDS = {"squared amplitude": KINDS[0], "helicity amplitudes": KINDS[1], "closed form": KINDS[2]}
Contenders = Mapping[str, Callable[[], object]]


@dataclass(frozen=True, slots=True)
class Target:
    """A figure to reach: how many times faster than the comparator (or slower, where ``slower`` is set)."""

    contender: str
    at_least: float
    aim_for: float
    slower: bool = False


ONE_ENERGY = (
    Target("kernel, squared amplitude", 100, 300),
    Target("kernel, helicity amplitudes", 100, 300),
    Target("predict, quadrature, contributions", 7, 20),
    Target("predict, closed form, contributions", 7, 20),
    Target("gRPC, quadrature, contributions", 2, 5),
    Target("gRPC, closed form, contributions", 2, 5),
)
SCAN = (
    Target("arrays, squared amplitude", 5, 3, slower=True),
    Target("arrays, helicity amplitudes", 5, 3, slower=True),
    Target("arrays, closed form", 5, 3, slower=True),
    Target("arrays, quadrature, contributions", 5, 3, slower=True),
    Target("every prediction, squared amplitude", 60, 20, slower=True),
    Target("every prediction, helicity amplitudes", 60, 20, slower=True),
    Target("every prediction, quadrature, contributions", 60, 20, slower=True),
)


def request(method: str | None = None) -> barnwright.Request:
    """The request of task A with the comparators' numbers, bins as contents."""
    histogram = {
        "name": "angle",
        "observables": ["cos_theta(mu-, frame=cm)"],
        "bins": [{"count": BINS, "low": -1.0, "high": 1.0}],
        "per": "bin",
    }
    return barnwright.Request.accept(
        process=NAME,
        beams={"kind": "collider", "sqrt_s": SQRT_S},
        parameters={"alpha": ALPHA, "sin2_theta_w": MIXING, "z_mass": Z_MASS, "z_width": Z_WIDTH},
        masses={"mu-": MUON},
        histograms=[histogram],
        accuracy={} if method is None else {"method": method},
    )


def alone(kind: str) -> Process:
    """The process with one of its laws, or its closed form, and no contributions."""
    whole = catalogue().load(NAME).process
    laws = tuple(law for law in whole.laws if law.kind == kind)
    forms = whole.closed_forms if kind == "closed_form" else ()
    return replace(whole, laws=laws, closed_forms=forms, contributions={})


def kernel(process: Process) -> Callable[[], object]:
    """Only the work on the block, as a worker does it."""
    plan = resolve(request(), lambda _: loaded_object(process))
    stage, blocks = plan.stage(), list(next(calculate(plan, Ledger(plan.digest))))
    return lambda: [evaluate(block, stage, process) for block in blocks]


def one_energy(client: Any) -> Contenders:
    """What is measured at one energy."""
    by_quadrature, by_form = request("quadrature"), request("closed_form")
    return {
        "scipy quad, bin by bin": lambda: quad_bins(EDGES, SQRT_S**2),
        "kernel, squared amplitude": kernel(alone(KINDS[0])),
        "kernel, helicity amplitudes": kernel(alone(KINDS[1])),
        "predict, quadrature, contributions": lambda: barnwright.predict(by_quadrature),
        "predict, closed form, contributions": lambda: barnwright.predict(by_form),
        "gRPC, quadrature, contributions": lambda: client.predict(by_quadrature),
        "gRPC, closed form, contributions": lambda: client.predict(by_form),
    }


def many_energies() -> Contenders:
    """What is measured over a thousand energies."""
    bare = GaussLegendre(EDGES)
    scans = {word: scanned(request(), alone(kind)) for word, kind in WORDS.items()}
    scans["quadrature, contributions"] = scanned(request("quadrature"), None)
    contenders: dict[str, Callable[[], object]] = {"bare Gauss-Legendre loop, 4 nodes a bin": lambda: bare(ENERGIES)}
    for words, scan in scans.items():
        contenders[f"arrays, {words}"] = lambda scan=scan: scan().values
        contenders[f"every prediction, {words}"] = lambda scan=scan: list(scan())
    return contenders


def scanned(asked: barnwright.Request, process: Process | None) -> Callable[[], Any]:
    """A scan of a request over the energies, with a process object or the one that it names."""
    over = {"beams.sqrt_s": ENERGIES.tolist()}
    given = {} if process is None else {"process": process}
    return lambda: barnwright.scan(asked, over=over, **given)


def check_answers(client: Any) -> None:
    """All of them give the same bins to 1e-10, or nothing is measured."""
    by_hand, loop = quad_bins(EDGES, SQRT_S**2), GaussLegendre(EDGES)(ENERGIES)
    found = [barnwright.predict(request(), process=alone(kind)) for kind in KINDS]
    found += [
        face.predict(request(method)) for face in (barnwright, client) for method in ("quadrature", "closed_form")
    ]
    for answer in found:
        np.testing.assert_allclose(answer.histograms["angle"].values, by_hand[1:], rtol=1e-9)
        np.testing.assert_allclose(answer.total.value, by_hand[0], rtol=1e-9)
    for kind in KINDS:
        sweep = scanned(request(), alone(kind))()
        np.testing.assert_allclose(sweep.values, loop.sum(axis=1), rtol=1e-9)
        np.testing.assert_allclose(sweep[-1].histograms["angle"].values, loop[-1], rtol=1e-9)


def medians(contenders: Contenders, repeats: int) -> dict[str, float]:
    """Seconds of every contender: after a warm-up each in turn, repeated, the median."""
    seconds: dict[str, list[float]] = {name: [] for name in contenders}
    for turn in range(repeats + 2):
        for name, contender in contenders.items():
            start = time.perf_counter()
            contender()
            if turn >= 2:
                seconds[name].append(time.perf_counter() - start)
    return {name: median(times) for name, times in seconds.items()}


def report(title: str, seconds: Mapping[str, float], targets: tuple[Target, ...]) -> None:
    """A table of ratios against the first contender."""
    comparator = next(iter(seconds))
    word = "times as long" if targets[0].slower else "times faster"
    print(f"\n{title}\n{'':42}{'ms':>9}{word:>16}{'at least':>11}{'aim for':>10}")
    print(f"{comparator:42}{1e3 * seconds[comparator]:9.3f}")
    for target in targets:
        ratio = seconds[comparator] / seconds[target.contender]
        shown, sign = (1 / ratio, "<= ") if target.slower else (ratio, ">= ")
        good = shown <= target.at_least if target.slower else shown >= target.at_least
        bounds = f"{sign}{target.at_least:g}", f"{sign}{target.aim_for:g}"
        verdict = "" if good else "   below the least"
        name, own = target.contender, 1e3 * seconds[target.contender]
        print(f"{name:42}{own:9.3f}{shown:16.1f}{bounds[0]:>11}{bounds[1]:>10}{verdict}")


@contextmanager
def served() -> Iterator[Any]:
    """A client of an idle server of our own, ended afterwards."""
    words = [sys.executable, "-m", "barnwright", "serve", "--address", "127.0.0.1:0"]
    with subprocess.Popen(words, stdout=subprocess.PIPE, text=True) as server:
        try:
            assert server.stdout is not None
            said = re.search(r"127\.0\.0\.1:\d+", server.stdout.readline())
            assert said is not None, "the server did not say where it listens"
            with barnwright.connect(said.group(), patience=60.0) as client:
                yield client
        finally:
            server.terminate()


def main() -> None:
    """Check the answers, measure, print."""
    with served() as client:
        check_answers(client)
        at_one = medians(one_energy(client), REPEATS)
    over_many = medians(many_energies(), SCAN_REPEATS)
    print(f"task A: e- e+ -> mu- mu+, {BINS} bins; medians of {REPEATS} and {SCAN_REPEATS} interleaved repeats")
    report(f"one energy, total and {BINS} bins, against scipy.integrate.quad bin by bin", at_one, ONE_ENERGY)
    report(f"{POINTS} energies x {BINS} bins, against the bare numpy loop", over_many, SCAN)


if __name__ == "__main__":
    main()
