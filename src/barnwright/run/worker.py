"""What a worker process does: resolve a request, work out a block. Plugins are found by identity, never unpickled."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any

from barnwright.documents import Request, checked
from barnwright.engine import Plan, ProcessSource, Stage, evaluate, formula_process, resolve
from barnwright.errors import PluginError, RequestError, Violation
from barnwright.integrate.block import Block
from barnwright.integrate.tally import Tally
from barnwright.process import Process
from barnwright.registry import catalogue


def resolve_task(request: Mapping[str, Any], over: Mapping[str, Sequence[Any]] | None = None) -> Plan:
    """The plan of a request given as plain values.

    Raises
    ------
    RequestError, UnknownProcessError, PluginError
        All of them can be pickled.
    """
    return resolve(checked(lambda: Request.model_validate(dict(request)), physics), catalogue().load, over)


def physics(request: Request) -> tuple[Violation, ...]:
    """What is wrong with the physics of a request; nothing where its plugin is broken."""
    try:
        resolve(request, catalogue().load)
    except RequestError as error:
        return error.violations
    except PluginError:
        return ()
    return ()


def evaluate_task(block: Block, stage: Stage) -> Tally:
    """The tally of a block, by the process that the stage's plan names.

    Raises
    ------
    PluginError
        When the process here is not the one that the plan was made with, or misbehaves.
    """
    return evaluate(block, stage, process_of(stage.plan.members[block.stratum].source))


def process_of(source: ProcessSource) -> Process:
    """The process of a plan, from the formula it carries or from the plugins installed here.

    Raises
    ------
    PluginError
        When another version of the plugin is installed here.
    """
    if source.formula is not None:
        return formula_process(dict(source.formula))
    loaded = catalogue().load(source.name)
    if loaded.identity.digest != source.digest:
        cause = (
            f"the plan was made with {source.distribution} {source.version} ({source.digest[:12]}), here is "
            f"{loaded.identity.distribution} {loaded.identity.version} ({loaded.identity.digest[:12]})"
        )
        raise PluginError(plugin=source.distribution, process=source.name, cause=cause)
    return loaded.process
