//! The whole program: `merestone check` on files, good and bad, as other programs call it.
#![forbid(unsafe_code)]

use serde_json::Value;
use std::io::Write;
use std::path::{Path, PathBuf};
use std::process::{Command, Output, Stdio};

fn data() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("../../tests/data")
}

fn samples() -> PathBuf {
    data().join("stl_samples")
}

fn program() -> Command {
    let mut command = Command::new(env!("CARGO_BIN_EXE_merestone"));
    command.arg("check").current_dir(data());
    command
}

fn check(arguments: &[&str]) -> Output {
    program().args(arguments).stdin(Stdio::null()).output().expect("the program runs")
}

fn check_input(arguments: &[&str], input: &[u8]) -> Output {
    let mut command = program();
    command.args(arguments).stdin(Stdio::piped()).stdout(Stdio::piped()).stderr(Stdio::piped());
    let mut child = command.spawn().expect("the program runs");
    let mut stdin = child.stdin.take().expect("a pipe");
    // A program that refuses its arguments does not read its input.
    let _ = stdin.write_all(input);
    drop(stdin);
    child.wait_with_output().expect("the program ends")
}

fn code(output: &Output) -> i32 {
    output.status.code().expect("an exit code")
}

fn stdout(output: &Output) -> &str {
    std::str::from_utf8(&output.stdout).expect("UTF-8")
}

fn stderr(output: &Output) -> &str {
    std::str::from_utf8(&output.stderr).expect("UTF-8")
}

/// The one object of the output.
fn json(output: &Output) -> Value {
    let text = stdout(output);
    assert_eq!(text.matches('\n').count(), 1, "one line: {text}");
    serde_json::from_str(text).expect("JSON")
}

/// Writes a file that is gone after the test.
struct Temporary(PathBuf);

impl Temporary {
    fn new(name: &str, bytes: &[u8]) -> Self {
        let folder = Path::new(env!("CARGO_TARGET_TMPDIR"));
        let path = folder.join(format!("check-{}-{name}", std::process::id()));
        std::fs::write(&path, bytes).expect("a writable folder");
        Self(path)
    }

    fn path(&self) -> &str {
        self.0.to_str().expect("UTF-8")
    }
}

impl Drop for Temporary {
    fn drop(&mut self) {
        let _ = std::fs::remove_file(&self.0);
    }
}

const TETRAHEDRON: &str = "ply\nformat ascii 1.0\nelement vertex 4\nproperty double x\n\
    property double y\nproperty double z\nelement face 4\n\
    property list uchar int vertex_indices\nend_header\n\
    0 0 0\n3 0 0\n0 2 0\n0 0 1\n3 0 2 1\n3 0 1 3\n3 1 2 3\n3 2 0 3\n";

