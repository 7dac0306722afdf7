//! How inputs are made from seeds: bytes changed, lines and cells moved, values replaced.

use super::container;
use super::kept;
use super::numbers::Numbers;
use super::seeds::{Kind, Seed};

/// The most bytes of an ordinary input; one in a thousand may have [`HUGE`].
const LARGE: usize = 64 << 10;
/// See [`LARGE`].
const HUGE: usize = 1 << 20;

/// One input.
pub struct Input {
    pub kind: Kind,
    /// The seed it was made from.
    pub from: &'static str,
    pub bytes: Vec<u8>,
    /// Under which site a table is read.
    pub site: usize,
}

/// Bytes that mean something to somebody.
const TELLING: [&[u8]; 30] = [
    b"\0",
    b"\"",
    b"\"\"",
    b"'",
    b"\r",
    b"\n",
    b"\r\n",
    b",",
    b";",
    b"\t",
    b"|",
    b"\xef\xbb\xbf",
    b"\xff\xfe",
    b"\xfe\xff",
    b"\xff",
    b"\xc2",
    b"\xe2\x80\xae",
    b"\x1b[31m",
    b"\x1a",
    b"\x7f",
    b"../",
    b"=",
    b"#",
    b"[",
    b"]",
    b"{",
    b"}",
    b"\\u0000",
    b"\xf0\x9f\x92\xa9",
    b" ",
];

/// Cells that a table may hold.
const CELLS: [&str; 64] = [
    "",
    " ",
    "0",
    "-0",
    "-1",
    "1e400",
    "-1e400",
    "1e-400",
    "NaN",
    "inf",
    "5,1,2",
    "1.204,5",
    "1 204,5",
    "1'204",
    "<",
    "<<5",
    "<0",
    "<-1",
    "< 0.5",
    "<.5",
    "<0,5",
    ">2000",
    ">",
    "ND",
    "ND (0.5)",
    "n.d.",
    "BRL",
    "0.5 U",
    "0.5 J",
    "O.5",
    "#N/A",
    "=1+1",
    "+1",
    "-",
    "--",
    "31/02/2024",
    "00/00/0000",
    "13/13/2024",
    "2024-02-30",
    "0000-01-01",
    "9999-12-31",
    "99999-01-01",
    "45366",
    "-45366",
    "4.5366e4",
    "2024-03-05T25:61:61",
    "1/1/1",
    "5-Mär-24",
    "U",
    "UJ;R",
    "E,D",
    "B/J",
    "ug/L",
    "UG/L as N",
    "mg/L as CaCO3",
    "pCi/L",
    "ppb",
    "furlong/L",
    "Trip Blank",
    "Duplicate",
    "Dry",
    "Not Detected",
    "127-18-4",
    "9007199254740993",
];

/// Header words.
const HEADERS: [&str; 28] = [
    "well",
    "Station No.",
    "site id",
    "analyte",
    "Parameter",
    "date",
    "Sample Date",
    "result",
    "Result (ug/L)",
    "Value",
    "unit",
    "UOM",
    "qualifier",
    "Flag",
    "RL",
    "MDL",
    "cas",
    "CAS No.",
    "fraction",
    "sample_type",
    "sample_id",
    "depth",
    "time",
    "batch",
    "uncertainty",
    "status",
    "detection_condition",
    "furlongs",
];

/// Values that a site file may hold.
const VALUES: [&str; 24] = [
    "nan",
    "inf",
    "-1",
    "0",
    "1e400",
    "99999999999999999999999",
    "true",
    "\"\"",
    "\"\\u0000\"",
    "'''\n'''",
    "[]",
    "{}",
    "[[[[[[1]]]]]]",
    "{ a = { b = { c = 1 } } }",
    "0001-01-01",
    "9999-12-31",
    "2024-02-30",
    "07:32:00",
    "\"5 ug/L\"",
    "\"MW-1\"",
    "\"**\"",
    "\"../x\"",
    "[\"MW-1\", \"MW-1\"]",
    "[{ value = \"5 ug/L\", from = 2020-01-01 }]",
];

