//! Writes the inputs that the fuzzer begins with into a folder for each target: `corpus <folder>`.

#[path = "shared.rs"]
mod shared;

use lowside::{pack, tag};
use shared::seeds;
use std::io::Result;
use std::path::Path;

fn main() -> Result<()> {
    let top = std::env::args_os().nth(1).expect("a folder is named");
    let top = Path::new(&top);
    let full = seeds::full();
    let text = full.text().expect("what was read can be written");
    let files = [seeds::FILES[1], seeds::FILES[2], &text];
    write(&top.join("file"), files)?;
    write(&top.join("call"), files)?;
    let records = seeds::records(&full);
    write(&top.join("kept"), records.iter().map(String::as_str))?;
    let typed: Vec<String> = seeds::FIGURES
        .iter()
        .zip('A'..)
        .map(|(figure, which)| format!("{which}{figure}"))
        .chain([format!("t{}", seeds::TABLE), format!("p{}", pack::stored(seeds::FILES[1]))])
        .chain(full.units.iter().map(|unit| format!("#{}", tag::digits(unit))))
        .collect();
    write(&top.join("typed"), typed.iter().map(String::as_str))
}

fn write<'a>(folder: &Path, texts: impl IntoIterator<Item = &'a str>) -> Result<()> {
    std::fs::create_dir_all(folder)?;
    for (at, text) in texts.into_iter().enumerate() {
        std::fs::write(folder.join(format!("begin-{at}")), text)?;
    }
    Ok(())
}
