//! `--fail-on`: verdicts and flags that end the program with status 1.

use ebbwell::findings::Findings;
use ebbwell::terms::{FlagCode, Standing, Verdict, nearest};

/// What `--fail-on` names.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct FailOn {
    verdicts: Vec<Verdict>,
    flags: Vec<FlagCode>,
}

/// Reads the words of `--fail-on`.
pub fn fail_on(words: &[String]) -> Result<FailOn, String> {
    let mut out = FailOn::default();
    for word in words.iter().map(|word| word.trim()).filter(|word| !word.is_empty()) {
        match (Verdict::from_code(word), FlagCode::from_code(word)) {
            (Some(verdict), _) => out.verdicts.push(verdict),
            (None, Some(flag)) => out.flags.push(flag),
            (None, None) => {
                let known = Verdict::ALL
                    .iter()
                    .map(|verdict| verdict.code())
                    .chain(FlagCode::ALL.iter().map(|flag| flag.code()));
                let near = nearest(word, known)
                    .map_or_else(String::new, |near| format!("; the nearest is {near}"));
                return Err(format!(
                    "--fail-on {word:?} is neither a verdict nor a flag{near}. `ebbwell explain` \
                     lists both"
                ));
            }
        }
    }
    Ok(out)
}

impl FailOn {
    /// Whether any series has one of the named verdicts or flags.
    pub fn found_in(&self, findings: &Findings) -> bool {
        findings.series.iter().any(|series| {
            let flagged = series
                .flags
                .iter()
                .any(|flag| flag.standing == Standing::Raised && self.flags.contains(&flag.code));
            flagged || self.verdicts.contains(&series.verdict)
        })
    }
}