/// The exit code of every STL sample, from what the file is: `tests/data/README.md`, the facts in
/// `tests/data/facts.json` (solid boundary and nothing dropped: 0), and the file's name.
#[test]
fn every_sample_has_its_exit_code() {
    let expected = [
        ("broken/empty.stl", 2),
        ("broken/fourVertices.ascii.stl", 1),
        ("broken/incorrectFaceCounter.bin.stl", 0),
        ("broken/missingEndsolid.ascii.stl", 0),
        ("broken/missingFace.ascii.stl", 1),
        ("broken/missingNormal.ascii.stl", 0),
        ("broken/notANumberNormal.ascii.stl", 0),
        ("broken/quad.ascii.stl", 1),
        ("broken/singleFace.ascii.stl", 1),
        ("broken/solidNameMismatch.ascii.stl", 0),
        ("broken/twoVertices.ascii.stl", 1),
        ("broken/wrongHeader.bin.stl", 0),
        ("broken/wrongNormal.ascii.stl", 0),
        ("broken/wrongNormals.ascii.stl", 0),
        ("misc/faceless.ascii.stl", 1),
        ("misc/multiWordName.ascii.stl", 0),
        ("misc/multiWordName.bin.stl", 1),
        ("misc/namelessSolid.ascii.stl", 0),
        ("polytopes/cube.ascii.stl", 0),
        ("polytopes/cube.bin.stl", 0),
        ("polytopes/cubeLarge.ascii.stl", 0),
        ("polytopes/tetrahedron.ascii.stl", 0),
        ("polytopes/tetrahedron.bin.stl", 0),
        ("polytopes/tetrahedron.min.ascii.stl", 0),
        ("polytopes/tetrahedronIrregular.ascii.stl", 0),
        ("polytopes/tetrahedronIrregular.bin.stl", 0),
        ("polytopes/tetrahedronMinusZero.bin.stl", 0),
        ("polytopes/triangle.ascii.stl", 1),
        ("polytopes/triangle.bin.stl", 1),
        ("polytopes/unitCube.ascii.stl", 0),
        ("polytopes/unitCube.binary.stl", 0),
    ];
    let mut found = 0;
    for folder in ["broken", "misc", "polytopes"] {
        for entry in std::fs::read_dir(samples().join(folder)).expect("samples") {
            let name = entry.expect("a file").file_name().into_string().expect("UTF-8");
            let name = format!("{folder}/{name}");
            let &(_, expected) = expected.iter().find(|(n, _)| *n == name).expect(&name);
            let output = check(&[&format!("stl_samples/{name}")]);
            assert_eq!(code(&output), expected, "{name}: {}", stderr(&output));
            // Again for other programs: the same code, and JSON alone.
            let output = check(&["--json", &format!("stl_samples/{name}")]);
            assert_eq!(code(&output), expected, "{name}");
            let answer = json(&output);
            assert_eq!(answer.get("error").is_some(), expected == 2, "{name}");
            if expected < 2 {
                assert_eq!(answer["sound"], expected == 0, "{name}");
            }
            found += 1;
        }
    }
    assert_eq!(found, expected.len());
}

#[test]
fn real_files_give_their_facts() {
    let facts = std::fs::read_to_string(data().join("facts.json")).expect("facts");
    let facts: Value = serde_json::from_str(&facts).expect("JSON");
    for (file, flag, expected) in [
        ("gearwheel.stl", None, 0),
        ("vertebra_c6.stl", None, 0),
        ("jacksboro_terrain.ply", None, 1),
        ("jacksboro_terrain.ply", Some("--open"), 0),
        // Counts that differ from one another, so that none can stand in another's place.
        ("stl_samples/misc/multiWordName.bin.stl", None, 1),
        ("stl_samples/broken/fourVertices.ascii.stl", None, 1),
        ("stl_samples/broken/twoVertices.ascii.stl", None, 1),
    ] {
        let arguments: Vec<&str> = ["--json", file].into_iter().chain(flag).collect();
        let output = check(&arguments);
        assert_eq!(code(&output), expected, "{file}");
        let (answer, fact) = (json(&output), &facts[file]);
        for (key, fact_key) in [
            ("vertices", "vertices"),
            ("edges", "edges"),
            ("faces", "faces"),
            ("collapsed_faces", "faces_dropped"),
            ("zero_area_faces", "faces_zero_area"),
            ("duplicate_faces", "faces_duplicate"),
            ("components", "components_by_edge"),
            ("vertex_components", "components_by_vertex"),
            ("boundary_edges", "edges_boundary"),
            ("boundary_loops", "boundary_loops"),
            ("non_manifold_edges", "edges_nonmanifold"),
            ("misoriented_edges", "edges_inconsistent"),
            ("unbalanced_edges", "edges_unbalanced"),
            ("non_manifold_vertices", "vertices_nonmanifold"),
            ("non_planar_faces", "faces_nonplanar"),
            ("euler_characteristic", "euler"),
            ("genus", "genus"),
            ("manifold", "is_manifold"),
            ("closed", "is_closed"),
            ("oriented", "is_oriented"),
            ("orientable", "is_orientable"),
        ] {
            assert_eq!(answer[key], fact[fact_key], "{file}: {key}");
        }
        let number = |value: &Value| value.as_f64().expect("a number");
        let area = number(&answer["area"]);
        // The damaged file has needles of 1e29, whose area is lost in rounding.
        let is_needle = file.ends_with("multiWordName.bin.stl");
        assert!(is_needle || (area - number(&fact["area"])).abs() <= 1e-12 * area, "{file}: area");
        match answer["volume"].as_f64() {
            Some(volume) => {
                assert!((volume - number(&fact["signed_volume"])).abs() <= 1e-12 * volume.abs());
            }
            None => assert_eq!(fact["volume_is_meaningful"], false, "{file}"),
        }
        let shells = if answer["volume"].is_null() { 0 } else { 1 };
        assert_eq!(answer["shells"], shells, "{file}");
        let listed = answer["defects"].as_array().expect("a list");
        assert_eq!(listed.is_empty(), expected == 0, "{file}");
    }
}

