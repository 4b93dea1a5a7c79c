//! The whole program: `merestone trial` on demonstrations and files, its JSON and its refusals.

use serde_json::Value;
use std::io::Write;
use std::path::PathBuf;
use std::process::{Command, Output, Stdio};

fn merestone(arguments: &[&str]) -> Output {
    merestone_fed(arguments, b"")
}

fn merestone_fed(arguments: &[&str], input: &[u8]) -> Output {
    let mut child = Command::new(env!("CARGO_BIN_EXE_merestone"))
        .args(arguments)
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    // A program that refuses its words does not read; then the pipe is closed.
    let _ = child.stdin.take().unwrap().write_all(input);
    child.wait_with_output().unwrap()
}

fn json(output: &Output) -> Value {
    let text = std::str::from_utf8(&output.stdout).unwrap();
    assert_eq!(text.matches('\n').count(), 1, "one line: {text}");
    serde_json::from_str(text).unwrap()
}

fn data(name: &str) -> String {
    let mut path = PathBuf::from(env!("CARGO_MANIFEST_DIR"));
    path.extend(["..", "..", "tests", "data", name]);
    path.into_os_string().into_string().unwrap()
}

/// A cube of six quads as PLY.
const CUBE: &str = "ply\nformat ascii 1.0\nelement vertex 8\nproperty float x\nproperty float y\n\
    property float z\nelement face 6\nproperty list uchar int vertex_indices\nend_header\n\
    0 0 0\n1 0 0\n1 1 0\n0 1 0\n0 0 1\n1 0 1\n1 1 1\n0 1 1\n\
    4 3 2 1 0\n4 4 5 6 7\n4 0 1 5 4\n4 1 2 6 5\n4 2 3 7 6\n4 3 0 4 7\n";

#[test]
fn demo_as_json_has_every_key_of_the_contract() {
    let output = merestone(&["trial", "--demo", "--json", "--seconds", "0.001"]);
    assert_eq!(output.status.code(), Some(0));
    let report = json(&output);
    for key in ["mesh", "machine", "kernels", "results", "mix", "verdict", "break_even"] {
        assert!(!report[key].is_null(), "{key}");
    }
    assert!(report.get("error").is_none());
    let mesh = &report["mesh"];
    // A torus, topologically: V − E + F = 0, and 3F = 2E.
    let count = |key: &str| mesh[key].as_i64().unwrap();
    assert_eq!(count("vertices") - count("edges") + count("faces"), 0);
    assert_eq!(3 * count("faces"), 2 * count("edges"));
    assert!(count("faces") >= 20_000 && mesh["closed"] == true && mesh["manifold"] == true);
    assert_eq!((mesh["genus"].as_i64(), mesh["format"].is_null()), (Some(1), true));
    for key in ["processor", "cores", "threads", "compiler"] {
        assert!(report["machine"].get(key).is_some(), "{key}");
    }
    assert_eq!(report["machine"]["threads"], 1);

    let names = |list: &Value, key: &str| -> Vec<String> {
        let list = list.as_array().unwrap().iter();
        list.map(|item| item[key].as_str().unwrap().to_owned()).collect()
    };
    assert_eq!(names(&report["kernels"], "kernel"), ["triangle", "half-edge", "bare"]);
    for held in report["kernels"].as_array().unwrap() {
        let by_array = held["bytes_by_array"].as_object().unwrap().values();
        let sum: u64 = by_array.map(|bytes| bytes.as_u64().unwrap()).sum();
        assert_eq!(held["bytes"].as_u64(), Some(sum));
        let each = held["bytes_per_face"].as_f64().unwrap();
        assert!((each - sum as f64 / count("faces") as f64).abs() < 1e-3);
        assert_eq!(held["lossless"], true);
    }
    let works = ["assemble", "face-normals", "smooth", "components"];
    assert_eq!(names(&report["mix"], "work"), works);
    let results = report["results"].as_array().unwrap();
    assert_eq!(results.len(), 12);
    for (i, row) in results.iter().enumerate() {
        assert_eq!(row["work"], works[i / 3]);
        assert_eq!((&row["supported"], &row["agrees"]), (&Value::Bool(true), &Value::Bool(true)));
        assert_eq!(row["checksum"], results[i / 3 * 3]["checksum"], "{row}");
        let number = |key: &str| row[key].as_f64().unwrap();
        assert!(
            number("low_ns") <= number("median_ns") && number("median_ns") <= number("high_ns")
        );
        assert!(number("runs") >= 7.0 && number("ns_per_element") > 0.0);
        let elements = if works[i / 3] == "smooth" { "vertices" } else { "faces" };
        assert_eq!(row["elements"], mesh[elements]);
    }
    let verdict = &report["verdict"];
    let totals = verdict["totals_ns"].as_object().unwrap();
    let best = verdict["kernel"].as_str().unwrap();
    for kernel in ["triangle", "half-edge"] {
        assert!(totals[best].as_f64() <= totals[kernel].as_f64());
    }
    assert!(
        verdict["confident"].is_boolean() && verdict["sentence"].as_str().unwrap().contains(best)
    );
    assert_eq!(report["break_even"], serde_json::json!([]));
}

