//! Writes the sample tables and the sample document in every format to a folder, to be looked at:
//! `cargo run -p tussock-report --example gallery -- FOLDER`.

#[path = "../tests/sample/mod.rs"]
mod sample;

use std::path::PathBuf;

use tussock_report::render::FORMATS;

fn main() -> std::io::Result<()> {
    let folder = PathBuf::from(std::env::args().nth(1).unwrap_or_else(|| "gallery".to_owned()));
    std::fs::create_dir_all(&folder)?;
    for format in FORMATS {
        let write = |name: &str, text: String| {
            std::fs::write(folder.join(format!("{name}.{}", format.extension)), text)
        };
        write("omnibus", (format.table)(&sample::omnibus()))?;
        write("groups", (format.table)(&sample::groups()))?;
        write("page", (format.page)(&sample::page()))?;
    }
    Ok(())
}
