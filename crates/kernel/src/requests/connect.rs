//! `connect_request`: where the kernel listens.

use serde_json::json;

use super::Answer;
use crate::connection::{Channel, Connection};

pub(crate) fn answer(connection: &Connection) -> Answer {
    Answer::ok(json!({
        "shell_port": connection.port(Channel::Shell),
        "iopub_port": connection.port(Channel::Iopub),
        "stdin_port": connection.port(Channel::Stdin),
        "control_port": connection.port(Channel::Control),
        "hb_port": connection.port(Channel::Heartbeat),
    }))
}
