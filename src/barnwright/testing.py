"""The conformance kit for authors of plugins.

from barnwright.testing import check_process
from barnwright_qed.compton import process

def test_it_keeps_the_contract():
    check_process(process)
"""

from __future__ import annotations

from barnwright.errors import PluginError
from barnwright.process import Process
from barnwright.registry.checks import findings_of
from barnwright.registry.second_roads import second_road_findings

__all__ = ["check_process", "findings_of_process"]


def findings_of_process(process: Process) -> list[str]:
    """Every finding about a process, each a sentence with the offending values; an empty list when it conforms.

    First what is checked when a plugin is loaded (signatures, shapes on three points, finite and positive numbers, of
    the whole and of each contribution alone). Then, when that holds, to 1e-8: laws with an angular distribution
    against the first of them, closed forms against its integral, the sum of the contributions against the whole,
    amplitudes asked for some helicities against the same among all, and claimed exchanges of the two outgoing
    particles.
    """
    return findings_of(process) or second_road_findings(process)


def check_process(process: Process) -> None:
    """Raise when a process does not keep the contract.

    Raises
    ------
    PluginError
        With every finding of `findings_of_process`, one a line.
    """
    findings = findings_of_process(process)
    if findings:
        raise PluginError(plugin="", process=process.name, cause="\n".join(findings))
