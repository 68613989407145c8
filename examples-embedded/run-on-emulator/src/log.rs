//! Turns the bytes that an image logged into lines, by the format strings in its ELF file.

use std::{fs, path::Path};

use defmt_decoder::{DecodeError, Table};

use crate::trouble::Trouble;

pub fn decode(elf: &Path, bytes: &[u8]) -> Result<Vec<String>, Trouble> {
    let bad_image = |problem: String| Trouble::BadImage { path: elf.to_owned(), problem };
    let image = fs::read(elf).map_err(|error| bad_image(error.to_string()))?;
    let table = Table::parse(&image)
        .map_err(|error| bad_image(error.to_string()))?
        .ok_or_else(|| bad_image("has no defmt section, so its log cannot be read".into()))?;
    let mut decoder = table.new_stream_decoder();
    decoder.received(bytes);
    let mut lines = Vec::new();
    loop {
        match decoder.decode() {
            Ok(frame) => lines.push(frame.display_message().to_string()),
            Err(DecodeError::UnexpectedEof) => return Ok(lines),
            Err(DecodeError::Malformed) => {
                return Err(Trouble::DamagedLog { good_lines: lines.len() });
            }
        }
    }
}
