//! Texts as codes: each distinct spelling is kept once and decoded once.

use std::collections::HashMap;

/// The code of one distinct text; 0 is the empty text.
pub type Code = u32;

/// All distinct texts of a run.
#[derive(Clone, Debug)]
pub struct Texts {
    codes: HashMap<Box<str>, Code>,
    texts: Vec<Box<str>>,
}

impl Default for Texts {
    fn default() -> Self {
        let empty: Box<str> = "".into();
        Self { codes: HashMap::from([(empty.clone(), 0)]), texts: vec![empty] }
    }
}

impl Texts {
    /// The code of a text, new or known.
    ///
    /// # Panics
    /// With more than 4,294,967,295 distinct texts, which no memory here holds.
    pub fn code(&mut self, text: &str) -> Code {
        if let Some(&code) = self.codes.get(text) {
            return code;
        }
        let code = Code::try_from(self.texts.len()).expect("fewer than 2^32 distinct texts");
        let boxed: Box<str> = text.into();
        self.codes.insert(boxed.clone(), code);
        self.texts.push(boxed);
        code
    }

    /// The code of a text that is known already.
    #[must_use]
    pub fn known(&self, text: &str) -> Option<Code> {
        self.codes.get(text).copied()
    }

    /// The text of a code.
    #[must_use]
    pub fn text(&self, code: Code) -> &str {
        &self.texts[code as usize]
    }

    /// The text of a code, `None` for the empty one.
    #[must_use]
    pub fn filled(&self, code: Code) -> Option<&str> {
        (code != 0).then(|| self.text(code))
    }
}
