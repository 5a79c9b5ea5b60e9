"""What collides, or decays: the three kinds of beams."""

from __future__ import annotations

import math
from typing import Annotated, Any, Literal, Self

from pydantic import BeforeValidator, Field, model_validator

from barnwright.documents.base import Document, Energy, Expects, Mass, Name, Polarisation
from barnwright.documents.checks import Finding, exactly_one, refuse


def _of_parent(value: Any) -> Any:
    """A plain number is the polarisation of the one parent."""
    return {"beam_a": value} if isinstance(value, (int, float)) else value


BeamPolarisation = Annotated[
    dict[Name, Polarisation],
    Field(max_length=2),
    Expects("a table of at most two beams and their polarisations, each from -1 to 1"),
]
ParentPolarisation = Annotated[
    dict[Name, Polarisation],
    BeforeValidator(_of_parent),
    Field(max_length=1),
    Expects("a number from -1 to 1, the polarisation of the parent along +z"),
]


def _given(document: Document, *names: str) -> list[str]:
    return [name for name in names if getattr(document, name) is not None]


class ColliderBeams(Document):
    """Two beams head-on, or at an angle: ``sqrt_s``, or the two energies, in GeV."""

    kind: Literal["collider"]
    sqrt_s: Energy | None = None
    energies: (
        Annotated[
            dict[Name, Energy], Field(min_length=2, max_length=2), Expects("a table of two beams and energies (GeV)")
        ]
        | None
    ) = None
    crossing_angle: (
        Annotated[
            float,
            Field(strict=True, ge=0, lt=math.pi, allow_inf_nan=False),
            Expects("a number from 0 to less than pi (rad), the full angle between the beams"),
        ]
        | None
    ) = None
    along_z: Name | None = None
    polarisation: BeamPolarisation = Field(default_factory=dict)

    @model_validator(mode="after")
    def _agree(self) -> Self:
        found = exactly_one(_given(self, "sqrt_s", "energies"), ("sqrt_s", "energies"))
        if self.crossing_angle is not None and self.energies is None:
            expected = "no crossing_angle, unless the two energies are given"
            found.append(Finding(("crossing_angle",), self.crossing_angle, expected, of=("crossing_angle", "energies")))
        refuse(found)
        return self


class FixedTargetBeams(Document):
    """One beam on a target at rest: its total energy, kinetic energy or momentum, in GeV."""

    kind: Literal["fixed_target"]
    energy: Energy | None = None
    kinetic_energy: Energy | None = None
    momentum: Energy | None = None
    target: Name | None = None
    along_z: Name | None = None
    polarisation: BeamPolarisation = Field(default_factory=dict)

    @model_validator(mode="after")
    def _agree(self) -> Self:
        choices = ("energy", "kinetic_energy", "momentum")
        refuse(exactly_one(_given(self, *choices), choices))
        return self


class DecayBeams(Document):
    """A decaying parent, at rest or with a momentum along +z; momentum and mass in GeV."""

    kind: Literal["decay"]
    momentum: Mass | None = None
    polarisation: ParentPolarisation = Field(default_factory=dict)
    mass: Energy | None = None


Beams = Annotated[
    ColliderBeams | FixedTargetBeams | DecayBeams,
    Field(discriminator="kind"),
    Expects("a table whose kind is 'collider', 'fixed_target' or 'decay'"),
]
