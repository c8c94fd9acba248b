//! Frames of the wire: headers, lengths, and whether what stands in a frame is a message at all.
//!
//! The codec of `tower-lsp` ends the stream at the first message it cannot read. So every frame is looked at before
//! it gets there: a bad one becomes a message of our own ([`BAD_MESSAGE`]) that is answered with its error, and the
//! stream goes on at the next header.

use std::borrow::Cow;
use std::io::{self, Read};

use serde::Deserialize;
use serde::de::IgnoredAny;
use serde_json::json;
use tower_lsp::jsonrpc::{ErrorCode, Id, Response};

/// The method of the message that stands for one that could not be read; `params` are its error.
pub const BAD_MESSAGE: &str = "$/badMessage";
/// Largest message, in bytes: room for a text of ten megabytes with every character escaped.
const LARGEST: usize = 128 << 20;
/// Longest line of a header.
const LONGEST_LINE: usize = 8192;
const LENGTH: &[u8] = b"content-length:";

/// Takes frames out of a stream.
pub struct Frames<R> {
    from: R,
    buffer: Vec<u8>,
    /// What is used up of the buffer.
    at: usize,
    /// Whether the stream is being searched for the next header, which was said already.
    lost: bool,
}

impl<R: Read> Frames<R> {
    /// Frames of a stream.
    pub const fn new(from: R) -> Self {
        Self { from, buffer: Vec::new(), at: 0, lost: false }
    }

    /// The body of the next message, always one that the codec can read; `None` at the end of the stream.
    pub fn next(&mut self) -> io::Result<Option<Vec<u8>>> {
        let mut length: Option<usize> = None;
        let mut headers = false;
        loop {
            let Some(line) = self.line()? else { return Ok(None) };
            if line.is_empty() {
                match length {
                    Some(length) => return self.body(length),
                    None if headers => {
                        headers = false;
                        if let Some(bad) = self.lose("the header has no Content-Length") {
                            return Ok(Some(bad));
                        }
                    }
                    None => {}
                }
                continue;
            }
            let said = match header(&line) {
                Header::Length(bytes) if bytes <= LARGEST => {
                    length = Some(bytes);
                    None
                }
                Header::Length(_) => self.lose("the message is too large: at most 128 MiB"),
                Header::BadLength => self.lose("Content-Length is not a number of bytes"),
                Header::Other => None,
                Header::None => {
                    length = None;
                    self.lose(
                        "this is not a header: `Content-Length: N` and an empty line go before a message",
                    )
                }
            };
            headers = true;
            if let Some(bad) = said {
                return Ok(Some(bad));
            }
        }
    }

    /// The body of a frame. A body that is no message may have had the wrong length, so the search for the next
    /// header begins inside it.
    fn body(&mut self, length: usize) -> io::Result<Option<Vec<u8>>> {
        while self.buffer.len() - self.at < length {
            if !self.fill()? {
                return Ok(None);
            }
        }
        self.lost = false;
        let body = &self.buffer[self.at..self.at + length];
        match check(body) {
            Ok(()) => {
                let body = body.to_vec();
                self.at += length;
                Ok(Some(body))
            }
            Err(error) => {
                self.at += find(body, LENGTH).or_else(|| first_value(body)).unwrap_or(length);
                Ok(Some(bad(&error)))
            }
        }
    }

    /// The next line of a header without its end. A line that holds a header behind other bytes begins there.
    fn line(&mut self) -> io::Result<Option<Vec<u8>>> {
        let mut searched = 0;
        loop {
            let rest = &self.buffer[self.at..];
            let end = rest[searched..].iter().position(|byte| *byte == b'\n').map(|at| at + searched);
            if let Some(end) = end {
                let mut line = rest[..end].to_vec();
                self.at += end + 1;
                while line.last() == Some(&b'\r') {
                    line.pop();
                }
                let begin = find(&line, LENGTH).unwrap_or(0);
                return Ok(Some(line.split_off(begin)));
            }
            searched = rest.len();
            if rest.len() > LONGEST_LINE {
                // No header is so long; its end may still be the beginning of one.
                self.at += rest.len() - LENGTH.len();
                return Ok(Some(b"?".to_vec()));
            }
            if !self.fill()? {
                return Ok(None);
            }
        }
    }

    fn lose(&mut self, why: &'static str) -> Option<Vec<u8>> {
        let first = !self.lost;
        self.lost = true;
        first.then(|| bad(&Fault { code: ErrorCode::ParseError, message: Cow::Borrowed(why) }))
    }

    fn fill(&mut self) -> io::Result<bool> {
        if self.at > 0 {
            self.buffer.drain(..self.at);
            self.at = 0;
        }
        let mut chunk = [0; 65536];
        loop {
            match self.from.read(&mut chunk) {
                Ok(count) => {
                    self.buffer.extend_from_slice(&chunk[..count]);
                    return Ok(count > 0);
                }
                Err(error) if error.kind() == io::ErrorKind::Interrupted => {}
                Err(error) => return Err(error),
            }
        }
    }
}

enum Header {
    Length(usize),
    BadLength,
    Other,
    None,
}

fn header(line: &[u8]) -> Header {
    let Some(colon) = line.iter().position(|byte| *byte == b':') else { return Header::None };
    let (name, value) = (&line[..colon], &line[colon + 1..]);
    let of_a_name = |byte: &u8| byte.is_ascii_alphanumeric() || *byte == b'-';
    if name.is_empty() || !name.iter().all(of_a_name) {
        return Header::None;
    }
    if !name.eq_ignore_ascii_case(b"content-length") {
        return Header::Other;
    }
    let value = std::str::from_utf8(value).ok().map(str::trim);
    value.and_then(|value| value.parse().ok()).map_or(Header::BadLength, Header::Length)
}