#[test]
fn text_is_plain_where_nobody_looks_at_a_terminal() {
    let words = ["trial", "--demo", "valve-body", "--work", "components=3", "--seconds", "0.001"];
    let output = merestone(&words);
    assert_eq!(output.status.code(), Some(0));
    let text = String::from_utf8(output.stdout).unwrap();
    assert!(!text.contains('\x1b'), "{text}");
    for part in
        ["valve-body", "genus 1", "triangle", "half-edge", "bare", "× bare", "3 × components"]
    {
        assert!(text.contains(part), "{part}: {text}");
    }
    assert!(!String::from_utf8(output.stderr).unwrap().contains("measuring"));
}

#[test]
fn files_are_tried_and_named() {
    let file = data("vertebra_c6.stl");
    let words = ["trial", &file, "--json", "--work", "smooth", "--seconds", "0.001"];
    let output = merestone(&words);
    assert_eq!(output.status.code(), Some(0), "{}", String::from_utf8_lossy(&output.stderr));
    let report = json(&output);
    assert_eq!(report["mesh"]["file"], file);
    assert_eq!(report["mesh"]["format"], "stl");
    assert!(report["results"].as_array().unwrap().iter().all(|row| row["agrees"] == true));

    // Coordinates from 1e-41 to 1e29: normals made of rounding, on which all kernels agree.
    let slivers = data("stl_samples/misc/multiWordName.bin.stl");
    let output = merestone(&["trial", &slivers, "--json", "--seconds", "0.001"]);
    assert_eq!(output.status.code(), Some(0), "{}", String::from_utf8_lossy(&output.stderr));

    // Without a weld every facet of an STL file is a mesh of its own.
    let output = merestone(&[&words[..], &["--weld", "none"]].concat());
    let apart = json(&output);
    assert_eq!(apart["mesh"]["components"], apart["mesh"]["faces"]);
    assert_eq!(apart["mesh"]["vertices"].as_u64(), apart["mesh"]["faces"].as_u64().map(|f| 3 * f));
}

#[test]
fn polygons_from_standard_input_leave_the_triangle_kernel_out() {
    let words = ["trial", "-", "--json", "--seconds", "0.001"];
    let output = merestone_fed(&words, CUBE.as_bytes());
    assert_eq!(output.status.code(), Some(0), "{}", String::from_utf8_lossy(&output.stderr));
    let report = json(&output);
    assert_eq!((&report["mesh"]["faces"], &report["mesh"]["edges"]), (&6.into(), &12.into()));
    let triangle = &report["kernels"][0];
    assert_eq!((&triangle["lossless"], &triangle["bytes"]), (&Value::Bool(false), &Value::Null));
    assert!(triangle["note"].as_str().unwrap().contains("triangle kernel cannot hold face 0"));
    let results = report["results"].as_array().unwrap();
    assert!(results.iter().all(|row| row["supported"] == (row["kernel"] != "triangle")));
    assert_eq!(report["verdict"]["kernel"], "half-edge");
    let totals = report["verdict"]["totals_ns"].as_object().unwrap();
    assert!(!totals.contains_key("triangle") && totals.contains_key("bare"));
}

