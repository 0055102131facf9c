//! The working thread: the only one that evaluates. One request after the other, each between
//! `busy` and `idle`.

use std::sync::mpsc::Receiver;

use tussock_session::cancel::Cancel;

use crate::connection::Connection;
use crate::evaluator::Evaluator;
use crate::history::History;
use crate::requests::{Exchange, answer_shell, execute};
use crate::sockets::iopub::Publisher;
use crate::sockets::mailbox::Mailbox;
use crate::sockets::shell::{Job, Notice};

/// What the requests of the shell channel work on.
pub(crate) struct Worker<E> {
    pub(crate) evaluator: E,
    pub(crate) connection: Connection,
    /// Raised by the control thread to stop the cell that runs.
    pub(crate) cancel: Cancel,
    pub(crate) history: History,
    /// The number of the last cell that counts.
    pub(crate) count: u32,
}

impl<E: Evaluator> Worker<E> {
    /// Works until no more jobs can come.
    pub(crate) fn run(mut self, jobs: &Receiver<Job>, shell: &Mailbox<Notice>, iopub: &Publisher) {
        for job in jobs {
            let request = &job.request;
            // Before `busy`, so that an interrupt by somebody who has seen it is not lost.
            self.cancel.reset();
            iopub.status(request, "busy");
            let answer = if job.aborted {
                execute::aborted(self.count)
            } else {
                answer_shell(&mut self, &Exchange { request, iopub })
            };
            shell.post(Notice::Done {
                reply: answer.content.map(|content| request.reply(content)),
                abort_waiting: answer.abort_waiting,
            });
            iopub.status(request, "idle");
        }
    }
}
