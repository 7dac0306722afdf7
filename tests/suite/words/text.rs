//! Text from files made harmless, and lines of a page.

use ebbwell::words::clean::{is_unsafe, shell_word, shown, shown_short};
use ebbwell::words::layout::{Align, Lines, columns, wrapped};
use proptest::prelude::{prop_assert, proptest};

#[test]
fn control_and_direction_characters_are_seen_and_do_nothing() {
    for hostile in
        ["\u{1b}[2J", "a\u{9b}31m", "x\u{202e}y", "a\r\nb", "\u{2066}q\u{2069}", "z\u{200b}"]
    {
        let clean = shown(hostile);
        assert!(!clean.chars().any(is_unsafe), "{hostile:?}");
        assert!(clean.contains('\u{fffd}'), "{hostile:?}");
    }
    assert_eq!(shown("Ünïcode \u{b5}g/L"), "Ünïcode \u{b5}g/L");
}

#[test]
fn a_long_text_is_cut_with_an_ellipsis() {
    assert_eq!(shown_short("abcdef", 4), "abc\u{2026}");
    assert_eq!(shown_short("abcd", 4), "abcd");
}

#[test]
fn a_word_for_the_shell_cannot_leave_its_quotes() {
    assert_eq!(shell_word("MW-1"), "MW-1");
    assert_eq!(shell_word("Old Depot"), "'Old Depot'");
    assert_eq!(shell_word("'; rm -rf ~ #"), "''\\''; rm -rf ~ #'");
    assert_eq!(shell_word("$(id)"), "'$(id)'");
    assert_eq!(shell_word(""), "''");
}

#[test]
fn a_no_break_space_holds_words_together() {
    let lines = wrapped("aaa bbb\u{a0}ccc", 8, 0, 0);
    assert_eq!(lines, ["aaa", "bbb ccc"]);
}

#[test]
fn wide_and_combining_characters_take_their_columns() {
    assert_eq!(columns("ab"), 2);
    assert_eq!(columns("\u{6c34}"), 2);
    assert_eq!(columns("e\u{301}"), 1);
}

#[test]
fn rows_align_and_wrap_their_last_column_under_itself() {
    let mut lines = Lines::new(40, false);
    let row = |a: &str, b: &str| vec![a.to_owned(), b.to_owned()];
    let rows = [row("9", "a sentence that does not fit on one line"), row("10", "short")];
    lines.rows(&rows, &[Align::Right, Align::Left], 2);
    assert_eq!(
        lines.finish(),
        "   9  a sentence that does not fit on\n      one line\n  10  short\n"
    );
}

proptest! {
    #[test]
    fn no_line_is_wider_than_asked_and_no_word_is_lost(
        text in "[a-z\u{e9}\u{6c34} ]{0,300}",
        width in 10_usize..100,
    ) {
        let lines = wrapped(&text, width, 2, 4);
        for line in &lines {
            prop_assert!(columns(line) <= width, "{line:?}");
        }
        let letters = |text: &str| text.chars().filter(|c| *c != ' ').collect::<String>();
        prop_assert!(letters(&lines.concat()) == letters(&text));
    }
}
