"""Task A: e- e+ -> mu- mu+, the total and 100 bins of cos theta, against what is written by hand in an afternoon.

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
from dataclasses import dataclass
from statistics import median
from typing import Any

import numpy as np
from comparators import ELECTRON, MUON, GaussLegendre, quad_bins

import barnwright
from barnwright.engine import evaluate, resolve
from barnwright.engine.calculate import calculate
from barnwright.integrate.ledger import Ledger
from barnwright.registry import catalogue

BINS, POINTS, REPEATS, SCAN_REPEATS = 100, 1000, 101, 9
SQRT_S = 10.0
EDGES = np.linspace(-1.0, 1.0, BINS + 1)
ENERGIES = np.linspace(5.0, 25.0, POINTS)
Contenders = Mapping[str, Callable[[], object]]


@dataclass(frozen=True, slots=True)
class Target:
    """A figure to reach: how many times faster than the comparator (or slower, where ``slower`` is set)."""

    contender: str
    at_least: float
    aim_for: float
    slower: bool = False


ONE_ENERGY = (
    Target("kernel, quadrature", 100, 300),
    Target("predict, quadrature", 7, 20),
    Target("predict, closed form", 7, 20),
    Target("gRPC, quadrature", 2, 5),
    Target("gRPC, closed form", 2, 5),
)
SCAN = (
    Target("scan, arrays, quadrature", 5, 3, slower=True),
    Target("scan, arrays, closed form", 5, 3, slower=True),
    Target("scan, every prediction, quadrature", 60, 20, slower=True),
    Target("scan, every prediction, closed form", 60, 20, slower=True),
)


def request(method: str) -> barnwright.Request:
    """The request of task A with the comparators' masses, bins as contents."""
    histogram = {
        "name": "angle",
        "observables": ["cos_theta(mu-, frame=cm)"],
        "bins": [{"count": BINS, "low": -1.0, "high": 1.0}],
        "per": "bin",
    }
    return barnwright.Request.accept(
        process="qed/muon-pair",
        beams={"kind": "collider", "sqrt_s": SQRT_S},
        masses={"e-": ELECTRON, "mu-": MUON},
        histograms=[histogram],
        accuracy={"method": method},
    )


def kernel(method: str) -> Callable[[], object]:
    """Only the work on the block, as a worker does it."""
    loaded = catalogue().load("qed/muon-pair")
    plan = resolve(request(method), catalogue().load)
    stage, blocks = plan.stage(), list(next(calculate(plan, Ledger(plan.digest))))
    return lambda: [evaluate(block, stage, loaded.process) for block in blocks]


def one_energy(client: Any) -> Contenders:
    """What is measured at one energy."""
    by_quadrature, by_form = request("quadrature"), request("closed_form")
    return {
        "scipy quad, bin by bin": lambda: quad_bins(EDGES, SQRT_S**2),
        "kernel, quadrature": kernel("quadrature"),
        "predict, quadrature": lambda: barnwright.predict(by_quadrature),
        "predict, closed form": lambda: barnwright.predict(by_form),
        "gRPC, quadrature": lambda: client.predict(by_quadrature),
        "gRPC, closed form": lambda: client.predict(by_form),
    }


def many_energies() -> Contenders:
    """What is measured over a thousand energies."""
    bare = GaussLegendre(EDGES)
    over = {"beams.sqrt_s": ENERGIES.tolist()}
    contenders: dict[str, Callable[[], object]] = {"bare Gauss-Legendre loop, 4 nodes a bin": lambda: bare(ENERGIES)}
    for method, words in (("quadrature", "quadrature"), ("closed_form", "closed form")):
        asked = request(method)
        contenders[f"scan, arrays, {words}"] = lambda asked=asked: barnwright.scan(asked, over=over).values
        contenders[f"scan, every prediction, {words}"] = lambda asked=asked: list(barnwright.scan(asked, over=over))
    return contenders


def check_answers(client: Any) -> None:
    """All of them give the same bins to 1e-10, or nothing is measured."""
    by_hand = quad_bins(EDGES, SQRT_S**2)
    loop = GaussLegendre(EDGES)(ENERGIES)
    for method in ("quadrature", "closed_form"):
        for answer in (barnwright.predict(request(method)), client.predict(request(method))):
            np.testing.assert_allclose(answer.histograms["angle"].values, by_hand[1:], rtol=1e-9)
            np.testing.assert_allclose(answer.total.value, by_hand[0], rtol=1e-9)
        sweep = barnwright.scan(request(method), over={"beams.sqrt_s": ENERGIES.tolist()})
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
