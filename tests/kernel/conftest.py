import os
import subprocess

import pytest
from kernel_support import PROGRAM, Kernel


@pytest.fixture(scope="session", autouse=True)
def installed(tmp_path_factory):
    """Installs the kernel where only these tests see it, and hides the user's own set-up."""
    prefix = tmp_path_factory.mktemp("prefix")
    private = {
        "JUPYTER_PATH": prefix / "share" / "jupyter",
        "JUPYTER_DATA_DIR": prefix / "data",
        "JUPYTER_RUNTIME_DIR": prefix / "runtime",
        "JUPYTER_CONFIG_DIR": prefix / "config",
    }
    before = {name: os.environ.get(name) for name in private}
    subprocess.run([PROGRAM, "install", "--prefix", prefix], check=True, timeout=60)
    os.environ.update({name: str(path) for name, path in private.items()})
    yield prefix
    for name, value in before.items():
        os.environ.pop(name, None)
        if value is not None:
            os.environ[name] = value


@pytest.fixture
def kernel(tmp_path):
    running = Kernel(tmp_path)
    yield running
    running.stop()


@pytest.fixture(scope="module")
def analysed(tmp_path_factory):
    """A kernel in which the comparison `main` of the built-in sample is defined."""
    from kernel_support import ANALYSIS

    running = Kernel(tmp_path_factory.mktemp("analysed"))
    running.run(ANALYSIS, cell="analysis").expect_ok()
    yield running
    running.stop()
