//! Both ends of the wire as `tower-lsp` wants them: bytes in from a thread of its own, bytes out until the client is
//! gone, and the messages that the server sends by itself.

use std::convert::Infallible;
use std::io;
use std::pin::Pin;
use std::sync::mpsc;
use std::task::{Context, Poll, ready};

use futures::{Sink, Stream};
use tokio::io::{AsyncRead, AsyncWrite, ReadBuf};
use tokio::sync::mpsc as channel;
use tower_lsp::Loopback;
use tower_lsp::jsonrpc::{Request, Response};

use crate::frames::Frames;
use crate::queue::{End, Event};

/// Messages read ahead of the service.
const AHEAD: usize = 64;

/// Standard input, one whole message at a time.
pub struct Input {
    frames: channel::Receiver<Vec<u8>>,
    /// What is left of the last message.
    rest: Vec<u8>,
    at: usize,
    end: End,
}

impl Input {
    /// Starts the thread that reads standard input.
    pub fn start(end: End) -> io::Result<Self> {
        let (send, frames) = channel::channel(AHEAD);
        let last = end.clone();
        std::thread::Builder::new().name(String::from("input")).spawn(move || {
            let mut frames = Frames::new(io::stdin().lock());
            while let Ok(Some(body)) = frames.next() {
                let mut frame = format!("Content-Length: {}\r\n\r\n", body.len()).into_bytes();
                frame.extend(body);
                if send.blocking_send(frame).is_err() {
                    break;
                }
            }
            drop(send);
            last.watch();
        })?;
        Ok(Self { frames, rest: Vec::new(), at: 0, end })
    }
}

impl AsyncRead for Input {
    fn poll_read(
        mut self: Pin<&mut Self>,
        cx: &mut Context<'_>,
        out: &mut ReadBuf<'_>,
    ) -> Poll<io::Result<()>> {
        if self.at == self.rest.len() {
            // Nothing that follows `exit` is read.
            if self.end.exited() {
                return Poll::Ready(Ok(()));
            }
            let Some(next) = ready!(self.frames.poll_recv(cx)) else { return Poll::Ready(Ok(())) };
            self.rest = next;
            self.at = 0;
        }
        let count = out.remaining().min(self.rest.len() - self.at);
        out.put_slice(&self.rest[self.at..self.at + count]);
        self.at += count;
        Poll::Ready(Ok(()))
    }
}

/// Standard output. A client that has closed it is gone, and the process ends.
pub struct Output {
    to: tokio::io::Stdout,
    end: End,
}

impl Output {
    /// Standard output.
    pub fn new(end: End) -> Self {
        Self { to: tokio::io::stdout(), end }
    }

    fn check<T>(&self, done: Poll<io::Result<T>>) -> Poll<io::Result<T>> {
        if matches!(done, Poll::Ready(Err(_))) {
            std::process::exit(self.end.status());
        }
        done
    }
}

impl AsyncWrite for Output {
    fn poll_write(mut self: Pin<&mut Self>, cx: &mut Context<'_>, bytes: &[u8]) -> Poll<io::Result<usize>> {
        let done = Pin::new(&mut self.to).poll_write(cx, bytes);
        self.check(done)
    }

    fn poll_flush(mut self: Pin<&mut Self>, cx: &mut Context<'_>) -> Poll<io::Result<()>> {
        let done = Pin::new(&mut self.to).poll_flush(cx);
        self.check(done)
    }

    fn poll_shutdown(mut self: Pin<&mut Self>, cx: &mut Context<'_>) -> Poll<io::Result<()>> {
        let done = Pin::new(&mut self.to).poll_shutdown(cx);
        self.check(done)
    }
}

/// What the server sends by itself, in its order, and the answers of the client. Nobody ever waits for one: an
/// answer is an event like any other.
pub struct Loop {
    /// Notifications and requests to the client.
    pub messages: channel::UnboundedReceiver<Request>,
    /// Where answers go.
    pub events: mpsc::Sender<Event>,
}

impl Loopback for Loop {
    type RequestStream = Messages;
    type ResponseSink = Replies;

    fn split(self) -> (Messages, Replies) {
        (Messages(self.messages), Replies(self.events))
    }
}

/// Messages to the client.
pub struct Messages(channel::UnboundedReceiver<Request>);

impl Stream for Messages {
    type Item = Request;

    fn poll_next(mut self: Pin<&mut Self>, cx: &mut Context<'_>) -> Poll<Option<Request>> {
        self.0.poll_recv(cx)
    }
}

/// Answers of the client.
pub struct Replies(mpsc::Sender<Event>);

impl Sink<Response> for Replies {
    type Error = Infallible;

    fn poll_ready(self: Pin<&mut Self>, _: &mut Context<'_>) -> Poll<Result<(), Infallible>> {
        Poll::Ready(Ok(()))
    }

    fn start_send(self: Pin<&mut Self>, response: Response) -> Result<(), Infallible> {
        // Without a receiver the server is ending.
        let _ = self.0.send(Event::Reply(response));
        Ok(())
    }

    fn poll_flush(self: Pin<&mut Self>, _: &mut Context<'_>) -> Poll<Result<(), Infallible>> {
        Poll::Ready(Ok(()))
    }

    fn poll_close(self: Pin<&mut Self>, _: &mut Context<'_>) -> Poll<Result<(), Infallible>> {
        Poll::Ready(Ok(()))
    }
}
