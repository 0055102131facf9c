"""A client of the language server, and the small folder that it works in."""

import asyncio
import os
from pathlib import Path

from lsprotocol import types
from pytest_lsp.client import (
    DEFAULT_CLIENT_FEATURES,
    LanguageClient,
    client_capabilities,
    register_lsp_features,
)
from pygls.protocol import default_converter

ROOT = Path(__file__).parents[2]
PROGRAM = Path(os.environ.get("TUSSOCK", ROOT / "target" / "release" / "tussock"))

# Invented: three rosters of ferry crews. One column name needs back-quotes.
CREW = "roster,alertness,mood,`Sleep (h)`\n".replace("`", '"') + "".join(
    f"{roster},{50 + 3 * shift + 2 * watch + (watch * watch) % 5},{30 + shift - watch % 4},{6 + (watch * 3 + shift) % 5 / 2}\n"
    for shift, roster in enumerate(["fixed", "forward", "backward"])
    for watch in range(8)
)

SCRIPT = """\
read "crew.csv" as crew
levels crew.roster fixed, forward, backward
compare alertness, mood across roster in crew as main
show omnibus of main
"""


class Editor(LanguageClient):
    """A client that keeps every set of diagnostics that it is sent."""

    def __init__(self):
        super().__init__(converter_factory=default_converter)
        self.published: list[types.PublishDiagnosticsParams] = []
        self.registrations: list[types.Registration] = []
        self._news = asyncio.Condition()
        features = {
            **DEFAULT_CLIENT_FEATURES,
            types.TEXT_DOCUMENT_PUBLISH_DIAGNOSTICS: _keep,
            types.CLIENT_REGISTER_CAPABILITY: _register,
        }
        register_lsp_features(self, features)

    async def greet(self, folder: Path, spec: str = "visual-studio-code", encodings=None):
        capabilities = client_capabilities(spec)
        # The profile is older than notebooks and encodings in the protocol.
        capabilities.notebook_document = types.NotebookDocumentClientCapabilities(
            synchronization=types.NotebookDocumentSyncClientCapabilities()
        )
        capabilities.general.position_encodings = encodings
        return await self.initialize_session(
            types.InitializeParams(
                capabilities=capabilities,
                workspace_folders=[types.WorkspaceFolder(uri=folder.as_uri(), name="crew")],
            )
        )

    def open(self, uri: str, text: str, language: str = "tussock"):
        self.text_document_did_open(
            types.DidOpenTextDocumentParams(types.TextDocumentItem(uri, language, 1, text))
        )

    def change(self, uri: str, version: int, *changes):
        self.text_document_did_change(
            types.DidChangeTextDocumentParams(
                types.VersionedTextDocumentIdentifier(uri=uri, version=version), list(changes)
            )
        )

    async def diagnosed(self, uri: str, version: int | None = None, wanted=lambda found: True):
        """The diagnostics of this version of a text, once the server has sent them and they are
        as wanted."""

        def fits(params):
            return (
                params.uri == uri
                and (version is None or params.version == version)
                and wanted(params.diagnostics)
            )

        async with self._news:
            while True:
                for params in reversed(self.published):
                    if fits(params):
                        return list(params.diagnostics)
                await asyncio.wait_for(self._news.wait(), timeout=20)

    async def completions(self, uri: str, line: int, character: int):
        found = await self.text_document_completion_async(
            types.CompletionParams(
                types.TextDocumentIdentifier(uri), types.Position(line, character)
            )
        )
        return list(found.items if hasattr(found, "items") else found or [])

    async def hover(self, uri: str, line: int, character: int):
        found = await self.text_document_hover_async(
            types.HoverParams(types.TextDocumentIdentifier(uri), types.Position(line, character))
        )
        return found and found.contents.value


async def _keep(client: Editor, params: types.PublishDiagnosticsParams):
    async with client._news:
        client.published.append(params)
        client._news.notify_all()


def _register(client: Editor, params: types.RegistrationParams):
    client.registrations.extend(params.registrations)


def replace(line: int, start: int, end: int, text: str):
    """An edit on one line."""
    range = types.Range(types.Position(line, start), types.Position(line, end))
    return types.TextDocumentContentChangePartial(range=range, text=text)


def rules(diagnostics) -> list[str]:
    return [diagnostic.code for diagnostic in diagnostics]
