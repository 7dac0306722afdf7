//! Questions that later stages ask of a site: which limit, which goal, which well, which analyte.

use chrono::NaiveDate;

use crate::terms::folded;

use super::cas::trimmed;
use super::catalogue;
use super::checked::{Analyte, Limit, Listing, Site, Well, WellAlias};
use super::choices::Role;

/// How a result's analyte was recognised.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum JoinedBy {
    /// By its CAS number.
    Cas,
    /// By the listed name or an alias of the site file.
    Name,
    /// By another name in the embedded catalogue.
    Synonym,
}

/// What a well name in a results file means.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum WellMatch<'s> {
    /// A listed well, by its own name.
    Listed(&'s Well),
    /// A listed well, by another name of it.
    Alias(&'s Well, &'s WellAlias),
    /// No listed well: used under its own name, and told.
    Unlisted,
}

impl Site {
    /// The limit in force at a date: the well's own for the analyte, else the analyte's. Before
    /// any has begun, the first to begin, again of the well before the analyte.
    #[must_use]
    pub fn limit_for(&self, well: &str, analyte: &str, as_of: NaiveDate) -> Option<&Limit> {
        let own = self
            .well_named(well)
            .into_iter()
            .flat_map(|well| &well.limits)
            .filter(|limit| limit.analyte == analyte)
            .map(|limit| &limit.limit);
        let listed = self.analyte_named(analyte).into_iter().flat_map(|a| &a.limits);
        let begun = |limit: &&Limit| limit.from.is_none_or(|from| from <= as_of);
        // Limits stand in the order in which they begin.
        let in_force = own.clone().rfind(begun);
        in_force.or_else(|| listed.clone().rfind(begun)).or_else(|| own.chain(listed).next())
    }

    /// The date by which the limit is to be met: the well's, else the analyte's, else the site's.
    #[must_use]
    pub fn goal_for(&self, well: &str, analyte: &str) -> Option<NaiveDate> {
        self.well_named(well)
            .and_then(|well| well.goal_date)
            .or_else(|| self.analyte_named(analyte).and_then(|analyte| analyte.goal_date))
            .or(self.settings.goal_date)
    }

    /// What a well is for; a well that is not listed is in the plume.
    #[must_use]
    pub fn role_of(&self, well: &str) -> Role {
        self.well_named(well).map_or(Role::Plume, |well| well.role)
    }

    /// The listed well with exactly this name.
    #[must_use]
    pub fn well_named(&self, name: &str) -> Option<&Well> {
        self.wells.iter().find(|well| well.name == name)
    }

    /// The listed analyte with exactly this name.
    #[must_use]
    pub fn analyte_named(&self, name: &str) -> Option<&Analyte> {
        self.analytes.iter().find(|analyte| analyte.name == name)
    }

    /// What a well name means on a date. An alias counts within its dates and goes before a well
    /// of that name; without a date, only where no well has the name.
    #[must_use]
    pub fn well_of(&self, written: &str, on: Option<NaiveDate>) -> WellMatch<'_> {
        let name = written.trim();
        let alias = self.wells.iter().find_map(|well| {
            let alias = well.aliases.iter().find(|alias| alias.name == name && alias.holds(on))?;
            Some(WellMatch::Alias(well, alias))
        });
        let listed = self.well_named(name).map(WellMatch::Listed);
        let found = if on.is_some() { alias.or(listed) } else { listed.or(alias) };
        found.unwrap_or(WellMatch::Unlisted)
    }

    /// The listed analyte that a result is about, by CAS number first and then by name.
    ///
    /// Names match the listed name, its aliases and the catalogue's other names of the same
    /// substance, without regard to case, blanks and hyphens.
    #[must_use]
    pub fn analyte_of(&self, cas: Option<&str>, name: &str) -> Option<(usize, JoinedBy)> {
        let cas = cas.map(trimmed).filter(|cas| !cas.is_empty());
        let by_cas = cas.and_then(|cas| {
            self.analytes.iter().position(|analyte| analyte.cas.as_deref() == Some(cas))
        });
        if let Some(index) = by_cas {
            return Some((index, JoinedBy::Cas));
        }
        let name = folded(name);
        let named = |analyte: &Analyte| {
            std::iter::once(&analyte.name).chain(&analyte.aliases).any(|n| folded(n) == name)
        };
        if let Some(index) = self.analytes.iter().position(named) {
            return Some((index, JoinedBy::Name));
        }
        let entry = catalogue::by_name(&name)?;
        let same = |analyte: &Analyte| {
            catalogue::find(analyte.cas.as_deref(), &analyte.name) == Some(entry)
        };
        Some((self.analytes.iter().position(same)?, JoinedBy::Synonym))
    }

    /// Whether results of analytes that are not listed are set aside.
    #[must_use]
    pub fn sets_unlisted_aside(&self) -> bool {
        self.listing == Listing::Listed
    }

    /// Whether a results file's site is this one: by name or alias, case, blanks and hyphens
    /// folded. A site without a name (bare results files) holds every site.
    #[must_use]
    pub fn is_named(&self, written: &str) -> bool {
        let written = folded(written);
        self.name.is_empty()
            || std::iter::once(&self.name).chain(&self.aliases).any(|name| folded(name) == written)
    }
}

impl WellAlias {
    /// Whether the alias holds on a date; without a date, always.
    #[must_use]
    pub fn holds(&self, on: Option<NaiveDate>) -> bool {
        on.is_none_or(|on| {
            self.from.is_none_or(|from| from <= on) && self.to.is_none_or(|to| on <= to)
        })
    }
}
