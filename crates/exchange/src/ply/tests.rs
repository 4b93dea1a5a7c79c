use crate::{Encoding, MeshFile, Place, ReadError, Records, read_bytes};
use merestone_geometry::{AttributeColumn, AttributeValues, NoteKind};

const XYZ: &str = "property float x\nproperty float y\nproperty float z\n";

fn ascii(header: &str, rows: &str) -> Vec<u8> {
    format!("ply\nformat ascii 1.0\n{header}end_header\n{rows}").into_bytes()
}

/// A square and a triangle over five vertices.
fn header(encoding: &str) -> String {
    format!(
        "ply\nformat {encoding} 1.0\nelement vertex 5\n{XYZ}\
         element face 2\nproperty list uchar int vertex_indices\nend_header\n"
    )
}

const ROWS: &str = "0 0 0\n1 0 0\n1 1 0\n0 1 0\n2 .5 -1.5e0\n4 0 1 2 3\n3 1 4 2\n";

fn binary(little: bool) -> Vec<u8> {
    let mut bytes =
        header(if little { "binary_little_endian" } else { "binary_big_endian" }).into_bytes();
    for x in [0., 0., 0., 1., 0., 0., 1., 1., 0., 0., 1., 0., 2., 0.5, -1.5_f32] {
        bytes.extend(if little { x.to_le_bytes() } else { x.to_be_bytes() });
    }
    for face in [&[0, 1, 2, 3][..], &[1, 4, 2]] {
        bytes.push(face.len() as u8);
        for corner in face {
            let corner: i32 = *corner;
            bytes.extend(if little { corner.to_le_bytes() } else { corner.to_be_bytes() });
        }
    }
    bytes
}

fn read(bytes: &[u8]) -> MeshFile {
    read_bytes(bytes, None, Records::AsFiled, "t.ply").unwrap()
}

fn refused(bytes: &[u8]) -> ReadError {
    read_bytes(bytes, None, Records::AsFiled, "t.ply").unwrap_err()
}

fn loops(file: &MeshFile) -> Vec<Vec<u32>> {
    let list = file.soup.faces.as_list();
    (0..list.loop_count()).map(|i| list.listed_loop(i).unwrap().corners.to_vec()).collect()
}

#[track_caller]
fn assert_refused(bytes: &[u8], place: Place, words: &str) {
    let error = refused(bytes);
    assert_eq!(error.place(), place, "{error}");
    assert!(error.to_string().contains(words), "{error}");
}

#[test]
fn the_three_encodings_say_the_same() {
    let text = read(&(header("ascii") + ROWS).into_bytes());
    let (little, big) = (read(&binary(true)), read(&binary(false)));
    assert_eq!(text.encoding, Encoding::Text);
    assert_eq!((little.encoding, big.encoding), (Encoding::LittleEndian, Encoding::BigEndian));
    assert_eq!(text.soup, little.soup);
    assert_eq!(text.soup, big.soup);
    assert_eq!(text.soup.points[4], [2.0, 0.5, -1.5]);
    assert_eq!(loops(&text), [vec![0, 1, 2, 3], vec![1, 4, 2]]);
    assert!(text.soup.notes.is_empty());
}

#[test]
fn line_ends_marks_blanks_and_bytes_that_are_no_text() {
    let text = header("ascii") + ROWS;
    let plain = read(text.as_bytes());
    for changed in [
        text.replace('\n', "\r\n"),
        text.replace('\n', "\r"),
        format!("\u{feff}{text}"),
        text.replace(' ', "  \t").replace("element", "\n element"),
        text.replace("0 1 0\n", " 0 1 0 \n\n"),
        text.trim_end().to_owned(),
    ] {
        assert_eq!(read(changed.as_bytes()).soup, plain.soup, "{changed}");
    }
    let mut latin = b"ply\nformat ascii 1.0\ncomment caf\xe9 \xff\xfe\nobj_info \x80\n".to_vec();
    latin.extend(&text.as_bytes()[b"ply\nformat ascii 1.0\n".len()..]);
    assert_eq!(read(&latin).soup, plain.soup);
    // Lone returns before binary rows that begin with the byte of a line feed.
    let mut bytes = b"ply\rformat binary_little_endian 1.0\relement vertex 1\rproperty char x\r\
        property char y\rproperty uchar z\rend_header\r"
        .to_vec();
    bytes.extend([10, 0xff, 0xff]);
    assert_eq!(read(&bytes).soup.points, [[10.0, -1.0, 255.0]]);
}

