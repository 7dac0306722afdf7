//! `[[expected]]`, `[[event]]`, `[[decision]]` and `[[qualifier]]` as written.

use super::super::choices::{DecisionKind, EventKind, Meaning};
use super::super::written::table::{Entry, Open, table, table_schema};
use super::super::written::{At, Day, FromToml, Header, Need, Problems};

table! {
    /// What each round should hold.
    ExpectedTable {
        /// The wells; all listed ones where left out.
        wells = "wells": Vec<At<String>>;
        /// The analytes; all listed ones where left out.
        analytes = "analytes": Vec<At<String>>;
        /// Every so many months. Default the length of a round.
        every = "every": u64;
    }
}

table! {
    /// Something that happened at the site.
    EventTable {
        /// When it happened.
        date = "date": Day, needed as "date = 2024-05-01";
        /// What happened.
        what = "what": String, needed as "what = \"pumping stopped\"";
        /// Whether the records of its wells begin anew on its date; then who, when and why are
        /// needed.
        restart = "restart": bool, needed as "restart = false, or true with who, when and why";
        /// The wells it concerns; all where left out.
        wells = "wells": Vec<At<String>>;
        /// What kind of event. Default "other".
        kind = "kind": EventKind;
        /// Who decided that records begin anew.
        who = "who": String;
        /// When that was decided.
        when = "when": Day;
        /// Why.
        why = "why": String;
    }
}

table! {
    /// A decision about named records. At least one of wells, analytes, from, to, samples, file
    /// and records names them; all that are given must hold.
    DecisionTable {
        /// Its name in the ledger.
        id = "id": String, needed as "id = \"D1\"";
        /// What it does.
        kind = "kind": DecisionKind, needed as "kind = \"exclude\"";
        /// With kind "use-qualifier": what the qualifiers of the named records mean.
        means = "means": Meaning;
        /// The wells.
        wells = "wells": Vec<At<String>>;
        /// The analytes.
        analytes = "analytes": Vec<At<String>>;
        /// The first date.
        from = "from": Day;
        /// The last date.
        to = "to": Day;
        /// Sample identifiers.
        samples = "samples": Vec<At<String>>;
        /// The results file, with / between folders, relative to the site folder.
        file = "file": String;
        /// Record numbers in that file, as the ledger counts them.
        records = "records": Vec<At<u64>>;
        /// Who decided.
        who = "who": String, needed as "who = \"…\": a decision says who, when and why";
        /// When.
        when = "when": Day, needed as "when = 2026-07-01: a decision says who, when and why";
        /// Why.
        why = "why": String, needed as "why = \"…\": a decision says who, when and why";
    }
}

table! {
    /// What a qualifier or a detection condition means.
    QualifierTable {
        /// The code, as the laboratory writes it. Either this or condition is needed.
        code = "code": String;
        /// The detection condition in words.
        condition = "condition": String;
        /// What it means.
        means = "means": Meaning, needed as "means = \"estimated\"";
        /// Patterns of the files it holds for; all where left out.
        files = "files": Vec<At<String>>;
        /// Who decided.
        who = "who": String, needed as "who = \"…\": a decision says who, when and why";
        /// When.
        when = "when": Day, needed as "when = 2026-07-01: a decision says who, when and why";
        /// Why, usually the laboratory's legend.
        why = "why": String, needed as "why = \"…\": a decision says who, when and why";
    }
}
