//! Crew members of Skerry Ferries under three duty rosters.

use super::deviates::{Deviates, cholesky};
use super::{csv, within};

/// Within rosters: baseline, alertness, mood, lapses, sleep.
const CORRELATIONS: [&[f64]; 5] = [
    &[1.0],
    &[0.60, 1.0],
    &[0.35, 0.60, 1.0],
    &[-0.30, -0.45, -0.35, 1.0],
    &[0.25, 0.45, 0.50, -0.30, 1.0],
];

/// A roster: how many of its crew are on which ship, and by how many standard deviations alertness,
/// mood, lapses and sleep lie above those of the fixed roster. Mood differs little for its correlation
/// with alertness, so that it serves the first function as a suppressor.
const ROSTERS: [(&str, [usize; 4], [f64; 4]); 3] = [
    ("fixed", [14, 11, 15, 12], [0.0, 0.0, 0.0, 0.0]),
    ("forward", [17, 20, 16, 18], [0.00, 0.40, -0.15, 0.45]),
    ("backward", [13, 17, 12, 15], [-0.85, -0.10, 0.65, -0.40]),
];

const SHIPS: [&str; 4] = ["Auk", "Gannet", "Petrel", "Tern"];

/// Means and standard deviations of baseline, alertness, mood, lapses and sleep.
const SCALES: [(f64, f64); 5] =
    [(63.0, 11.0), (62.0, 11.0), (58.0, 12.0), (4.6, 1.5), (57.0, 13.0)];

/// Rows, counted from 0, of the forward roster that are spelt "Forward ".
const MISSPELT: [usize; 3] = [18, 90, 143];

/// Rows and columns, counted from 0, of cells that are missing.
const MISSING: [(usize, usize); 8] =
    [(8, 5), (23, 9), (41, 7), (66, 9), (67, 7), (102, 8), (135, 9), (159, 5)];

/// The row whose mood has its decimal point one place too far to the left.
const SLIP: usize = 149;

/// The place of mood among the measures.
const MOOD: usize = 2;

/// Chosen so that the sample shows what the scenario asks for as clearly as the model does.
const SEED: u8 = 221;

pub(super) fn table() -> String {
    let mut deviates = Deviates::new(SEED);
    let factor = cholesky(&CORRELATIONS);
    let mut posts = Vec::new();
    for (roster, crew, effects) in ROSTERS {
        for (ship, crew) in SHIPS.into_iter().zip(crew) {
            posts.extend(std::iter::repeat_n((ship, roster, effects), crew));
        }
    }
    deviates.shuffle(&mut posts);
    let rows = posts.into_iter().enumerate().map(|(row, (ship, roster, effects))| {
        let age = 41.0 + 11.0 * deviates.normal();
        let watches = 11.0 + 2.0 * deviates.normal();
        let z = deviates.correlated(&factor);
        let effects = std::iter::once(0.0).chain(effects);
        let values = z.iter().zip(effects).zip(SCALES).enumerate();
        let values = values.map(|(measure, ((z, effect), (mean, sd)))| {
            let value = (mean + sd * (z + effect)).clamp(0.0, 100.0);
            within(if row == SLIP && measure == MOOD { value / 10.0 } else { value }, 0.0, 100.0)
        });
        let misspelt = roster == "forward" && MISSPELT.contains(&row);
        let mut cells = vec![
            format!("K{:03}", row + 1),
            ship.to_owned(),
            if misspelt { "Forward ".to_owned() } else { roster.to_owned() },
            format!("{:.0}", age.clamp(19.0, 64.0)),
            format!("{:.0}", watches.clamp(3.0, 18.0)),
        ];
        cells.extend(values);
        for (column, cell) in cells.iter_mut().enumerate() {
            if MISSING.contains(&(row, column)) {
                cell.clear();
            }
        }
        cells
    });
    csv(
        "crew,ship,roster,age,watches,baseline,alertness,mood,lapses,sleep",
        rows.collect::<Vec<_>>(),
    )
}
