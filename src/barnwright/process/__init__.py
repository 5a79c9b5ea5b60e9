"""What a plugin offers: the process, its laws, closed forms and parameters."""

from .claims import Claims
from .closed_form import ClosedForm
from .contributions import Parts, is_interference
from .cross_sections import AngularCrossSection, TotalCrossSection
from .declaration import DeclarationError
from .helicity_amplitudes import HelicityAmplitudes
from .laws import Expression, Law, MomentaLaw, SquaredAmplitude
from .parameters import ParameterFacts, Parameters, ParameterValue, facts_of, parameter, parameters_model
from .polarisation import UNPOLARISED, Polarisation, can_be_polarised, helicities_of
from .process import Process
from .validity import Validity

__all__ = [
    "UNPOLARISED",
    "AngularCrossSection",
    "Claims",
    "ClosedForm",
    "DeclarationError",
    "Expression",
    "HelicityAmplitudes",
    "Law",
    "MomentaLaw",
    "ParameterFacts",
    "ParameterValue",
    "Parameters",
    "Parts",
    "Polarisation",
    "Process",
    "SquaredAmplitude",
    "TotalCrossSection",
    "Validity",
    "can_be_polarised",
    "facts_of",
    "helicities_of",
    "is_interference",
    "parameter",
    "parameters_model",
]
