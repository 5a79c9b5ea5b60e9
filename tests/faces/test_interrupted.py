"""A law that hangs in this process is ended by Ctrl-C, and the message says whose it is."""

from __future__ import annotations

import os
import shutil
import signal
import subprocess
import sys
import time
from pathlib import Path

FIXTURES = Path(__file__).parent.parent / "fixtures" / "plugins"

REQUEST = """
process = "hangs-later/pair"
[beams]
kind = "collider"
sqrt_s = 10.0
"""


def test_ctrl_c_ends_a_law_that_hangs(tmp_path: Path) -> None:
    """SIGINT in the middle of a law: exit code 130, one line with the process's name, no traceback."""
    file, started, plugin = tmp_path / "request.toml", tmp_path / "started", tmp_path / "plugin"
    file.write_text(REQUEST)
    shutil.copytree(FIXTURES / "hangs_later", plugin)
    module = plugin / "hangs_later.py"
    says_so = module.read_text().replace("time.sleep(0.1)", f"open({str(started)!r}, 'w').close(); time.sleep(0.1)")
    module.write_text(says_so)
    path = os.pathsep.join([str(plugin), *filter(None, [os.environ.get("PYTHONPATH")])])
    environment = {**os.environ, "PYTHONPATH": path}
    command = [sys.executable, "-m", "barnwright", "predict", str(file)]
    with subprocess.Popen(command, stderr=subprocess.PIPE, stdout=subprocess.PIPE, text=True, env=environment) as run:
        while not started.exists() and run.poll() is None:
            time.sleep(0.02)
        run.send_signal(signal.SIGINT)
        _, errors = run.communicate()
    assert run.returncode == 130
    assert "hangs-later/pair" in errors
    assert "Traceback" not in errors
