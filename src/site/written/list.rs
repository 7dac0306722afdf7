//! Lists, and blocks that stand several times.

use toml::de::DeValue;

use super::super::problem::ProblemKind;
use super::table::{Header, element};
use super::{At, FromToml, Problems};

impl<T: FromToml> FromToml for Vec<At<T>> {
    const WANTS: &'static str = "a list in square brackets";
    const HEADER: Header = match T::HEADER {
        Header::Key => Header::Key,
        Header::Table | Header::Tables => Header::Tables,
    };

    /// Elements that cannot be read are told and left out.
    fn from_toml(value: &DeValue<'_>, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
        let Some(list) = value.as_array() else {
            let tables = "written in blocks that each begin with this line in [[ ]]";
            let wants = if at.key.starts_with("[[") && !at.key.contains("]] ") {
                tables
            } else {
                Self::WANTS
            };
            problems.wrong_type(at, wants, value);
            return None;
        };
        if list.is_empty() {
            problems
                .tell(at, ProblemKind::Empty { wants: "name at least one or leave the key out" });
        }
        let mut read = Self::new();
        for (index, item) in list.iter().enumerate() {
            let place =
                At { line: problems.line(&item.span()), key: element(&at.key, index), value: () };
            if let Some(value) = T::from_toml(item.get_ref(), &place, problems) {
                read.push(place.with(value));
            }
        }
        Some(read)
    }
}
