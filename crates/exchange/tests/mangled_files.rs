//! Valid small files with random damage: readers refuse or read them, and never panic, never hand
//! out what the counting rules refuse, never take memory out of proportion to the bytes.
#![forbid(unsafe_code)]

use merestone_exchange::{Format, Place, Records, read_bytes};
use peak_alloc::PeakAlloc;

#[global_allocator]
static MEMORY: PeakAlloc = PeakAlloc;

/// xorshift64* (Marsaglia 2003; multiplier from memory): the same damage in every run.
struct Random(u64);

impl Random {
    fn next(&mut self) -> u64 {
        self.0 ^= self.0 >> 12;
        self.0 ^= self.0 << 25;
        self.0 ^= self.0 >> 27;
        self.0.wrapping_mul(0x2545_f491_4f6c_dd1d)
    }

    fn below(&mut self, bound: usize) -> usize {
        (self.next() >> 11) as usize % bound.max(1)
    }
}

fn stl_text() -> Vec<u8> {
    let facet = "facet normal 0 0 1\n outer loop\n  vertex 0 0 0\n  vertex 1 0 0\n  vertex 0 1e0 0\n endloop\nendfacet\n";
    format!("solid one\n{facet}{facet}endsolid one\nsolid two\n{facet}endsolid two\n").into_bytes()
}

fn stl_binary() -> Vec<u8> {
    let mut bytes = vec![b' '; 80];
    bytes.extend(3_u32.to_le_bytes());
    for facet in 0..3_u8 {
        for value in 0..12_u8 {
            bytes.extend(f32::from(value ^ facet).to_le_bytes());
        }
        bytes.extend([0, facet]);
    }
    bytes
}

fn ply(encoding: &str) -> Vec<u8> {
    let mut bytes = format!(
        "ply\nformat {encoding} 1.0\ncomment x\nelement vertex 4\nproperty float x\nproperty float y\n\
         property double z\nproperty uchar red\nelement face 2\nproperty list uchar int vertex_indices\n\
         property short id\nelement edge 1\nproperty list uint float w\nend_header\n"
    )
    .into_bytes();
    let little = encoding == "binary_little_endian";
    if encoding == "ascii" {
        bytes.extend(b"0 0 0 255\n1 0 0 0\n1 1 .5 7\n0 1 0 9\n4 0 1 2 3 -5\n3 0 2 3 6\n2 0.5 1\n");
        return bytes;
    }
    let mut put = |mut word: Vec<u8>| {
        if !little {
            word.reverse();
        }
        bytes.extend(word);
    };
    for (x, y) in [(0.0_f32, 0.0_f32), (1.0, 0.0), (1.0, 1.0), (0.0, 1.0)] {
        put(x.to_le_bytes().to_vec());
        put(y.to_le_bytes().to_vec());
        put(0.25_f64.to_le_bytes().to_vec());
        put(vec![200]);
    }
    for face in [&[0, 1, 2, 3][..], &[0, 2, 3_i32]] {
        put(vec![face.len() as u8]);
        face.iter().for_each(|corner| put(corner.to_le_bytes().to_vec()));
        put(7_i16.to_le_bytes().to_vec());
    }
    put(1_u32.to_le_bytes().to_vec());
    put(1.5_f32.to_le_bytes().to_vec());
    bytes
}

fn damage(bytes: &mut Vec<u8>, random: &mut Random) {
    const WORDS: [&[u8]; 16] = [
        b"nan",
        b"-inf",
        b"1e999",
        b"-1",
        b"4294967280",
        b"4294967296",
        b"99999999999999999999",
        b"\xf0\xff\xff\xff",
        b"\xff\xff\xff\xf0",
        b"\x00\x00\xc0\x7f",
        b"\r\n",
        b" ",
        b"\0",
        b"property list uint double y\n",
        b"element face 2\n",
        b"\xef\xbb\xbf",
    ];
    let at = random.below(bytes.len() + 1);
    let to = (at + random.below(12)).min(bytes.len());
    match random.below(8) {
        0 => bytes.truncate(at),
        1 => {
            bytes.drain(at..to);
        }
        2 => {
            let copy = bytes[at..to].to_vec();
            let place = random.below(bytes.len() + 1);
            bytes.splice(place..place, copy);
        }
        3 | 4 => {
            let word = WORDS[random.below(WORDS.len())].to_vec();
            let end = if random.below(2) == 0 { at } else { (at + word.len()).min(bytes.len()) };
            bytes.splice(at..end, word);
        }
        5 => {
            // A digit for another keeps text well-formed and changes what it says.
            if let Some(digit) = bytes[at..].iter_mut().find(|byte| byte.is_ascii_digit()) {
                *digit = b'0' + random.below(10) as u8;
            }
        }
        _ => {
            if let Some(byte) = bytes.get_mut(at) {
                *byte = random.next() as u8;
            }
        }
    }
}

// One test, since the allocator counts what the whole process holds.
#[test]
fn damaged_files_are_refused_or_read_and_cost_no_more_than_their_size() {
    let seeds = [
        stl_text(),
        stl_binary(),
        ply("ascii"),
        ply("binary_little_endian"),
        ply("binary_big_endian"),
    ];
    let mut random = Random(0x6d65_7265_7374_6f6e);
    let (mut read, mut refused) = (0, 0);
    for seed in &seeds {
        assert!(
            read_bytes(seed, None, Records::AsFiled, "whole").is_ok(),
            "{}",
            String::from_utf8_lossy(seed)
        );
        for case in 0..6000 {
            let mut bytes = seed.clone();
            for _ in 0..=random.below(4) {
                damage(&mut bytes, &mut random);
            }
            let format = [None, None, Some(Format::Stl), Some(Format::Ply)][case % 4];
            let before = MEMORY.current_usage();
            MEMORY.reset_peak_usage();
            let result = read_bytes(&bytes, format, Records::AsFiled, "damaged.stl");
            let peak = MEMORY.peak_usage() - before;
            // A list of announced length may be given 2¹⁶ places at first, 8 bytes each.
            assert!(peak <= 128 * bytes.len() + (1 << 20), "{peak} bytes for {}", bytes.len());
            match result {
                Ok(file) => {
                    read += 1;
                    let welded = read_bytes(&bytes, format, Records::Welded, "damaged.stl")
                        .expect("the same bytes")
                        .soup;
                    let (soup, _) = file.soup.weld_exact();
                    assert!(welded.points == soup.points && welded.faces == soup.faces);
                    let clean = soup.clean().expect("readers check");
                    let faces = clean.faces().face_count();
                    assert!(clean.duplicate_faces().len() <= faces);
                    assert!(clean.zero_area_faces().len() <= faces);
                    assert!(clean.non_planar_faces(1e-6).len() <= faces);
                }
                Err(error) => {
                    refused += 1;
                    assert!(error.to_string().starts_with("damaged.stl"), "{error}");
                    match error.place() {
                        Place::Byte(byte) => assert!(byte <= bytes.len(), "{error}"),
                        Place::Line(line) => {
                            let ends = bytes.iter().filter(|b| matches!(b, b'\n' | b'\r')).count();
                            assert!((1..=ends + 1).contains(&line), "{error}");
                        }
                        Place::File => {}
                    }
                }
            }
        }
    }
    assert!(read > 3000 && refused > 3000, "{read} read, {refused} refused");
}
