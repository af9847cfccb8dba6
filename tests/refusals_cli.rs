//! Refusals that need the binary itself: paths, the first grid, and the same problems as data.

mod common;

use common::Case;

/// A wall of one layer between two airs.
const WALL: &str = "\
title: Plain wall
plane: vertical
environments:
  outdoors: { kind: external, temperature: -5 }
  flat: { kind: internal, temperature: 20 }
materials:
  block: { conductivity: 0.5 }
  wool: { conductivity: 0.035 }
section:
  - { environment: outdoors, x: [-500, 0], y: [0, 1400] }
  - { environment: flat, x: [1400, 2000], y: [0, 1400] }
  - { material: block, x: [0, 1400], y: [0, 1400] }
";

/// The wall with boxes that share no coordinate.
fn scattered(count: usize) -> String {
    let mut text = WALL.to_owned();
    for number in 0..count {
        let [x, y] = [2.0_f64, 3.0].map(|square| (number as f64 * 1000.0 * square.sqrt()) % 1300.0);
        text += &format!("  - {{ material: wool, x: [{x:.4}, {:.4}], y: [{y:.4}, {:.4}] }}\n", x + 17.3, y + 11.9);
    }
    text
}

#[test]
fn paths_that_lead_to_no_junction_are_refused_with_what_would() {
    let case = || Case::args(["rate", "no-such.yaml", "empty", "wall.yaml"]).file("empty/notes.txt", "").exit(1);
    let printed = case().file("wall.yaml", WALL).run();
    let expected = "\
error: there is no such file
--> no-such.yaml
 = help: check the path and its spelling

error: no junction file in this folder
--> empty
 = help: junction files end in .yaml or .yml; folders within a folder are not searched, name them too

";
    assert_eq!(printed.stderr, expected);
    // the third is rated all the same
    assert!(printed.stdout.starts_with("Plain wall\n"), "{}", printed.stdout);
    assert_eq!(
        Case::args(["check", "no-such.yaml", "empty"]).file("empty/notes.txt", "").exit(1).run().stderr,
        expected
    );
}

#[test]
fn a_first_grid_beyond_the_node_limit_is_refused_before_it_is_made() {
    let start = std::time::Instant::now();
    let printed = Case::args(["rate", "wall.yaml"])
        .file("wall.yaml", &scattered(600))
        .exit(1)
        .stderr("error: the first grid over this drawing needs ")
        .stderr(" nodes, and the node limit is 2,000,000\n--> wall.yaml\n")
        .stderr("set `--node-limit` well above that number")
        .run();
    assert!(start.elapsed().as_secs() < 2, "took {:?}", start.elapsed());
    assert_eq!(printed.stdout, "");
    let case = || Case::args([]).file("wall.yaml", WALL).arg("rate").arg("wall.yaml").arg("--node-limit");
    case().arg("4").exit(1).stderr("needs 8 nodes, and the node limit is 4\n").run();
    // the same drawing under a limit that it keeps
    case().arg("1000").stdout("Plain wall\n").run();
}

#[test]
fn problems_of_a_drawing_come_as_data_too_with_their_places() {
    let touching = WALL
        .replace(
            "y: [0, 1400] }\n  - { material",
            "y: [0, 1400] }\n  - { environment: flat, x: [0, 1400], y: [0, 1400] }\n  - { material",
        )
        .replace("block, x: [0, 1400], y: [0, 1400]", "block, x: [0, 1400], y: [0, 1300]")
        + "probes:\n  in the room: [1500, 700]\n";
    let json = Case::args(["rate", "wall.yaml", "--format", "json"]).file("wall.yaml", &touching).exit(1).run_json();
    let problems = json["failed"][0]["problems"].as_array().unwrap();
    let told: Vec<_> = problems.iter().map(|p| (p["line"].as_u64(), p["column"].as_u64(), &p["message"])).collect();
    assert_eq!(
        told,
        [
            (Some(12), Some(5), &serde_json::json!("outdoors and flat touch at x 0 mm, y 1300 to 1400 mm")),
            (
                Some(15),
                Some(3),
                &serde_json::json!("the probe `in the room` at x 1500 mm, y 700 mm lies in the environment `flat`")
            ),
        ]
    );
}

#[test]
fn thousands_of_problems_are_answered_in_time_in_every_format() {
    let start = std::time::Instant::now();
    let wrong = |number: usize| format!("  - {{ material: wol{number}, x: [0, wall], y: [0, 0], colour: red }}\n");
    let text = WALL.to_owned() + &(0..15_000).map(wrong).collect::<String>();
    let json = Case::args(["rate", "wall.yaml", "--format", "json"]).file("wall.yaml", &text).exit(1).run_json();
    assert_eq!(json["failed"][0]["problems"].as_array().unwrap().len(), 60_000);
    assert_eq!(json["failed"][0]["problems"][59_999]["line"], 15_012);
    assert!(start.elapsed().as_secs() < 3, "took {:?}", start.elapsed());
}
