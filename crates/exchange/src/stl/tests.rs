use crate::{Encoding, MeshFile, Place, ReadError, Records, read_bytes};
use merestone_geometry::{AttributeValues, NoteKind};

fn read(bytes: &[u8]) -> MeshFile {
    read_bytes(bytes, None, Records::AsFiled, "t.stl").unwrap()
}

fn refused(bytes: &[u8]) -> ReadError {
    read_bytes(bytes, None, Records::AsFiled, "t.stl").unwrap_err()
}

#[track_caller]
fn assert_refused(bytes: &[u8], place: Place, words: &str) {
    let error = refused(bytes);
    assert_eq!(error.place(), place, "{error}");
    assert!(error.to_string().contains(words), "{error}");
}

fn kinds(file: &MeshFile) -> Vec<(NoteKind, usize)> {
    file.soup.notes.iter().map(|note| (note.kind, note.count)).collect()
}

fn sizes(file: &MeshFile) -> Vec<usize> {
    let list = file.soup.faces.as_list();
    (0..list.face_count()).map(|f| list.loops(f).next().unwrap().corners.len()).collect()
}

const FACET: &str =
    "facet normal 0 0 1\nouter loop\nvertex 0 0 0\nvertex 1 0 0\nvertex 0 1 0\nendloop\nendfacet\n";

/// Two facets of the unit square.
fn binary(header: &[u8], announced: u32) -> Vec<u8> {
    let mut bytes = header.to_vec();
    bytes.resize(80, 0);
    bytes.extend(announced.to_le_bytes());
    for corners in [[0., 0., 0., 1., 0., 0., 0., 1., 0.], [1., 0., 0., 1., 1., 0., 0., 1., -0.]] {
        for x in [0.0, 0.0, 1.0].iter().chain(&corners) {
            bytes.extend((*x as f32).to_le_bytes());
        }
        bytes.extend([0, 0]);
    }
    bytes
}

#[test]
fn several_solids_in_any_case_keep_their_numbers_and_names() {
    let text = format!(
        "solid left bracket\n{FACET}endsolid left bracket\nSOLID\r\n{}ENDSOLID\nsolid z\nendsolid z\nsolid w\n{FACET}{FACET}endsolid",
        FACET.to_uppercase().replace('\n', "\r\n")
    );
    let file = read(text.as_bytes());
    assert_eq!(file.encoding, Encoding::Text);
    assert_eq!(file.soup.part_names, ["left bracket", "", "z", "w"]);
    assert_eq!(file.soup.face_columns[0].name, "solid");
    assert_eq!(file.soup.face_columns[0].values, AttributeValues::U32(vec![0, 1, 3, 3]));
    assert_eq!(file.soup.points[..3], [[0., 0., 0.], [1., 0., 0.], [0., 1., 0.]]);
    assert_eq!(kinds(&file), []);
}

#[test]
fn blanks_may_stand_for_line_ends() {
    let text = format!(
        "solid solid part\n{FACET}endsolid solid part\nsolid facet plate\n{FACET}endsolid facet plate\n"
    );
    let expected = read(text.as_bytes()).soup;
    assert_eq!(expected.part_names, ["solid part", "facet plate"]);
    for blank in [" ", "\t \t", "\r", "\n\n", "\u{b}"] {
        let file = read(text.replace('\n', blank).as_bytes());
        assert_eq!(file.soup, expected, "{blank:?}");
    }
    assert_eq!(read(format!("\u{feff}{text}").as_bytes()).soup, expected);
}

#[test]
fn names_need_not_be_text() {
    let mut bytes = b"solid caf\xe9 \xff\n".to_vec();
    bytes.extend(FACET.as_bytes());
    bytes.extend(b"endsolid caf\xe9 \xff\n");
    let file = read(&bytes);
    assert_eq!(file.soup.part_names, ["caf\u{fffd} \u{fffd}"]);
    assert_eq!(kinds(&file), []);
}

#[test]
fn facets_of_other_than_three_vertices_are_kept_and_noted() {
    let vertices = |n: usize| {
        let vertex = |i| format!("vertex {i} {} 0\n", i * i);
        let all: String = (0..n).map(vertex).collect();
        format!("facet normal 0 0 1\nouter loop\n{all}endloop\nendfacet\n")
    };
    let text: String = [2, 4, 0, 1, 3].map(vertices).concat();
    let file = read(format!("solid\n{text}endsolid\n").as_bytes());
    assert_eq!(sizes(&file), [2, 4, 1, 3]);
    assert_eq!(kinds(&file), [(NoteKind::FacetCorners, 4), (NoteKind::EmptyFaces, 1)]);
    assert!(file.soup.notes[0].message.contains("line 8"), "{}", file.soup.notes[0]);
    let clean = file.soup.weld_exact().0.clean().unwrap();
    assert_eq!(clean.collapsed_faces(), [0, 2]);
    assert_eq!((clean.collapsed_face_count(), clean.faces().face_count()), (3, 2));
}

#[test]
fn normals_are_compared_and_noted() {
    let normal = |n: &str| FACET.replace("normal 0 0 1", n);
    for (words, expected) in [
        ("normal 0 0 2.5", None),
        ("normal 0.5 0 1", None),
        ("normal 0 0 0", Some(NoteKind::MissingNormal)),
        ("normal", Some(NoteKind::MissingNormal)),
        ("", Some(NoteKind::MissingNormal)),
        ("normal 0 1", Some(NoteKind::MissingNormal)),
        ("normal nan nan NaN", Some(NoteKind::InvalidNormal)),
        ("normal inf 0 0", Some(NoteKind::InvalidNormal)),
        ("normal 0 0 -1", Some(NoteKind::WrongNormal)),
        ("normal 1 0 0.1", Some(NoteKind::WrongNormal)),
    ] {
        let file = read(format!("solid\n{}endsolid", normal(words)).as_bytes());
        assert_eq!(kinds(&file), expected.map(|kind| (kind, 1)).as_slice(), "{words}");
        assert_eq!(sizes(&file), [3]);
    }
    for words in ["normal up 0 0", "norm 0 0 1", "normal 0 0 1 0", "0 0 1"] {
        let text = format!("solid\n{}endsolid", normal(words));
        assert_refused(text.as_bytes(), Place::Line(2), "expected");
    }
}

