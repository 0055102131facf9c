"""A kernel whose notebook server is killed."""

import os
import signal
import subprocess
import sys
import time
from pathlib import Path

import pytest

LAUNCHER = """
import time
from jupyter_client.manager import start_new_kernel

manager, client = start_new_kernel(kernel_name="tussock")
print(manager.provisioner.process.pid, flush=True)
client.execute("show omnibus of nobody", reply=True, timeout=60)
time.sleep(600)
"""


@pytest.mark.skipif(not Path("/proc").is_dir(), reason="looks at processes by /proc")
def test_a_kernel_ends_soon_after_the_program_that_started_it():
    launcher = subprocess.Popen([sys.executable, "-c", LAUNCHER], stdout=subprocess.PIPE, text=True)
    kernel = int(launcher.stdout.readline())
    assert state(kernel) is not None
    launcher.send_signal(signal.SIGKILL)
    launcher.wait()
    deadline = time.monotonic() + 30
    while state(kernel) is not None and time.monotonic() < deadline:
        time.sleep(0.1)
    if state(kernel) is not None:
        os.kill(kernel, signal.SIGKILL)
        pytest.fail("the kernel stayed")


def state(process: int) -> str | None:
    """What a process does; nothing once it has ended, waited for or not."""
    try:
        letter = Path(f"/proc/{process}/stat").read_text().rpartition(")")[2].split()[0]
    except FileNotFoundError:
        return None
    return None if letter == "Z" else letter