#[test]
fn other_properties_become_columns_and_the_rest_is_noted() {
    let bytes = ascii(
        &format!(
            "element material 1\nproperty int id\nelement vertex 3\nproperty uchar red\n{XYZ}\
             property double quality\nproperty list uchar int ring\n\
             element face 2\nproperty short group\nproperty list uint ushort vertex_index\n\
             property list uchar float texcoord\nelement none 4000000000\n"
        ),
        "7\n255 0 0 0 0.1 0\n0 1 0 0 1e300 2 1 2\n9 0 1 0 -3 1 0\n-5 3 0 1 2 2 0.5 0.25\n6 3 2 1 0 0\n",
    );
    let soup = read(&bytes).soup;
    assert_eq!(
        soup.vertex_columns,
        [
            AttributeColumn::new("red", AttributeValues::U8(vec![255, 0, 9])),
            AttributeColumn::new("quality", AttributeValues::F64(vec![0.1, 1e300, -3.0])),
        ]
    );
    assert_eq!(
        soup.face_columns,
        [AttributeColumn::new("group", AttributeValues::I16(vec![-5, 6]))]
    );
    let skipped: Vec<_> = soup.notes.iter().map(|note| (note.kind, note.count)).collect();
    assert_eq!(
        skipped,
        [
            (NoteKind::Skipped, 1),
            (NoteKind::Skipped, 1),
            (NoteKind::Skipped, 1),
            (NoteKind::Skipped, 4_000_000_000),
        ]
    );
    let named = ["`material`", "`ring`", "`texcoord`", "`none`"];
    for (note, name) in soup.notes.iter().zip(named) {
        assert!(note.message.contains(name), "{note}");
    }
}

#[test]
fn text_coordinates_are_taken_as_written_and_doubles_in_full() {
    let rows = "0.1 123456789.123 -1e-20\n";
    let bytes = ascii(&format!("element vertex 1\n{XYZ}"), rows);
    assert_eq!(read(&bytes).soup.points, [[0.1, 123_456_789.123, -1e-20]]);
    let mut bytes = b"ply\nformat binary_big_endian 1.0\nelement vertex 1\nproperty double x\n\
        property double y\nproperty float64 z\nend_header\n"
        .to_vec();
    [0.1_f64, -2.5, 1e-300].iter().for_each(|x| bytes.extend(x.to_be_bytes()));
    let file = read(&bytes);
    assert_eq!(file.soup.points, [[0.1, -2.5, 1e-300]]);
    assert_eq!(file.soup.notes[0].kind, NoteKind::NoFaces);
}

#[test]
fn faces_before_vertices_and_faces_of_few_corners_are_kept() {
    let bytes = ascii(
        &format!(
            "element face 4\nproperty list char char vertex_indices\nproperty int id\nelement vertex 3\n{XYZ}"
        ),
        "2 0 1 10\n0 11\n1 2 12\n3 2 1 0 13\n0 0 0\n1 0 0\n0 1 0\n",
    );
    let file = read(&bytes);
    assert_eq!(loops(&file), [vec![0, 1], vec![2], vec![2, 1, 0]]);
    assert_eq!(file.soup.face_columns[0].values, AttributeValues::I32(vec![10, 12, 13]));
    assert_eq!((file.soup.empty_faces, file.soup.notes[0].kind), (1, NoteKind::EmptyFaces));
    assert_eq!(file.soup.clean().unwrap().collapsed_face_count(), 3);
}

