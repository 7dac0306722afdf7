//! Bytes become text: a byte-order mark, else strict UTF-8, else windows-1252 with a warning.

use encoding_rs::{UTF_16BE, UTF_16LE, WINDOWS_1252};

use crate::ledger::NotText;
use crate::site::Encoding;

/// A decoded file.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Decoded {
    /// The text without its byte-order mark.
    pub text: String,
    /// How it was decoded, as run.json names it.
    pub encoding: &'static str,
    /// For windows-1252 that was not declared: the first line with a byte outside ASCII.
    pub guessed_at_line: Option<u64>,
}

/// Decodes a results file.
///
/// # Errors
/// [`NotText`] for an empty file, a NUL byte, or bytes that the declared encoding cannot hold.
pub fn decode(bytes: &[u8], declared: Option<Encoding>) -> Result<Decoded, NotText> {
    if bytes.is_empty() {
        return Err(NotText::Empty);
    }
    let (encoding, body) = match (encoding_rs::Encoding::for_bom(bytes), declared) {
        (Some((encoding, length)), _) => (Some(encoding), &bytes[length..]),
        (None, Some(Encoding::Utf8)) => (Some(encoding_rs::UTF_8), bytes),
        (None, Some(Encoding::Utf16Le)) => (Some(UTF_16LE), bytes),
        (None, Some(Encoding::Utf16Be)) => (Some(UTF_16BE), bytes),
        (None, Some(Encoding::Windows1252)) => (Some(WINDOWS_1252), bytes),
        (None, None) => (None, bytes),
    };
    let text = match encoding {
        Some(encoding) => {
            let name = shown(encoding);
            let text = encoding
                .decode_without_bom_handling_and_without_replacement(body)
                .ok_or(NotText::Malformed { declared: name })?;
            Decoded { text: text.into_owned(), encoding: name, guessed_at_line: None }
        }
        None => undeclared(body)?,
    };
    match text.text.bytes().position(|byte| byte == 0) {
        Some(byte) => Err(NotText::Binary { byte }),
        None if text.text.trim().is_empty() => Err(NotText::Empty),
        None => Ok(text),
    }
}

/// No mark and nothing declared: strict UTF-8, else windows-1252, which decodes every byte and so
/// is a guess that is told.
fn undeclared(bytes: &[u8]) -> Result<Decoded, NotText> {
    if let Some(byte) = bytes.iter().position(|&byte| byte == 0) {
        return Err(NotText::Binary { byte });
    }
    match std::str::from_utf8(bytes) {
        Ok(text) => Ok(Decoded { text: text.to_owned(), encoding: "utf-8", guessed_at_line: None }),
        Err(_) => {
            let first = bytes.iter().position(|byte| !byte.is_ascii());
            let before = &bytes[..first.unwrap_or(bytes.len())];
            let lines = before.iter().filter(|&&byte| byte == b'\n').count();
            let (text, _) = WINDOWS_1252.decode_without_bom_handling(bytes);
            Ok(Decoded {
                text: text.into_owned(),
                encoding: "windows-1252",
                guessed_at_line: Some(lines as u64 + 1),
            })
        }
    }
}

fn shown(encoding: &'static encoding_rs::Encoding) -> &'static str {
    if encoding == UTF_16LE {
        "utf-16le"
    } else if encoding == UTF_16BE {
        "utf-16be"
    } else if encoding == WINDOWS_1252 {
        "windows-1252"
    } else {
        "utf-8"
    }
}

#[cfg(test)]
mod tests {
    use super::{Encoding, NotText, decode};

    #[test]
    fn marks_are_taken_off_and_utf_16_is_read() {
        assert_eq!(decode(b"\xEF\xBB\xBFwell", None).map(|d| d.text), Ok("well".into()));
        let le: Vec<u8> = [0xFF, 0xFE]
            .into_iter()
            .chain("w\u{b5}".encode_utf16().flat_map(u16::to_le_bytes))
            .collect();
        let decoded = decode(&le, None);
        assert_eq!(decoded.as_ref().map(|d| d.text.as_str()), Ok("w\u{b5}"));
        assert_eq!(decoded.map(|d| d.encoding), Ok("utf-16le"));
    }

    #[test]
    fn latin_bytes_are_windows_1252_and_the_first_line_is_named() {
        let decoded = decode(b"well,unit\nMW-1,\xB5g/L\n", None);
        assert_eq!(decoded.as_ref().map(|d| d.guessed_at_line), Ok(Some(2)));
        assert_eq!(decoded.map(|d| d.text), Ok("well,unit\nMW-1,\u{b5}g/L\n".into()));
    }

    #[test]
    fn nothing_nul_and_a_wrong_declaration_are_refused() {
        assert_eq!(decode(b"", None), Err(NotText::Empty));
        assert_eq!(decode(b"a\0b", None), Err(NotText::Binary { byte: 1 }));
        assert_eq!(
            decode(b"\xB5g/L", Some(Encoding::Utf8)),
            Err(NotText::Malformed { declared: "utf-8" })
        );
    }
}
