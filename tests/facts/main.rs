//! Counts and measures of real files against `facts.json`: first what points and loops alone tell,
//! then what the topology tells, on every kernel.
//!
//! The facts come from an independent script; `data/README.md` says what the files are and where
//! they come from. The files in `data` are always read. `MERESTONE_DATA` may name a folder with
//! more files and a `facts.json` of their own.
#![forbid(unsafe_code)]

mod topology;

use merestone_exchange::{MeshFile, ReadError, Records, read_path};
use merestone_geometry::{NoteKind, PLANAR_TOLERANCE};
use serde_json::Value;
use std::collections::BTreeMap;
use std::path::{Path, PathBuf};

fn data() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("data")
}

fn read(name: &str) -> Result<MeshFile, ReadError> {
    read_path(data().join(name), None, Records::AsFiled)
}

/// The counts that `facts.json` has, too, under its names; `Err` is the reader's message.
fn counts(path: &Path) -> Result<BTreeMap<&'static str, usize>, String> {
    let soup = read_path(path, None, Records::AsFiled).map_err(|error| error.to_string())?.soup;
    let in_file = soup.points.len();
    let (soup, record_to_vertex) = soup.weld_exact();
    assert_eq!(record_to_vertex.len(), in_file);
    // Welded on the way in, the file is the same.
    let welded = read_path(path, None, Records::Welded).map_err(|error| error.to_string())?.soup;
    assert!(welded == soup, "{}", path.display());
    let welded = soup.points.len();
    let clean = soup.clean().map_err(|error| error.to_string())?;
    assert_eq!(clean.isolated_vertices(), welded - clean.points().len());
    let faces = clean.faces().face_count();
    Ok(BTreeMap::from([
        ("vertices_in_file", in_file),
        ("vertices_welded", welded),
        ("vertices", clean.points().len()),
        ("faces_in_file", faces + clean.collapsed_face_count()),
        ("faces_dropped", clean.collapsed_face_count()),
        ("faces", faces),
        ("faces_zero_area", clean.zero_area_faces().len()),
        ("faces_duplicate", clean.duplicate_faces().len()),
        ("faces_nonplanar", clean.non_planar_faces(PLANAR_TOLERANCE).len()),
    ]))
}

/// Files that the facts' script gave up on: what the reader makes of them, from what the file is.
fn beyond_the_facts(name: &str) -> Option<Result<(usize, usize), &'static str>> {
    match name {
        // A tetrahedron whose header announces 66 facets.
        "stl_samples/broken/incorrectFaceCounter.bin.stl" => Some(Ok((4, 4))),
        "stl_samples/broken/empty.stl" => Some(Err("the file is empty")),
        _ => None,
    }
}

fn facts(folder: &Path) -> BTreeMap<String, Value> {
    let facts = std::fs::read_to_string(folder.join("facts.json")).expect("facts.json");
    serde_json::from_str(&facts).expect("a JSON object")
}

/// Compares every file that facts are known of. Returns how many values were compared.
fn compare_all(folder: &Path) -> usize {
    let facts = facts(folder);
    let mut compared = 0;
    for (name, fact) in &facts {
        let counted = counts(&folder.join(name));
        if name.ends_with(".obj") {
            let message = counted.expect_err(name);
            assert!(message.contains("OBJ file, which is not supported yet"), "{message}");
            continue;
        }
        if fact.get("error").is_some() {
            let expected = beyond_the_facts(name).expect(name);
            match (expected, &counted) {
                (Ok((vertices, faces)), Ok(counted)) => {
                    assert_eq!(
                        (counted["vertices"], counted["faces"]),
                        (vertices, faces),
                        "{name}"
                    );
                }
                (Err(words), Err(message)) => assert!(message.contains(words), "{message}"),
                _ => panic!("{name}: expected {expected:?}, counted {counted:?}"),
            }
            continue;
        }
        for (key, count) in counted.expect(name) {
            // A file without a face has no facts of its faces.
            if let Some(expected) = fact.get(key).and_then(Value::as_u64) {
                assert_eq!(count as u64, expected, "{name}: {key}");
                compared += 1;
            }
        }
    }
    compared
}

#[test]
fn the_files_beside_the_tests_give_their_facts() {
    // 31 files with nine facts each, and one without faces, of which six are known.
    assert_eq!(compare_all(&data()), 31 * 9 + 6);
}

#[test]
fn more_files_give_their_facts() {
    // Absent for most people; the files above are always read.
    if let Some(folder) = std::env::var_os("MERESTONE_DATA") {
        assert!(compare_all(Path::new(&folder)) > 0);
    }
}

#[test]
fn what_is_odd_about_a_file_is_noted() {
    use NoteKind::{
        FacetCorners, InvalidNormal, MissingNormal, NameMismatch, NoFaces, TrailingBytes, Unclosed,
        WrongCount, WrongNormal,
    };
    // What each file is: `data/README.md` and the file's name.
    for (name, expected) in [
        ("broken/fourVertices.ascii.stl", &[FacetCorners][..]),
        ("broken/quad.ascii.stl", &[FacetCorners]),
        ("broken/twoVertices.ascii.stl", &[FacetCorners]),
        ("broken/incorrectFaceCounter.bin.stl", &[WrongCount]),
        ("broken/missingEndsolid.ascii.stl", &[Unclosed]),
        ("broken/missingFace.ascii.stl", &[]),
        ("broken/missingNormal.ascii.stl", &[MissingNormal]),
        ("broken/notANumberNormal.ascii.stl", &[InvalidNormal]),
        ("broken/singleFace.ascii.stl", &[]),
        ("broken/solidNameMismatch.ascii.stl", &[NameMismatch]),
        ("broken/wrongHeader.bin.stl", &[]),
        ("broken/wrongNormal.ascii.stl", &[WrongNormal]),
        ("broken/wrongNormals.ascii.stl", &[MissingNormal]),
        ("misc/faceless.ascii.stl", &[NoFaces]),
        ("misc/multiWordName.ascii.stl", &[]),
        ("misc/multiWordName.bin.stl", &[TrailingBytes, MissingNormal, WrongNormal]),
        ("misc/namelessSolid.ascii.stl", &[]),
    ] {
        let file = read(&format!("stl_samples/{name}")).expect(name);
        let kinds: Vec<_> = file.soup.notes.iter().map(|note| note.kind).collect();
        assert_eq!(kinds, expected, "{name}");
    }
}

#[test]
fn names_of_solids_are_kept() {
    let names = |name: &str| read(name).expect(name).soup.part_names;
    assert_eq!(names("stl_samples/misc/namelessSolid.ascii.stl"), [""]);
    assert_eq!(names("stl_samples/misc/multiWordName.ascii.stl").len(), 1);
    assert!(names("stl_samples/misc/multiWordName.ascii.stl")[0].contains(' '));
}

#[test]
fn a_wrong_ending_does_not_matter() {
    let bytes = std::fs::read(data().join("jacksboro_terrain.ply")).expect("a file");
    let soup = merestone_exchange::read_bytes(&bytes, None, Records::AsFiled, "terrain.stl")
        .expect("a PLY file")
        .soup;
    assert_eq!(soup.faces.as_list().face_count(), 68742);
}
