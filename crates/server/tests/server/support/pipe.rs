//! A pipe in memory: one end of it is written to, the other end read from, by either side.

use std::io;
use std::pin::Pin;
use std::task::{Context, Poll};

use serde_json::Value;
use tokio::io::{AsyncRead, AsyncWrite, ReadBuf};
use tokio::sync::mpsc::{UnboundedReceiver, UnboundedSender, unbounded_channel};

/// The end that is written to.
pub(crate) struct PipeWriter(UnboundedSender<Vec<u8>>);

/// The end that is read from.
pub(crate) struct PipeReader {
    chunks: UnboundedReceiver<Vec<u8>>,
    buffer: Vec<u8>,
}

/// A new pipe.
pub(crate) fn pipe() -> (PipeWriter, PipeReader) {
    let (sender, chunks) = unbounded_channel();
    (PipeWriter(sender), PipeReader { chunks, buffer: Vec::new() })
}

impl PipeWriter {
    /// Writes without waiting. A reader that is gone reads nothing.
    pub(crate) fn push(&self, bytes: Vec<u8>) {
        let _gone = self.0.send(bytes);
    }
}

impl PipeReader {
    /// Reads one message of the protocol.
    pub(crate) async fn message(&mut self) -> Value {
        loop {
            if let Some(message) = self.take_message() {
                return message;
            }
            let chunk = self.chunks.recv().await.expect("the server has closed its output");
            self.buffer.extend(chunk);
        }
    }

    fn take_message(&mut self) -> Option<Value> {
        let header_end = self.buffer.windows(4).position(|bytes| bytes == b"\r\n\r\n")? + 4;
        let header = String::from_utf8(self.buffer[..header_end].to_vec()).expect("ASCII");
        let length = header.lines().find_map(|line| line.strip_prefix("Content-Length: "));
        let length: usize = length.expect("a length").parse().expect("a number");
        if self.buffer.len() < header_end + length {
            return None;
        }
        let message: Vec<u8> = self.buffer.drain(..header_end + length).skip(header_end).collect();
        Some(serde_json::from_slice(&message).expect("JSON"))
    }
}

impl AsyncRead for PipeReader {
    fn poll_read(
        mut self: Pin<&mut Self>,
        context: &mut Context<'_>,
        into: &mut ReadBuf<'_>,
    ) -> Poll<io::Result<()>> {
        if self.buffer.is_empty() {
            match self.chunks.poll_recv(context) {
                Poll::Ready(Some(chunk)) => self.buffer = chunk,
                Poll::Ready(None) => return Poll::Ready(Ok(())),
                Poll::Pending => return Poll::Pending,
            }
        }
        let count = into.remaining().min(self.buffer.len());
        let bytes: Vec<u8> = self.buffer.drain(..count).collect();
        into.put_slice(&bytes);
        Poll::Ready(Ok(()))
    }
}

impl AsyncWrite for PipeWriter {
    fn poll_write(
        self: Pin<&mut Self>,
        _: &mut Context<'_>,
        bytes: &[u8],
    ) -> Poll<io::Result<usize>> {
        self.push(bytes.to_vec());
        Poll::Ready(Ok(bytes.len()))
    }

    fn poll_flush(self: Pin<&mut Self>, _: &mut Context<'_>) -> Poll<io::Result<()>> {
        Poll::Ready(Ok(()))
    }

    fn poll_shutdown(self: Pin<&mut Self>, _: &mut Context<'_>) -> Poll<io::Result<()>> {
        Poll::Ready(Ok(()))
    }
}
