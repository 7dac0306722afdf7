//! Whatever stands in a cross-tab or in a sheet's XML, every record has its row and nothing panics.

use proptest::prelude::{ProptestConfig, Strategy, any, prop, prop_assert_eq, proptest};

use super::by_hand::{book, one_row, text};
use super::{read_bytes, site};

fn cell() -> impl Strategy<Value = String> {
    prop::sample::select(vec![
        "Well",
        "Date",
        "Analyte",
        "Unit",
        "Qualifier",
        "Sample ID",
        "Benzene",
        "Benzene (ug/L)",
        "Toluene, mg/L",
        "Units: ug/L",
        "ug/L",
        "2024-03-05",
        "2024-06-05",
        "05/03/2024",
        "MW-1",
        "MW-2",
        "4.2",
        "<0.5",
        "ND",
        "dry",
        "#N/A",
        "",
        "",
        "",
        "note",
        "\u{202e}x",
        "()",
        "(",
        ":",
        "a\nb",
    ])
    .prop_map(str::to_owned)
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 300, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn any_cross_tab_of_any_cells_is_read_or_refused(
        head in prop::sample::select(vec![
            "Benzene (ug/L)\nWell,2024-03-05,2024-06-05,2024-09-05\n",
            "Toluene (mg/L)\nDate,MW-1,MW-2,MW-3\n",
            "Well,Date,Benzene (ug/L),Toluene (mg/L)\n",
            "Well,Analyte,Unit,2024-03-05,2024-06-05\n",
            "",
        ]),
        table in prop::collection::vec(prop::collection::vec(cell(), 0..6), 0..12),
        declared in any::<bool>(),
    ) {
        let mut writer = csv::WriterBuilder::new().flexible(true).from_writer(Vec::new());
        for row in &table {
            writer.write_record(row).expect("in memory");
        }
        let mut bytes = head.as_bytes().to_vec();
        bytes.extend(writer.into_inner().expect("in memory"));
        let site = site(if declared { "layout = \"cross-tab\"" } else { "" });
        let read = read_bytes(&bytes, &site);
        let records: usize = read.files.iter().map(|file| file.records).sum();
        prop_assert_eq!(read.ledger.len(), records);
        prop_assert_eq!(read.files.len() + read.unreadable.len(), 1);
    }

    #[test]
    fn any_change_to_a_sheets_xml_is_read_or_refused(
        places in prop::collection::vec((any::<prop::sample::Index>(), any::<u8>()), 1..6),
        cut in any::<prop::sample::Index>(),
        shorter in any::<bool>(),
    ) {
        let data = one_row("<c r=\"D2\"><v>4.2</v></c>", &text("C2", "2024-03-05"));
        let merged = "<mergeCells count=\"1\"><mergeCell ref=\"A2:A3\"/></mergeCells>";
        let mut bytes = format!("{data}{merged}").into_bytes();
        for (place, byte) in places {
            let at = place.index(bytes.len());
            bytes[at] = byte & 0x7f;
        }
        if shorter {
            bytes.truncate(cut.index(bytes.len()));
        }
        let xml = String::from_utf8(bytes).expect("ASCII");
        let read = read_bytes(&book(&xml, ""), &site(""));
        let records: usize = read.files.iter().map(|file| file.records).sum();
        prop_assert_eq!(read.ledger.len(), records);
    }
}
