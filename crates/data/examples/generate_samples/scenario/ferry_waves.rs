//! Crew members of Skerry Ferries, asked three times after a change of rosters.

use super::deviates::{Deviates, cholesky};
use super::{csv, within};

/// Within rosters: alertness at the three waves, then mood at the three waves.
const CORRELATIONS: [&[f64]; 6] = [
    &[1.0],
    &[0.65, 1.0],
    &[0.50, 0.65, 1.0],
    &[0.45, 0.35, 0.30, 1.0],
    &[0.35, 0.45, 0.35, 0.60, 1.0],
    &[0.30, 0.35, 0.45, 0.45, 0.60, 1.0],
];

/// A roster, its crew, and by how many standard deviations the six measures lie above their means.
const ROSTERS: [(&str, usize, [f64; 6]); 3] = [
    ("fixed", 34, [0.0, 0.05, 0.05, 0.0, 0.0, 0.05]),
    ("forward", 45, [0.05, 0.20, 0.35, -0.05, 0.20, 0.45]),
    ("backward", 41, [-0.05, -0.35, -0.60, 0.05, -0.20, -0.30]),
];

/// Means and standard deviations of alertness and of mood.
const SCALES: [(f64, f64); 2] = [(63.0, 11.0), (58.0, 12.0)];

/// How often a crew member leaves between two waves.
const LOSS: f64 = 0.05;

pub(super) fn table() -> String {
    let mut deviates = Deviates::new(57);
    let factor = cholesky(&CORRELATIONS);
    let mut posts = Vec::new();
    for (roster, crew, effects) in ROSTERS {
        posts.extend(std::iter::repeat_n((roster, effects), crew));
    }
    deviates.shuffle(&mut posts);
    let rows = posts.into_iter().enumerate().map(|(row, (roster, effects))| {
        let z = deviates.correlated(&factor);
        let waves_kept = match (deviates.chance(LOSS), deviates.chance(LOSS)) {
            (true, _) => 1,
            (false, true) => 2,
            (false, false) => 3,
        };
        let scales = SCALES.into_iter().flat_map(|scale| std::iter::repeat_n(scale, 3));
        let values = z.iter().zip(effects).zip(scales).enumerate();
        let mut cells = vec![format!("W{:03}", row + 1), roster.to_owned()];
        cells.extend(values.map(|(index, ((z, effect), (mean, sd)))| {
            let value = within(mean + sd * (z + effect), 0.0, 100.0);
            if index % 3 < waves_kept { value } else { String::new() }
        }));
        cells
    });
    csv(
        "crew,roster,alertness_a,alertness_b,alertness_c,mood_a,mood_b,mood_c",
        rows.collect::<Vec<_>>(),
    )
}
