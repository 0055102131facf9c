//! How long it takes to read 200,000 rows of 12 columns and to parse one of every kind:
//! `cargo run --release -p tussock-data --example read_speed`.

use std::fmt::Write as _;
use std::io::Write as _;
use std::time::Instant;

use tussock_data::read::{ReadOptions, read_bytes};

const ROWS: usize = 200_000;

fn main() -> Result<(), Box<dyn std::error::Error>> {
    let mut text = String::from("id,ship,roster");
    for outcome in 1..=9 {
        write!(text, ",y{outcome}")?;
    }
    for row in 0..ROWS {
        let roster = ["fixed", "forward", "backward"].into_iter().nth(row % 3).unwrap_or_default();
        write!(text, "\n{row},ship {},{roster}", row % 4)?;
        for outcome in 1..=9 {
            match (row * outcome) % 101 {
                0 => text.push(','),
                rest => write!(text, ",{rest}.{:03}", row % 997)?,
            }
        }
    }
    let mut out = std::io::stdout().lock();
    writeln!(out, "{} rows, {:.1} MB", ROWS, text.len() as f64 / 1e6)?;

    let start = Instant::now();
    let frame = read_bytes(text.as_bytes(), ',', &ReadOptions::default())?;
    writeln!(out, "read:    {:>6.1} ms", start.elapsed().as_secs_f64() * 1e3)?;

    let declared =
        ReadOptions { missing: vec!["-9".into(), "NA".into()], ..ReadOptions::default() };
    let start = Instant::now();
    read_bytes(text.as_bytes(), ',', &declared)?;
    writeln!(
        out,
        "read with declared missing values: {:.1} ms",
        start.elapsed().as_secs_f64() * 1e3
    )?;

    let start = Instant::now();
    let numbers = frame.numbers("y5")?;
    writeln!(out, "numbers: {:>6.1} ms ({})", start.elapsed().as_secs_f64() * 1e3, numbers.len())?;

    let start = Instant::now();
    let factor = frame.factor("roster").ok_or("no roster")?;
    writeln!(
        out,
        "factor:  {:>6.1} ms ({})",
        start.elapsed().as_secs_f64() * 1e3,
        factor.levels.len()
    )?;
    Ok(())
}
