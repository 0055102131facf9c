//! Writes the tables of the built-in samples anew: `cargo run -p tussock-data --example generate_samples`.

mod scenario;

use std::path::Path;

fn main() -> std::io::Result<()> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("src/samples");
    for (name, table) in scenario::tables() {
        std::fs::write(folder.join(format!("{name}.csv")), table)?;
    }
    Ok(())
}
