"""Descriptions of processes."""

from __future__ import annotations

import json

from barnwright.documents import ParameterDescription, ProcessDescription, ProcessSummary


def test_description_comes_back_whole() -> None:
    """A description read from its own JSON is equal; parameters are read by name."""
    parameter = ParameterDescription(name="alpha", type="float", default=0.0073, meaning="coupling", source="CODATA")
    description = ProcessDescription(
        name="qed/compton",
        plugin="qed",
        distribution="barnwright-qed",
        version="0.1.0",
        reaction="gamma e- -> gamma e-",
        summary="Compton scattering",
        order="tree",
        laws=("closed_form", "squared_amplitude"),
        parameters=[parameter],
        masses={"e-": 0.00051099895},
        sqrt_s_min=None,
        observables=("cos_theta", "energy"),
        request='process = "qed/compton"\n',
    )
    again = ProcessDescription.model_validate(json.loads(description.model_dump_json()))
    assert again == description
    assert again.parameters["alpha"].default == 0.0073
    assert str(again) == "qed/compton  gamma e- -> gamma e-  Compton scattering"


def test_broken_processes_say_why() -> None:
    """The cause stands where the summary would."""
    broken = ProcessSummary(name="x/y", plugin="x", distribution="bx", version="1", broken="ImportError: no numpy")
    assert str(broken) == "x/y: broken: ImportError: no numpy"
