//! How numbers and dates are written.

use chrono::NaiveDate;
use ebbwell::terms::Reading;
use ebbwell::words::number::{
    confidence, count, counted, iso, json, month, p_value, people, percent, reading, table,
};
use proptest::prelude::{any, prop_assert, prop_assert_eq, prop_assume, proptest};

#[test]
fn the_shortest_decimal_of_six_digits_without_trailing_zeros() {
    for (value, written) in [
        (0.1 + 0.2, "0.3"),
        (5.0, "5"),
        (-5.25, "-5.25"),
        (0.000_123_456_78, "0.000123457"),
        (123_456.4, "123456"),
        (1_234_567.0, "1234570"),
        (100.0, "100"),
        (1e14, "100000000000000"),
        (2.0 / 3.0, "0.666667"),
        (0.999_999_9, "1"),
    ] {
        assert_eq!(table(value), written, "{value}");
    }
}

#[test]
fn the_plain_form_ends_at_a_hundred_thousandth_and_at_a_quadrillion() {
    assert_eq!(table(1e-5), "0.00001");
    assert_eq!(table(9.99999e-6), "9.99999e-6");
    // Rounded to six digits this is a hundred-thousandth, and the rounded value decides.
    assert_eq!(table(9.999_999e-6), "0.00001");
    assert_eq!(table(1e15), "1e15");
    assert_eq!(table(9.999_99e14), "999999000000000");
    assert_eq!(table(9.999_999e14), "1e15");
    assert_eq!(table(1.23e-7), "1.23e-7");
    assert_eq!(table(-1.23e20), "-1.23e20");
}

#[test]
fn ties_round_as_the_exact_binary_value_lies_and_halves_to_even() {
    // 123456.5 is exact in binary; 9.999995e-6 lies 5e-22 over the tie it is written as.
    assert_eq!(table(123_456.5), "123456");
    assert_eq!(table(123_457.5), "123458");
    assert_eq!(table(9.999_995e-6), "0.00001");
    assert_eq!(table(9.999_994e-6), "9.99999e-6");
}

#[test]
fn zero_has_no_sign_and_the_smallest_number_is_written() {
    assert_eq!(table(-0.0), "0");
    assert_eq!(table(0.0), "0");
    assert_eq!(table(5e-324), "4.94066e-324");
    assert_eq!(table(f64::MAX), "1.79769e308");
}

#[test]
fn what_is_not_finite_is_written_as_nothing() {
    for value in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
        assert_eq!(table(value), "");
        assert_eq!(json(value), "");
        assert_eq!(people(value), "");
        assert_eq!(percent(value), "");
    }
}

#[test]
fn json_keeps_ten_digits_and_people_read_three() {
    assert_eq!(json(std::f64::consts::PI), "3.141592654");
    assert_eq!(people(std::f64::consts::PI), "3.14");
    assert_eq!(people(1234.0), "1230");
    assert_eq!(people(0.27), "0.27");
}

#[test]
fn dates_are_iso_in_files_and_months_for_people() {
    let date = NaiveDate::from_ymd_opt(2031, 4, 7).expect("a date");
    assert_eq!(iso(date), "2031-04-07");
    assert_eq!(month(date), "2031-04");
    let early = NaiveDate::from_ymd_opt(987, 1, 2).expect("a date");
    assert_eq!(iso(early), "0987-01-02");
}

#[test]
fn counts_shares_and_p_values_for_people() {
    assert_eq!(count(55_544), "55,544");
    assert_eq!(count(999), "999");
    assert_eq!(count(1_000_000), "1,000,000");
    assert_eq!(counted(1, "record", "records"), "1 record");
    assert_eq!(counted(0, "record", "records"), "0 records");
    assert_eq!(percent(0.1234), "12 %");
    assert_eq!(percent(0.0042), "0.4 %");
    assert_eq!(p_value(0.0123), "p 0.012");
    assert_eq!(p_value(0.000_9), "p under 0.001");
    assert_eq!(confidence(0.9), "90 %");
    assert_eq!(confidence(0.975), "97.5 %");
}

#[test]
fn a_reading_carries_its_mark() {
    assert_eq!(reading(Reading::Below(0.5)), "<0.5");
    assert_eq!(reading(Reading::Above(2000.0)), ">2000");
    assert_eq!(reading(Reading::Measured(1.25)), "1.25");
    assert_eq!(reading(Reading::Between(0.2, 0.5)), "0.2 to 0.5");
}

proptest! {
    #[test]
    fn a_written_number_reads_back_to_six_digits_and_is_written_the_same_again(bits in any::<u64>()) {
        let value = f64::from_bits(bits);
        prop_assume!(value.is_finite());
        let written = table(value);
        let back: f64 = written.parse().expect("a number");
        // Subnormal numbers have fewer bits than the digits ask for.
        let slack = 5.000_001e-6 * value.abs() + 1e-323;
        prop_assert!(back.is_infinite() || (back - value).abs() <= slack, "{} {}", value, written);
        if back.is_finite() {
            prop_assert_eq!(table(back), written);
        }
    }
}

#[test]
fn an_estimate_is_written_no_finer_than_its_interval() {
    use ebbwell::words::number::people_beside;
    assert_eq!(people_beside(0.000_024_9, -0.007_65, 0.007_7), "0.00002");
    assert_eq!(people_beside(-0.000_000_1, -0.007_65, 0.007_7), "0");
    assert_eq!(people_beside(0.278_4, 0.251, 0.305), "0.278");
    assert_eq!(people_beside(17.34, 2.87, 104.0), "17.3", "one that does not hold zero");
    assert_eq!(people_beside(0.5, -1.0, 4000.0), "0.5");
    assert_eq!(people_beside(f64::NAN, -1.0, 1.0), "");
    assert_eq!(people_beside(0.25, -1.0, f64::INFINITY), "0.25");
}
