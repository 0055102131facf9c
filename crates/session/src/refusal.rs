//! Puts the analyst's own names to what the analysis refuses.

use tussock_analysis::error::{AnalysisError, Weight};
use tussock_language::diagnostic::Diagnostic;
use tussock_language::span::Location;

use crate::comparison::Outcome;
use crate::trouble::trouble;

/// The names behind the indices of an analysis.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Names<'a> {
    /// The outcomes.
    pub(crate) outcomes: &'a [Outcome],
    /// The levels of the factor.
    pub(crate) levels: &'a [String],
    /// Where the factor stands.
    pub(crate) factor: Location,
}

/// The diagnostic of a refusal.
pub(crate) fn refusal(error: &AnalysisError, names: &Names<'_>) -> Box<Diagnostic> {
    trouble(match error {
        AnalysisError::Shape { .. }
        | AnalysisError::NotFinite { .. }
        | AnalysisError::NoOutcomes
        | AnalysisError::GroupCode { .. } => {
            Diagnostic::error("internal-error", names.factor, error.to_string())
                .help("please report this with the document that shows it")
        }
        AnalysisError::TooLarge { outcome, .. } => Diagnostic::error(
            "too-large-values",
            names.location(*outcome),
            format!("`{}` has values too large to compute with", names.outcome(*outcome)),
        )
        .help("express it in a larger unit, or check the column for a slip"),
        AnalysisError::TooFewGroups { .. } => {
            Diagnostic::error("single-group", names.factor, "there is only one group to compare")
                .help("a comparison needs two groups or more")
        }
        AnalysisError::EmptyGroup { group } => Diagnostic::error(
            "empty-group",
            names.factor,
            format!("the group `{}` has no rows", names.level(*group)),
        )
        .help("leave it out, or check the spelling of the level"),
        AnalysisError::SmallGroup { group, n, needed } => Diagnostic::error(
            "small-group",
            names.factor,
            format!(
                "the group `{}` has {n} {}, and {needed} are needed here",
                names.level(*group),
                if *n == 1 { "row" } else { "rows" },
            ),
        )
        .help("leave the group out with `where`, merge it with another, or use fewer outcomes"),
        AnalysisError::NoErrorDf => Diagnostic::error(
            "single-row-groups",
            names.factor,
            "every group has one row, so there is no variation within groups to compare with",
        )
        .help("check that the factor is the right column: an identifier makes one group a row"),
        AnalysisError::ConstantOutcome { outcome } => Diagnostic::error(
            "constant-outcome",
            names.location(*outcome),
            format!("`{}` has the same value in every row", names.outcome(*outcome)),
        )
        .help("leave it out of the outcomes: it can show no difference"),
        AnalysisError::ConstantWithinGroups { outcome } => Diagnostic::error(
            "constant-within-groups",
            names.location(*outcome),
            format!("`{}` does not vary within any group", names.outcome(*outcome)),
        )
        .help("it separates the groups perfectly, so no test of it is possible: leave it out"),
        AnalysisError::DependentOutcome { outcome, of } => names.dependent(*outcome, of),
        AnalysisError::SingularGroup { group } => Diagnostic::error(
            "singular-group",
            names.factor,
            format!("the outcomes depend on each other in the group `{}`", names.level(*group)),
        )
        .help("leave out an outcome that is a function of others in that group"),
        AnalysisError::TooManyOutcomes { outcomes, df_error } => Diagnostic::error(
            "too-many-outcomes",
            names.outcomes.first().map_or(names.factor, |outcome| outcome.location),
            format!("{outcomes} outcomes are too many for {df_error} degrees of freedom for error"),
        )
        .help(format!("compare at most {df_error} outcomes at once, better far fewer")),
    })
}

impl Names<'_> {
    fn level(&self, group: usize) -> &str {
        self.levels.get(group).map_or("?", String::as_str)
    }

    fn outcome(&self, outcome: usize) -> &str {
        self.outcomes.get(outcome).map_or("?", |outcome| outcome.name.as_str())
    }

    fn location(&self, outcome: usize) -> Location {
        self.outcomes.get(outcome).map_or(self.factor, |outcome| outcome.location)
    }

    fn dependent(&self, outcome: usize, of: &[Weight]) -> Diagnostic {
        let name = self.outcome(outcome);
        let location = self.location(outcome);
        if let [single] = of {
            let other = self.outcome(single.outcome);
            let message = if (single.weight - 1.0).abs() < 1e-6 {
                format!("`{name}` holds the same information as `{other}`")
            } else {
                format!("`{name}` is `{other}` in another unit")
            };
            return Diagnostic::error("dependent-outcomes", location, message)
                .related(self.location(single.outcome), format!("`{other}` is here"))
                .help("leave out one of the two");
        }
        let parts: Vec<String> = of.iter().map(|part| self.part(part)).collect();
        let message =
            format!("`{name}` is a linear function of other outcomes: {}", parts.join(" + "));
        Diagnostic::error("dependent-outcomes", location, message)
            .help("leave out one of them: a total and all its parts can't be outcomes together")
    }

    fn part(&self, part: &Weight) -> String {
        let name = self.outcome(part.outcome);
        let rounded = (part.weight * 1e4).round() / 1e4;
        if (rounded - 1.0).abs() < f64::EPSILON {
            format!("`{name}`")
        } else {
            format!("{rounded} x `{name}`")
        }
    }
}
