//! Facts that are made up: the ferry crews' file and its results.

use tussock_language::facts::{ColumnFact, ColumnKind, Facts, KeyFact, Page};

/// What the tests know of the world.
pub(crate) struct MadeUp;

static VIEWS: &[Page] = &[
    Page::new("groups", "# groups\n\nMeans and standard deviations.\n\nMore on groups.\n"),
    Page::new("omnibus", "# omnibus\n\nThe multivariate tests.\n\nMore on the tests.\n"),
    Page::new("coefficients", "# coefficients\n\nThree kinds of coefficients.\n"),
];

static FUNCTIONS: &[Page] = &[
    Page::new("log", "# log\n\nThe natural logarithm.\n"),
    Page::new("mean", "# mean\n\nThe mean of columns in each row.\n"),
];

static SAMPLES: &[Page] = &[Page::new("ferry", "# ferry\n\nCrews of Skerry Ferries, invented.\n")];

static RULES: &[Page] = &[Page::new("small-groups", "# small-groups\n\nA group is small.\n")];

const LEVELS: &[&str] = &["fixed", "forward", "backward", "on call"];

impl Facts for MadeUp {
    fn views(&self) -> &[Page] {
        VIEWS
    }

    fn functions(&self) -> &[Page] {
        FUNCTIONS
    }

    fn samples(&self) -> &[Page] {
        SAMPLES
    }

    fn rules(&self) -> &[Page] {
        RULES
    }

    fn columns(&self, table: &str) -> Option<Vec<ColumnFact>> {
        let column = |name: &str, kind, detail: &str| ColumnFact {
            name: name.to_owned(),
            kind,
            detail: detail.to_owned(),
        };
        matches!(table, "crew" | "served").then(|| {
            vec![
                column("roster", ColumnKind::Text, "4 levels"),
                column("alertness", ColumnKind::Number, "12 to 48"),
                column("mood", ColumnKind::Number, "Mood | 1 to 7"),
                column("Reaction time (ms)", ColumnKind::Number, "180 to 900"),
                column("deck", ColumnKind::Number, "1 to 3"),
            ]
        })
    }

    fn levels(&self, table: &str, column: &str) -> Option<Vec<String>> {
        self.columns(table)?;
        match column {
            "roster" => Some(LEVELS.iter().map(|level| (*level).to_owned()).collect()),
            "deck" => Some(["1", "2", "3"].map(str::to_owned).to_vec()),
            _ => None,
        }
    }

    fn keys(&self, path: &[String]) -> Vec<KeyFact> {
        let path: Vec<&str> = path.iter().map(String::as_str).collect();
        let keys: &[(&str, &str)] = match path.as_slice() {
            ["main"] => &[("groups", "n, M, SD"), ("omnibus", "four criteria")],
            ["main", "omnibus"] => &[("wilks", "Λ = .61"), ("pillai", "V = .38")],
            ["main", "omnibus", "pillai"] => &[("value", ".38"), ("p", "< .001")],
            ["main", "groups"] => &[("fixed", "n = 41"), ("on call", "n = 12")],
            ["main", "coefficients", "structure", "mood"] => &[("1", ".71")],
            _ => &[],
        };
        keys.iter()
            .map(|(key, detail)| KeyFact { key: (*key).to_owned(), detail: (*detail).to_owned() })
            .collect()
    }

    fn value(&self, path: &[String]) -> Option<String> {
        let value = match path.join(".").as_str() {
            "main.omnibus.pillai" => "V = .38, F(8, 290) = 8.52, p < .001",
            "main.omnibus.pillai.value" => ".38",
            "main.omnibus.pillai.eta2" => ".19",
            "main.functions.1.share" => ".92",
            "main.coefficients.share.mood.1" => ".31",
            "main.groups.fixed.mood.mean" => "4.12",
            "main.groups.fixed.oddity" => "7",
            _ => return None,
        };
        Some(value.to_owned())
    }

    fn coefficients(&self, comparison: &str, kind: &str) -> Option<String> {
        (comparison == "main")
            .then(|| format!("| outcome | {kind} 1 |\n| --- | --- |\n| mood | .71 |"))
    }

    fn files(&self, prefix: &str) -> Vec<String> {
        let files: &[&str] =
            if prefix.contains('/') { &["data/basil.csv"] } else { &["crew.csv", "data/"] };
        files
            .iter()
            .filter(|file| file.starts_with(prefix))
            .map(|file| (*file).to_owned())
            .collect()
    }
}