#[test]
fn bytes_after_the_last_row_are_noted() {
    let mut bytes = binary(true);
    let end = bytes.len();
    bytes.extend(b"\0extra");
    let note = &read(&bytes).soup.notes[0];
    assert_eq!((note.kind, note.count), (NoteKind::TrailingBytes, 6));
    assert!(note.message.contains(&format!("byte {end}")), "{note}");
    let text = header("ascii") + ROWS + "\n\n5 5 5\n";
    let note = &read(text.as_bytes()).soup.notes[0];
    assert!(note.count == 5 && note.message.contains("line 19"), "{note}");
}

#[test]
fn indices_are_checked_against_the_vertices() {
    let text = header("ascii") + ROWS;
    for (index, line) in [("5", 15), ("-1", 15), ("2147483647", 15)] {
        let bytes = text.replace("4 0 1 2 3", &format!("4 0 1 2 {index}"));
        assert_refused(bytes.as_bytes(), Place::Line(line), "names vertex");
        assert!(refused(bytes.as_bytes()).to_string().contains(index));
    }
    // More digits than the type holds is another matter.
    let bytes = text.replace("4 0 1 2 3", "4 0 1 2 99999999999999999999999");
    assert_refused(bytes.as_bytes(), Place::Line(15), "row 0 of element `face`");
    let mut bytes = binary(false);
    let last = bytes.len() - 1;
    bytes[last] = 99;
    assert_refused(&bytes, Place::Byte(last - 12), "face 1 names vertex 99");
}

#[test]
fn coordinates_that_are_no_finite_numbers_are_refused_with_their_place() {
    let text = header("ascii") + ROWS;
    for word in ["nan", "NaN", "-inf", "1e999", "infinity"] {
        let bytes = text.replace("1 1 0\n", &format!("1 {word} 0\n"));
        assert_refused(bytes.as_bytes(), Place::Line(12), "coordinate y is");
    }
    assert_refused(text.replace(".5", "0,5").as_bytes(), Place::Line(14), "`0,5` is not a number");
    for little in [true, false] {
        let mut bytes = binary(little);
        let at = header(if little { "binary_little_endian" } else { "binary_big_endian" }).len();
        let nan = f32::NAN;
        bytes[at + 20..at + 24].copy_from_slice(&if little {
            nan.to_le_bytes()
        } else {
            nan.to_be_bytes()
        });
        assert_refused(&bytes, Place::Byte(at + 12), "coordinate z is NaN");
    }
}

#[test]
fn counts_beyond_the_bytes_are_refused_before_anything_is_reserved() {
    for count in ["5000000000", "4294967296", "18446744073709551615"] {
        let text = (header("ascii") + ROWS).replace("vertex 5", &format!("vertex {count}"));
        assert_refused(text.as_bytes(), Place::Line(16), "rows are announced");
        let bytes =
            String::from_utf8_lossy(&binary(true)).replace("vertex 5", &format!("vertex {count}"));
        assert!(refused(bytes.as_bytes()).to_string().contains("rows are announced"));
    }
    for (count, words) in [("-5", "not understood"), ("99999999999999999999", "not understood")] {
        let text = (header("ascii") + ROWS).replace("vertex 5", &format!("vertex {count}"));
        assert_refused(text.as_bytes(), Place::Line(3), words);
    }
    // List lengths: 2³² − 16 as text and as bytes, and a negative one.
    let text = (header("ascii") + ROWS).replace("3 1 4 2", "4294967280 1 4 2");
    assert_refused(text.as_bytes(), Place::Line(16), "row 1 of element `face`");
    let text = (header("ascii") + ROWS).replace("3 1 4 2", "-3 1 4 2");
    assert_refused(text.as_bytes(), Place::Line(16), "row 1 of element `face`");
    let faces = |length: &str, bytes: &[u8]| {
        let mut file = format!(
            "ply\nformat binary_little_endian 1.0\nelement vertex 0\n{XYZ}element face 1\n\
             property list {length} int vertex_indices\nend_header\n"
        )
        .into_bytes();
        file.extend(bytes);
        file
    };
    let long = faces("uint", &[0xf0, 0xff, 0xff, 0xff, 0, 0, 0, 0]);
    assert_refused(&long, Place::Byte(long.len()), "row 0 of the 1 of element `face`");
    let negative = faces("int", &[0xff; 8]);
    assert_refused(&negative, Place::Byte(negative.len() - 8), "negative");
}

