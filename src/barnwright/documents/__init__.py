"""The documents: what is asked (``Request``) and what is answered (``Prediction``), syntax only."""

from __future__ import annotations

from barnwright.documents.accuracy import Accuracy
from barnwright.documents.base import Document
from barnwright.documents.beams import ColliderBeams, DecayBeams, FixedTargetBeams
from barnwright.documents.cuts import Cut, CutChange
from barnwright.documents.derived import AsymmetryRequest, RatioRequest
from barnwright.documents.findings import violations_of
from barnwright.documents.formula import Formula, FormulaPeak
from barnwright.documents.histograms import Bins, HistogramRequest
from barnwright.documents.merge import merge, split_key
from barnwright.documents.request import Request
from barnwright.documents.variations import BeamsChange, Variation

__all__ = [
    "Accuracy",
    "AsymmetryRequest",
    "BeamsChange",
    "Bins",
    "ColliderBeams",
    "Cut",
    "CutChange",
    "DecayBeams",
    "Document",
    "FixedTargetBeams",
    "Formula",
    "FormulaPeak",
    "HistogramRequest",
    "RatioRequest",
    "Request",
    "Variation",
    "merge",
    "split_key",
    "violations_of",
]
