use serde_json::{Value, json as value};

use super::json;
use crate::input::Severity;
use crate::rating::Bracket;
use crate::report::files::{FailedFile, Problem, RatedFile};
use crate::report::sample;

fn parsed(ratings: &[RatedFile], failed: &[FailedFile]) -> Value {
    serde_json::from_str(&json(ratings, failed)).unwrap()
}

#[test]
fn the_agreed_fields_stand_where_they_were_agreed() {
    let document = parsed(&[sample::balcony()], &[]);
    assert_eq!(document["coldseam"], value!(env!("CARGO_PKG_VERSION")));
    assert_eq!(document["failed"], value!([]));
    let rating = &document["ratings"][0];
    assert_eq!(rating["file"], value!("junctions/balcony-slab.yaml"));
    assert_eq!(rating["title"], value!("Balcony slab through an externally insulated wall"));
    assert_eq!(rating["bracket_met"], value!(true));
    assert_eq!(rating["warnings"], value!([]));
    assert_eq!(rating["grid"], value!({"nodes": 5097, "passes": 15}));
    let flank = &rating["flanks"][0];
    assert_eq!(flank["name"], value!("wall above"));
    assert_eq!(flank["between"], value!(["flat", "outdoors"]));
    assert_eq!(flank["u"], value!(0.2164));
    assert_eq!([&flank["internal"], &flank["overall_internal"], &flank["external"]], [1.2, 1.3, 1.3]);
    assert_eq!(rating["psi"][0]["between"], value!(["flat", "outdoors"]));
    assert_eq!(rating["psi"][0]["internal"], value!({"low": 0.8426, "value": 0.5 * (0.8426 + 0.8430), "high": 0.8430}));
    let factor = &rating["temperature_factor"][0];
    assert_eq!(factor["environment"], value!("flat"));
    assert_eq!(factor["surface"], value!("opaque"));
    assert_eq!(factor["bound"], value!("converged"));
    assert_eq!([&factor["value"], &factor["temperature"], &factor["x"], &factor["y"]], [0.7476, 13.69, 0.368, 0.1]);
}

#[test]
fn bounds_keep_every_bit() {
    let mut file = sample::balcony();
    let exact = Bracket { low: 0.1 + 0.2, high: f64::from_bits(0.1f64.to_bits() + 3) + 1.0 };
    file.rating.couplings[0].bracket = Some(exact);
    let coupling = &parsed(&[file], &[])["ratings"][0]["coupling"][0];
    assert_eq!(coupling["low"].as_f64().unwrap().to_bits(), exact.low.to_bits());
    assert_eq!(coupling["high"].as_f64().unwrap().to_bits(), exact.high.to_bits());
}

#[test]
fn what_is_not_settled_is_null() {
    let document = parsed(&[sample::unsettled(), sample::infinite()], &[]);
    let [unsettled, infinite] = [&document["ratings"][0], &document["ratings"][1]];
    assert_eq!(unsettled["psi"][0]["external"], Value::Null);
    assert_eq!(unsettled["flanks"][0]["external"], Value::Null);
    assert_eq!(unsettled["temperature_factor"][0]["value"], Value::Null);
    assert!(unsettled["flank_proposal"].as_str().unwrap().starts_with("flanks:\n"));
    assert_eq!(unsettled["remarks"][0]["severity"], value!("warning"));
    assert_eq!(unsettled["asked"], value!({"half_width": 0.00002, "relative_half_width": null, "node_limit": 10000}));
    assert_eq!(
        infinite["coupling"][0],
        value!({"between": ["flat", "outdoors"], "low": null, "value": null, "high": null})
    );
    assert_eq!(infinite["psi"][0]["internal"], Value::Null);
}

#[test]
fn a_failed_file_lists_its_problems() {
    let problem = Problem {
        line: Some(3),
        column: Some(8),
        severity: Severity::Error,
        message: "unknown material \"mineral wol\"".into(),
        label: "no material of this name".into(),
        help: Some("did you mean \"mineral wool\"?".into()),
    };
    let whole = Problem::of_whole_file("the file is empty", None);
    let failed = FailedFile { file: "torn.yaml".into(), problems: vec![problem, whole] };
    assert_eq!(
        parsed(&[], &[failed])["failed"],
        value!([{"file": "torn.yaml", "problems": [
            {"line": 3, "column": 8, "severity": "error", "message": "unknown material \"mineral wol\"",
             "label": "no material of this name", "help": "did you mean \"mineral wool\"?"},
            {"line": null, "column": null, "severity": "error", "message": "the file is empty", "label": null,
             "help": null},
        ]}])
    );
}
