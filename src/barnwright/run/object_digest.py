"""The digest of a process object: everything that its numbers come from, as far as Python lets it be seen.

Rules of this file
------------------
- Of a function: its byte code with all names and constants, its defaults, what it closes over, and the functions,
  classes and values of its own module that it names.
- Functions and classes of modules that hold none of the process's laws count by their name alone, as modules do.
- Nothing that differs between two runs of one program: no addresses, no names of files, no line numbers.
"""

from __future__ import annotations

import dataclasses
import hashlib
from collections.abc import Callable, Iterable, Iterator, Mapping
from types import CodeType, FunctionType, MethodType, ModuleType
from typing import Any

import numpy as np
from pydantic import BaseModel

from barnwright.process import Process, facts_of
from barnwright.registry.functions import function_of

_PLAIN = (type(None), bool, int, float, complex, str, bytes)
_DEEPEST = 50


def object_digest(process: Process) -> str:
    """SHA-256 in hexadecimal over a process's declaration and the code of its laws."""
    functions = (function_of(law) for law in (*process.laws, *process.closed_forms))
    walk = _Walk(frozenset(getattr(function, "__module__", None) or "" for function in functions))
    digest = hashlib.sha256()
    for field in dataclasses.fields(process):
        if field.name not in ("parameters", "legs"):
            for text in walk.texts(getattr(process, field.name), 0):
                digest.update(f"{field.name}\0{text}\0".encode())
    for fact in facts_of(process.parameters):
        digest.update(repr(fact).encode())
    return digest.hexdigest()


class _Walk:
    """A walk over values, in which each is met once; ``home`` are the modules whose code counts."""

    def __init__(self, home: frozenset[str]) -> None:
        self._home = home
        self._met: dict[int, tuple[int, Any]] = {}

    def texts(self, value: Any, depth: int) -> Iterator[str]:
        """Texts that are the same for the same value; of what was met already, when that was."""
        if isinstance(value, _PLAIN):
            yield repr(value)
        elif id(value) in self._met:
            yield f"again {self._met[id(value)][0]}"
        elif depth > _DEEPEST:
            yield "deeper"
        else:
            self._met[id(value)] = (len(self._met), value)  # kept, so that no other value gets its address
            yield type(value).__qualname__
            for part in self._parts(value):
                yield from self.texts(part, depth + 1)

    def _parts(self, value: Any) -> Iterable[Any]:
        """What a value that is not plain consists of."""
        if isinstance(value, (FunctionType, type)) and value.__module__ not in self._home:
            return (value.__module__, value.__qualname__)
        return next((parts(value) for kinds, parts in _FORMS if isinstance(value, kinds)), None) or _of_object(value)


def _of_function(function: FunctionType) -> Iterator[Any]:
    yield from (function.__code__, function.__defaults__, function.__kwdefaults__)
    for cell in function.__closure__ or ():
        try:
            yield cell.cell_contents
        except ValueError:  # a name that the enclosing function has not given a value yet
            yield "empty"
    for name in _names(function.__code__):
        if name in function.__globals__:
            yield function.__globals__[name]


def _names(code: CodeType) -> Iterator[str]:
    """All names that a function and those inside it look up."""
    yield from code.co_names
    for constant in code.co_consts:
        if isinstance(constant, CodeType):
            yield from _names(constant)


def _of_code(code: CodeType) -> Iterable[Any]:
    return (code.co_code, code.co_names, code.co_varnames, code.co_freevars, code.co_consts)


def _of_array(array: Any) -> Iterable[Any]:
    return (str(array.dtype), array.shape, array.tolist() if array.dtype == object else array.tobytes())


def _of_mapping(table: Mapping[Any, Any]) -> Iterable[Any]:
    return (part for key in sorted(table, key=repr) for part in (key, table[key]))


def _of_class(kind: type) -> Iterable[Any]:
    return (kind.__qualname__, *(part for part in vars(kind).values() if isinstance(part, (FunctionType, *_PLAIN))))


def _of_object(value: Any) -> Iterator[Any]:
    """The class with the fields of a record, or with the attributes; a sympy expression is what it prints."""
    yield type(value)
    if dataclasses.is_dataclass(value):
        yield from (getattr(value, field.name) for field in dataclasses.fields(value))
    elif hasattr(value, "free_symbols"):
        yield str(value)
    else:
        yield from (getattr(value, name, None) for name in ("__name__", "py_func", "func", "args", "keywords"))
        yield getattr(value, "__dict__", None)


_FORMS: tuple[tuple[Any, Callable[[Any], Iterable[Any]]], ...] = (
    (FunctionType, _of_function),
    (CodeType, _of_code),
    (MethodType, lambda method: (method.__func__, method.__self__)),
    (ModuleType, lambda module: (module.__name__,)),
    (type, _of_class),
    ((np.ndarray, np.generic), _of_array),
    (Mapping, _of_mapping),
    ((list, tuple), lambda entries: ("sequence", *entries)),
    ((set, frozenset), lambda entries: ("set", *sorted(entries, key=repr))),
    (BaseModel, lambda model: (model.model_dump(),)),
)
