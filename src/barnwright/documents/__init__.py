"""The documents: what is asked (``Request``) and what is answered (``Prediction``), syntax only."""

from __future__ import annotations

from barnwright.documents.accuracy import Accuracy
from barnwright.documents.axes import plain_axes
from barnwright.documents.base import Document
from barnwright.documents.beams import ColliderBeams, DecayBeams, FixedTargetBeams
from barnwright.documents.by_name import ByName
from barnwright.documents.curves import Curve, Curves
from barnwright.documents.cuts import Cut, CutChange
from barnwright.documents.derived import AsymmetryRequest, EnvelopeRequest, RatioRequest
from barnwright.documents.description import (
    Alternative,
    Condition,
    ParameterDescription,
    ProcessDescription,
    ProcessSummary,
)
from barnwright.documents.estimate import Estimate, Total
from barnwright.documents.findings import violations_of
from barnwright.documents.formula import Formula, FormulaPeak
from barnwright.documents.histogram import Covariance, Histogram
from barnwright.documents.histograms import Bins, HistogramRequest
from barnwright.documents.merge import merge, split_key
from barnwright.documents.notes import Diagnostics, Note, Run
from barnwright.documents.prediction import Prediction
from barnwright.documents.remainder import checked, completed, remainder_of
from barnwright.documents.request import Request
from barnwright.documents.results import Derived, DerivedBins, Part
from barnwright.documents.scanned import Scanned
from barnwright.documents.variations import BeamsChange, Variation

__all__ = [
    "Accuracy",
    "Alternative",
    "AsymmetryRequest",
    "BeamsChange",
    "Bins",
    "ByName",
    "ColliderBeams",
    "Condition",
    "Covariance",
    "Curve",
    "Curves",
    "Cut",
    "CutChange",
    "DecayBeams",
    "Derived",
    "DerivedBins",
    "Diagnostics",
    "Document",
    "EnvelopeRequest",
    "Estimate",
    "FixedTargetBeams",
    "Formula",
    "FormulaPeak",
    "Histogram",
    "HistogramRequest",
    "Note",
    "ParameterDescription",
    "Part",
    "Prediction",
    "ProcessDescription",
    "ProcessSummary",
    "RatioRequest",
    "Request",
    "Run",
    "Scanned",
    "Total",
    "Variation",
    "checked",
    "completed",
    "merge",
    "plain_axes",
    "remainder_of",
    "split_key",
    "violations_of",
]
