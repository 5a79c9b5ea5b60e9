"""Messages that nobody would send: answers or refusals, never UNKNOWN or INTERNAL."""

from __future__ import annotations

from typing import Any

import grpc
import pytest
from faces.wrong_requests import GOOD
from google.protobuf.descriptor import FieldDescriptor
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st
from service.running import SERVICE, Running

from barnwright.wire import encode
from barnwright.wire.v1 import request_pb2, service_pb2, values_pb2

METHODS = {method.name: method for method in service_pb2.DESCRIPTOR.services_by_name["CrossSectionService"].methods}
VALUE = values_pb2.ParameterValue.DESCRIPTOR
ALLOWED = {"OK", "INVALID_ARGUMENT", "NOT_FOUND", "FAILED_PRECONDITION", "DEADLINE_EXCEEDED"}
WORDS = ["qed/muon-pair", "healthy/pair", "collider", "fixed_target", "decay", "e-", "e+", "mu-", "beam_a", "pb", "log"]
WORDS += [
    "cos_theta(mu-)",
    "pt(mu-)",
    "s",
    "asymmetry",
    "ratio",
    "value",
    "e- e+ -> mu- mu+",
    "averaged",
    "beams.sqrt_s",
]
PATIENT = settings(max_examples=40, suppress_health_check=[HealthCheck.function_scoped_fixture, HealthCheck.too_slow])

SCALARS: dict[int, st.SearchStrategy[Any]] = {
    FieldDescriptor.CPPTYPE_DOUBLE: st.floats() | st.sampled_from([0.0, 1.0, 10.0, -1.0, 1e300]),
    FieldDescriptor.CPPTYPE_INT64: st.integers(-(2**63), 2**63 - 1) | st.integers(-2, 5),
    FieldDescriptor.CPPTYPE_UINT64: st.integers(0, 2**64 - 1),
    FieldDescriptor.CPPTYPE_BOOL: st.booleans(),
    FieldDescriptor.CPPTYPE_STRING: st.sampled_from(WORDS) | st.text(max_size=20),
}


def messages(descriptor: Any) -> st.SearchStrategy[dict[str, Any]]:
    """Any fields of a message, with any values; one of a oneof at most."""
    choices = [field for field in descriptor.fields if len(_siblings(field)) > 1]
    if choices:
        return st.one_of([st.fixed_dictionaries({field.name: _values(field)}) for field in choices])
    return st.fixed_dictionaries({}, optional={field.name: _values(field) for field in descriptor.fields})


def built(descriptor: Any) -> st.SearchStrategy[Any]:
    """The same as messages."""
    return messages(descriptor).map(lambda fields: descriptor._concrete_class(**fields))


def _siblings(field: FieldDescriptor) -> list[Any]:
    return [] if field.containing_oneof is None else list(field.containing_oneof.fields)


def _values(field: FieldDescriptor) -> st.SearchStrategy[Any]:
    inner = field.message_type
    if inner is not None and inner.GetOptions().map_entry:
        value = inner.fields_by_name["value"]
        values = SCALARS[value.cpp_type] if value.message_type is None else built(value.message_type)
        return st.dictionaries(SCALARS[FieldDescriptor.CPPTYPE_STRING], values, max_size=2)
    one = SCALARS[field.cpp_type] if inner is None else built(inner)
    return one if field.has_presence else st.lists(one, max_size=3)


def code_of(server: Running, method: str, message: bytes) -> str:
    """The name of the code of a call with these bytes."""
    path = f"/{SERVICE}/{method}"
    with server.channel() as channel:
        call = channel.unary_stream if METHODS[method].server_streaming else channel.unary_unary
        try:
            answer = call(path)(message, wait_for_ready=True, timeout=20)
            list(answer) if METHODS[method].server_streaming else None
        except grpc.RpcError as failure:
            return str(failure.code().name)
    return "OK"


@pytest.mark.parametrize("method", METHODS)
@PATIENT
@given(data=st.data())
def test_any_bytes(server: Running, method: str, data: st.DataObject) -> None:
    """Whatever they are."""
    assert code_of(server, method, data.draw(st.binary(max_size=200))) in ALLOWED


@pytest.mark.parametrize("method", ["GetProcess", "ValidateRequest", "Predict", "Scan"])
@PATIENT
@given(data=st.data())
def test_any_messages(server: Running, method: str, data: st.DataObject) -> None:
    """Fields that are right by themselves, and wrong together."""
    message = data.draw(built(METHODS[method].input_type))
    assert code_of(server, method, message.SerializeToString()) in ALLOWED


@pytest.mark.parametrize("method", ["ValidateRequest", "Predict", "Scan"])
@PATIENT
@given(data=st.data())
def test_any_change_of_a_good_message(server: Running, method: str, data: st.DataObject) -> None:
    """Some fields on top of those that are right."""
    kind = METHODS[method].input_type
    message = kind._concrete_class(request=encode(GOOD, request_pb2.Request))
    change = data.draw(st.sampled_from(list(request_pb2.Request.DESCRIPTOR.fields)))
    message.request.MergeFrom(request_pb2.Request(**{change.name: data.draw(_values(change))}))
    if method == "Scan":
        message.over.add(key=data.draw(st.sampled_from(WORDS)), values=data.draw(st.lists(built(VALUE), max_size=3)))
    assert code_of(server, method, message.SerializeToString()) in ALLOWED
