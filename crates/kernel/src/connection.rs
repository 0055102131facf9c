//! The connection file: where a kernel listens and with which key messages are signed.

use std::fmt;
use std::net::IpAddr;
use std::path::Path;

use serde::Deserialize;

use crate::error::KernelError;

/// What a connection file says. Fields that this kernel doesn't know are ignored.
#[derive(Clone, Debug, Deserialize)]
pub struct Connection {
    #[serde(default = "tcp")]
    transport: String,
    #[serde(default = "loopback")]
    ip: String,
    shell_port: u32,
    iopub_port: u32,
    stdin_port: u32,
    control_port: u32,
    hb_port: u32,
    #[serde(default)]
    key: String,
    #[serde(default = "hmac_sha256")]
    signature_scheme: String,
}

fn tcp() -> String {
    "tcp".to_owned()
}

fn loopback() -> String {
    "127.0.0.1".to_owned()
}

fn hmac_sha256() -> String {
    "hmac-sha256".to_owned()
}

/// One of the five sockets of a kernel.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Channel {
    /// Requests that wait for their turn.
    Shell,
    /// What is published to every client.
    Iopub,
    /// Where a kernel would ask its user for input; Tussock never does.
    Stdin,
    /// Requests that don't wait for a running cell.
    Control,
    /// The echo by which a client knows that the kernel lives.
    Heartbeat,
}

impl fmt::Display for Channel {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(match self {
            Self::Shell => "shell",
            Self::Iopub => "iopub",
            Self::Stdin => "stdin",
            Self::Control => "control",
            Self::Heartbeat => "heartbeat",
        })
    }
}

impl Connection {
    /// Reads a connection file.
    ///
    /// # Errors
    /// When there is no such file, when it is no connection file, or when it asks for an address,
    /// a transport or a signature that this kernel doesn't serve.
    pub fn read(path: &Path) -> Result<Self, KernelError> {
        let text = std::fs::read_to_string(path)
            .map_err(|source| KernelError::Unreadable { path: path.to_owned(), source })?;
        Self::parse(&text)
    }

    /// Reads the text of a connection file.
    ///
    /// # Errors
    /// As for [`Connection::read`].
    pub fn parse(text: &str) -> Result<Self, KernelError> {
        let mut connection: Self = serde_json::from_str(text)?;
        if connection.signature_scheme != "hmac-sha256" {
            let asked = format!("the signature scheme `{}`", connection.signature_scheme);
            return Err(KernelError::Unsupported { asked, instead: "it signs by hmac-sha256" });
        }
        match connection.transport.as_str() {
            "tcp" => connection.keep_to_this_machine()?,
            "ipc" => {}
            other => {
                let asked = format!("the transport `{other}`");
                return Err(KernelError::Unsupported { asked, instead: "it serves tcp and ipc" });
            }
        }
        Ok(connection)
    }

    /// A cell may read any file that its user may read, and nothing on the wire is encrypted: so a
    /// kernel listens to its own machine only.
    fn keep_to_this_machine(&mut self) -> Result<(), KernelError> {
        if self.ip == "localhost" {
            self.ip = loopback();
        }
        let address: Option<IpAddr> = self.ip.parse().ok();
        if address.is_some_and(|address| address.is_loopback()) {
            return Ok(());
        }
        let asked = format!("the address `{}`", self.ip);
        Err(KernelError::Unsupported {
            asked,
            instead: "it listens on a loopback address only, such as 127.0.0.1; \
                      reach it from another machine through a tunnel",
        })
    }

    /// The address of a channel, as the message library writes it.
    #[must_use]
    pub fn endpoint(&self, channel: Channel) -> String {
        let port = self.port(channel);
        match self.transport.as_str() {
            "ipc" => format!("ipc://{}-{port}", self.ip),
            _ if self.ip.contains(':') => format!("tcp://[{}]:{port}", self.ip),
            _ => format!("tcp://{}:{port}", self.ip),
        }
    }

    /// The port of a channel; with the transport `ipc`, the last part of a file's name.
    #[must_use]
    pub fn port(&self, channel: Channel) -> u32 {
        match channel {
            Channel::Shell => self.shell_port,
            Channel::Iopub => self.iopub_port,
            Channel::Stdin => self.stdin_port,
            Channel::Control => self.control_port,
            Channel::Heartbeat => self.hb_port,
        }
    }

    /// The key by which messages are signed; where it is empty they aren't.
    #[must_use]
    pub fn key(&self) -> &str {
        &self.key
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn file(more: &str) -> String {
        format!(
            r#"{{"shell_port": 1, "iopub_port": 2, "stdin_port": 3, "control_port": 4,
                "hb_port": 5, "key": "k", "kernel_name": "tussock", "jupyter_session": "x"{more}}}"#
        )
    }

    #[test]
    fn a_file_with_unknown_fields_is_read_and_the_rest_has_defaults() {
        let connection = Connection::parse(&file("")).unwrap();
        assert_eq!(connection.endpoint(Channel::Shell), "tcp://127.0.0.1:1");
        assert_eq!(connection.endpoint(Channel::Heartbeat), "tcp://127.0.0.1:5");
        assert_eq!(connection.key(), "k");
    }

    #[test]
    fn an_ipc_address_ends_in_the_number_of_the_channel() {
        let connection =
            Connection::parse(&file(r#", "transport": "ipc", "ip": "/tmp/k""#)).unwrap();
        assert_eq!(connection.endpoint(Channel::Control), "ipc:///tmp/k-4");
    }

    #[test]
    fn an_address_that_other_machines_reach_is_refused() {
        for ip in ["0.0.0.0", "192.0.2.7", "*", "example.org", "::"] {
            let error = Connection::parse(&file(&format!(r#", "ip": "{ip}""#))).unwrap_err();
            assert!(error.to_string().contains("loopback"), "{ip}: {error}");
        }
        for (ip, endpoint) in [
            ("localhost", "tcp://127.0.0.1:2"),
            ("127.0.0.2", "tcp://127.0.0.2:2"),
            ("::1", "tcp://[::1]:2"),
        ] {
            let connection = Connection::parse(&file(&format!(r#", "ip": "{ip}""#))).unwrap();
            assert_eq!(connection.endpoint(Channel::Iopub), endpoint);
        }
    }

    #[test]
    fn an_unknown_signature_scheme_or_transport_is_refused() {
        for more in [r#", "signature_scheme": "hmac-md5""#, r#", "transport": "udp""#] {
            assert!(matches!(Connection::parse(&file(more)), Err(KernelError::Unsupported { .. })));
        }
    }

    #[test]
    fn a_file_without_ports_is_no_connection_file() {
        assert!(matches!(Connection::parse("{}"), Err(KernelError::Malformed(_))));
        assert!(matches!(
            Connection::read(Path::new("/nowhere/at/all.json")),
            Err(KernelError::Unreadable { .. })
        ));
    }
}