#[test]
fn statements_left_out_between_facets_are_noted() {
    let file = read(format!("solid a\n{FACET}solid b\n{FACET}").as_bytes());
    assert_eq!(kinds(&file), [(NoteKind::Unclosed, 2)]);
    let file = read(FACET.as_bytes());
    assert_eq!(kinds(&file), [(NoteKind::Unclosed, 1), (NoteKind::Unclosed, 1)]);
    let file = read(format!("solid a\n{FACET}endsolid b c\n").as_bytes());
    assert_eq!(kinds(&file), [(NoteKind::NameMismatch, 2)]);
    assert_eq!(kinds(&read(b"solid empty\nendsolid empty")), [(NoteKind::NoFaces, 1)]);
}

#[test]
fn text_errors_name_their_line() {
    let text = format!("solid s\n{FACET}{FACET}endsolid s\n");
    for (from, to, line, words) in [
        ("vertex 1 0 0", "vertex 1 0", 6, "expected a coordinate, found `vertex`"),
        ("vertex 1 0 0", "vertex 1 0,5 0", 5, "expected a coordinate, found `0,5`"),
        ("vertex 1 0 0", "vertex 1 NaN 0", 5, "coordinate y is NaN"),
        ("vertex 1 0 0", "vertex 1e999 0 0", 5, "coordinate x is 1e999"),
        ("vertex 1 0 0", "vortex 1 0 0", 5, "expected `vertex` or `endloop`, found `vortex`"),
        ("vertex 1 0 0", "vertex 1 0 0 0", 5, "expected `vertex` or `endloop`, found `0`"),
        ("outer loop", "outer", 4, "expected `outer loop`"),
        ("endfacet", "", 9, "expected `endfacet`"),
        ("endsolid", "end", 16, "expected `facet` or `endsolid`, found `end`"),
    ] {
        assert_refused(text.replacen(from, to, 1).as_bytes(), Place::Line(line), words);
    }
    assert_refused((text.clone() + "more").as_bytes(), Place::Line(17), "expected `solid`");
    let long = text.replacen("outer", &"x".repeat(5000), 1);
    assert!(refused(long.as_bytes()).to_string().len() < 300);
}

#[test]
fn every_truncation_of_text_is_refused_or_noted() {
    let text = format!("solid s\n{FACET}{FACET}endsolid s\n");
    for length in 0..text.len() {
        match read_bytes(&text.as_bytes()[..length], None, Records::AsFiled, "t.stl") {
            Err(error) => assert!(length < 7 || error.place() != Place::File, "{length}: {error}"),
            // Cut between facets: what was read is whole. The last two characters are a name.
            Ok(file) => {
                assert!(!file.soup.notes.is_empty() || length + 4 > text.len(), "{length}");
                assert!(sizes(&file).iter().all(|&size| size == 3));
            }
        }
    }
}

#[test]
fn a_size_that_fits_the_count_is_binary_whatever_the_header_says() {
    for header in
        [&b"made by hand"[..], b"solid s\nfacet normal 0 0 1\n", b"ply is not here", b"\xff"]
    {
        let file = read(&binary(header, 2));
        assert_eq!(file.encoding, Encoding::LittleEndian);
        assert_eq!((sizes(&file), kinds(&file)), (vec![3, 3], vec![]));
        assert_eq!(file.soup.weld_exact().0.points.len(), 4);
    }
    let mut bytes = binary(b"", 2);
    bytes[84 + 48] = 5;
    bytes[84 + 99] = 1;
    let soup = read(&bytes).soup;
    assert_eq!(soup.face_columns[0].values, AttributeValues::U16(vec![5, 256]));
}

#[test]
fn wrong_counts_and_trailing_bytes_are_noted() {
    for (announced, off) in [(66, 64), (u32::MAX, u32::MAX as usize - 2), (0, 2), (1, 1)] {
        let file = read(&binary(b"", announced));
        assert_eq!((sizes(&file).len(), kinds(&file)), (2, vec![(NoteKind::WrongCount, off)]));
    }
    let mut bytes = binary(b"solid", 2);
    bytes.extend([1; 49]);
    let file = read(&bytes);
    assert_eq!((sizes(&file).len(), kinds(&file)), (2, vec![(NoteKind::TrailingBytes, 49)]));
    assert!(file.soup.notes[0].message.contains("byte 184"));
    assert_eq!(kinds(&read(&[0; 84])), [(NoteKind::NoFaces, 1)]);
}

#[test]
fn binary_files_that_make_no_sense_are_refused_with_the_byte() {
    let whole = binary(b"", 2);
    assert_refused(&whole[..60], Place::Byte(60), "84 bytes");
    assert_refused(&whole[..133], Place::Byte(133), "the first of 2 facets");
    for value in [f32::NAN, f32::INFINITY, f32::NEG_INFINITY] {
        let mut bytes = whole.clone();
        bytes[84 + 50 + 12 + 20..][..4].copy_from_slice(&value.to_le_bytes());
        assert_refused(&bytes, Place::Byte(166), "coordinate z is");
    }
    assert!(refused(b"").to_string().contains("empty"));
    assert!(read_bytes(b"  ", Some(crate::Format::Stl), Records::AsFiled, "-").is_err());
}