#[test]
fn json_has_every_key_with_its_type() {
    let is_count = |value: &Value| value.is_u64();
    let is_bool = |value: &Value| value.is_boolean();
    let counts = [
        "vertices",
        "edges",
        "faces",
        "inner_loops",
        "isolated_vertices",
        "collapsed_faces",
        "zero_area_faces",
        "degenerate_faces",
        "duplicate_faces",
        "components",
        "vertex_components",
        "boundary_edges",
        "boundary_loops",
        "non_manifold_edges",
        "misoriented_edges",
        "unbalanced_edges",
        "non_manifold_vertices",
        "non_planar_faces",
        "shells",
    ];
    for file in [
        "gearwheel.stl",
        "stl_samples/broken/fourVertices.ascii.stl",
        "stl_samples/broken/twoVertices.ascii.stl",
        "stl_samples/misc/faceless.ascii.stl",
        "stl_samples/misc/multiWordName.bin.stl",
    ] {
        let answer = json(&check(&["--json", file]));
        assert_eq!(answer["file"], file);
        assert_eq!(answer["format"], "stl");
        for key in counts {
            assert!(is_count(&answer[key]), "{file}: {key} is {}", answer[key]);
        }
        for key in ["manifold", "closed", "oriented", "orientable"] {
            assert!(is_bool(&answer[key]), "{file}: {key} is {}", answer[key]);
        }
        let object = answer.as_object().expect("an object");
        for key in ["solids", "voids", "inside_out_components"] {
            assert!(object.get(key).is_some_and(Value::is_null), "{file}: {key} is not known yet");
        }
        assert!(answer["euler_characteristic"].is_i64(), "{file}");
        assert!(answer["area"].is_f64(), "{file}");
        for (key, is_known) in [
            ("genus", answer["closed"] == true && answer["manifold"] == true),
            ("volume", answer["faces"] != 0 && answer["unbalanced_edges"] == 0),
        ] {
            let value = object.get(key).expect(key);
            assert_eq!(value.is_number(), is_known, "{file}: {key} is {value}");
            assert!(is_known || value.is_null(), "{file}: {key} is {value}");
        }
        for defect in answer["defects"].as_array().expect("a list") {
            let kind = defect["kind"].as_str().expect("a word");
            assert!(answer[kind].as_u64().expect("a count of that name") > 0);
            let at = defect["at"].as_array().expect("a point");
            assert!(at.len() == 3 && at.iter().all(Value::is_number), "{file}: {defect}");
            assert!(!defect["cells"].as_array().expect("cells").is_empty());
            assert!(!defect["message"].as_str().expect("a sentence").is_empty());
        }
    }
}

#[test]
fn defects_are_where_they_are() {
    let output = check(&["--json", "stl_samples/broken/missingFace.ascii.stl"]);
    let answer = json(&output);
    let defects = answer["defects"].as_array().expect("a list");
    let boundary: Vec<_> = defects.iter().filter(|d| d["kind"] == "boundary_edges").collect();
    // Three of four faces of the corner tetrahedron: the slanted one is missing.
    let mut places: Vec<String> = boundary.iter().map(|d| d["at"].to_string()).collect();
    places.sort_unstable();
    assert_eq!(places, ["[0.0,0.5,0.5]", "[0.5,0.0,0.5]", "[0.5,0.5,0.0]"]);
}

#[test]
fn the_limit_shortens_the_list_and_no_count() {
    let terrain = |limit: &str| {
        let answer = json(&check(&["--json", "--limit", limit, "jacksboro_terrain.ply"]));
        assert_eq!(answer["boundary_edges"], 744);
        let defects = answer["defects"].as_array().expect("a list").clone();
        defects.iter().filter(|d| d["kind"] == "boundary_edges").count()
    };
    assert_eq!([terrain("0"), terrain("3"), terrain("744"), terrain("9999")], [0, 3, 744, 744]);
}

