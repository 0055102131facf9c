//! The invented data of the samples. Every number comes from a seeded generator by additions,
//! multiplications, divisions and square roots only, which round alike on every machine.

mod basil;
mod deviates;
mod ferry;
mod ferry_waves;

/// The name and the CSV text of every sample.
pub(crate) fn tables() -> Vec<(&'static str, String)> {
    vec![
        ("ferry", ferry::table()),
        ("ferry_waves", ferry_waves::table()),
        ("basil", basil::table()),
    ]
}

/// A CSV text, of cells that need no quotation marks.
fn csv(header: &str, rows: impl IntoIterator<Item = Vec<String>>) -> String {
    let rows = rows.into_iter().map(|row| row.join(",") + "\n");
    std::iter::once(format!("{header}\n")).chain(rows).collect()
}

/// A number with one decimal, within bounds.
fn within(value: f64, low: f64, high: f64) -> String {
    format!("{:.1}", value.clamp(low, high))
}
