//! The one ordered queue of everything that is published: status, inputs, outputs, errors.

use serde_json::{Value, json};
use zmq::{Error, Socket};

use super::mailbox::{Inbox, Mailbox};
use super::{receive, send};
use crate::message::{Message, Request, Wire};

/// What the publishing thread is told.
pub(crate) enum Publication {
    /// To publish this after all that was posted before.
    Message(Message),
    /// To end when all that was posted before is published.
    End,
}

/// A thread's way to publish.
pub(crate) struct Publisher {
    queue: Mailbox<Publication>,
}

impl Publisher {
    pub(crate) fn new(queue: Mailbox<Publication>) -> Self {
        Self { queue }
    }

    /// The same queue for another thread.
    pub(crate) fn another(&self) -> Result<Self, Error> {
        Ok(Self { queue: self.queue.another()? })
    }

    /// Publishes what follows from a request.
    pub(crate) fn publish(&self, request: &Request, kind: &str, content: Value) {
        let message = message(kind, request.header.clone(), content);
        self.queue.post(Publication::Message(message));
    }

    /// Publishes that work on a request begins (`busy`) or has ended (`idle`).
    pub(crate) fn status(&self, request: &Request, state: &str) {
        self.publish(request, "status", json!({ "execution_state": state }));
    }

    /// Ends the publishing thread.
    pub(crate) fn end(&self) {
        self.queue.post(Publication::End);
    }
}

/// A message under a topic of its own type's name.
fn message(kind: &str, parent: Value, content: Value) -> Message {
    let identities = vec![kind.as_bytes().to_vec()];
    Message { identities, kind: kind.to_owned(), parent, content }
}

/// Publishes until it is told to end.
///
/// # Errors
/// When the socket fails.
pub(crate) fn run(socket: &Socket, wire: &Wire, inbox: &Inbox<Publication>) -> Result<(), Error> {
    // That the kernel has started is told to the first subscriber: earlier nobody would hear it.
    let mut untold = Some(message("status", json!({}), json!({ "execution_state": "starting" })));
    loop {
        inbox.wait_with(socket)?;
        // Newcomers first: what is published next reaches them.
        while let Some(parts) = receive(socket)? {
            if let Some(topic) = subscription(&parts) {
                send(socket, wire, &welcome(topic))?;
                if let Some(starting) = untold.take() {
                    send(socket, wire, &starting)?;
                }
            }
        }
        for publication in inbox.letters()? {
            match publication {
                Publication::Message(message) => {
                    untold = None;
                    send(socket, wire, &message)?;
                }
                Publication::End => return Ok(()),
            }
        }
    }
}

/// The topic to which the sender of these bytes subscribes; nothing where it unsubscribes.
fn subscription(parts: &[Vec<u8>]) -> Option<&[u8]> {
    parts.first()?.strip_prefix(&[1])
}

/// The word that tells a subscriber that from now on nothing is missed.
fn welcome(topic: &[u8]) -> Message {
    Message {
        identities: if topic.is_empty() { Vec::new() } else { vec![topic.to_vec()] },
        kind: "iopub_welcome".to_owned(),
        parent: json!({}),
        content: json!({ "subscription": String::from_utf8_lossy(topic) }),
    }
}
