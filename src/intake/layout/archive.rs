//! A workbook is a zip archive: weighed as declared, then as it really unpacks, before it is read.

use std::io::{Cursor, Read};

use zip::ZipArchive;
use zip::result::ZipError;

use crate::ledger::{Cap, WorkbookProblem};

/// The largest workbook file, in bytes (practice notes: workbook 256 MB).
const MOST_BYTES: u64 = 256 << 20;
/// The most entries: a workbook has about ten, and two or three a sheet (judgement).
const MOST_ENTRIES: u64 = 4_096;
/// The most bytes that all entries may unpack to: a sheet of a million rows of ten cells is about
/// 400 MB of XML (judgement).
const MOST_UNPACKED: u64 = 512 << 20;
/// How much larger an entry may unpack. The XML of real sheets shrinks 5 to 40 times; a bomb
/// reaches the 1,032 of the deflate format (judgement between the two).
const MOST_RATIO: u64 = 200;
/// Entries that unpack to less may shrink as they like, in bytes: they can do no harm.
const SMALL: u64 = 1 << 20;
/// The most marks `<` in the table of shared texts; a text has four (judgement: over a million
/// texts). The reader keeps them all.
const MOST_TEXT_MARKS: u64 = 6_000_000;
/// The most distinct texts a workbook may announce; the reader makes room for them at once.
const MOST_TEXTS: u64 = 2_000_000;
/// The largest entry beside sheets and shared texts, in bytes: styles and lists of sheets, which
/// the reader keeps (judgement).
const MOST_OTHER_XML: u64 = 16 << 20;

/// What an archive that may be read holds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Weighed {
    /// Whether any sheet has merged cells.
    pub(super) merged: bool,
    /// How many bytes it unpacks to.
    pub(super) unpacked: u64,
}

/// Weighs the archive.
///
/// # Errors
/// [`WorkbookProblem`] where it is no workbook, is damaged, or is over a cap.
pub(super) fn weigh(bytes: &[u8]) -> Result<Weighed, WorkbookProblem> {
    at_most(Cap::FileBytes, bytes.len() as u64, MOST_BYTES)?;
    let mut archive = ZipArchive::new(Cursor::new(bytes)).map_err(|error| damaged(&error))?;
    at_most(Cap::Entries, archive.len() as u64, MOST_ENTRIES)?;
    declared(&mut archive)?;
    let mut unpacked = 0;
    let mut merged = false;
    for at in 0..archive.len() {
        let mut entry = archive.by_index(at).map_err(|error| damaged(&error))?;
        let name = entry.name().map_err(|error| damaged(&error))?.to_ascii_lowercase();
        let (size, packed) = (entry.size(), entry.compressed_size());
        let mut scan = Scan::of(&name);
        let mut buffer = vec![0; 64 << 10];
        let mut own = 0;
        loop {
            let read = entry
                .read(&mut buffer)
                .map_err(|error| WorkbookProblem::Damaged { why: error.to_string() })?;
            if read == 0 {
                break;
            }
            own += read as u64;
            at_most(Cap::UnpackedBytes, unpacked + own, MOST_UNPACKED)?;
            ratio(own, packed)?;
            scan.take(&buffer[..read])?;
        }
        if own != size {
            let why = format!("{name} unpacks to {own} bytes and declares {size}");
            return Err(WorkbookProblem::Damaged { why });
        }
        unpacked += own;
        merged |= scan.merged;
    }
    Ok(Weighed { merged, unpacked })
}

/// The caps on what the directory of the archive says, and what kind of archive it is.
fn declared(archive: &mut ZipArchive<Cursor<&[u8]>>) -> Result<(), WorkbookProblem> {
    let (mut total, mut workbook, mut nested) = (0_u64, false, false);
    for at in 0..archive.len() {
        let entry = archive.by_index_raw(at).map_err(|error| damaged(&error))?;
        let name = entry.name().map_err(|error| damaged(&error))?.to_ascii_lowercase();
        if entry.encrypted() {
            return Err(WorkbookProblem::Locked);
        }
        total = total.saturating_add(entry.size());
        at_most(Cap::UnpackedBytes, total, MOST_UNPACKED)?;
        ratio(entry.size(), entry.compressed_size())?;
        if name.ends_with("workbook.bin") {
            return Err(WorkbookProblem::OtherFormat { format: "xlsb" });
        }
        if name == "content.xml" {
            return Err(WorkbookProblem::OtherFormat { format: "ods" });
        }
        workbook |= name == "[content_types].xml";
        nested |= name.ends_with(".zip");
    }
    if !workbook || nested {
        return Err(WorkbookProblem::OtherArchive);
    }
    Ok(())
}

