//! What is broken: sound files, records and tables to begin with.

use lowside::bench::stand::{BenchSheet, Subject as Stood, paste};
use lowside::demo::TAMARISK;
use lowside::record::{Export, NeutralSheet};
use lowside::tracking;

/// Files of every format there was.
pub const FILES: [&str; 3] = [
    TAMARISK,
    include_str!("../../../../tests/fixtures/v1/export.json"),
    include_str!("../../../../tests/fixtures/v2/export.json"),
];
/// A pasted table.
pub const TABLE: &str = "Point\tSpeed\tInlet pressure\tOutlet pressure\tFlow\tTorque\n\trpm\tbar\tbar\tl/min\tNm\n1\t1500\t20,0\t220,5\t108,3\t262,4\n";
/// Figures as they are typed.
pub const FIGURES: [&str; 7] = [
    "21,5 bar",
    "3/4 turn",
    "1.234,5 psi",
    "-0.8 bar",
    "2 1/2 L",
    "70 °F",
    "1e3 rpm",
];

/// The demo yard.
pub fn yard() -> Export {
    Export::read(TAMARISK.as_bytes()).expect("the yard reads")
}

/// A call in which every sheet has something.
pub fn full() -> Export {
    let mut export = yard();
    export.visits.truncate(1);
    let of = export.visits.first().map(|visit| visit.unit.clone());
    export.units.retain(|unit| Some(&unit.id) == of.as_ref());
    if let Some(visit) = export.visits.first_mut() {
        let mut bench = BenchSheet::default();
        if let Ok(pasted) = paste::read(TABLE, Stood::Pump) {
            let mut rows = 0;
            bench.rows = pasted
                .rows(|| {
                    rows += 1;
                    format!("row-{rows}")
                })
                .0;
        }
        visit.bench = Some(bench);
        visit.neutral = Some(NeutralSheet::default());
        visit.tracking = Some(tracking::TrackingSheet {
            runs: vec![tracking::Line::default()],
            ..tracking::TrackingSheet::default()
        });
    }
    export
}

/// The texts of the records of a file, as they are kept one by one.
pub fn records(export: &Export) -> Vec<String> {
    let units = export.units.iter().map(serde_json::to_string);
    let visits = export.visits.iter().map(serde_json::to_string);
    units
        .chain(visits)
        .map(|text| text.expect("a record can be written"))
        .collect()
}
