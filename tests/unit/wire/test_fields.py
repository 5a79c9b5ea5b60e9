"""The fields of the wire are those of the documents."""

from __future__ import annotations

from typing import Any

import pytest
from google.protobuf.descriptor import FieldDescriptor

from barnwright import documents
from barnwright.wire.v1 import prediction_pb2, process_pb2, request_pb2, service_pb2, values_pb2

PAIRS = [
    (request_pb2.Request, [documents.Request]),
    (request_pb2.Beams, [documents.ColliderBeams, documents.FixedTargetBeams, documents.DecayBeams]),
    (request_pb2.Cut, [documents.Cut]),
    (request_pb2.Cut, [documents.CutChange]),
    (request_pb2.HistogramRequest, [documents.HistogramRequest]),
    (request_pb2.Bins, [documents.Bins]),
    (request_pb2.Variation, [documents.Variation]),
    (request_pb2.BeamsChange, [documents.BeamsChange]),
    (request_pb2.DerivedRequest, [documents.AsymmetryRequest, documents.RatioRequest, documents.EnvelopeRequest]),
    (request_pb2.Accuracy, [documents.Accuracy]),
    (request_pb2.Formula, [documents.Formula]),
    (request_pb2.FormulaPeak, [documents.FormulaPeak]),
    (prediction_pb2.Prediction, [documents.Prediction]),
    (prediction_pb2.Total, [documents.Total]),
    (prediction_pb2.Histogram, [documents.Histogram]),
    (prediction_pb2.Derived, [documents.Derived]),
    (prediction_pb2.DerivedBins, [documents.DerivedBins]),
    (prediction_pb2.Part, [documents.Part]),
    (prediction_pb2.Note, [documents.Note]),
    (prediction_pb2.Diagnostics, [documents.Diagnostics]),
    (prediction_pb2.Run, [documents.Run]),
    (process_pb2.ProcessSummary, [documents.ProcessSummary]),
    (process_pb2.ParameterDescription, [documents.ParameterDescription]),
    (process_pb2.Condition, [documents.Condition]),
    (process_pb2.Alternative, [documents.Alternative]),
    (process_pb2.ProcessDescription, [documents.ProcessDescription]),
]
FILES = [values_pb2, request_pb2, prediction_pb2, process_pb2, service_pb2]


@pytest.mark.parametrize(("message", "models"), PAIRS, ids=lambda entry: getattr(entry, "__name__", ""))
def test_a_message_has_the_fields_of_its_document(message: Any, models: list[Any]) -> None:
    """Not one more, not one less, under the names that are written; one may name what is null."""
    written = {field.alias or name for model in models for name, field in model.model_fields.items()}
    assert {field.name for field in message.DESCRIPTOR.fields} - {"absent"} == written


def test_presence_is_known_of_every_single_value() -> None:
    """A field that is not set differs from one that is set to zero."""
    for file in FILES:
        for message in file.DESCRIPTOR.message_types_by_name.values():
            single = [field for field in message.fields if not _is_many(field)]
            assert all(field.has_presence for field in single), message.full_name


def test_every_call_has_messages_of_its_own() -> None:
    """A request and a response that no other call uses, named after it."""
    for method in service_pb2.DESCRIPTOR.services_by_name["CrossSectionService"].methods:
        assert method.input_type.name == f"{method.name}Request"
        assert method.output_type.name == f"{method.name}Response"


def _is_many(field: FieldDescriptor) -> bool:
    empty = getattr(field.containing_type._concrete_class(), field.name)
    return hasattr(empty, "__len__") and not isinstance(empty, (str, bytes))
