//! Tables that are built in. All of their data is invented; the example `generate_samples` writes it.

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

/// A sample whose page and table lie beside this file.
macro_rules! sample {
    ($name:literal, $summary:literal) => {
        Sample {
            name: $name,
            summary: $summary,
            page: include_str!(concat!($name, ".md")),
            text: include_str!(concat!($name, ".csv")),
        }
    };
}

static SAMPLES: &[Sample] = &[
    sample!("ferry", "Crew of Skerry Ferries under three duty rosters; invented data."),
    sample!(
        "ferry_waves",
        "Crew of Skerry Ferries asked three times after a change of rosters; invented data."
    ),
    sample!("basil", "Potted basil in three substrates, few plants each; invented data."),
];

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
