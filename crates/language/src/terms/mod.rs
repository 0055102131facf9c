//! Pages of the trade's own terms: what a coefficient, a criterion, an effect size is, how it is
//! computed, how to read it, when it misleads.
//!
//! One Markdown file a term, registered here in one line with the words that lead to it.

use crate::facts::Page;

/// A term of the trade and the words of the language that mean it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Term {
    /// Its page.
    pub page: Page,
    /// Words and path keys that lead to it. `view.key` holds for that key below that view only,
    /// and goes before a plain `key`.
    pub words: &'static [&'static str],
    /// What sort of term it is.
    pub kind: TermKind,
}

/// Sorts of terms.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum TermKind {
    /// A kind of discriminant coefficient, whose values hover can show.
    Coefficient,
    /// Anything else.
    Other,
}

macro_rules! term {
    ($kind:ident, $name:literal, $summary:literal, [$($word:literal),*]) => {
        Term {
            page: Page {
                name: $name,
                summary: $summary,
                text: include_str!(concat!($name, ".md")),
            },
            words: &[$($word),*],
            kind: TermKind::$kind,
        }
    };
}

/// Every term, in the order in which a reader meets them.
#[rustfmt::skip]
static TERMS: &[Term] = &[
    term!(Coefficient, "raw-coefficient", "the weight of an outcome in a discriminant score, in the outcome's own unit", ["raw"]),
    term!(Coefficient, "standardized-coefficient", "the weight of an outcome in a discriminant score, given the other outcomes, in within-group standard deviations", ["standardized"]),
    term!(Coefficient, "structure-coefficient", "the within-group correlation of an outcome with a discriminant score", ["structure"]),
    term!(Coefficient, "share", "how much of one function's separation is credited to each outcome", ["coefficients.share"]),
    term!(Other, "suppression", "a weight whose sign is opposite to the outcome's own relation with the score", []),
    term!(Other, "discriminant-function", "a weighted sum of the outcomes on which the groups lie as far apart as they can", []),
    term!(Other, "discriminant-score", "a unit's value on a discriminant function", ["scores.F", "scores.p", "scores.p_adjusted"]),
    term!(Other, "centroid", "a group's mean on a discriminant function", ["centroids.mean"]),
    term!(Other, "eigenvalue", "variation between groups over variation within them, on one discriminant function", []),
    term!(Other, "function-share", "the part of the between-group variation that one discriminant function takes", ["functions.share"]),
    term!(Other, "canonical-correlation", "the correlation between a discriminant score and group membership", ["canonical"]),
    term!(Other, "remaining-functions", "the test of a discriminant function together with all later ones", ["functions.wilks", "functions.F", "functions.p"]),
    term!(Other, "criterion", "one number for how much groups differ on all outcomes together; four are in use", []),
    term!(Other, "wilks", "Wilks's lambda (Λ): the part of the generalized variance that groups do not account for", []),
    term!(Other, "pillai", "Pillai's trace (V): the sum of the squared canonical correlations", []),
    term!(Other, "hotelling", "the Hotelling–Lawley trace (U): the sum of the eigenvalues", []),
    term!(Other, "roy", "Roy's largest root (λ₁, θ): the separation on the first discriminant function alone", []),
    term!(Other, "eta2", "eta squared (η²): the share of variation in the sample that goes with the groups", []),
    term!(Other, "omega2", "omega squared (ω²): η² with most of its upward bias taken out", []),
    term!(Other, "cohens-d", "the difference of two means in pooled standard deviations", ["d"]),
    term!(Other, "hedges-g", "Cohen's d without its small-sample bias", ["g"]),
    term!(Other, "mean-absolute-effect", "the average size of an outcome's standardized differences over all pairs of groups", ["mean_abs_effect"]),
    term!(Other, "mean-difference", "the mean of one group less the mean of another, in the outcome's unit", ["difference"]),
    term!(Other, "box", "Box's M: whether the groups have the same covariance matrix", ["M"]),
    term!(Other, "log-determinant", "a group's spread over all outcomes at once, in one number", ["logdet"]),
    term!(Other, "levene", "Levene's test: whether groups have equal variances on one outcome", []),
    term!(Other, "brown-forsythe", "Levene's test about medians, which skewed data do not upset", ["brown_forsythe"]),
    term!(Other, "within-correlation", "the correlation of two outcomes among units of the same group", ["correlations.within"]),
    term!(Other, "total-correlation", "the correlation of two outcomes over all units, groups ignored", ["correlations.total"]),
    term!(Other, "f-ratio", "variation between groups over variation within them, each per degree of freedom", ["F"]),
    term!(Other, "t-statistic", "the difference of two means over its standard error", ["t"]),
    term!(Other, "chi-squared", "a test statistic that is compared with the χ² distribution", ["chi2"]),
    term!(Other, "degrees-of-freedom", "how many independent pieces of information a sum of squares rests on", ["df", "df1", "df2"]),
    term!(Other, "p-value", "how often a difference at least this large would turn up if there were none", ["p", "chi2_p"]),
    term!(Other, "adjusted-p", "a p value that allows for its being one of a family of tests", ["p_adjusted"]),
    term!(Other, "alpha", "the rate of false rejections that is accepted, fixed beforehand", []),
    term!(Other, "interval", "the values that the data do not contradict at a stated level", ["lower", "upper", "eta2_lower", "eta2_upper", "g_lower", "g_upper"]),
    term!(Other, "bonferroni", "every p value times the number of tests", []),
    term!(Other, "holm", "Bonferroni in steps: never less powerful, with the same guarantee", []),
    term!(Other, "unadjusted", "each p value stands for its own test", []),
    term!(Other, "listwise", "a row with any missing value among the comparison's columns is left out", []),
    term!(Other, "mean", "the average of an outcome in a group", []),
    term!(Other, "standard-deviation", "how far single units typically lie from their group's mean", ["sd"]),
    term!(Other, "standard-error", "how far an estimate would typically lie from the true value", ["se"]),
    term!(Other, "group-size", "the number of units of a group that were analysed", ["n"]),
];

/// Every term.
#[must_use]
pub fn all() -> &'static [Term] {
    TERMS
}

/// The term of this name, or that this word of the language means.
#[must_use]
pub fn of_word(word: &str) -> Option<&'static Term> {
    TERMS.iter().find(|term| term.page.name == word || term.words.contains(&word))
}

/// The term that a key means below a view: `share` is one thing in `main.functions.1.share` and
/// another in `main.coefficients.share.mood.1`.
#[must_use]
pub fn of_key(view: &str, key: &str) -> Option<&'static Term> {
    let scoped = format!("{view}.{key}");
    TERMS.iter().find(|term| term.words.contains(&scoped.as_str())).or_else(|| of_word(key))
}

impl Term {
    /// The word that asks for this kind of coefficient in `coefficients KIND` and in paths.
    #[must_use]
    pub fn coefficient_word(&self) -> Option<&'static str> {
        match self.kind {
            TermKind::Coefficient => {
                self.words.first().map(|word| word.rsplit('.').next().unwrap_or(word))
            }
            TermKind::Other => None,
        }
    }
}