/// The input with a number.
pub fn input(seeds: &[Seed], seed: u64, number: u64) -> Input {
    if let Some(kept) = kept::input(number) {
        return kept;
    }
    let mut numbers = Numbers::of(seed, number);
    let from = numbers.one(seeds);
    let most = if numbers.once_in(1000) { HUGE } else { LARGE };
    let mut bytes = from.bytes.clone();
    // Mostly few changes, so that most of the input still reads and the change goes deep.
    let changes = match numbers.below(10) {
        0 => 0,
        1..=6 => 1 + numbers.below(3),
        7 | 8 => 1 + numbers.below(12),
        _ => 1 + numbers.below(80),
    };
    if from.kind == Kind::Workbook && !numbers.once_in(3) {
        let at = numbers.below(container::COUNT);
        let mut part = container::part(at);
        for _ in 0..changes {
            change_bytes(&mut part, &mut numbers, seeds, most);
        }
        bytes = container::workbook(&[(at, part)]);
    } else {
        for _ in 0..changes {
            match from.kind {
                Kind::Table if !numbers.once_in(3) => change_table(&mut bytes, &mut numbers, most),
                Kind::Site if !numbers.once_in(3) => change_site(&mut bytes, &mut numbers),
                _ => change_bytes(&mut bytes, &mut numbers, seeds, most),
            }
        }
    }
    bytes.truncate(most);
    Input { kind: from.kind, from: from.name, bytes, site: numbers.below(3) }
}

/// A stretch of a length, at most `longest`.
fn stretch(length: usize, longest: usize, numbers: &mut Numbers) -> std::ops::Range<usize> {
    let from = numbers.below(length);
    let to = from + numbers.below(longest.min(length - from) + 1);
    from..to
}

/// Changes bytes without regard to what they mean.
fn change_bytes(bytes: &mut Vec<u8>, numbers: &mut Numbers, seeds: &[Seed], most: usize) {
    let at = numbers.below(bytes.len() + 1);
    match numbers.below(9) {
        0 if !bytes.is_empty() => {
            let at = numbers.below(bytes.len());
            bytes[at] ^= 1 << numbers.below(8);
        }
        1 if !bytes.is_empty() => {
            let at = numbers.below(bytes.len());
            bytes[at] = u8::try_from(numbers.below(256)).expect("a byte");
        }
        2 => drop(bytes.drain(stretch(bytes.len(), 200, numbers))),
        3 => bytes.truncate(at),
        4 => {
            let copy = bytes[stretch(bytes.len(), 400, numbers)].to_vec();
            bytes.splice(at..at, copy);
        }
        5 => {
            let other = numbers.one(seeds);
            let copy = other.bytes[stretch(other.bytes.len(), 400, numbers)].to_vec();
            bytes.splice(at..at, copy);
        }
        6 => {
            let filler = numbers.one(&TELLING);
            let longest = if numbers.once_in(20) { most } else { 300 };
            let times = numbers.below(longest / filler.len());
            bytes.splice(at..at, filler.repeat(times));
        }
        _ => {
            let telling = numbers.one(&TELLING);
            bytes.splice(at..at, telling.iter().copied());
        }
    }
}

/// The lines of a text, their ends kept.
fn lines(bytes: &[u8]) -> Vec<Vec<u8>> {
    bytes.split_inclusive(|byte| *byte == b'\n').map(<[u8]>::to_vec).collect()
}

