//! Tables that are built in. All of their data is invented.

/// A table that is built in.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Sample {
    /// The word that `read sample` takes.
    pub name: &'static str,
    /// One line.
    pub summary: &'static str,
    /// The whole page, in Markdown, headed by the name.
    pub page: &'static str,
    /// The table, as a CSV file in UTF-8.
    pub text: &'static str,
}

static SAMPLES: &[Sample] = &[];

/// All samples.
#[must_use]
pub fn samples() -> &'static [Sample] {
    SAMPLES
}

/// The sample of a name.
#[must_use]
pub fn sample(name: &str) -> Option<&'static Sample> {
    SAMPLES.iter().find(|sample| sample.name == name)
}
