//! The heartbeat: whatever comes goes back, from a thread that does nothing else.

use zmq::{Error, Socket};

use super::mailbox::Inbox;
use super::{receive, send_parts};

/// What the heartbeat thread is told: to end.
pub(crate) struct End;

/// Echoes until it is told to end.
///
/// # Errors
/// When the socket fails.
pub(crate) fn echo(socket: &Socket, inbox: &Inbox<End>) -> Result<(), Error> {
    loop {
        inbox.wait_with(socket)?;
        while let Some(beat) = receive(socket)? {
            send_parts(socket, &beat)?;
        }
        if !inbox.letters()?.is_empty() {
            return Ok(());
        }
    }
}
