//! A channel to a thread that waits for its socket. A channel alone can't wake such a thread, so
//! each letter rings a bell: a socket inside the process, which the thread waits for as well.

use std::sync::mpsc::{Receiver, Sender, channel};
use std::time::Duration;

use zmq::{Context, Error, Socket, SocketType};

use super::{receive, uninterrupted, wait};

/// Where letters are posted.
pub(crate) struct Mailbox<T> {
    letters: Sender<T>,
    bell: Socket,
    context: Context,
    address: String,
}

/// Where they arrive, in the order of posting.
pub(crate) struct Inbox<T> {
    letters: Receiver<T>,
    bell: Socket,
}

/// A mailbox and its inbox. The name is that of the receiving thread.
pub(crate) fn mailbox<T>(context: &Context, name: &str) -> Result<(Mailbox<T>, Inbox<T>), Error> {
    let address = format!("inproc://{name}");
    let bell = context.socket(SocketType::PULL)?;
    bell.bind(&address)?;
    let (sender, letters) = channel();
    let sending = Mailbox::open(context.clone(), address, sender)?;
    Ok((sending, Inbox { letters, bell }))
}

impl<T> Mailbox<T> {
    fn open(context: Context, address: String, letters: Sender<T>) -> Result<Self, Error> {
        let bell = context.socket(SocketType::PUSH)?;
        bell.set_linger(0)?;
        bell.connect(&address)?;
        Ok(Self { letters, bell, context, address })
    }

    /// The same mailbox for another thread, with a bell of its own.
    pub(crate) fn another(&self) -> Result<Self, Error> {
        Self::open(self.context.clone(), self.address.clone(), self.letters.clone())
    }

    /// Posts a letter. Where the receiving thread has ended, nobody wants it any more.
    pub(crate) fn post(&self, letter: T) {
        let _nobody_listens = self.letters.send(letter);
        // A bell that can't ring is one that rings already.
        let _already_ringing = uninterrupted(|| self.bell.send(&[][..], zmq::DONTWAIT));
    }
}

impl<T> Inbox<T> {
    /// Waits for a letter or for something to read at `socket`.
    pub(crate) fn wait_with(&self, socket: &Socket) -> Result<(), Error> {
        wait(&self.bell, socket, None)
    }

    /// The same, but no longer than for some time.
    pub(crate) fn wait_at_most(&self, time: Duration, socket: &Socket) -> Result<(), Error> {
        wait(&self.bell, socket, Some(time))
    }

    /// The letters that have arrived. The bell is silenced first, so that one which comes
    /// meanwhile rings again.
    pub(crate) fn letters(&self) -> Result<Vec<T>, Error> {
        while receive(&self.bell)?.is_some() {}
        Ok(self.letters.try_iter().collect())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn letters_of_many_threads_all_arrive_and_each_senders_in_its_order() {
        let context = Context::new();
        let (post, inbox) = mailbox::<(usize, usize)>(&context, "test").unwrap();
        let silent = context.socket(SocketType::PULL).unwrap();
        let threads: Vec<_> = (0..4)
            .map(|sender| {
                let post = post.another().unwrap();
                std::thread::spawn(move || (0..3_000).for_each(|n| post.post((sender, n))))
            })
            .collect();
        let mut next = [0; 4];
        while next.iter().sum::<usize>() < 12_000 {
            inbox.wait_with(&silent).unwrap();
            for (sender, n) in inbox.letters().unwrap() {
                assert_eq!(n, next[sender]);
                next[sender] += 1;
            }
        }
        for thread in threads {
            thread.join().unwrap();
        }
    }
}
