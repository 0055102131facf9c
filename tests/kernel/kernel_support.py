"""A running kernel as a front end sees it."""

import os
import re
from dataclasses import dataclass, field
from pathlib import Path

from jupyter_client.manager import KernelManager

ROOT = Path(__file__).parents[2]
PROGRAM = Path(os.environ.get("TUSSOCK", ROOT / "target" / "release" / "tussock"))
TIMEOUT = 60
ESCAPES = re.compile(r"\x1b\[[0-9;]*m")

# A whole analysis on the built-in sample, in the cells of a notebook.
READ = """\
read sample ferry as crew
levels crew.roster fixed, forward, backward merging "Forward " into forward"""
COMPARE = "compare alertness, mood, lapses, sleep across roster in crew as main"
ANALYSIS = f"{READ}\n{COMPARE}"


@dataclass
class Output:
    """One message of a cell's outputs."""

    kind: str
    content: dict

    def plain(self) -> str:
        return self.content["data"]["text/plain"]

    def html(self) -> str:
        return self.content["data"]["text/html"]


@dataclass
class Ran:
    """What running a cell gave."""

    reply: dict
    outputs: list[Output] = field(default_factory=list)

    def of_kind(self, kind: str) -> list[Output]:
        return [output for output in self.outputs if output.kind == kind]

    def result(self) -> Output:
        (result,) = self.of_kind("execute_result")
        return result

    def error(self) -> Output:
        (error,) = self.of_kind("error")
        return error

    def traceback(self) -> str:
        return ESCAPES.sub("", "\n".join(self.error().content["traceback"]))

    def expect_ok(self) -> "Ran":
        assert self.reply["status"] == "ok", self.reply
        return self


class Kernel:
    """A kernel of one's own, in a folder of one's own."""

    def __init__(self, folder: Path):
        self.manager = KernelManager(kernel_name="tussock")
        self.manager.start_kernel(cwd=str(folder))
        self.client = self.manager.blocking_client()
        self.client.start_channels()
        self.client.wait_for_ready(timeout=TIMEOUT)

    def stop(self):
        self.client.stop_channels()
        self.manager.shutdown_kernel()

    def send(self, code: str, cell: str | None = None, **options) -> str:
        """Sends a cell under the name that the front end has for it."""
        message = self.client.session.msg(
            "execute_request",
            {
                "code": code,
                "silent": False,
                "store_history": True,
                "user_expressions": {},
                "allow_stdin": False,
                "stop_on_error": True,
                **options,
            },
            metadata={"cellId": cell} if cell else {},
        )
        self.client.shell_channel.send(message)
        return message["header"]["msg_id"]

    def wait_until_busy(self, message_id: str):
        while True:
            message = self.client.get_iopub_msg(timeout=TIMEOUT)
            if message["parent_header"].get("msg_id") == message_id:
                assert message["content"] == {"execution_state": "busy"}
                return

    def receive(self, message_id: str) -> Ran:
        outputs = []
        while True:
            message = self.client.get_iopub_msg(timeout=TIMEOUT)
            if message["parent_header"].get("msg_id") != message_id:
                continue
            kind, content = message["msg_type"], message["content"]
            if kind == "status" and content["execution_state"] == "idle":
                break
            if kind not in ("status", "execute_input"):
                outputs.append(Output(kind, content))
        reply = self.client.get_shell_msg(timeout=TIMEOUT)
        assert reply["parent_header"]["msg_id"] == message_id
        return Ran(reply["content"], outputs)

    def run(self, code: str, cell: str | None = None, **options) -> Ran:
        return self.receive(self.send(code, cell, **options))

    def ask(self, message_id: str) -> dict:
        """The reply to a request that the client has sent."""
        while True:
            reply = self.client.get_shell_msg(timeout=TIMEOUT)
            if reply["parent_header"].get("msg_id") == message_id:
                return reply["content"]

    def interrupt(self) -> dict:
        message = self.client.session.msg("interrupt_request", {})
        self.client.control_channel.send(message)
        while True:
            reply = self.client.get_control_msg(timeout=TIMEOUT)
            if reply["parent_header"].get("msg_id") == message["header"]["msg_id"]:
                return reply["content"]

    def complete(self, marked: str) -> dict:
        """What may stand at the `|` in the code."""
        code, position = marked.replace("|", "", 1), marked.index("|")
        return self.ask(self.client.complete(code, position))

    def inspect(self, marked: str) -> dict:
        code, position = marked.replace("|", "", 1), marked.index("|")
        return self.ask(self.client.inspect(code, position))
