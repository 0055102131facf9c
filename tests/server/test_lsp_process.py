"""The process: what it prints, and when it ends."""

import json
import subprocess

import pytest
from lsp_support import PROGRAM


def message(**content):
    body = json.dumps({"jsonrpc": "2.0", **content}).encode()
    return b"Content-Length: %d\r\n\r\n%s" % (len(body), body)


INITIALIZE = message(id=1, method="initialize", params={"capabilities": {}})
SHUTDOWN = message(id=2, method="shutdown", params=None)
EXIT = message(method="exit", params=None)


def read(stream):
    """The next message of the server, which writes nothing else."""
    name, _, length = stream.readline().partition(b": ")
    assert (name, stream.readline()) == (b"Content-Length", b"\r\n")
    return json.loads(stream.read(int(length)))


@pytest.fixture
def server():
    with subprocess.Popen(
        [PROGRAM, "server"], stdin=subprocess.PIPE, stdout=subprocess.PIPE, stderr=subprocess.PIPE
    ) as process:
        yield process
        process.kill()


def send(server, messages):
    server.stdin.write(messages)
    server.stdin.flush()


def test_the_server_ends_at_exit_though_its_input_stays_open(server):
    send(server, INITIALIZE)
    assert read(server.stdout)["id"] == 1
    # One message behind the other, without a wait.
    send(server, SHUTDOWN + EXIT)
    assert server.wait(timeout=20) == 0
    reply = read(server.stdout)
    assert (reply["id"], reply["result"]) == (2, None)
    assert (server.stdout.read(), server.stderr.read()) == (b"", b"")


@pytest.mark.parametrize("greeting", [INITIALIZE, b""], ids=["greeted", "not greeted"])
def test_an_exit_without_shutdown_is_a_failure(server, greeting):
    send(server, greeting + EXIT)
    assert server.wait(timeout=20) == 1


def test_the_server_ends_when_its_client_is_gone(server):
    send(server, INITIALIZE)
    server.stdin.close()
    assert server.wait(timeout=20) == 1


def test_the_option_that_editors_pass_is_taken():
    run = subprocess.run([PROGRAM, "server", "--stdio"], input=EXIT, capture_output=True, timeout=20)
    assert (run.returncode, run.stderr) == (1, b"")
