//! A place in the bytes of a text format.

use memchr::memchr_iter;

/// Walks text token by token. Bytes need not be UTF-8; lines end with LF, CR LF or CR.
///
/// Lines are not counted on the way: [`line_at`] counts them when an error needs one.
#[derive(Clone, Debug, Default)]
pub(crate) struct Cursor<'a> {
    bytes: &'a [u8],
    at: usize,
}

fn is_line_end(byte: u8) -> bool {
    byte == b'\n' || byte == b'\r'
}

fn is_blank(byte: u8) -> bool {
    matches!(byte, b' ' | b'\t' | b'\n' | b'\r' | 0x0b | 0x0c)
}

impl<'a> Cursor<'a> {
    pub(crate) fn new(bytes: &'a [u8]) -> Self {
        Self { bytes, at: 0 }
    }

    /// Where the next token is looked for.
    pub(crate) fn position(&self) -> usize {
        self.at
    }

    /// Goes on from here; beyond the end means the end.
    pub(crate) fn go_to(&mut self, position: usize) {
        self.at = position.min(self.bytes.len());
    }

    /// The next token, whichever line it is on.
    #[inline]
    pub(crate) fn token(&mut self) -> Option<&'a [u8]> {
        self.skip(is_blank);
        self.take()
    }

    /// The next token, if it is on this line.
    pub(crate) fn token_on_line(&mut self) -> Option<&'a [u8]> {
        self.skip(|byte| is_blank(byte) && !is_line_end(byte));
        self.take()
    }

    /// The next token, to be taken later.
    pub(crate) fn peek(&self) -> Option<&'a [u8]> {
        self.clone().token()
    }

    /// Passes over the next token if it is this word in any case.
    #[inline]
    pub(crate) fn accept(&mut self, word: &[u8]) -> bool {
        let before = self.at;
        if self.token().is_some_and(|token| token.eq_ignore_ascii_case(word)) {
            return true;
        }
        self.at = before;
        false
    }

    /// Passes over these very bytes on this line, if a blank or the end follows.
    pub(crate) fn accept_on_line(&mut self, text: &[u8]) -> bool {
        let before = self.at;
        self.skip(|byte| is_blank(byte) && !is_line_end(byte));
        let rest = &self.bytes[self.at..];
        if rest.starts_with(text) && rest.get(text.len()).is_none_or(|&byte| is_blank(byte)) {
            self.at += text.len();
            return true;
        }
        self.at = before;
        false
    }

    /// The number of the line where the next token stands, or the last line.
    pub(crate) fn line(&self) -> usize {
        let mut ahead = self.clone();
        ahead.skip(is_blank);
        if ahead.at == self.bytes.len() {
            return line_at(self.bytes, self.bytes.trim_ascii_end().len());
        }
        line_at(self.bytes, ahead.at)
    }

    #[inline]
    fn skip(&mut self, blank: impl Fn(u8) -> bool) {
        let rest = &self.bytes[self.at..];
        self.at += rest.iter().position(|&byte| !blank(byte)).unwrap_or(rest.len());
    }

    #[inline]
    fn take(&mut self) -> Option<&'a [u8]> {
        let rest = &self.bytes[self.at..];
        let length = rest.iter().position(|&byte| is_blank(byte)).unwrap_or(rest.len());
        self.at += length;
        (length > 0).then(|| &rest[..length])
    }
}

/// The number, from 1, of the line that byte `at` is on. O(at).
pub(crate) fn line_at(bytes: &[u8], at: usize) -> usize {
    let before = &bytes[..at.min(bytes.len())];
    let line_feeds = memchr_iter(b'\n', before).count();
    let lone_returns =
        memchr_iter(b'\r', before).filter(|&cr| bytes.get(cr + 1) != Some(&b'\n')).count();
    1 + line_feeds + lone_returns
}

/// A decimal number as Rust reads it: a sign, digits with or without a point, an exponent, and
/// also `nan` and `inf`, which the caller judges.
pub(crate) fn number(token: &[u8]) -> Option<f64> {
    std::str::from_utf8(token).ok()?.parse().ok()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn tokens_lines_and_words() {
        let mut cursor = Cursor::new(b" one two\r\nthree\rfour\n\n five");
        assert_eq!(cursor.token(), Some(&b"one"[..]));
        assert_eq!(cursor.token_on_line(), Some(&b"two"[..]));
        assert_eq!(cursor.token_on_line(), None);
        assert_eq!(cursor.line(), 2);
        assert!(!cursor.accept(b"thre") && cursor.accept(b"THREE"));
        assert_eq!((cursor.line(), cursor.peek()), (3, Some(&b"four"[..])));
        cursor.token();
        assert_eq!(cursor.line(), 5);
        assert!(!cursor.accept_on_line(b"five"));
        cursor.go_to(22);
        assert!(!cursor.accept_on_line(b"fiv") && cursor.accept_on_line(b"five"));
        assert_eq!((cursor.token(), cursor.line(), cursor.position()), (None, 5, 27));
    }

    #[test]
    fn numbers_of_every_make() {
        assert_eq!(number(b"-1.5E+2"), Some(-150.0));
        assert_eq!((number(b".5"), number(b"5.")), (Some(0.5), Some(5.0)));
        assert_eq!(number(b"1e999"), Some(f64::INFINITY));
        assert!(number(b"1,5").is_none() && number(b"\xff").is_none() && number(b"").is_none());
    }
}
