"""What a plugin offers: the process, its laws, closed forms and parameters."""

from .claims import Claims
from .closed_form import ClosedForm
from .declaration import DeclarationError
from .laws import Expression, Law, SquaredAmplitude
from .parameters import ParameterFacts, Parameters, ParameterValue, facts_of, parameter, parameters_model
from .process import Process
from .validity import Validity

__all__ = [
    "Claims",
    "ClosedForm",
    "DeclarationError",
    "Expression",
    "Law",
    "ParameterFacts",
    "ParameterValue",
    "Parameters",
    "Process",
    "SquaredAmplitude",
    "Validity",
    "facts_of",
    "parameter",
    "parameters_model",
]
