import pytest
import pytest_lsp
from lsp_support import CREW, PROGRAM, Editor
from pytest_lsp import ClientServerConfig


@pytest.fixture
def folder(tmp_path):
    """A folder with a data file."""
    (tmp_path / "crew.csv").write_text(CREW, encoding="utf-8")
    return tmp_path


@pytest_lsp.fixture(
    config=ClientServerConfig(server_command=[str(PROGRAM), "server"], client_factory=Editor)
)
async def editor(lsp_client: Editor, folder):
    await lsp_client.greet(folder)
    yield
    await lsp_client.shutdown_session()
    assert lsp_client._server.returncode == 0


@pytest_lsp.fixture(
    config=ClientServerConfig(server_command=[str(PROGRAM), "server"], client_factory=Editor)
)
async def stranger(lsp_client: Editor):
    """A client that has not greeted yet."""
    yield
    await lsp_client.shutdown_session()
    assert lsp_client._server.returncode == 0