/// Where `word` stands in `bytes`, case aside.
fn find(bytes: &[u8], word: &[u8]) -> Option<usize> {
    bytes.windows(word.len()).position(|window| window.eq_ignore_ascii_case(word))
}

/// Where the first JSON value of a body ends, if it holds one.
fn first_value(body: &[u8]) -> Option<usize> {
    let mut values = serde_json::Deserializer::from_slice(body).into_iter::<IgnoredAny>();
    values.next()?.ok()?;
    Some(values.byte_offset())
}

struct Fault {
    code: ErrorCode,
    message: Cow<'static, str>,
}

fn bad(fault: &Fault) -> Vec<u8> {
    let params = json!({ "code": fault.code.code(), "message": fault.message });
    json!({ "jsonrpc": "2.0", "id": null, "method": BAD_MESSAGE, "params": params }).to_string().into_bytes()
}

#[derive(Deserialize)]
struct Envelope<'a> {
    #[serde(borrow)]
    jsonrpc: Option<Cow<'a, str>>,
    #[serde(borrow)]
    method: Option<Cow<'a, str>>,
    #[serde(default, rename = "id")]
    _id: Option<Id>,
    #[serde(default, rename = "params")]
    _params: Option<IgnoredAny>,
}

/// Whether the codec will make a message of this.
fn check(body: &[u8]) -> Result<(), Fault> {
    let fault = |code, message| Fault { code, message };
    let text = std::str::from_utf8(body)
        .map_err(|_| fault(ErrorCode::ParseError, Cow::Borrowed("the message is not UTF-8")))?;
    let envelope: Envelope<'_> = serde_json::from_str(text).map_err(|error| {
        let code = if error.is_data() { ErrorCode::InvalidRequest } else { ErrorCode::ParseError };
        let what = if error.is_data() { "not a message" } else { "not JSON" };
        fault(code, Cow::Owned(format!("{what}: {error}")))
    })?;
    let invalid = |message| Err(fault(ErrorCode::InvalidRequest, Cow::Borrowed(message)));
    if envelope.jsonrpc.as_deref() != Some("2.0") {
        return invalid("a message has `\"jsonrpc\": \"2.0\"`");
    }
    if envelope.method.is_none() && serde_json::from_str::<Response>(text).is_err() {
        return invalid("a message has a `method`, or `id` and one of `result` and `error`");
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::Frames;

    const GOOD: &str = r#"{"jsonrpc":"2.0","method":"a"}"#;

    /// Each message; a bad one as the number of its error.
    fn read(bytes: &[u8]) -> Vec<String> {
        let mut frames = Frames::new(bytes);
        let mut out = Vec::new();
        while let Ok(Some(body)) = frames.next() {
            let body = String::from_utf8(body).unwrap();
            let value: serde_json::Value = serde_json::from_str(&body).unwrap();
            out.push(match value["params"]["code"].as_i64() {
                Some(code) => code.to_string(),
                None => value["method"].as_str().unwrap_or("?").to_owned(),
            });
        }
        out
    }

    fn frame(body: &str) -> String {
        format!("Content-Length: {}\r\n\r\n{body}", body.len())
    }

    #[test]
    fn good_frames_in_any_spelling() {
        let other = format!(
            "content-type: application/vscode-jsonrpc; charset=utf-8\ncontent-length:{}\n\n{GOOD}",
            GOOD.len()
        );
        assert_eq!(read([frame(GOOD), other].concat().as_bytes()), ["a", "a"]);
    }

    #[test]
    fn bad_bodies_are_told_and_passed() {
        for (body, code) in [
            ("{\"jsonrpc\":", "-32700"),
            ("[]", "-32600"),
            ("{}", "-32600"),
            ("{\"jsonrpc\":\"1.0\",\"method\":\"a\"}", "-32600"),
            ("{\"jsonrpc\":\"2.0\",\"id\":{},\"method\":\"a\"}", "-32600"),
            ("{\"jsonrpc\":\"2.0\",\"id\":4}", "-32600"),
        ] {
            assert_eq!(read([frame(body), frame(GOOD)].concat().as_bytes()), [code, "a"], "{body}");
        }
        let mut bytes = b"Content-Length: 2\r\n\r\n\xff\xfe".to_vec();
        bytes.extend(frame(GOOD).bytes());
        assert_eq!(read(&bytes), ["-32700", "a"]);
    }

    #[test]
    fn wrong_lengths_cost_one_message() {
        let short = format!("Content-Length: {}\r\n\r\n{GOOD}", GOOD.len() - 3);
        assert_eq!(read([short, frame(GOOD)].concat().as_bytes()), ["-32700", "a"]);
        let long = format!("Content-Length: {}\r\n\r\n{GOOD}", GOOD.len() + 9);
        assert_eq!(read([long, frame(GOOD)].concat().as_bytes()), ["-32700", "a"]);
        for length in ["-1", "x", "99999999999999999999999", "999999999999"] {
            let odd = format!("Content-Length: {length}\r\n\r\n{GOOD}");
            let read = read([odd, frame(GOOD)].concat().as_bytes());
            assert_eq!(read, ["-32700", "a"], "{length}");
        }
    }

    #[test]
    fn noise_is_passed_over() {
        let noise = "x".repeat(100_000);
        assert_eq!(read([noise, frame(GOOD)].concat().as_bytes()), ["-32700", "a"]);
        assert_eq!(read(["\r\n\r\n", &frame(GOOD)].concat().as_bytes()), ["a"]);
        assert_eq!(read(["Other: 5\r\n\r\n", &frame(GOOD)].concat().as_bytes()), ["-32700", "a"]);
        assert_eq!(read(b"Content-Length: 50\r\n\r\n{}"), [""; 0]);
    }
}