/// Changes lines and cells of a table. Cells are cut at the commonest separator of the first line,
/// without regard to quotes: a cut through a quoted cell is a change like any other.
fn change_table(bytes: &mut Vec<u8>, numbers: &mut Numbers, most: usize) {
    let mut all = lines(bytes);
    if all.is_empty() {
        all.push(b"well,analyte,date,result,unit\n".to_vec());
    }
    let count = |separator: u8| all[0].iter().filter(|byte| **byte == separator).count();
    let separator = [b',', b';', b'\t'].into_iter().max_by_key(|s| count(*s)).unwrap_or(b',');
    let at = numbers.below(all.len());
    match numbers.below(12) {
        0 => {
            let line = all[at].clone();
            let times =
                if numbers.once_in(50) { most / (line.len() + 1) } else { 1 + numbers.below(20) };
            all.splice(at..at, vec![line; times]);
        }
        1 => drop(all.remove(at)),
        2 => {
            let other = numbers.below(all.len());
            all.swap(at, other);
        }
        3 => {
            for place in (1..all.len()).rev() {
                all.swap(place, numbers.below(place + 1));
            }
        }
        4 => all.insert(at, b"\n".to_vec()),
        5 => {
            let other = *numbers.one(b",;\t| ");
            let swap = |byte: &mut u8| {
                if *byte == separator {
                    *byte = other;
                }
            };
            all.iter_mut().for_each(|line| line.iter_mut().for_each(swap));
        }
        6 => {
            // A column is moved, doubled or taken away.
            let (from, to, how) = (numbers.below(12), numbers.below(12), numbers.below(3));
            for line in &mut all {
                change_cells(line, separator, |cells| {
                    if from < cells.len() {
                        let cell = if how == 0 { cells[from].clone() } else { cells.remove(from) };
                        if how < 2 {
                            cells.insert(to.min(cells.len()), cell);
                        }
                    }
                });
            }
        }
        7 => {
            let word = numbers.one(&HEADERS).as_bytes().to_vec();
            let place = numbers.below(12);
            change_cells(&mut all[0], separator, |cells| {
                let place = place.min(cells.len() - 1);
                cells[place] = word;
            });
        }
        8 if numbers.once_in(30) => {
            let wide = numbers.below(most / 2);
            change_cells(&mut all[at], separator, |cells| {
                cells.resize(cells.len() + wide, Vec::new());
            });
        }
        _ => {
            let cell = numbers.one(&CELLS);
            let times = if numbers.once_in(60) { LARGE / (cell.len() + 1) } else { 1 };
            let cell = cell.as_bytes().repeat(times);
            let place = numbers.below(12);
            let whole = numbers.once_in(8);
            let first = if whole { 1 } else { at };
            let last = if whole { all.len() } else { at + 1 };
            for line in all.iter_mut().take(last).skip(first) {
                change_cells(line, separator, |cells| {
                    let place = place.min(cells.len() - 1);
                    cells[place].clone_from(&cell);
                });
                if line.len() > LARGE {
                    break;
                }
            }
        }
    }
    *bytes = all.concat();
}

/// Changes the cells of a line; its end is kept.
fn change_cells(line: &mut Vec<u8>, separator: u8, change: impl FnOnce(&mut Vec<Vec<u8>>)) {
    let end = line.iter().rposition(|byte| !matches!(byte, b'\r' | b'\n')).map_or(0, |at| at + 1);
    let tail = line.split_off(end);
    let mut cells: Vec<Vec<u8>> =
        line.split(|byte| *byte == separator).map(<[u8]>::to_vec).collect();
    change(&mut cells);
    *line = cells.join(&separator);
    line.extend(tail);
}

/// Changes lines, keys and values of a site file.
fn change_site(bytes: &mut Vec<u8>, numbers: &mut Numbers) {
    let mut all = lines(bytes);
    if all.is_empty() {
        all.push(b"[site]\n".to_vec());
    }
    let at = numbers.below(all.len());
    match numbers.below(8) {
        0 => drop(all.remove(at)),
        1 => {
            let line = all[at].clone();
            let to = numbers.below(all.len() + 1);
            all.insert(to, line);
        }
        2 => {
            let other = numbers.below(all.len());
            all.swap(at, other);
        }
        3 => {
            let deepest = if numbers.once_in(20) { 20_000 } else { 40 };
            let depth = 1 + numbers.below(deepest);
            let open = numbers.one(&["[", "{ a = ", "\"", "(", "a."]);
            all[at] = format!("deep = {}\n", open.repeat(depth)).into_bytes();
        }
        _ => {
            let keyed = |line: &[u8]| line.iter().position(|byte| *byte == b'=');
            let places: Vec<usize> =
                (0..all.len()).filter(|place| keyed(&all[*place]).is_some()).collect();
            if let Some(at) = places.get(numbers.below(places.len())).copied() {
                let key = keyed(&all[at]).unwrap_or_default();
                let value = numbers.one(&VALUES);
                let mut line = all[at][..key].to_vec();
                if numbers.once_in(6) {
                    let other = &all[places[numbers.below(places.len())]];
                    line = other[..keyed(other).unwrap_or_default()].to_vec();
                }
                line.extend(format!("= {value}\n").into_bytes());
                all[at] = line;
            }
        }
    }
    *bytes = all.concat();
}