fn at_most(cap: Cap, found: u64, most: u64) -> Result<(), WorkbookProblem> {
    if found > most { Err(WorkbookProblem::OverCap { cap, found, most }) } else { Ok(()) }
}

fn ratio(unpacked: u64, packed: u64) -> Result<(), WorkbookProblem> {
    if unpacked <= SMALL {
        return Ok(());
    }
    at_most(Cap::Ratio, unpacked / packed.max(1), MOST_RATIO)
}

fn damaged(error: &ZipError) -> WorkbookProblem {
    WorkbookProblem::Damaged { why: error.to_string() }
}

/// What is looked for while an entry unpacks, before anything keeps its content.
struct Scan {
    xml: bool,
    texts: bool,
    sheet: bool,
    marks: u64,
    bytes: u64,
    merged: bool,
    /// The end of the last piece, so that a word across two pieces is seen.
    tail: Vec<u8>,
}

impl Scan {
    fn of(name: &str) -> Self {
        let texts = name.ends_with("sharedstrings.xml");
        Self {
            xml: name.ends_with(".xml") || name.ends_with(".rels"),
            texts,
            sheet: name.contains("sheet"),
            marks: 0,
            bytes: 0,
            merged: false,
            tail: Vec::new(),
        }
    }

    fn take(&mut self, piece: &[u8]) -> Result<(), WorkbookProblem> {
        /// As long as the words looked for with the number behind them.
        const OVERLAP: usize = 64;
        self.bytes += piece.len() as u64;
        // XML 1.0 has no such characters, and encodings that hide words need them.
        if self.xml && piece.iter().any(|b| *b < 0x20 && !matches!(b, b'\t' | b'\n' | b'\r')) {
            let why = "control characters in its XML".to_owned();
            return Err(WorkbookProblem::Damaged { why });
        }
        if self.xml && !self.texts && !self.sheet {
            at_most(Cap::UnpackedBytes, self.bytes, MOST_OTHER_XML)?;
        }
        if self.texts {
            self.marks += piece.iter().filter(|byte| **byte == b'<').count() as u64;
            at_most(Cap::Texts, self.marks / 4, MOST_TEXT_MARKS / 4)?;
        }
        self.tail.extend_from_slice(piece);
        if self.texts {
            for at in places(&self.tail, b"uniqueCount") {
                at_most(Cap::Texts, number_after(&self.tail[at..]), MOST_TEXTS)?;
            }
        }
        self.merged |= self.sheet && !self.merged && !places(&self.tail, b"mergeCell").is_empty();
        let cut = self.tail.len().saturating_sub(OVERLAP);
        self.tail.drain(..cut);
        Ok(())
    }
}

/// Where a word stands.
fn places(text: &[u8], word: &[u8]) -> Vec<usize> {
    let first = word.first().copied().unwrap_or_default();
    let starts = text.iter().enumerate().filter(|(_, byte)| **byte == first);
    starts.filter(|(at, _)| text[*at..].starts_with(word)).map(|(at, _)| at + word.len()).collect()
}

/// The number that an attribute's name is followed by; none is 0, and one too long is the most.
fn number_after(text: &[u8]) -> u64 {
    let digits = text.iter().skip_while(|byte| !byte.is_ascii_digit() && **byte != b'>');
    digits.take_while(|byte| byte.is_ascii_digit()).fold(0_u64, |number, digit| {
        number.saturating_mul(10).saturating_add(u64::from(digit - b'0'))
    })
}

#[cfg(test)]
mod tests {
    use super::{Scan, number_after, places};

    #[test]
    fn a_word_across_two_pieces_is_seen_with_its_number() {
        let mut scan = Scan::of("xl/sharedstrings.xml");
        assert!(scan.take(b"<sst uniqueCo").is_ok());
        assert!(scan.take(b"unt='99999999'><si/>").is_err());
        let mut scan = Scan::of("xl/worksheets/sheet1.xml");
        assert!(scan.take(b"<mergeC").is_ok() && !scan.merged);
        assert!(scan.take(b"ell ref=\"A1:A2\"/>").is_ok() && scan.merged);
    }

    #[test]
    fn numbers_after_a_name_are_read_whole() {
        assert_eq!(places(b"a uniqueCount a uniqueCount", b"uniqueCount"), [13, 27]);
        assert_eq!(number_after(b" = \"12\" x=\"5\""), 12);
        assert_eq!(number_after(b"=\"\">5"), 0);
        assert_eq!(number_after(b"=\"99999999999999999999999\""), u64::MAX);
    }
}
