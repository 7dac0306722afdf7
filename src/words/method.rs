//! Methods in words.

use crate::terms::Method;

/// The short name.
#[must_use]
pub fn label(method: Method) -> &'static str {
    match method {
        Method::LeastSquares => "least squares",
        Method::CensoredLikelihood => "censored likelihood",
        Method::LeastSquaresSubstituted => "least squares with substituted non-detects",
        Method::Count => "count of the last dates",
    }
}

/// What is done.
#[must_use]
pub fn meaning(method: Method) -> &'static str {
    match method {
        Method::LeastSquares => {
            "A straight line through the logarithms of the measured values against time, by least \
             squares; used where every date in the window is measured. Intervals are t intervals \
             and, for dates, Fieller's; their coverage assumes independent, normal errors of equal \
             size on the log scale."
        }
        Method::CensoredLikelihood => {
            "The same line by maximum likelihood, every non-detect entering as `somewhere under its \
             own limit` and every `>` value as `somewhere above`. Intervals come from the profile \
             likelihood with a small-sample cut-off; their coverage assumes independent, normal \
             errors of equal size on the log scale."
        }
        Method::LeastSquaresSubstituted => {
            "Least squares after non-detects were replaced by their limit or half of it, because \
             the site file asks for it. Substitution makes a trend out of falling reporting limits, \
             and the coverage of its intervals is not known; the flag substituted says so."
        }
        Method::Count => {
            "No line was fitted; the verdict below rests on the last 8 dates, in 4 rounds or more \
             over 1.5 years or more, each at or under the limit."
        }
    }
}

/// The formula.
#[must_use]
pub fn formula(method: Method) -> Option<&'static str> {
    match method {
        Method::LeastSquares | Method::LeastSquaresSubstituted => Some(
            "ln C = a - k t;  k = -sum((t - tbar)(y - ybar)) / Sxx;  s^2 = RSS / (n - 2);  \
             interval k +- t[n-2] s / sqrt(Sxx)",
        ),
        Method::CensoredLikelihood => Some(
            "measured: -ln s - z^2/2;  below R: ln Phi((ln R - mu) / s);  above v: ln Phi(-(ln v - \
             mu) / s);  mu = a - k t",
        ),
        Method::Count => None,
    }
}

/// Where the method comes from.
#[must_use]
pub fn source(method: Method) -> &'static str {
    match method {
        Method::LeastSquares => {
            "textbook least squares; checked against NIST StRD Norris and Example 21-7 of the US EPA \
             Unified Guidance (EPA 530-R-09-007) as a public script reproduces it"
        }
        Method::CensoredLikelihood => {
            "Tobin 1958; the concave form of Olsen 1978 (both from memory); checked against R's \
             survival::survreg"
        }
        Method::LeastSquaresSubstituted => "the site file's setting; Helsel 2005 argues against it",
        Method::Count => "this program's rule",
    }
}