#[test]
fn kernels_and_works_can_be_chosen() {
    let words = ["trial", "--demo", "--json", "--seconds", "0.001", "--kernels", "half-edge,bare"];
    let report = json(&merestone(&[&words[..], &["--work", "components=7,assemble"]].concat()));
    let mix =
        serde_json::json!([{"work": "components", "count": 7}, {"work": "assemble", "count": 1}]);
    assert_eq!(report["mix"], mix);
    assert_eq!(report["results"].as_array().unwrap().len(), 4);
    assert_eq!(report["verdict"]["kernel"], "half-edge");
}

#[test]
fn unusable_words_are_refused_with_what_is_available() {
    let cases: [(&[&str], &[&str]); 16] = [
        (&["--kernels", "incidence"], &["not built yet", "triangle, half-edge, bare"]),
        (&["--kernels", "half-edge-lean"], &["not built yet"]),
        (&["--kernels", "octree"], &["no kernel `octree`", "available"]),
        (&["--kernels", "triangle,triangle"], &["named twice"]),
        (&["--work", "collapse=3"], &["not built yet", "assemble, face-normals"]),
        (&["--work", "polish"], &["no work `polish`", "available"]),
        (&["--work", "smooth=0"], &["`0` is no count"]),
        (&["--work", "smooth,smooth=2"], &["named twice"]),
        (&["--report", "out.html"], &["--report is not built yet"]),
        (&["--trace", "calls"], &["--trace is not built yet"]),
        (&["--threads", "2"], &["one thread"]),
        (&["--threads", "0"], &["one thread"]),
        (&["--seconds", "0"], &["0 seconds"]),
        (&["--seconds=-1"], &["-1 seconds"]),
        (&["--seconds", "nan"], &["NaN seconds"]),
        (&["--seconds", "1e9"], &["at most 3600"]),
    ];
    for (words, parts) in cases {
        let output = merestone(&[&["trial", "--demo", "--json"], words].concat());
        assert_eq!(output.status.code(), Some(2), "{words:?}");
        let told = String::from_utf8(output.stderr.clone()).unwrap();
        let error = json(&output)["error"].as_str().unwrap().to_owned();
        for part in parts {
            assert!(error.contains(part) && told.contains(part), "{words:?}: {error}");
        }
    }
    let output = merestone(&["trial", "--demo=bollard", "--json"]);
    assert_eq!(output.status.code(), Some(2));
    assert!(json(&output)["error"].as_str().unwrap().contains("available is valve-body"));
}

#[test]
fn unusable_input_is_refused_by_name() {
    let empty = data("stl_samples/broken/empty.stl");
    let no_faces = data("stl_samples/misc/faceless.ascii.stl");
    let cases: [(&[&str], &str); 7] = [
        (&["no-such-file.stl"], "no-such-file.stl"),
        (&[&empty], "empty"),
        (&[&no_faces], "no faces"),
        (&["-"], "standard input: the file is empty"),
        (&["-", "--format", "docx"], "ply and stl"),
        (&["x.stl", "--weld", "0.001"], "not built yet"),
        (&["x.stl", "--weld", "glue"], "none and exact"),
    ];
    for (words, part) in cases {
        let output = merestone(&[&["trial", "--json"], words].concat());
        assert_eq!(output.status.code(), Some(2), "{words:?}");
        let error = json(&output)["error"].as_str().unwrap().to_owned();
        assert!(error.contains(part), "{words:?}: {error}");
    }
    let nan = CUBE.replace("1 1 1", "1 1 nan");
    let output = merestone_fed(&["trial", "-", "--format", "ply", "--json"], nan.as_bytes());
    assert_eq!(output.status.code(), Some(2));
    assert!(json(&output)["error"].as_str().unwrap().contains("line 16"), "its line is named");
}

#[test]
fn words_that_make_no_command_are_refused() {
    for words in [&["trial"][..], &["trial", "a.stl", "--demo"], &["trial", "--demo", "--polish"]] {
        assert_eq!(merestone(words).status.code(), Some(2), "{words:?}");
    }
}

#[test]
fn help_names_what_is_built_and_nothing_else() {
    let output = merestone(&["trial", "--help"]);
    assert_eq!(output.status.code(), Some(0));
    let help = String::from_utf8(output.stdout).unwrap();
    for built in ["--kernels", "half-edge", "face-normals", "--weld", "--json", "valve-body"] {
        assert!(help.contains(built), "{built}");
    }
    for planned in ["incidence", "lean", "--report", "--trace", "collapse", "extrude"] {
        assert!(!help.contains(planned), "{planned}");
    }
}
