//! A client that speaks the wire format by itself, so that a mistake in the kernel's own reading
//! and writing can't hide. It starts a kernel in this process and ends it when dropped.

use std::sync::atomic::{AtomicUsize, Ordering};
use std::thread::JoinHandle;

use hmac::{Hmac, KeyInit, Mac};
use serde_json::{Value, json};
use sha2::Sha256;
use tussock_kernel::KernelError;
use tussock_kernel::connection::{Channel, Connection};
use zmq::{Context, Socket, SocketType};

use crate::scripted::Scripted;

const KEY: &str = "a6f1c0de-key";
const MARK: &[u8] = b"<IDS|MSG>";
/// How long a test waits for a message before it fails, in milliseconds.
const PATIENCE: i32 = 20_000;

pub(crate) struct Client {
    pub(crate) shell: Peer,
    pub(crate) control: Peer,
    pub(crate) iopub: Peer,
    pub(crate) heartbeat: Socket,
    pub(crate) connection: Connection,
    context: Context,
    kernel: Option<JoinHandle<Result<(), KernelError>>>,
}

/// A socket of the client's.
pub(crate) struct Peer(Socket);

/// A message as it arrives.
#[derive(Clone, Debug)]
pub(crate) struct Received {
    pub(crate) kind: String,
    pub(crate) header: Value,
    pub(crate) parent: Value,
    pub(crate) content: Value,
}

impl Received {
    pub(crate) fn is_status(&self, state: &str) -> bool {
        self.kind == "status" && self.content["execution_state"] == state
    }

    pub(crate) fn follows(&self, id: &str) -> bool {
        self.parent["msg_id"] == id
    }

    pub(crate) fn plain(&self) -> &str {
        self.content["data"]["text/plain"].as_str().unwrap()
    }
}

impl Client {
    /// A kernel over sockets in the file system, where no two tests can meet.
    pub(crate) fn start() -> Self {
        static NUMBER: AtomicUsize = AtomicUsize::new(0);
        let number = NUMBER.fetch_add(1, Ordering::Relaxed);
        let stem = std::env::temp_dir().join(format!("tussock-{}-{number}", std::process::id()));
        Self::start_at("ipc", stem.to_str().unwrap(), [1, 2, 3, 4, 5])
    }

    /// A kernel over the network, as notebooks use it.
    pub(crate) fn start_on_network() -> Self {
        let listeners: [_; 5] =
            std::array::from_fn(|_| std::net::TcpListener::bind("127.0.0.1:0").unwrap());
        let ports = listeners.each_ref().map(|one| one.local_addr().unwrap().port());
        drop(listeners);
        Self::start_at("tcp", "127.0.0.1", ports)
    }

    fn start_at(transport: &str, ip: &str, ports: [u16; 5]) -> Self {
        let [shell, iopub, stdin, control, heartbeat] = ports;
        let file = json!({
            "transport": transport, "ip": ip, "key": KEY, "signature_scheme": "hmac-sha256",
            "shell_port": shell, "iopub_port": iopub, "stdin_port": stdin,
            "control_port": control, "hb_port": heartbeat, "kernel_name": "made-up",
        });
        Self::start_with(Connection::parse(&file.to_string()).unwrap())
    }

    pub(crate) fn start_with(connection: Connection) -> Self {
        let served = connection.clone();
        let kernel =
            std::thread::spawn(move || tussock_kernel::serve(&served, Scripted::default()));
        let context = Context::new();
        let connect = |kind: SocketType, channel: Channel| {
            let socket = context.socket(kind).unwrap();
            socket.set_rcvtimeo(PATIENCE).unwrap();
            socket.set_linger(0).unwrap();
            socket.set_rcvhwm(0).unwrap();
            socket.connect(&connection.endpoint(channel)).unwrap();
            socket
        };
        let iopub = connect(SocketType::SUB, Channel::Iopub);
        iopub.set_subscribe(b"").unwrap();
        let client = Self {
            shell: Peer(connect(SocketType::DEALER, Channel::Shell)),
            control: Peer(connect(SocketType::DEALER, Channel::Control)),
            iopub: Peer(iopub),
            heartbeat: connect(SocketType::REQ, Channel::Heartbeat),
            context: context.clone(),
            connection: connection.clone(),
            kernel: Some(kernel),
        };
        let first = client.iopub.receive();
        assert_eq!(first.kind, "iopub_welcome");
        assert_eq!(first.content, json!({"subscription": ""}));
        assert_eq!(first.parent, json!({}));
        assert!(client.iopub.receive().is_status("starting"));
        client
    }

    /// A further subscriber to what the kernel publishes.
    pub(crate) fn subscriber(&self, topic: &str) -> Peer {
        let socket = self.context.socket(SocketType::SUB).unwrap();
        socket.set_rcvtimeo(PATIENCE).unwrap();
        socket.connect(&self.connection.endpoint(Channel::Iopub)).unwrap();
        socket.set_subscribe(topic.as_bytes()).unwrap();
        Peer(socket)
    }