#[test]
fn people_read_the_verdict_first() {
    let output = check(&["gearwheel.stl"]);
    let mut lines = stdout(&output).lines();
    assert!(lines.next().expect("a name").starts_with("gearwheel.stl"));
    assert_eq!(lines.next(), Some("bounds a solid of genus 1"));
    assert_eq!(stderr(&output), "");
    assert!(!stdout(&output).contains('\u{1b}'), "no colours for a pipe");
    assert!(stdout(&output).lines().all(|line| line == line.trim_end() && line.len() <= 80));

    let output = check(&["stl_samples/broken/missingFace.ascii.stl"]);
    let verdict = stdout(&output).lines().nth(1);
    assert_eq!(verdict, Some("does not bound a solid: 3 boundary edges in 1 boundary loop"));

    let output = check(&["--open", "jacksboro_terrain.ply"]);
    assert_eq!(stdout(&output).lines().nth(1), Some("is an open sheet with 1 boundary loop"));
}

#[test]
fn what_the_reader_noted_is_a_warning() {
    let output = check(&["--json", "stl_samples/broken/incorrectFaceCounter.bin.stl"]);
    assert_eq!(code(&output), 0);
    let warning = stderr(&output);
    assert!(warning.starts_with("warning: stl_samples/broken/incorrectFaceCounter.bin.stl: "));
    assert!(warning.contains("66"), "{warning}");
    assert!(json(&output)["notes"][0]["message"].as_str().expect("a note").contains("66"));
}

#[test]
fn several_files_are_answered_in_order_and_the_worst_decides() {
    let good = "stl_samples/polytopes/cube.bin.stl";
    let open = "stl_samples/polytopes/triangle.bin.stl";
    let gone = "no such file.stl";
    for (files, expected) in
        [(&[good, good][..], 0), (&[open, good], 1), (&[good, gone, open], 2), (&[gone], 2)]
    {
        let output = check(&[&["--json"], files].concat());
        assert_eq!(code(&output), expected, "{files:?}");
        let lines: Vec<Value> =
            stdout(&output).lines().map(|line| serde_json::from_str(line).expect("JSON")).collect();
        assert_eq!(lines.len(), files.len());
        for (line, &file) in lines.iter().zip(files) {
            assert_eq!(line["file"], file);
            assert_eq!(line.get("error").is_some(), file == gone);
        }
        let output = check(files);
        assert_eq!(code(&output), expected, "{files:?}");
        assert_eq!(
            stderr(&output).matches("error: no such file.stl: ").count(),
            usize::from(expected == 2)
        );
    }
}

#[test]
fn standard_input_is_a_file_called_dash() {
    let bytes = std::fs::read(data().join("gearwheel.stl")).expect("a file");
    for arguments in [&["--json", "-"][..], &["--json", "--format", "stl", "-"]] {
        let output = check_input(arguments, &bytes);
        assert_eq!(code(&output), 0);
        let answer = json(&output);
        assert_eq!((&answer["file"], &answer["genus"]), (&"-".into(), &1.into()));
    }
    let output = check_input(&["-"], TETRAHEDRON.as_bytes());
    assert_eq!(code(&output), 0);
    // Read as what it is not.
    let output = check_input(&["--format", "ply", "-"], &bytes);
    assert_eq!(code(&output), 2);
    assert!(stderr(&output).contains("standard input"), "{}", stderr(&output));
    let output = check_input(&["-"], b"");
    assert_eq!(code(&output), 2);
    assert!(stderr(&output).contains("empty"), "{}", stderr(&output));
    // Twice is once too often, and the first answer is still given.
    let output = check_input(&["--json", "-", "-"], &bytes);
    assert_eq!(code(&output), 2);
    assert_eq!(stdout(&output).lines().count(), 2);
    assert!(stdout(&output).lines().nth(1).expect("a line").contains("once only"));
}

