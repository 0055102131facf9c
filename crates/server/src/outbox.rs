//! Messages to the client that answer no request, sent one after another in the order of posting.

use tokio::sync::mpsc::{UnboundedReceiver, UnboundedSender, unbounded_channel};
use tower_lsp::Client;
use tower_lsp::lsp_types::{MessageType, PublishDiagnosticsParams};

/// Where messages are posted. Posting never waits for the client.
#[derive(Clone, Debug)]
pub(crate) struct Outbox {
    sender: UnboundedSender<Message>,
}

#[derive(Debug)]
enum Message {
    Diagnostics(PublishDiagnosticsParams),
    Fault(String),
}

impl Outbox {
    /// Starts the task that carries messages to `client`.
    pub(crate) fn open(client: Client) -> Self {
        let (sender, receiver) = unbounded_channel();
        tokio::spawn(carry(client, receiver));
        Self { sender }
    }

    /// Posts the diagnostics of a text.
    pub(crate) fn publish(&self, diagnostics: PublishDiagnosticsParams) {
        self.post(Message::Diagnostics(diagnostics));
    }

    /// Posts word of a fault of the server itself, for the client's log.
    pub(crate) fn report_fault(&self, fault: &str) {
        self.post(Message::Fault(format!("{fault}\n{PLEA}")));
    }

    fn post(&self, message: Message) {
        // The receiver is gone only when the server is ending, and then nobody reads on.
        let _ending = self.sender.send(message);
    }
}

/// What a reader of a fault is asked to do.
pub(crate) const PLEA: &str = concat!(
    "This is a fault in Tussock ",
    env!("CARGO_PKG_VERSION"),
    ", not in your document. Please report it with the text that led to it."
);

async fn carry(client: Client, mut messages: UnboundedReceiver<Message>) {
    while let Some(message) = messages.recv().await {
        match message {
            Message::Diagnostics(of) => {
                client.publish_diagnostics(of.uri, of.diagnostics, of.version).await;
            }
            Message::Fault(text) => client.log_message(MessageType::ERROR, text).await,
        }
    }
}
