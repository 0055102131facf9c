//! The sockets of a kernel. One thread owns each; what another thread has to say to it comes
//! through a [`mailbox`].

pub(crate) mod control;
pub(crate) mod heartbeat;
pub(crate) mod iopub;
pub(crate) mod mailbox;
pub(crate) mod shell;

use std::time::Duration;

use zmq::{Context, Error, POLLIN, Socket, SocketType};

use crate::connection::{Channel, Connection};
use crate::error::KernelError;
use crate::log::log;
use crate::message::{Message, Request, Wire};

/// How long a socket may take to deliver its last messages, in milliseconds: the reply to a
/// shutdown leaves, and a client that is gone doesn't keep the kernel.
const LINGER: i32 = 1_000;

/// A socket that listens where the connection file says.
pub(crate) fn listen(
    context: &Context,
    connection: &Connection,
    channel: Channel,
) -> Result<Socket, KernelError> {
    let socket = context.socket(match channel {
        Channel::Shell | Channel::Stdin | Channel::Control => SocketType::ROUTER,
        Channel::Iopub => SocketType::XPUB,
        Channel::Heartbeat => SocketType::REP,
    })?;
    socket.set_linger(LINGER)?;
    // By default a socket forgets messages when a client reads slowly; a lost output is worse than
    // a longer queue.
    socket.set_sndhwm(0)?;
    socket.set_rcvhwm(0)?;
    match channel {
        // A client that comes back under its old name takes its place again.
        Channel::Shell | Channel::Stdin | Channel::Control => socket.set_router_handover(true)?,
        // Each subscriber is heard of, not only the first to a topic.
        Channel::Iopub => socket.set_xpub_verbose(true)?,
        Channel::Heartbeat => {}
    }
    let endpoint = connection.endpoint(channel);
    if endpoint.starts_with("tcp://[") {
        socket.set_ipv6(true)?;
    }
    match socket.bind(&endpoint) {
        Ok(()) => Ok(socket),
        Err(source) => Err(KernelError::Bind { channel, endpoint, source }),
    }
}

/// Repeats a call that a signal interrupted.
fn uninterrupted<T>(mut call: impl FnMut() -> Result<T, Error>) -> Result<T, Error> {
    loop {
        match call() {
            Err(Error::EINTR) => {}
            result => return result,
        }
    }
}

/// Waits until one of two sockets has something to read, or until the time is over.
fn wait(one: &Socket, other: &Socket, longest: Option<Duration>) -> Result<(), Error> {
    let mut items = [one.as_poll_item(POLLIN), other.as_poll_item(POLLIN)];
    let forever = -1;
    let milliseconds =
        longest.map_or(forever, |time| i64::try_from(time.as_millis()).unwrap_or(i64::MAX));
    uninterrupted(|| zmq::poll(&mut items, milliseconds)).map(|_| ())
}

/// The next message of a socket, or nothing where none waits.
fn receive(socket: &Socket) -> Result<Option<Vec<Vec<u8>>>, Error> {
    match uninterrupted(|| socket.recv_multipart(zmq::DONTWAIT)) {
        Ok(parts) => Ok(Some(parts)),
        Err(Error::EAGAIN) => Ok(None),
        Err(error) => Err(error),
    }
}

/// The next request that can be read. What can't be, or isn't signed rightly, is dropped with a
/// line in the log.
fn receive_request(socket: &Socket, wire: &Wire) -> Result<Option<Request>, Error> {
    while let Some(parts) = receive(socket)? {
        match wire.decode(&parts) {
            Ok(request) => return Ok(Some(request)),
            Err(error) => log(&format!("dropped a message: {error}")),
        }
    }
    Ok(None)
}

fn send(socket: &Socket, wire: &Wire, message: &Message) -> Result<(), Error> {
    send_parts(socket, &wire.encode(message))
}

fn send_parts(socket: &Socket, parts: &[Vec<u8>]) -> Result<(), Error> {
    let last = parts.len().saturating_sub(1);
    for (number, part) in parts.iter().enumerate() {
        let flags = if number < last { zmq::SNDMORE } else { 0 };
        uninterrupted(|| socket.send(part.as_slice(), flags))?;
    }
    Ok(())
}
