//! Reading of the reference files, and scattered numbers for designs that need no file.

use std::path::PathBuf;

use nalgebra::DMatrix;
use serde_json::Value;
use tussock_analysis::error::AnalysisError;
use tussock_analysis::sample::Sample;

/// A table of text with named columns.
pub(crate) struct Table {
    columns: Vec<String>,
    rows: Vec<Vec<String>>,
}

impl Table {
    /// Reads a file under `tests/reference`; its cells hold no quotes and no commas.
    pub(crate) fn read(file: &str) -> Table {
        let text = std::fs::read_to_string(reference(file)).unwrap();
        let mut lines =
            text.lines().map(|line| line.split(',').map(str::to_owned).collect::<Vec<_>>());
        Table { columns: lines.next().unwrap(), rows: lines.collect() }
    }

    pub(crate) fn column(&self, name: &str) -> Vec<&str> {
        let index = self.columns.iter().position(|column| column == name).unwrap();
        self.rows.iter().map(|row| row[index].as_str()).collect()
    }

    pub(crate) fn numbers(&self, name: &str) -> Vec<f64> {
        self.column(name).iter().map(|cell| cell.parse().unwrap()).collect()
    }

    /// Every column but the factor as an outcome; groups in the order of their first unit.
    pub(crate) fn sample(&self, factor: &str) -> Result<Sample, AnalysisError> {
        let outcomes: Vec<Vec<f64>> = self
            .columns
            .iter()
            .filter(|column| *column != factor)
            .map(|column| self.numbers(column))
            .collect();
        let coded = codes(&self.column(factor));
        sample(&outcomes, coded.clone(), coded.iter().max().map_or(0, |last| last + 1))
    }
}

/// Codes labels in the order in which they first occur.
pub(crate) fn codes<'a>(labels: &[&'a str]) -> Vec<usize> {
    let mut known: Vec<&'a str> = Vec::new();
    let mut codes = Vec::new();
    for label in labels {
        let code = known.iter().position(|known| known == label);
        codes.push(code.unwrap_or(known.len()));
        if code.is_none() {
            known.push(label);
        }
    }
    codes
}

/// A sample from columns.
pub(crate) fn sample(
    outcomes: &[Vec<f64>],
    groups: Vec<usize>,
    group_count: usize,
) -> Result<Sample, AnalysisError> {
    let matrix =
        DMatrix::from_iterator(groups.len(), outcomes.len(), outcomes.iter().flatten().copied());
    Sample::new(matrix, groups, group_count)
}

/// The outcomes of a sample as columns, to change them and build another.
pub(crate) fn columns(sample: &Sample) -> Vec<Vec<f64>> {
    (0..sample.outcome_count()).map(|outcome| sample.outcome(outcome).to_vec()).collect()
}

pub(crate) fn read_json(file: &str) -> Value {
    serde_json::from_str(&std::fs::read_to_string(reference(file)).unwrap()).unwrap()
}

/// A number that the reference writes as text.
#[track_caller]
pub(crate) fn number(value: &Value) -> f64 {
    value.as_str().unwrap_or_else(|| panic!("{value} is not a number as text")).parse().unwrap()
}

fn reference(file: &str) -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("tests/reference").join(file)
}

/// Numbers in -1..1 without pattern, the same in every run (xorshift, Marsaglia 2003, Journal of
/// Statistical Software 8).
pub(crate) struct Scatter(u64);

impl Scatter {
    pub(crate) fn new(seed: u64) -> Scatter {
        Scatter(seed.wrapping_mul(0x9e37_79b9_7f4a_7c15) | 1)
    }

    pub(crate) fn next(&mut self) -> f64 {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        (self.0 >> 11) as f64 / (1_u64 << 52) as f64 - 1.0
    }

    /// Roughly normal with variance 1: the sum of three uniform numbers.
    pub(crate) fn roughly_normal(&mut self) -> f64 {
        self.next() + self.next() + self.next()
    }

    /// Correlated outcomes whose means drift with the group: a sample with a real effect.
    pub(crate) fn sample(&mut self, sizes: &[usize], outcomes: usize) -> Sample {
        let groups: Vec<usize> =
            sizes.iter().enumerate().flat_map(|(group, &n)| vec![group; n]).collect();
        let mut columns = vec![Vec::new(); outcomes];
        for &group in &groups {
            let common = self.roughly_normal();
            for (j, column) in columns.iter_mut().enumerate() {
                let effect = ((group * (j + 1)) % 4) as f64 * 0.4;
                column.push(10.0 + common + effect + self.roughly_normal());
            }
        }
        sample(&columns, groups, sizes.len()).unwrap()
    }
}
