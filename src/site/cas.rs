//! CAS numbers: their form and their check digit.

/// What a CAS number's form and check digit say.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum CasCheck {
    /// The form is right and the check digit agrees.
    Holds,
    /// The form is right and the check digit does not agree. Some numbers in official lists are
    /// like this, so it is a reason to look, not to refuse.
    Fails,
    /// The text is no CAS number.
    Malformed,
}

/// A CAS number as it is compared: trimmed, without a trailing full stop.
#[must_use]
pub fn trimmed(text: &str) -> &str {
    text.trim().trim_end_matches('.').trim_end()
}

/// Checks a CAS number's form (2 to 7 digits, 2 digits, 1 digit) and its check digit.
///
/// # Formula
/// ```text
/// check = (Σ digit × position) mod 10
/// ```
/// where positions count from the right, beginning with 1 at the digit before the check digit.
///
/// # Reference
/// CAS, "Check Digit Verification of CAS Registry Numbers"; its example is 107-07-3.
#[must_use]
pub fn cas_check(text: &str) -> CasCheck {
    let mut parts = trimmed(text).split('-');
    let (Some(head), Some(middle), Some(check), None) =
        (parts.next(), parts.next(), parts.next(), parts.next())
    else {
        return CasCheck::Malformed;
    };
    let digits = |part: &str| part.bytes().all(|byte| byte.is_ascii_digit());
    let sizes = (2..=7).contains(&head.len()) && middle.len() == 2 && check.len() == 1;
    if !sizes || ![head, middle, check].into_iter().all(digits) {
        return CasCheck::Malformed;
    }
    let weighted = middle
        .bytes()
        .rev()
        .chain(head.bytes().rev())
        .zip(1_u32..)
        .map(|(digit, position)| u32::from(digit - b'0') * position);
    let sum: u32 = weighted.sum();
    if check.bytes().all(|digit| u32::from(digit - b'0') == sum % 10) {
        CasCheck::Holds
    } else {
        CasCheck::Fails
    }
}
