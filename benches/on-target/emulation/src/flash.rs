//! What an image takes of the flash: its linked sections.

use std::{fs, path::Path};

use object::{Object, ObjectSection, SectionFlags, elf};

use crate::trouble::Trouble;

/// Bytes of code, constants and initial values.
pub fn bytes(image: &Path) -> Result<u64, Trouble> {
    let bad = |problem: String| Trouble::BadFile { path: image.to_owned(), problem };
    let data = fs::read(image).map_err(|error| bad(error.to_string()))?;
    let file = object::File::parse(&*data).map_err(|error| bad(error.to_string()))?;
    Ok(file
        .sections()
        .filter(|section| {
            matches!(section.flags(), SectionFlags::Elf { sh_flags } if sh_flags & u64::from(elf::SHF_ALLOC) != 0)
        })
        // Sections without data, as zeroed memory, have no place in the file.
        .filter_map(|section| section.file_range())
        .map(|(_, size)| size)
        .sum())
}
