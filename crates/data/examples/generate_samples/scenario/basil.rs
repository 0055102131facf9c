//! Potted basil in three substrates, few plants each.

use super::csv;
use super::deviates::{Deviates, cholesky};

/// Within substrates: height, leaves, mass, colour.
const CORRELATIONS: [&[f64]; 4] =
    [&[1.0], &[0.45, 1.0], &[0.55, 0.60, 1.0], &[0.10, 0.20, 0.25, 1.0]];

/// A substrate, its plants on the two benches, and by how many standard deviations height, leaves,
/// mass and colour lie above those in peat.
const SUBSTRATES: [(&str, [usize; 2], [f64; 4]); 3] = [
    ("peat", [4, 4], [0.0, 0.0, 0.0, 0.0]),
    ("coir", [4, 3], [0.9, 0.2, 0.5, -0.8]),
    ("bark", [3, 4], [-0.7, -1.1, -1.4, -0.5]),
];

/// Means and standard deviations of height (cm), leaves, fresh mass (g) and colour (index).
const SCALES: [(f64, f64); 4] = [(24.5, 2.6), (31.0, 4.0), (18.2, 2.9), (38.4, 2.7)];

pub(super) fn table() -> String {
    let mut deviates = Deviates::new(12);
    let factor = cholesky(&CORRELATIONS);
    let mut pots = Vec::new();
    for (substrate, plants, effects) in SUBSTRATES {
        for (bench, plants) in ["window", "wall"].into_iter().zip(plants) {
            pots.extend(std::iter::repeat_n((bench, substrate, effects), plants));
        }
    }
    deviates.shuffle(&mut pots);
    let rows = pots.into_iter().enumerate().map(|(row, (bench, substrate, effects))| {
        let z = deviates.correlated(&factor);
        let mut cells = vec![format!("P{:02}", row + 1), bench.to_owned(), substrate.to_owned()];
        let values = z.iter().zip(effects).zip(SCALES).enumerate();
        cells.extend(values.map(|(index, ((z, effect), (mean, sd)))| {
            let value = mean + sd * (z + effect);
            if index == 1 { format!("{value:.0}") } else { format!("{value:.1}") }
        }));
        cells
    });
    csv("pot,bench,substrate,height,leaves,mass,colour", rows.collect::<Vec<_>>())
}
