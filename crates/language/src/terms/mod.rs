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
    ($kind:ident, $name:literal, [$($word:literal),*]) => {
        Term {
            page: Page::new($name, include_str!(concat!($name, ".md"))),
            words: &[$($word),*],
            kind: TermKind::$kind,
        }
    };
}

/// Every term, in the order in which a reader meets them.
#[rustfmt::skip]
static TERMS: &[Term] = &[
    term!(Coefficient, "raw-coefficient", ["raw"]),
    term!(Coefficient, "standardized-coefficient", ["standardized"]),
    term!(Coefficient, "structure-coefficient", ["structure"]),
    term!(Coefficient, "share", ["coefficients.share"]),
    term!(Other, "suppression", []),
    term!(Other, "discriminant-function", []),
    term!(Other, "discriminant-score", ["scores.F", "scores.p", "scores.p_adjusted", "scores alpha"]),
    term!(Other, "centroid", ["centroids.mean"]),
    term!(Other, "eigenvalue", []),
    term!(Other, "function-share", ["functions.share"]),
    term!(Other, "canonical-correlation", ["canonical"]),
    term!(Other, "remaining-functions", ["functions.wilks", "functions.F", "functions.p"]),
    term!(Other, "criterion", []),
    term!(Other, "wilks", []),
    term!(Other, "pillai", []),
    term!(Other, "hotelling", []),
    term!(Other, "roy", ["theta", "p_bound"]),
    term!(Other, "eta2", []),
    term!(Other, "omega2", []),
    term!(Other, "cohens-d", ["d"]),
    term!(Other, "hedges-g", ["g"]),
    term!(Other, "mean-absolute-effect", ["mean_abs_effect"]),
    term!(Other, "mean-difference", ["difference"]),
    term!(Other, "box", ["M"]),
    term!(Other, "log-determinant", ["logdet", "logdet_pooled"]),
    term!(Other, "levene", []),
    term!(Other, "brown-forsythe", ["brown_forsythe"]),
    term!(Other, "within-correlation", ["correlations.within"]),
    term!(Other, "total-correlation", ["correlations.total"]),
    term!(Other, "f-ratio", ["F"]),
    term!(Other, "t-statistic", ["t"]),
    term!(Other, "chi-squared", ["chi2"]),
    term!(Other, "degrees-of-freedom", ["df", "df1", "df2"]),
    term!(Other, "p-value", ["p", "chi2_p", "ln_p"]),
    term!(Other, "adjusted-p", ["p_adjusted"]),
    term!(Other, "alpha", []),
    term!(Other, "interval", ["lower", "upper", "eta2_lower", "eta2_upper", "d_lower", "d_upper", "g_lower", "g_upper"]),
    term!(Other, "bonferroni", ["p_bonferroni"]),
    term!(Other, "holm", ["p_holm"]),
    term!(Other, "unadjusted", []),
    term!(Other, "listwise", []),
    term!(Other, "mean", []),
    term!(Other, "standard-deviation", ["sd"]),
    term!(Other, "standard-error", ["se"]),
    term!(Other, "group-size", ["n"]),
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
