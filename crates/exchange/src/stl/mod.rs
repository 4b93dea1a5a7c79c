//! STL: facets of three vertices each, text or binary, without an index.
//!
//! A file is binary when its facet count accounts for every byte, whatever the header says; else
//! it is text when it shows a `facet` and no zero byte before it; else it is a binary file whose
//! count is wrong or that has more bytes than it should, and is read as far as it goes, with a
//! note. Facet normals are never used, only compared.

mod binary;
mod normals;
mod text;

use crate::error::{Fault, ReadProblem};
use crate::format::{Encoding, has_binary_stl_size, is_stl_text};
use merestone_geometry::PolygonSoup;

/// With `weld`, records with equal coordinates are one point each.
pub(crate) fn read(bytes: &[u8], weld: bool) -> Result<(Encoding, PolygonSoup), Fault> {
    if bytes.trim_ascii().is_empty() {
        return Err(Fault::file(ReadProblem::Empty));
    }
    if !has_binary_stl_size(bytes) && is_stl_text(bytes) {
        let soup = text::read(bytes)?;
        return Ok((Encoding::Text, if weld { soup.weld_exact().0 } else { soup }));
    }
    Ok((Encoding::LittleEndian, binary::read(bytes, weld)?))
}

/// The facet count in a binary file's place, if there are so many bytes.
pub(crate) fn announced_facets(bytes: &[u8]) -> Option<u32> {
    bytes.get(80..84)?.first_chunk().map(|&count| u32::from_le_bytes(count))
}

/// Refuses more vertex records than can be numbered.
fn check_record_count(records: usize) -> Result<(), Fault> {
    use merestone_topology::{FaceListError, MAX_DENSE_INDEX};
    if records > MAX_DENSE_INDEX + 1 {
        let error = FaceListError::TooMany { what: "corners", count: records };
        return Err(Fault::file(error.into()));
    }
    Ok(())
}

#[cfg(test)]
mod tests;
