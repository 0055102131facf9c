//! A kernel from its start to its end: who owns what, and in which order all is taken down.

use std::collections::VecDeque;
use std::sync::mpsc::{Receiver, channel};
use std::thread::{Builder, JoinHandle};
use std::time::Duration;

use tussock_session::cancel::Cancel;
use zmq::Context;

use crate::connection::{Channel, Connection};
use crate::error::KernelError;
use crate::evaluator::Evaluator;
use crate::history::History;
use crate::log::log;
use crate::message::Wire;
use crate::requests::Control;
use crate::sockets::iopub::{self, Publisher};
use crate::sockets::mailbox::{Mailbox, mailbox};
use crate::sockets::shell::{Notice, Shell};
use crate::sockets::{control, heartbeat, listen};
use crate::worker::Worker;

/// How long a cell that was asked to stop may keep the kernel from ending.
const PATIENCE: Duration = Duration::from_secs(1);

/// The stack of the working thread, in bytes: as much as a main thread usually has.
const STACK: usize = 8 << 20;

/// Serves what a connection file describes, by any evaluator, until a client asks for the end.
///
/// # Errors
/// When an address can't be taken or the connection fails.
pub fn serve<E: Evaluator>(connection: &Connection, evaluator: E) -> Result<(), KernelError> {
    // Bells ring in a context of their own: a cell that doesn't stop keeps its thread's bells, and
    // must not keep the outer sockets from being closed in good order.
    let bells = Context::new();
    let outer = Context::new();
    let wire = Wire::new(connection.key());
    let cancel = Cancel::new();

    let shell_socket = listen(&outer, connection, Channel::Shell)?;
    let control_socket = listen(&outer, connection, Channel::Control)?;
    let iopub_socket = listen(&outer, connection, Channel::Iopub)?;
    let heartbeat_socket = listen(&outer, connection, Channel::Heartbeat)?;
    // Clients connect to it, and would wait if nobody listened.
    let stdin_socket = listen(&outer, connection, Channel::Stdin)?;

    let (failures, failures_inbox) = mailbox::<KernelError>(&bells, "control")?;
    let (publications, publications_inbox) = mailbox(&bells, "iopub")?;
    let (notices, notices_inbox) = mailbox::<Notice>(&bells, "shell")?;
    let publisher = Publisher::new(publications);

    let (beats, beats_inbox) = mailbox(&bells, "heartbeat")?;
    let heartbeat_failures = failures.another()?;
    let heartbeat = thread("heartbeat", move || {
        watched(heartbeat::echo(&heartbeat_socket, &beats_inbox), &heartbeat_failures);
    })?;

    let iopub_wire = wire.clone();
    let iopub_failures = failures.another()?;
    let iopub = thread("iopub", move || {
        watched(iopub::run(&iopub_socket, &iopub_wire, &publications_inbox), &iopub_failures);
    })?;

    let (jobs, jobs_to_do) = channel();
    let shell = Shell {
        socket: shell_socket,
        wire: wire.clone(),
        inbox: notices_inbox,
        worker: jobs,
        waiting: VecDeque::new(),
        working: false,
    };
    let shell = thread("shell", move || watched(shell.run(), &failures))?;

    let worker = Worker {
        evaluator,
        connection: connection.clone(),
        cancel: cancel.clone(),
        history: History::default(),
        count: 0,
    };
    let worker_notices = notices.another()?;
    let worker_publisher = publisher.another()?;
    let (end_of_work, work_ended) = channel::<()>();
    thread("work", move || {
        worker.run(&jobs_to_do, &worker_notices, &worker_publisher);
        // Everything of this thread that others wait for is gone before they hear of its end.
        drop((worker_notices, worker_publisher));
        drop(end_of_work);
    })?;

    let mut control = Control { connection: connection.clone(), cancel, ending: false };
    let outcome = control::run(&control_socket, &wire, &failures_inbox, &publisher, &mut control);

    // The shell thread first: no further cell is begun. Then the cell that runs, then the queue
    // with what it published. The context goes last, when all its sockets are closed; it waits
    // until their last messages have left.
    notices.post(Notice::End);
    join(shell);
    control.cancel.cancel();
    wait_for_work(&work_ended);
    publisher.end();
    join(iopub);
    beats.post(heartbeat::End);
    join(heartbeat);
    drop((control_socket, stdin_socket));
    drop(outer);
    outcome
}

fn thread(name: &str, work: impl FnOnce() + Send + 'static) -> Result<JoinHandle<()>, KernelError> {
    let builder = Builder::new().name(name.to_owned()).stack_size(STACK);
    builder.spawn(work).map_err(KernelError::Thread)
}

/// Tells the control thread of a failure, so that the kernel ends instead of falling silent.
fn watched(outcome: Result<(), zmq::Error>, failures: &Mailbox<KernelError>) {
    if let Err(error) = outcome {
        failures.post(KernelError::Socket(error));
    }
}

/// The thread hangs up when it ends; nothing is ever sent.
fn wait_for_work(work_ended: &Receiver<()>) {
    use std::sync::mpsc::RecvTimeoutError;
    if work_ended.recv_timeout(PATIENCE) == Err(RecvTimeoutError::Timeout) {
        log("the running cell did not stop in time");
    }
}

fn join(thread: JoinHandle<()>) {
    if thread.join().is_err() {
        log("a thread of the kernel failed");
    }
}
