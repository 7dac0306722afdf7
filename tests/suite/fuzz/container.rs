//! A workbook put together from its parts: a container without compression, so that a part can be
//! mutated and the container around it still stands.

/// The parts of a small workbook: one sheet with numbers, texts, a shared text and a date.
const PARTS: [(&str, &str); 6] = [
    (
        "[Content_Types].xml",
        "<?xml version=\"1.0\"?><Types xmlns=\"http://schemas.openxmlformats.org/package/2006/content-types\">\
         <Default Extension=\"rels\" ContentType=\"application/vnd.openxmlformats-package.relationships+xml\"/>\
         <Default Extension=\"xml\" ContentType=\"application/xml\"/>\
         <Override PartName=\"/xl/workbook.xml\" ContentType=\"application/vnd.openxmlformats-officedocument.spreadsheetml.sheet.main+xml\"/>\
         <Override PartName=\"/xl/worksheets/sheet1.xml\" ContentType=\"application/vnd.openxmlformats-officedocument.spreadsheetml.worksheet+xml\"/>\
         <Override PartName=\"/xl/sharedStrings.xml\" ContentType=\"application/vnd.openxmlformats-officedocument.spreadsheetml.sharedStrings+xml\"/></Types>",
    ),
    (
        "_rels/.rels",
        "<?xml version=\"1.0\"?><Relationships xmlns=\"http://schemas.openxmlformats.org/package/2006/relationships\">\
         <Relationship Id=\"rId1\" Type=\"http://schemas.openxmlformats.org/officeDocument/2006/relationships/officeDocument\" Target=\"xl/workbook.xml\"/></Relationships>",
    ),
    (
        "xl/workbook.xml",
        "<?xml version=\"1.0\"?><workbook xmlns=\"http://schemas.openxmlformats.org/spreadsheetml/2006/main\" \
         xmlns:r=\"http://schemas.openxmlformats.org/officeDocument/2006/relationships\"><sheets>\
         <sheet name=\"Results\" sheetId=\"1\" r:id=\"rId1\"/></sheets></workbook>",
    ),
    (
        "xl/_rels/workbook.xml.rels",
        "<?xml version=\"1.0\"?><Relationships xmlns=\"http://schemas.openxmlformats.org/package/2006/relationships\">\
         <Relationship Id=\"rId1\" Type=\"http://schemas.openxmlformats.org/officeDocument/2006/relationships/worksheet\" Target=\"worksheets/sheet1.xml\"/>\
         <Relationship Id=\"rId2\" Type=\"http://schemas.openxmlformats.org/officeDocument/2006/relationships/sharedStrings\" Target=\"sharedStrings.xml\"/></Relationships>",
    ),
    (
        "xl/sharedStrings.xml",
        "<?xml version=\"1.0\"?><sst xmlns=\"http://schemas.openxmlformats.org/spreadsheetml/2006/main\" count=\"1\" uniqueCount=\"1\"><si><t>PCE</t></si></sst>",
    ),
    (
        "xl/worksheets/sheet1.xml",
        "<?xml version=\"1.0\"?><worksheet xmlns=\"http://schemas.openxmlformats.org/spreadsheetml/2006/main\"><dimension ref=\"A1:E3\"/><sheetData>\
         <row r=\"1\"><c r=\"A1\" t=\"inlineStr\"><is><t>well</t></is></c><c r=\"B1\" t=\"inlineStr\"><is><t>analyte</t></is></c><c r=\"C1\" t=\"inlineStr\"><is><t>date</t></is></c><c r=\"D1\" t=\"inlineStr\"><is><t>result</t></is></c><c r=\"E1\" t=\"inlineStr\"><is><t>unit</t></is></c></row>\
         <row r=\"2\"><c r=\"A2\" t=\"inlineStr\"><is><t>MW-1</t></is></c><c r=\"B2\" t=\"s\"><v>0</v></c><c r=\"C2\" t=\"inlineStr\"><is><t>2024-03-05</t></is></c><c r=\"D2\"><v>4.2</v></c><c r=\"E2\" t=\"inlineStr\"><is><t>ug/L</t></is></c></row>\
         <row r=\"3\"><c r=\"A3\" t=\"inlineStr\"><is><t>MW-1</t></is></c><c r=\"B3\" t=\"s\"><v>0</v></c><c r=\"C3\" t=\"d\"><v>2024-06-05</v></c><c r=\"D3\" t=\"e\"><v>#N/A</v></c><c r=\"E3\" t=\"inlineStr\"><is><t>ug/L</t></is></c></row>\
         </sheetData><mergeCells count=\"1\"><mergeCell ref=\"A2:A3\"/></mergeCells></worksheet>",
    ),
];

/// How many parts there are.
pub const COUNT: usize = PARTS.len();

/// The bytes of one part.
pub fn part(at: usize) -> Vec<u8> {
    PARTS[at].1.as_bytes().to_vec()
}

/// The workbook, with some parts in place of their own.
pub fn workbook(changed: &[(usize, Vec<u8>)]) -> Vec<u8> {
    let mut bytes = Vec::new();
    let mut directory = Vec::new();
    for (at, (name, own)) in PARTS.iter().enumerate() {
        let other = changed.iter().find(|(place, _)| *place == at).map(|(_, part)| part.as_slice());
        let content = other.unwrap_or(own.as_bytes());
        let offset = u32::try_from(bytes.len()).expect("a small container");
        let size = u32::try_from(content.len()).expect("a small part");
        // Version 2.0, no flags, stored, 1 January 1980 (APPNOTE 4.3.7 and 4.3.12).
        let mut common = Vec::new();
        for word in [20_u16, 0, 0, 0, 0x21] {
            common.extend(word.to_le_bytes());
        }
        for long in [crc32(content), size, size] {
            common.extend(long.to_le_bytes());
        }
        common.extend(u16::try_from(name.len()).expect("a short name").to_le_bytes());
        common.extend(0_u16.to_le_bytes());
        bytes.extend(0x0403_4b50_u32.to_le_bytes());
        bytes.extend(&common);
        bytes.extend(name.as_bytes());
        bytes.extend(content);
        directory.extend(0x0201_4b50_u32.to_le_bytes());
        directory.extend(20_u16.to_le_bytes());
        directory.extend(&common);
        directory.extend([0; 10]);
        directory.extend(offset.to_le_bytes());
        directory.extend(name.as_bytes());
    }
    let (start, size) = (bytes.len(), directory.len());
    bytes.extend(&directory);
    bytes.extend(0x0605_4b50_u32.to_le_bytes());
    let count = u16::try_from(PARTS.len()).expect("a few parts");
    for word in [0, 0, count, count] {
        bytes.extend(word.to_le_bytes());
    }
    for long in [size, start] {
        bytes.extend(u32::try_from(long).expect("a small container").to_le_bytes());
    }
    bytes.extend(0_u16.to_le_bytes());
    bytes
}

/// The checksum of a part (ISO 3309, reflected, 0xEDB88320).
fn crc32(bytes: &[u8]) -> u32 {
    let mut sum = u32::MAX;
    for byte in bytes {
        sum ^= u32::from(*byte);
        for _ in 0..8 {
            sum = if sum & 1 == 1 { (sum >> 1) ^ 0xedb8_8320 } else { sum >> 1 };
        }
    }
    !sum
}

#[test]
fn the_checksum_is_the_one_that_containers_use() {
    // The check value of the algorithm, for the digits 1 to 9.
    assert_eq!(crc32(b"123456789"), 0xcbf4_3926);
}
