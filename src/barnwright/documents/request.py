"""The request: the document that asks."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Annotated, Any, Literal, Self

from pydantic import (
    BeforeValidator,
    Field,
    ModelWrapValidatorHandler,
    PlainSerializer,
    ValidationError,
    model_validator,
)

from barnwright.documents.accuracy import Accuracy
from barnwright.documents.agreement import disagreements
from barnwright.documents.base import MAX_ITEMS, Document, Expects, Mass, Name, ParameterValue
from barnwright.documents.beams import Beams
from barnwright.documents.canonical import SAFE_WHOLE, canonical_text, digest_of
from barnwright.documents.checks import refuse
from barnwright.documents.cuts import Cut, named
from barnwright.documents.derived import DerivedRequest
from barnwright.documents.examine import examine, plain
from barnwright.documents.formats import asked_in, read_json, read_text, read_toml
from barnwright.documents.formula import Formula
from barnwright.documents.histograms import HistogramRequest
from barnwright.documents.merge import merge
from barnwright.documents.variations import Variation
from barnwright.errors import RequestError, Violation, show

SCHEMA = "barnwright.request/1"


def _whole(value: Any) -> Any:
    """A seed above 2**53 travels as text."""
    return int(value) if isinstance(value, str) and value.isascii() and value.isdigit() and len(value) <= 20 else value


Seed = Annotated[
    int,
    BeforeValidator(_whole),
    Field(strict=True, ge=0, lt=2**64),
    PlainSerializer(lambda seed: str(seed) if seed > SAFE_WHOLE else seed, when_used="json"),
    Expects("a whole number from 0 to 2**64 - 1 (as text where it is above 2**53)"),
]
Names = Annotated[tuple[Name, ...], Field(min_length=1, max_length=MAX_ITEMS), Expects("a list of names, at least one")]


class Request(Document):
    """What is asked: process, beams, cuts, histograms, accuracy. Energies and masses in GeV, angles in rad.

    ``Request.model_validate(dictionary)``, ``Request(process=..., beams=...)``, ``Request.from_toml``,
    ``Request.from_json`` and ``Request.accept`` (any of them) all raise ``RequestError`` with every finding at once.
    """

    schema_: Literal["barnwright.request/1"] = Field(default="barnwright.request/1", alias="schema")
    process: Name | None = None
    processes: Names | None = None
    formula: Formula | None = None
    contributions: Names | None = None
    unit: Annotated[str, Field(strict=True), Expects("a unit, as text")] = ""
    seed: Seed = 1
    beams: Beams
    parameters: Annotated[
        dict[Name, ParameterValue], Field(max_length=MAX_ITEMS), Expects("a table of parameters and values")
    ] = Field(default_factory=dict)
    masses: Annotated[dict[Name, Mass], Field(max_length=MAX_ITEMS), Expects("a table of legs and masses (GeV)")] = (
        Field(default_factory=dict)
    )
    cuts: Annotated[tuple[Cut, ...], Field(max_length=MAX_ITEMS), Expects(f"a list of at most {MAX_ITEMS} cuts")] = ()
    histograms: Annotated[
        tuple[HistogramRequest, ...], Field(max_length=MAX_ITEMS), Expects(f"a list of at most {MAX_ITEMS} histograms")
    ] = ()
    variations: Annotated[
        tuple[Variation, ...], Field(max_length=MAX_ITEMS), Expects(f"a list of at most {MAX_ITEMS} variations")
    ] = ()
    derived: Annotated[
        tuple[DerivedRequest, ...],
        Field(max_length=MAX_ITEMS),
        Expects(f"a list of at most {MAX_ITEMS} derived quantities"),
    ] = ()
    accuracy: Accuracy = Accuracy()

    @property
    def schema(self) -> str:  # type: ignore[override]
        """The schema of the document."""
        return self.schema_

    @model_validator(mode="after")
    def _fill_and_agree(self) -> Self:
        fields = self.__dict__
        if "unit" not in self.model_fields_set:
            fields["unit"] = "GeV" if self.beams.kind == "decay" else "pb"
        if self.cuts and not all(cut.name for cut in self.cuts):
            fields["cuts"] = named(self.cuts)
        refuse(disagreements(self))
        return self

    @model_validator(mode="wrap")
    @classmethod
    def _all_findings(cls, data: Any, handler: ModelWrapValidatorHandler[Self]) -> Self:
        """Outside of all other checks: the quick road; then once more with plain values; then all findings."""
        try:
            return handler(data)
        except ValidationError:
            values = plain(data)
        try:
            return handler(values)
        except ValidationError as error:
            raise examine(values, error, cls, handler) from None

    @classmethod
    def accept(cls, source: Request | Mapping[str, Any] | str | None = None, /, **fields: Any) -> Request:
        """A request from whatever holds one: a request, a prediction, a dictionary, TOML or JSON text, fields, or both.

        Fields are merged key by key into the source, as a variation is.

        Raises:
            RequestError: with every finding.
        """
        kept = getattr(source, "request", None)
        if isinstance(kept, Request):  # of a prediction
            source = kept
        if isinstance(source, Request):
            return source.merged(fields) if fields else source
        data = asked_in(read_text(source) if isinstance(source, str) else source)
        if data is not None and not isinstance(data, Mapping):
            expected = "a request: a Request, a dictionary, TOML text or JSON text"
            raise RequestError([Violation("request", show(data), expected)])
        return cls.model_validate(merge(data, fields) if data is not None else fields)

    @classmethod
    def from_toml(cls, text: str) -> Self:
        """The request of a TOML text. Raises ``RequestError`` with every finding."""
        return cls.model_validate(read_toml(text))

    @classmethod
    def from_json(cls, text: str) -> Self:
        """The request of a JSON text. Raises ``RequestError`` with every finding."""
        return cls.model_validate(read_json(text))

    def given(self) -> dict[str, Any]:
        """Plain values of what was asked, without the defaults that were filled in."""
        return self.model_dump(mode="json", exclude_unset=True)

    def canonical(self) -> dict[str, Any]:
        """Plain values with every default filled in; integers above 2**53 as text."""
        return self.model_dump(mode="json")

    def canonical_json(self) -> str:
        """The one JSON text of this request: sorted keys, no white space."""
        return canonical_text(self.canonical())

    def digest(self) -> str:
        """SHA-256 of the canonical JSON, 64 hexadecimal digits."""
        return digest_of(self.canonical_json())

    def merged(self, override: Mapping[str, Any]) -> Request:
        """The request with an override merged in (see ``merge``). Raises ``RequestError`` with every finding."""
        return type(self).model_validate(merge(self.given(), override))

    def varied(self, variation: Variation) -> Request:
        """The request with one of its variations applied, itself without variations and derived quantities."""
        base = {key: value for key, value in self.given().items() if key not in ("variations", "derived")}
        return type(self).model_validate(merge(base, variation.change()))
