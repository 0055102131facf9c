//! The error-rate policy in force: the document's, where a statement does not say otherwise.

use tussock_language::ast::{Adjustment, Effect, Settings};

/// Every setting, resolved.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Policy {
    /// The level of single tests.
    pub(crate) alpha: f64,
    /// The confidence of intervals.
    pub(crate) interval: f64,
    /// How p values of pairs are adjusted.
    pub(crate) pairs: Adjustment,
    /// The level of tests on discriminant scores.
    pub(crate) scores_alpha: f64,
    /// The standardized difference that is printed.
    pub(crate) effect: Effect,
}

/// What holds where the document says nothing: common practice throughout.
impl Default for Policy {
    fn default() -> Self {
        Self {
            alpha: 0.05,
            interval: 0.95,
            pairs: Adjustment::Bonferroni,
            scores_alpha: 0.001,
            effect: Effect::G,
        }
    }
}

impl Policy {
    /// The policy with some settings replaced.
    #[must_use]
    pub(crate) fn with(self, settings: &Settings) -> Self {
        Self {
            alpha: settings.alpha.as_ref().map_or(self.alpha, |set| set.value),
            interval: settings.interval.as_ref().map_or(self.interval, |set| set.value),
            pairs: settings.pairs.as_ref().map_or(self.pairs, |set| set.value),
            scores_alpha: settings.scores_alpha.as_ref().map_or(self.scores_alpha, |set| set.value),
            effect: settings.effect.as_ref().map_or(self.effect, |set| set.value),
        }
    }

    /// The confidence at which an interval of a share of variance leaves out zero just when its
    /// test rejects at alpha: 1 − 2 alpha (Steiger 2004, Psychological Methods 9, 164).
    pub(crate) fn share_interval(self) -> f64 {
        1.0 - 2.0 * self.alpha
    }
}
