//! Proof that the suite can fail: a kernel with one fault at a time, each of which it must name.

mod kernel;
mod placed;

use super::*;
use kernel::{FAULT, Planted};
use placed::Placed;

/// What is wrong with a [`Planted`] kernel.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Fault {
    None,
    TurnsAtMisorientedEdges,
    TurnsAtBoundaries,
    MissesTheThirdUse,
    ReversesRadialOrder,
    HandleInsideAnOpenSector,
    DropsTheSecondSector,
    NumbersSectorsBackwards,
    OneSectorTooMany,
    KeepsTheHandlesOfBefore,
    IteratesRetiredFaces,
    FaceCountOffAfterRemoval,
    EdgeCountOffAfterRemoval,
    KeepsInnerLoopCount,
    PrevOfTheLastCorner,
    EndIsStart,
    BoundsBackwards,
    OneVertexLoopOnly,
    RetiredEdgesUnreported,
    MovedEdgesUnreported,
    StaleFaceAccepted,
    StaleVertexAccepted,
    UsedVertexAccepted,
    RefusalLeavesATrace,
    CompactionLeavesAColumnBehind,
    CompactionSwapsFaces,
    FoldDropsTheLast,
    GoesOnAfterTheEnd,
    IteratesBackwards,
    TriangleBeginsElsewhere,
    IndexBufferBackwards,
    LookupLosesUpperBits,
    LooksUpRetiredFaces,
    AllUsesRunWithTheirEdge,
    MisorientedIsPlain,
    EdgeUseOfAnotherEdge,
    ThirdUseOfAnEdgeOfItsOwn,
    TwoArraysOfOneName,
    ErrorNamesTheNextCorner,
    AcrossStaysHere,
}

/// Every fault, and what the suite must call the first thing it finds.
const FAULTS: [(Fault, &str); 39] = [
    (Fault::TurnsAtMisorientedEdges, "turn"),
    (Fault::TurnsAtBoundaries, "turn"),
    (Fault::MissesTheThirdUse, "radial"),
    (Fault::ReversesRadialOrder, "radial"),
    (Fault::HandleInsideAnOpenSector, "handle of sector"),
    (Fault::DropsTheSecondSector, "sector"),
    (Fault::NumbersSectorsBackwards, "sectors"),
    (Fault::OneSectorTooMany, "sector beyond the last"),
    (Fault::KeepsTheHandlesOfBefore, "handle of sector"),
    (Fault::IteratesRetiredFaces, "faces"),
    (Fault::FaceCountOffAfterRemoval, "face_count"),
    (Fault::EdgeCountOffAfterRemoval, "edge_count"),
    (Fault::KeepsInnerLoopCount, "inner_loop_count"),
    (Fault::PrevOfTheLastCorner, "prev"),
    (Fault::EndIsStart, "end"),
    (Fault::BoundsBackwards, "start"),
    (Fault::OneVertexLoopOnly, "vertex_loop"),
    (Fault::RetiredEdgesUnreported, "retired_edges"),
    (Fault::MovedEdgesUnreported, "moved_edges"),
    (Fault::StaleFaceAccepted, "remove_face of a dead face"),
    (Fault::StaleVertexAccepted, "remove_isolated_vertex of a dead vertex"),
    (Fault::UsedVertexAccepted, "remove_isolated_vertex"),
    (Fault::RefusalLeavesATrace, "vertex_count"),
    (Fault::CompactionLeavesAColumnBehind, "oriented edges"),
    (Fault::CompactionSwapsFaces, "faces"),
    (Fault::FoldDropsTheLast, "vertices"),
    (Fault::GoesOnAfterTheEnd, "vertices"),
    (Fault::IteratesBackwards, "vertices"),
    (Fault::TriangleBeginsElsewhere, "face_corners"),
    (Fault::IndexBufferBackwards, "index_buffer"),
    (Fault::LookupLosesUpperBits, "vertex_at"),
    (Fault::LooksUpRetiredFaces, "face_at"),
    (Fault::AllUsesRunWithTheirEdge, "runs_with_edge"),
    (Fault::MisorientedIsPlain, "is_plain"),
    (Fault::EdgeUseOfAnotherEdge, "edge of edge_use"),
    (Fault::ThirdUseOfAnEdgeOfItsOwn, "edge"),
    (Fault::TwoArraysOfOneName, "names of arrays"),
    (Fault::ErrorNamesTheNextCorner, "assemble"),
    (Fault::AcrossStaysHere, "across against radial and face"),
];

const CAPABILITIES: Capabilities = Capabilities::everything("planted");
const PLACED: Capabilities = Capabilities { edge_numbers: false, ..CAPABILITIES };

/// A small corpus that shows every feature.
fn corpus() -> impl Iterator<Item = Complex> {
    named_complexes().into_iter().chain(random_complexes(0, 12))
}

fn judge(fault: Fault) -> Result<(), Failure> {
    FAULT.set(fault);
    check_corpus::<Planted<Reference>>(&CAPABILITIES, corpus(), 5)?;
    check_malformed_lists::<Planted<Reference>>(&CAPABILITIES)?;
    check_corpus::<Planted<Placed>>(&PLACED, corpus(), 5)?;
    Ok(())
}

#[test]
fn a_kernel_without_fault_passes() {
    judge(Fault::None).unwrap_or_else(|failure| panic!("{failure}"));
}

#[test]
fn each_planted_fault_is_caught_and_named() {
    let mut missed = Vec::new();
    for (fault, what) in FAULTS {
        match judge(fault) {
            Ok(()) => missed.push(format!("{fault:?} went unnoticed")),
            Err(failure) if failure.what != what => {
                missed.push(format!("{fault:?}, to be found at {what}: {failure}"));
            }
            Err(_) => {}
        }
    }
    assert!(missed.is_empty(), "{}", missed.join("\n"));
}

#[test]
fn a_kernel_that_holds_more_than_it_says_is_caught() {
    let polygons = random_complexes(0, 40);
    let failure =
        check_corpus::<Reference>(&Capabilities::triangles("reference"), polygons, 0).unwrap_err();
    assert_eq!((failure.what, &failure.expected[..]), ("assemble", "\"CannotHold\""));
}
