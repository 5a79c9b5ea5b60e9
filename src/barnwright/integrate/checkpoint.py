"""Sums, rounds and worst points as plain data that JSON can carry, without losing a bit, and back.

Arrays are their little-endian bytes in base64, numbers that may be infinite or NaN are hexadecimal floats.
"""

from __future__ import annotations

from base64 import b64decode, b64encode
from typing import Any

import numpy as np

from barnwright.integrate.account import Account
from barnwright.integrate.block import Round, Strand, StrandKey
from barnwright.integrate.settled import Settled
from barnwright.integrate.tally import Array, Sums, WorstPoint

Plain = dict[str, Any]


def dump_array(array: Array) -> Plain:
    """An array as its shape and its bytes."""
    data = np.ascontiguousarray(array, dtype="<f8").tobytes()
    return {"shape": list(array.shape), "float64": b64encode(data).decode("ascii")}


def load_array(plain: Plain) -> Array:
    """The array again."""
    return np.frombuffer(b64decode(plain["float64"]), dtype="<f8").astype(np.float64).reshape(plain["shape"])


def dump_sums(sums: Sums) -> Plain:
    """All arrays of some sums."""
    training = None if sums.training is None else [dump_array(array) for array in sums.training]
    return {"added": dump_array(sums.added), "largest": dump_array(sums.largest), "training": training}


def load_sums(plain: Plain) -> Sums:
    """The sums again."""
    training = plain["training"]
    arrays = None if training is None else tuple(load_array(array) for array in training)
    return Sums(load_array(plain["added"]), load_array(plain["largest"]), arrays)


def dump_key(key: StrandKey) -> list[Any]:
    """Points, stratum and replicate."""
    return [list(key[0]), key[1], key[2]]


def load_key(plain: list[Any]) -> StrandKey:
    """The key again."""
    (start, stop), stratum, replicate = plain
    return (start, stop), stratum, replicate


def dump_round(opened: Round) -> Plain:
    """A round with its strands."""
    strands = [[list(s.points), s.stratum, s.replicate, list(s.chunks), list(s.seed)] for s in opened.strands]
    return {
        "stage": opened.stage,
        "number": opened.number,
        "strands": strands,
        "length": opened.length,
        "training": opened.training,
    }


def load_round(plain: Plain) -> Round:
    """The round again."""
    strands = tuple(
        Strand((points[0], points[1]), stratum, replicate, (chunks[0], chunks[1]), tuple(seed))
        for points, stratum, replicate, chunks, seed in plain["strands"]
    )
    return Round(plain["stage"], plain["number"], strands, plain["length"], plain["training"])


def dump_worst(worst: tuple[WorstPoint, ...]) -> list[Any]:
    """Worst points."""
    return [[point.value.hex(), [[c.hex() for c in leg] for leg in point.momenta]] for point in worst]


def load_worst(plain: list[Any]) -> tuple[WorstPoint, ...]:
    """The worst points again."""
    read = float.fromhex
    return tuple(WorstPoint(read(v), tuple(tuple(read(c) for c in leg) for leg in legs)) for v, legs in plain)


def dump_account(account: Account) -> Plain:
    """An account."""
    return {
        "covered": [list(chunks) for chunks in account.covered],
        "nodes": [[*node, dump_sums(sums)] for node, sums in account.nodes.items()],
        "counters": dict(account.counters),
        "worst": dump_worst(account.worst),
    }


def load_account(plain: Plain) -> Account:
    """The account again."""
    return Account(
        tuple((start, stop) for start, stop in plain["covered"]),
        {(level, index): load_sums(sums) for level, index, sums in plain["nodes"]},
        dict(plain["counters"]),
        load_worst(plain["worst"]),
    )


def dump_settled(settled: Settled) -> Plain:
    """A closed round."""
    return {
        "number": settled.number,
        "sums": [[dump_key(key), settled.chunks[key], dump_sums(sums)] for key, sums in settled.sums.items()],
        "counters": dict(settled.counters),
        "worst": dump_worst(settled.worst),
    }


def load_settled(plain: Plain) -> Settled:
    """The closed round again."""
    entries = [(load_key(key), chunks, load_sums(sums)) for key, chunks, sums in plain["sums"]]
    return Settled(
        plain["number"],
        {key: sums for key, _, sums in entries},
        {key: chunks for key, chunks, _ in entries},
        dict(plain["counters"]),
        load_worst(plain["worst"]),
    )
