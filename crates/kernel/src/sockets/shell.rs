//! The shell channel: requests wait here for their turn at the working thread.

use std::collections::VecDeque;
use std::sync::mpsc::Sender;

use zmq::{Error, Socket};

use super::mailbox::Inbox;
use super::{receive_request, send};
use crate::message::{Message, Request, Wire};

/// A request for the working thread.
pub(crate) struct Job {
    pub(crate) request: Request,
    /// Whether an earlier cell failed, so that this one isn't to be run.
    pub(crate) aborted: bool,
}

/// What the shell thread is told.
pub(crate) enum Notice {
    /// That the working thread has done its job.
    Done {
        /// What the client gets, where the request has a reply.
        reply: Option<Message>,
        /// Whether the cells that wait are not to be run.
        abort_waiting: bool,
    },
    /// To end.
    End,
}

/// The shell thread's state.
pub(crate) struct Shell {
    pub(crate) socket: Socket,
    pub(crate) wire: Wire,
    pub(crate) inbox: Inbox<Notice>,
    pub(crate) worker: Sender<Job>,
    pub(crate) waiting: VecDeque<Job>,
    pub(crate) working: bool,
}

impl Shell {
    /// Serves until it is told to end.
    ///
    /// # Errors
    /// When the socket fails.
    pub(crate) fn run(mut self) -> Result<(), Error> {
        loop {
            self.inbox.wait_with(&self.socket)?;
            self.take_requests()?;
            for notice in self.inbox.letters()? {
                match notice {
                    Notice::Done { reply, abort_waiting } => self.finish(reply, abort_waiting)?,
                    Notice::End => return Ok(()),
                }
            }
            self.hand_out();
        }
    }

    fn take_requests(&mut self) -> Result<(), Error> {
        while let Some(request) = receive_request(&self.socket, &self.wire)? {
            self.waiting.push_back(Job { request, aborted: false });
        }
        Ok(())
    }

    /// Sends the reply. A cell that came before the client can have seen the reply was sent in the
    /// belief that this one would succeed: a failure stops all of those, and none that comes later.
    fn finish(&mut self, reply: Option<Message>, abort_waiting: bool) -> Result<(), Error> {
        self.working = false;
        if abort_waiting {
            self.take_requests()?;
            let cells = self.waiting.iter_mut().filter(|job| job.request.kind == "execute_request");
            cells.for_each(|job| job.aborted = true);
        }
        match reply {
            Some(reply) => send(&self.socket, &self.wire, &reply),
            None => Ok(()),
        }
    }

    fn hand_out(&mut self) {
        if self.working {
            return;
        }
        if let Some(job) = self.waiting.pop_front() {
            self.working = self.worker.send(job).is_ok();
        }
    }
}