#[test]
fn content_goes_before_the_ending() {
    let terrain = std::fs::read(data().join("jacksboro_terrain.ply")).expect("a file");
    let file = Temporary::new("terrain.stl", &terrain);
    let answer = json(&check(&["--json", "--open", file.path()]));
    assert_eq!((&answer["format"], &answer["faces"]), (&"ply".into(), &68742.into()));
    let file = Temporary::new("thing.ply", b"v 0 0 0\nv 1 0 0\nv 0 1 0\nf 1 2 3\n");
    let output = check(&[file.path()]);
    assert_eq!(code(&output), 2);
    assert!(stderr(&output).contains("OBJ"), "{}", stderr(&output));
    let file = Temporary::new("letter.txt", b"Dear foundry,\n");
    assert_eq!(code(&check(&[file.path()])), 2);
}

#[test]
fn files_that_cannot_be_used_say_where() {
    let swapped = |from: &str, to: &str| TETRAHEDRON.replacen(from, to, 1).into_bytes();
    let gearwheel = std::fs::read(data().join("gearwheel.stl")).expect("a file");
    let cut = TETRAHEDRON.len() - 12;
    let nan = "solid s\nfacet normal 0 0 1\nouter loop\nvertex 0 0 nan\nvertex 1 0 0\nvertex 0 1 0\nendloop\nendfacet\nendsolid s\n";
    let mut infinite = gearwheel[..84 + 100].to_vec();
    infinite[80..84].copy_from_slice(&2_u32.to_le_bytes());
    infinite[96..100].copy_from_slice(&f32::INFINITY.to_le_bytes());
    for (name, bytes, words) in [
        ("nan.stl", nan.as_bytes().to_vec(), &["line 4", "nan"][..]),
        ("infinite.stl", infinite, &["byte 96", "inf"]),
        ("nan.ply", swapped("0 2 0", "0 nan 0"), &["line 12"]),
        ("range.ply", swapped("3 0 2 1", "3 0 2 9"), &["9", "face 0"]),
        ("negative.ply", swapped("3 0 2 1", "3 0 2 -1"), &["-1"]),
        ("cut.ply", TETRAHEDRON.as_bytes()[..cut].to_vec(), &[]),
        ("huge.ply", swapped("element vertex 4", "element vertex 4294967296"), &[]),
        ("blank.stl", b" \n".to_vec(), &["empty"]),
    ] {
        let file = Temporary::new(name, &bytes);
        let output = check(&[file.path()]);
        assert_eq!(code(&output), 2, "{name}: {}", stdout(&output));
        assert_eq!(stdout(&output), "", "{name}");
        let message = stderr(&output);
        assert!(message.starts_with(&format!("error: {}", file.path())), "{message}");
        for word in words {
            assert!(message.contains(word), "{name}: {message}");
        }
        let answer = json(&check(&["--json", file.path()]));
        assert_eq!(answer.as_object().expect("an object").len(), 2, "{answer}");
        assert_eq!(format!("error: {}\n", answer["error"].as_str().expect("words")), message);
    }
    // Whole facets of a file that was cut off are kept, and the loss is told.
    let file = Temporary::new("cut.stl", &gearwheel[..84 + 50 * 100 + 7]);
    let output = check(&[file.path()]);
    assert_eq!(code(&output), 1);
    assert!(stderr(&output).contains("warning: "), "{}", stderr(&output));
}

