//! Workbooks made to do harm are refused within 200 MB and a second.

use std::fs;
use std::process::Command;
use std::time::{Duration, Instant};

use tempfile::TempDir;

use super::by_hand::{archive, book, book_with, one_row, text};

/// The most address space the program may have, in KiB, its own code included.
const MOST_MEMORY: u32 = 200 << 10;
const LONGEST: Duration = Duration::from_secs(1);

/// Checks a folder with this one file under the bound on memory; what is told.
#[track_caller]
fn refused(name: &str, bytes: &[u8]) -> String {
    let place = TempDir::new().expect("a folder");
    fs::write(place.path().join(name), bytes).expect("a file");
    let program = env!("CARGO_BIN_EXE_ebbwell");
    let begun = Instant::now();
    let output = Command::new("sh")
        .args(["-c", "ulimit -v $0 && exec \"$1\" check --threads 1 --out out \"$2\""])
        .args([&MOST_MEMORY.to_string(), program, name])
        .current_dir(place.path())
        .output()
        .expect("the program starts");
    let took = begun.elapsed();
    let message = String::from_utf8_lossy(&output.stderr).into_owned();
    println!("{name}: {} bytes refused in {took:?}", bytes.len());
    assert_eq!(output.status.code(), Some(3), "{name}: {message}");
    assert!(took < LONGEST, "{name}: {took:?}");
    assert!(!message.contains("panicked"), "{name}: {message}");
    message
}

#[test]
fn a_sheet_of_two_cells_far_apart() {
    let far = format!(
        "<sheetData><row r=\"1\">{}</row><row r=\"1048576\">{}</row></sheetData>",
        text("A1", "well"),
        text("XFD1048576", "x")
    );
    assert!(refused("sparse.xlsx", &book(&far, "")).contains("no column for"));
}

#[test]
fn a_sheet_whose_rows_reach_far_and_hold_next_to_nothing() {
    let mut data = one_row("", "").replace("</sheetData>", "");
    for row in 3..4_000 {
        data.push_str(&format!("<row r=\"{row}\">{}</row>", text(&format!("XFD{row}"), "x")));
    }
    data.push_str("</sheetData>");
    assert!(refused("gaps.xlsx", &book(&data, "")).contains("nearly all of them empty"));
}

#[test]
fn an_archive_that_unpacks_a_thousandfold() {
    let zeros = vec![b' '; 100 << 20];
    let bomb = book_with("<sheetData/>", "", &[("xl/worksheets/sheet2.xml", &zeros)]);
    assert!(bomb.len() < 200_000);
    assert!(refused("bomb.xlsx", &bomb).contains("for each byte packed"));
}

#[test]
fn an_archive_that_lies_about_its_size() {
    let zeros = vec![b' '; 20 << 20];
    let mut bomb = book_with("<sheetData/>", "", &[("xl/worksheets/sheet2.xml", &zeros)]);
    // The declared size stands in the entry and in the directory at the end.
    let (declared, lie) = ((20_u32 << 20).to_le_bytes(), 1_000_u32.to_le_bytes());
    let places: Vec<usize> =
        (0..bomb.len() - 4).filter(|at| bomb[*at..].starts_with(&declared)).collect();
    assert_eq!(places.len(), 2);
    for at in places {
        bomb[at..at + 4].copy_from_slice(&lie);
    }
    let message = refused("lie.xlsx", &bomb);
    assert!(message.contains("damaged") || message.contains("for each byte packed"), "{message}");
}

#[test]
fn an_archive_in_an_archive() {
    let inner = archive(&[("results.csv", &vec![b'0'; 50 << 20])]);
    let nested = archive(&[("more.zip", &inner), ("again.zip", &inner)]);
    assert!(refused("nested.xlsx", &nested).contains("no workbook"));
    let hidden = book_with("<sheetData/>", "", &[("xl/more.zip", &inner)]);
    assert!(refused("hidden.xlsx", &hidden).contains("no workbook"));
}

#[test]
fn shared_texts_that_announce_more_than_they_hold() {
    let texts = "<sst uniqueCount=\"99999999999\"><si><t>x</t></si></sst>";
    let bomb = book_with("<sheetData/>", "", &[("xl/sharedStrings.xml", texts.as_bytes())]);
    assert!(refused("texts.xlsx", &bomb).contains("distinct texts"));
}

#[test]
fn one_long_text_that_every_cell_repeats() {
    let long = format!("<sst><si><t>{}</t></si></sst>", "x".repeat(32_000));
    let mut data = one_row("", "").replace("</sheetData>", "");
    for row in 3..40_000 {
        data.push_str(&format!("<row r=\"{row}\"><c r=\"A{row}\" t=\"s\"><v>0</v></c></row>"));
    }
    data.push_str("</sheetData>");
    let bomb = book_with(&data, "", &[("xl/sharedStrings.xml", long.as_bytes())]);
    assert!(refused("repeated.xlsx", &bomb).contains("bytes of text"));
}

#[test]
fn merged_regions_over_everything() {
    let data = one_row("<c r=\"D2\"><v>4</v></c>", &text("C2", "2024-03-05"));
    let regions = "<mergeCell ref=\"A1:XFD1048576\"/>".repeat(200_000);
    let data = format!("{data}<mergeCells count=\"1\">{regions}</mergeCells>");
    // A region over a full row fills nothing: what matters is that it costs nothing.
    let place = TempDir::new().expect("a folder");
    fs::write(place.path().join("merged.xlsx"), book(&data, "")).expect("a file");
    let begun = Instant::now();
    let output = Command::new(env!("CARGO_BIN_EXE_ebbwell"))
        .args(["check", "--out", "out", "merged.xlsx"])
        .current_dir(place.path())
        .output()
        .expect("the program starts");
    assert!(begun.elapsed() < 5 * LONGEST, "{:?}", begun.elapsed());
    assert!(!String::from_utf8_lossy(&output.stderr).contains("panicked"));
}

#[test]
fn workbooks_of_other_kinds_say_what_to_do() {
    let ole = [0xD0, 0xCF, 0x11, 0xE0, 0xA1, 0xB1, 0x1A, 0xE1];
    let mut locked = ole.to_vec();
    locked.resize(600, 0);
    locked.extend("EncryptedPackage".encode_utf16().flat_map(u16::to_le_bytes));
    let ods = archive(&[("mimetype", b"x"), ("content.xml", b"<x/>")]);
    let xlsb = archive(&[("[Content_Types].xml", b"<x/>"), ("xl/workbook.bin", b"x")]);
    for (name, bytes, part) in [
        ("old.xls", ole.to_vec(), ".xls, which is not read"),
        ("locked.xlsx", locked, "password"),
        ("open.ods", ods, ".ods, which is not read"),
        ("binary.xlsb", xlsb, ".xlsb, which is not read"),
        ("table.parquet", b"PAR1xxxx".to_vec(), ".parquet, which is not read"),
        ("cut.xlsx", b"PK\x03\x04".to_vec(), "damaged"),
    ] {
        let message = refused(name, &bytes);
        assert!(message.contains(part) && message.contains("CSV"), "{name}: {message}");
    }
}