    /// Sends a cell.
    pub(crate) fn execute(&self, code: &str) -> String {
        self.shell.send("execute_request", json!({"code": code}))
    }

    /// What is published for a request, from its `busy` to its `idle`, both checked and left out.
    pub(crate) fn published(&self, id: &str) -> Vec<Received> {
        let mut messages: Vec<Received> = Vec::new();
        loop {
            let message = self.iopub.receive();
            if message.follows(id) {
                messages.push(message);
            }
            if messages.last().is_some_and(|last| last.is_status("idle")) {
                break;
            }
        }
        assert!(messages[0].is_status("busy"), "{messages:#?}");
        messages.remove(0);
        messages.pop();
        assert!(messages.iter().all(|message| message.kind != "status"), "{messages:#?}");
        messages
    }

    /// Runs a cell: what is published, and the reply.
    pub(crate) fn run(&self, code: &str) -> (Vec<Received>, Value) {
        let id = self.execute(code);
        let published = self.published(&id);
        let reply = self.shell.reply(&id);
        assert_eq!(reply.kind, "execute_reply");
        (published, reply.content)
    }

    /// Waits until the kernel has begun to work on a request.
    pub(crate) fn wait_until_busy(&self, id: &str) {
        loop {
            let message = self.iopub.receive();
            if message.follows(id) && message.is_status("busy") {
                return;
            }
        }
    }

    /// Asks for the end, waits for it, and gives the reply.
    pub(crate) fn shut_down(&mut self, restart: bool) -> Value {
        let id = self.control.send("shutdown_request", json!({"restart": restart}));
        let reply = self.control.reply(&id);
        assert_eq!(reply.kind, "shutdown_reply");
        let kernel = self.kernel.take().unwrap();
        kernel.join().unwrap().unwrap();
        reply.content
    }
}

impl Drop for Client {
    fn drop(&mut self) {
        if self.kernel.is_some() && !std::thread::panicking() {
            self.shut_down(false);
        }
    }
}

impl Peer {
    pub(crate) fn send(&self, kind: &str, content: Value) -> String {
        self.send_signed(kind, content, json!({}), KEY)
    }

    pub(crate) fn send_signed(
        &self,
        kind: &str,
        content: Value,
        metadata: Value,
        key: &str,
    ) -> String {
        let id = uuid::Uuid::new_v4().to_string();
        let header = json!({
            "msg_id": id, "session": "s", "username": "ann", "date": "2026-07-01T00:00:00Z",
            "msg_type": kind, "version": "5.3",
        });
        let dictionaries = [header, json!({}), metadata, content].map(|one| one.to_string());
        let signature = sign(key, dictionaries.iter().map(String::as_bytes));
        let mut parts = vec![MARK.to_vec(), signature.into_bytes()];
        parts.extend(dictionaries.map(String::into_bytes));
        self.0.send_multipart(parts, 0).unwrap();
        id
    }

    /// The next message, its signature checked.
    pub(crate) fn receive(&self) -> Received {
        let parts = self.0.recv_multipart(0).expect("a message comes in time");
        let mark = parts.iter().position(|part| part == MARK).unwrap();
        let [_, signature, header, parent, metadata, content] = &parts[mark..] else {
            panic!("{} parts", parts.len() - mark)
        };
        let signed = [header, parent, metadata, content].map(Vec::as_slice);
        assert_eq!(sign(KEY, signed), String::from_utf8_lossy(signature));
        let [header, parent, metadata, content] =
            signed.map(|part| serde_json::from_slice::<Value>(part).unwrap());
        assert!(metadata.is_object());
        for field in ["msg_id", "session", "username", "date", "msg_type", "version"] {
            assert!(header[field].is_string(), "{field} in {header}");
        }
        let kind = header["msg_type"].as_str().unwrap().to_owned();
        Received { kind, header, parent, content }
    }

    /// The next message, which is the reply to a request.
    pub(crate) fn reply(&self, id: &str) -> Received {
        let reply = self.receive();
        assert!(reply.follows(id), "{reply:#?}");
        assert!(reply.content["status"].is_string(), "{reply:#?}");
        reply
    }

    /// Sends a request and receives its reply.
    pub(crate) fn ask(&self, kind: &str, content: Value) -> Value {
        let id = self.send(kind, content);
        self.reply(&id).content
    }

    /// Whether nothing arrives for a while.
    pub(crate) fn is_silent_for(&self, milliseconds: i64) -> bool {
        self.0.poll(zmq::POLLIN, milliseconds).unwrap() == 0
    }
}

fn sign<'a>(key: &str, parts: impl IntoIterator<Item = &'a [u8]>) -> String {
    let mut mac = Hmac::<Sha256>::new_from_slice(key.as_bytes()).unwrap();
    parts.into_iter().for_each(|part| mac.update(part));
    mac.finalize().into_bytes().iter().map(|byte| format!("{byte:02x}")).collect()
}