#[test]
fn every_truncation_is_refused_with_a_place() {
    for whole in [(header("ascii") + ROWS).into_bytes(), binary(true), binary(false)] {
        // The text's last line may lack its end; a digit less is another index.
        let shortest = whole.len() - if whole.ends_with(b"\n") { 2 } else { 0 };
        for length in 0..shortest {
            let error = read_bytes(&whole[..length], None, Records::AsFiled, "t.ply").unwrap_err();
            assert!(length == 0 || length < 3 || error.place() != Place::File, "{length}: {error}");
        }
    }
}

#[test]
fn rows_that_do_not_fit_are_refused() {
    let text = header("ascii") + ROWS;
    assert_refused(text.replace("1 1 0", "1 1").as_bytes(), Place::Line(12), "row 2 of");
    assert_refused(text.replace("1 1 0", "1 1 0 4").as_bytes(), Place::Line(12), "more numbers");
    assert_refused(text.replace("4 0 1", "3 0 1").as_bytes(), Place::Line(15), "more numbers");
    assert_refused(text.replace("4 0 1", "5 0 1").as_bytes(), Place::Line(15), "row 0 of");
    let mut bytes = text.into_bytes();
    let at = bytes.len() - 2;
    bytes[at] = 0xff;
    assert_refused(&bytes, Place::Line(16), "is not text");
}

#[test]
fn headers_that_describe_no_mesh_are_refused() {
    let face = "element face 1\nproperty list uchar int vertex_indices\n";
    for (header, words) in [
        (face.to_owned(), "no element `vertex`"),
        ("element vertex 1\nproperty float x\nproperty float y\n".to_owned(), "no number `z`"),
        (
            format!("element vertex 1\n{XYZ}").replace("float y", "list uchar int y"),
            "no number `y`",
        ),
        (
            format!("element vertex 0\n{XYZ}element face 1\nproperty int id\n"),
            "no list `vertex_indices`",
        ),
        (
            format!("element vertex 0\n{XYZ}{face}").replace("uchar int", "uchar float"),
            "not a list of whole numbers",
        ),
        (
            format!("element vertex 0\n{XYZ}{face}property list uchar int vertex_index\n"),
            "has both",
        ),
    ] {
        assert_refused(&ascii(&header, ""), Place::File, words);
    }
    let twice = format!("element vertex 1\n{XYZ}property float x\n");
    assert_refused(&ascii(&twice, "0 0 0 0\n"), Place::Line(7), "`x` twice");
    let twice = format!("element vertex 1\n{XYZ}{face}element vertex 1\n{XYZ}");
    assert_refused(&ascii(&twice, ""), Place::Line(9), "`vertex` twice");
    assert_refused(
        b"ply\nformat ascii 1.0\nelement  vertex\n end_header\n",
        Place::Line(3),
        "vertex",
    );
    assert_refused(b"ply\nelement vertex 0\nend_header\n", Place::File, "`format`");
    assert_refused(b"ply\nformat ascii 1.0\n", Place::Line(3), "no line `end_header`");
    assert_refused(b"play\n", Place::Line(1), "begins with `ply`");
}
