//! Workbooks written by hand, for what a writer would not write.

use std::io::{Cursor, Write};

use zip::write::SimpleFileOptions;
use zip::{CompressionMethod, ZipWriter};

const HEAD: &str = r#"<?xml version="1.0" encoding="UTF-8" standalone="yes"?>"#;
const MAIN: &str = "http://schemas.openxmlformats.org/spreadsheetml/2006/main";
const OFFICE: &str = "http://schemas.openxmlformats.org/officeDocument/2006/relationships";
const PACKAGE: &str = "http://schemas.openxmlformats.org/package/2006/relationships";

/// A zip archive of these entries, in their order.
pub(super) fn archive(entries: &[(&str, &[u8])]) -> Vec<u8> {
    let mut writer = ZipWriter::new(Cursor::new(Vec::new()));
    let options = SimpleFileOptions::default().compression_method(CompressionMethod::Deflated);
    for (name, bytes) in entries {
        writer.start_file(*name, options).expect("an entry");
        writer.write_all(bytes).expect("in memory");
    }
    writer.finish().expect("in memory").into_inner()
}

/// A workbook of one sheet with this `sheetData` and what follows it.
pub(super) fn book(sheet_data: &str, properties: &str) -> Vec<u8> {
    book_with(sheet_data, properties, &[])
}

/// The same with more entries, or others in the place of its own.
pub(super) fn book_with(sheet_data: &str, properties: &str, more: &[(&str, &[u8])]) -> Vec<u8> {
    let types = format!(
        "{HEAD}<Types xmlns=\"http://schemas.openxmlformats.org/package/2006/content-types\">\
         <Default Extension=\"xml\" ContentType=\"application/xml\"/></Types>"
    );
    let rels = format!(
        "{HEAD}<Relationships xmlns=\"{PACKAGE}\"><Relationship Id=\"rId1\" \
         Type=\"{OFFICE}/officeDocument\" Target=\"xl/workbook.xml\"/></Relationships>"
    );
    let workbook = format!(
        "{HEAD}<workbook xmlns=\"{MAIN}\" xmlns:r=\"{OFFICE}\">{properties}<sheets>\
         <sheet name=\"Data\" sheetId=\"1\" r:id=\"rId1\"/></sheets></workbook>"
    );
    let sheets = format!(
        "{HEAD}<Relationships xmlns=\"{PACKAGE}\"><Relationship Id=\"rId1\" \
         Type=\"{OFFICE}/worksheet\" Target=\"worksheets/sheet1.xml\"/></Relationships>"
    );
    // Format 1 is a date's (14), format 0 a plain number's.
    let styles = format!(
        "{HEAD}<styleSheet xmlns=\"{MAIN}\"><cellXfs count=\"2\"><xf numFmtId=\"0\"/>\
         <xf numFmtId=\"14\"/></cellXfs></styleSheet>"
    );
    let sheet = format!("{HEAD}<worksheet xmlns=\"{MAIN}\">{sheet_data}</worksheet>");
    let own: [(&str, &[u8]); 6] = [
        ("[Content_Types].xml", types.as_bytes()),
        ("_rels/.rels", rels.as_bytes()),
        ("xl/workbook.xml", workbook.as_bytes()),
        ("xl/_rels/workbook.xml.rels", sheets.as_bytes()),
        ("xl/styles.xml", styles.as_bytes()),
        ("xl/worksheets/sheet1.xml", sheet.as_bytes()),
    ];
    let replaced = |name: &str| more.iter().any(|(other, _)| *other == name);
    let kept = own.into_iter().filter(|(name, _)| !replaced(name));
    archive(&kept.chain(more.iter().copied()).collect::<Vec<_>>())
}

/// A text cell.
pub(super) fn text(address: &str, text: &str) -> String {
    format!("<c r=\"{address}\" t=\"inlineStr\"><is><t>{text}</t></is></c>")
}

/// The header and one row of benzene, with this cell for the result and this one for the date.
pub(super) fn one_row(result: &str, date: &str) -> String {
    let header: String = ["well", "analyte", "date", "result", "unit"]
        .iter()
        .zip(["A1", "B1", "C1", "D1", "E1"])
        .map(|(header, address)| text(address, header))
        .collect();
    format!(
        "<sheetData><row r=\"1\">{header}</row><row r=\"2\">{}{}{date}{result}{}</row></sheetData>",
        text("A2", "001"),
        text("B2", "Benzene"),
        text("E2", "ug/L")
    )
}
