//! The control channel: requests that are answered at once, even while a cell runs.

use zmq::Socket;

use super::iopub::Publisher;
use super::mailbox::Inbox;
use super::{receive_request, send};
use crate::error::KernelError;
use crate::log::log;
use crate::message::Wire;
use crate::parent::{self, Parent};
use crate::requests::{self, Control, Exchange};

/// Serves until a client asks for the end, the program that started the kernel has ended, or
/// another thread fails.
///
/// # Errors
/// When this socket fails, or the one whose failure another thread posts.
pub(crate) fn run(
    socket: &Socket,
    wire: &Wire,
    failures: &Inbox<KernelError>,
    iopub: &Publisher,
    control: &mut Control,
) -> Result<(), KernelError> {
    let parent = Parent::of_this_process();
    while !control.ending {
        failures.wait_at_most(parent::INTERVAL, socket)?;
        if parent.has_ended() {
            log("the program that started this kernel has ended, and so does the kernel");
            return Ok(());
        }
        if let Some(failure) = failures.letters()?.into_iter().next() {
            return Err(failure);
        }
        while let Some(request) = receive_request(socket, wire)? {
            let exchange = Exchange { request: &request, iopub };
            iopub.status(&request, "busy");
            let answer = requests::answer_control(control, &exchange);
            if let Some(content) = answer.content {
                send(socket, wire, &request.reply(content))?;
            }
            iopub.status(&request, "idle");
        }
    }
    Ok(())
}
