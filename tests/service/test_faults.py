"""Workers, schedulers and servers that hang or die: nobody else notices, and nothing is left behind."""

from __future__ import annotations

import os
import signal
import threading
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pytest
from service.plugins import plugin
from service.running import Running, children, is_alive, serving, until

from barnwright.client import Client
from barnwright.errors import PluginError, ServerError

BEAMS = {"kind": "collider", "sqrt_s": 10.0}


def good(client: Client) -> Any:
    """A prediction that must not be troubled."""
    return client.predict(process="healthy/pair", beams=BEAMS).total


def in_background(call: Callable[[], Any]) -> tuple[threading.Thread, list[BaseException]]:
    """A call in a thread of its own, and what it raises."""
    raised: list[BaseException] = []

    def run() -> None:
        try:
            call()
        except BaseException as error:
            raised.append(error)

    thread = threading.Thread(target=run)
    thread.start()
    return thread, raised


def test_a_law_that_hangs_costs_its_worker_only() -> None:
    """The request fails naming plugin and process; others are answered meanwhile and afterwards."""
    limits = {"block_seconds": 2.0, "suspect_seconds": 0.2}
    with serving("healthy", "hangs_later", workers=1, **limits) as server, server.client() as client:
        expected = good(client)
        thread, raised = in_background(lambda: client.predict(process="hangs-later/pair", beams=BEAMS))
        others = [good(client) for _ in range(20)]
        thread.join()
        assert others == [expected] * 20
        (error,) = raised
        assert isinstance(error, PluginError)
        assert (error.process, error.plugin) == ("hangs-later/pair", "hangs-later")
        assert "took longer than 2 s, so the worker was ended: one of its functions hangs" in error.cause
        assert good(client) == expected


def test_a_process_that_hangs_at_load_leaves_room_for_others() -> None:
    """There is a spare worker for resolving; lists, descriptions and validations end too."""
    with serving("healthy", "hangs", light_seconds=1.5) as server, server.client() as client:
        expected = good(client)
        thread, raised = in_background(lambda: client.predict(process="hangs/pair", beams=BEAMS))
        assert [good(client) for _ in range(20)] == [expected] * 20
        thread.join()
        assert [type(error) for error in raised] == [PluginError]
        with pytest.raises(PluginError, match=r"^plugin hangs, process hangs/pair: loading and checking took longer"):
            client.describe("hangs/pair")
        listed = {summary.name: summary.broken for summary in client.processes()}
        assert listed["healthy/pair"] is None
        assert "took longer than 1.5 s" in str(listed["hangs/pair"])


def test_a_law_that_ends_its_worker_twice_fails_its_request() -> None:
    """Not a loop: two workers are lost, then the error says so; others go on."""
    with serving("healthy", "dies_later") as server, server.client() as client:
        expected = good(client)
        with pytest.raises(ServerError, match=r"^2 workers were lost while they worked on this request") as caught:
            client.predict(process="dies-later/pair", beams=BEAMS)
        assert caught.value.code == "UNAVAILABLE"
        assert good(client) == expected


def test_a_worker_that_is_killed_once_is_not_noticed(tmp_path: Path) -> None:
    """Its block goes to another one."""
    marker = tmp_path / "was-here"
    body = (
        f"marker = Path({str(marker)!r}); dies = not marker.exists(); marker.touch(); dies and os.kill(os.getpid(), 9)"
    )
    with serving(plugin(tmp_path, "once", body)) as server, server.client() as client:
        assert client.predict(process="once/pair", beams=BEAMS).status == "converged"
        assert marker.exists()


def test_idle_workers_that_are_killed_are_replaced() -> None:
    """All of them at once."""
    with serving("healthy") as server, server.client() as client:
        expected = good(client)
        before = server.family()["workers"]
        for worker in before:
            os.kill(worker, signal.SIGKILL)
        until(lambda: are_replaced(server, before))
        assert good(client) == expected


def test_a_scheduler_that_is_killed_is_replaced() -> None:
    """Who waits learns that the machinery failed, and its workers end; then the server serves again."""
    with serving("healthy", "hangs_later") as server, server.client() as client:
        expected = good(client)
        family = server.family()
        thread, raised = in_background(lambda: client.predict(process="hangs-later/pair", beams=BEAMS, timeout=3.0))
        os.kill(family["scheduler"][0], signal.SIGKILL)
        until(lambda: not any(is_alive(pid) for pids in family.values() for pid in pids))
        until(lambda: server.health() == 1)
        assert good(client) == expected
        thread.join()
        assert [type(error) for error in raised] == [ServerError]


def test_a_fork_server_that_is_killed_is_replaced() -> None:
    """Workers live on, and new ones can be started."""
    with serving("healthy") as server, server.client() as client:
        expected = good(client)
        family = server.family()
        os.kill(family["forkserver"][0], signal.SIGKILL)
        for worker in family["workers"]:
            os.kill(worker, signal.SIGKILL)
        until(lambda: are_replaced(server, family["workers"]))
        assert good(client) == expected


def are_replaced(server: Running, before: list[int]) -> bool:
    """Whether none of these workers is there any more, and a full crew is."""
    now = server.family()["workers"]
    return len(now) >= 4 and not set(now) & set(before)


@pytest.mark.parametrize("busy", [False, True], ids=["idle", "busy"])
def test_nothing_outlives_a_server_that_is_killed(busy: bool) -> None:
    """Scheduler, fork server and workers end, those too that are deep in their work."""
    with serving("healthy", "hangs_later") as server, server.client() as client:
        good(client)
        family = [pid for pids in server.family().values() for pid in pids]
        assert len(family) >= 6
        if busy:
            thread, raised = in_background(lambda: client.predict(process="hangs-later/pair", beams=BEAMS, timeout=5.0))
            until(lambda: is_working(server))
        server.tell(signal.SIGKILL)
        until(lambda: not any(is_alive(pid) for pid in family))
        if busy:
            thread.join()
            assert [type(error) for error in raised] == [ServerError]


def is_working(server: Running) -> bool:
    """Whether a substitute was started, since somebody has been at work for long."""
    return len(server.family()["workers"]) > 4


def test_a_port_is_free_again_at_once() -> None:
    """After a server was killed another one takes its place."""
    with serving() as server:
        server.tell(signal.SIGKILL)
        server.process.wait()
        with serving(address=server.address) as another:
            assert another.address == server.address


def test_no_worker_imports_grpc(tmp_path: Path) -> None:
    """The network stays in the server process."""
    body = "import sys; assert 'grpc' not in sys.modules and 'asyncio' not in sys.modules, 'imported'"
    with serving(plugin(tmp_path, "looks", body)) as server, server.client() as client:
        assert client.predict(process="looks/pair", beams=BEAMS).status == "converged"
        assert children(server.process.pid)


@pytest.mark.parametrize("process", ["hangs/pair", "hangs-later/pair"])
def test_many_callers_of_what_hangs_hold_one_worker(process: str) -> None:
    """What has not answered once gets one worker at a time, however many ask for it."""
    limits = {"light_seconds": 60.0, "suspect_seconds": 60.0}
    with serving("healthy", "hangs", "hangs_later", workers=1, **limits) as server, server.client() as client:
        expected = good(client)
        callers = [in_background(lambda: client.predict(process=process, beams=BEAMS, timeout=2.0)) for _ in range(12)]
        assert [good(client) for _ in range(20)] == [expected] * 20
        for thread, _ in callers:
            thread.join()
        assert [getattr(raised[0], "code", None) for _, raised in callers] == ["DEADLINE_EXCEEDED"] * 12
        assert good(client) == expected