#[test]
fn flaws_that_leave_the_boundary_closed_are_defects_all_the_same() {
    // A face of two corners, a vertex that nothing uses, and the faces turned inside out.
    let ply = |vertices: usize, faces: &[&str]| {
        let head = TETRAHEDRON.replacen("vertex 4", &format!("vertex {vertices}"), 1).replacen(
            "face 4",
            &format!("face {}", faces.len()),
            1,
        );
        let (head, _) = head.split_once("3 0 2 1").expect("the faces");
        let more = "9 9 9\n".repeat(vertices - 4);
        format!("{head}{more}{}\n", faces.join("\n"))
    };
    let outward = ["3 0 2 1", "3 0 1 3", "3 1 2 3", "3 2 0 3"];
    let answer = |text: String, expected: i32| {
        let output = check_input(&["--json", "-"], text.as_bytes());
        assert_eq!(code(&output), expected, "{}", stdout(&output));
        json(&output)
    };

    let fine = answer(ply(4, &outward), 0);
    assert_eq!((&fine["volume"], &fine["area"]), (&1.0.into(), &9.0.into()));

    let isolated = answer(ply(6, &outward), 0);
    assert_eq!((&isolated["isolated_vertices"], &isolated["vertices"]), (&2.into(), &4.into()));

    let collapsed = answer(ply(4, &[&outward[..], &["2 0 1"]].concat()), 1);
    assert_eq!(collapsed["collapsed_faces"], 1);
    assert_eq!(collapsed["degenerate_faces"], 1);
    assert_eq!(collapsed["defects"][0]["kind"], "collapsed_faces");
    assert_eq!(collapsed["defects"][0]["cells"], serde_json::json!([{ "face": 4 }]));

    let inward = answer(ply(4, &["3 1 2 0", "3 3 1 0", "3 3 2 1", "3 3 0 2"]), 1);
    assert_eq!(inward["volume"], -1.0);
    assert!(inward["verdict"].as_str().expect("words").contains("inward"));

    let doubled = answer(ply(4, &[&outward[..], &["3 2 1 0"]].concat()), 1);
    assert_eq!(doubled["duplicate_faces"], 1);
    assert_eq!(doubled["non_manifold_edges"], 3);
    assert_eq!(doubled["unbalanced_edges"], 3);

    let turned = answer(ply(4, &["3 1 2 0", "3 0 1 3", "3 1 2 3", "3 2 0 3"]), 1);
    assert_eq!((&turned["misoriented_edges"], &turned["orientable"]), (&3.into(), &true.into()));
}

#[test]
fn planar_says_how_flat_is_flat() {
    let quad = "ply\nformat ascii 1.0\nelement vertex 4\nproperty float x\nproperty float y\n\
        property float z\nelement face 1\nproperty list uchar int vertex_indices\nend_header\n\
        0 0 0\n1 0 0\n1 1 0.01\n0 1 0\n4 0 1 2 3\n";
    for (planar, expected) in [("1e-6", 1), ("0.01", 0)] {
        let output = check_input(&["--open", "--json", "--planar", planar, "-"], quad.as_bytes());
        assert_eq!(code(&output), expected, "{}", stdout(&output));
        assert_eq!(json(&output)["non_planar_faces"], expected);
    }
}

#[test]
fn welding_is_as_asked() {
    let cube = "stl_samples/polytopes/cube.bin.stl";
    let vertices = |arguments: &[&str]| {
        json(&check(&[&["--json", cube], arguments].concat()))["vertices"].clone()
    };
    assert_eq!(vertices(&[]), 8);
    assert_eq!(vertices(&["--weld", "exact"]), 8);
    assert_eq!(vertices(&["--weld", "none"]), 36);
    let output = check(&["--weld", "0.001", cube]);
    assert_eq!(code(&output), 2);
    assert!(stderr(&output).contains("not supported yet"), "{}", stderr(&output));
    let answer = json(&check(&["--weld", "0.001", "--json", cube]));
    assert!(answer["error"].as_str().expect("words").starts_with(cube));
}

#[test]
fn wrong_words_are_refused() {
    let cube = "stl_samples/polytopes/cube.bin.stl";
    for arguments in [
        &[][..],
        &["--jsno", cube],
        &["--weld", "nearly", cube],
        &["--weld", "-1", cube],
        &["--weld", "nan", cube],
        &["--format", "docx", cube],
        &["--limit", "-1", cube],
        &["--limit", "many", cube],
        &["--planar", "nan", cube],
        &["--planar=-1", cube],
        // Not built yet, so not offered.
        &["--report", "out.html", cube],
        &["--intersections", cube],
    ] {
        let output = check(arguments);
        assert_eq!(code(&output), 2, "{arguments:?}");
        assert_eq!(stdout(&output), "", "{arguments:?}");
        assert!(!stderr(&output).is_empty(), "{arguments:?}");
    }
}

#[test]
fn the_same_file_gives_the_same_answer() {
    let file = "stl_samples/broken/fourVertices.ascii.stl";
    assert_eq!(check(&["--json", file]).stdout, check(&["--json", file]).stdout);
}
