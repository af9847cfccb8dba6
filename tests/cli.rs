//! The binary as its users meet it: files, arguments, what is printed, exit codes.

mod common;

use common::Case;

/// A plain wall of one layer: everything about it follows from ISO 6946.
const WALL: &str = "\
title: Plain wall
plane: vertical
environments:
  outdoors: { kind: external, temperature: -5 }
  flat: { kind: internal, temperature: 20 }
materials:
  block: { conductivity: 0.5, source: declared by the maker }
section:
  - { environment: outdoors, x: [-200, 0], y: [0, 2600] }
  - { environment: flat, x: [200, 400], y: [0, 2600] }
  - { material: block, x: [0, 200], y: [0, 2600] }
";

/// R = 0.13 + 0.2/0.5 + 0.04 = 0.57 m²·K/W; L = 2.6 m / R.
const WALL_COUPLING: f64 = 2.6 / 0.57;

const BALCONY: &str = "\
title: Balcony slab
plane: vertical
environments:
  outdoors: { kind: external, temperature: -5 }
  flat: { kind: internal, temperature: 20, relative_humidity: 50 }
materials:
  hollow block: { conductivity: 0.50 }
  mineral wool: { conductivity: 0.035 }
  cement render: { conductivity: 1.0 }
  gypsum plaster: { conductivity: 0.57 }
  reinforced concrete: { conductivity: 2.3 }
buildups:
  outer wall:
    - cement render: 15
    - mineral wool: 140
    - hollow block: 200
    - gypsum plaster: 13
section:
  - { environment: outdoors, x: [-1200, 0], y: [-1300, 1300] }
  - { environment: flat, x: [368, 1600], y: [-1300, 1300] }
  - { buildup: outer wall, x: 0, towards: right, y: [-1300, 1300] }
  - { material: reinforced concrete, x: [-1000, 1600], y: [-100, 100] }
flanks:
  - { name: wall above, cut: top, internal: 1200, external: 1300, overall_internal: 1300 }
  - { name: wall below, cut: bottom, internal: 1200, external: 1300, overall_internal: 1300 }
";

/// The wall with a misspelt material on line 11.
fn misspelt() -> String {
    WALL.replace("{ material: block,", "{ material: blok,")
}

#[track_caller]
fn number(value: &serde_json::Value) -> f64 {
    value.as_f64().unwrap_or_else(|| panic!("{value} is no number"))
}

#[test]
fn help_and_version_are_results() {
    let help = Case::args(["--help"]).stdout("Usage: coldseam <COMMAND>").stdout("Exit codes:").run();
    assert_eq!(help.stderr, "");
    Case::args(["--version"]).stdout(env!("CARGO_PKG_VERSION")).run();
    for command in ["rate", "check", "verify"] {
        Case::args([command, "--help"]).stdout("Examples:\n  coldseam ").run();
    }
}

#[test]
fn a_command_line_not_understood_exits_with_2_and_prints_no_results() {
    for arguments in [&["rte"][..], &["rate"], &["rate", "a.yaml", "--format", "html"], &["check", "--solve"]] {
        let mut case = Case::args([]).exit(2).stderr("error: ");
        for argument in arguments {
            case = case.arg(argument);
        }
        assert_eq!(case.run().stdout, "", "{arguments:?}");
    }
}

#[test]
fn senseless_numbers_are_refused_with_what_makes_sense() {
    Case::args(["rate", "a.yaml", "--accuracy", "5"])
        .exit(2)
        .stderr("5 W/(m·K) lies outside 0.000001 to 0.1 W/(m·K); write a half-width in W/(m·K), such as 0.0005")
        .run();
    Case::args(["rate", "a.yaml", "--accuracy", "-0.001"]).exit(2).stderr("lies outside").run();
    Case::args(["rate", "a.yaml", "--node-limit", "1e6"]).exit(2).stderr("write a whole number from 4").run();
    Case::args(["rate", "a.yaml", "--threads", "0"]).exit(2).stderr("write a whole number from 1").run();
}

#[test]
fn a_folder_without_junctions_is_refused_in_every_format() {
    let case = |format| {
        Case::args(["rate", "drawings", "--format", format])
            .file("drawings/notes.txt", "")
            .file("drawings/within/wall.yaml", WALL)
            .exit(1)
            .stderr("no junction file in this folder")
            .stderr("drawings")
    };
    assert_eq!(case("text").run().stdout, "");
    assert!(case("csv").run().stdout.starts_with("file,title,warm,cold,psi_internal_w_mk,"));
    let json = case("json").run_json();
    assert_eq!(json["ratings"], serde_json::json!([]));
    assert_eq!(json["failed"][0]["file"], "drawings");
    assert_eq!(json["failed"][0]["problems"][0]["message"], "no junction file in this folder");
    Case::args(["check", "drawings"]).file("drawings/notes.txt", "").exit(1).stderr("no junction file").run();
}

#[test]
fn a_missing_file_is_named() {
    Case::args(["rate", "no-such.yaml"]).exit(1).stderr("no-such.yaml").run();
    Case::args(["check", "no-such.yaml"]).exit(1).stderr("no-such.yaml").run();
}

#[test]
fn a_plain_wall_is_its_series_resistance() {
    let json = Case::args(["rate", "wall.yaml", "--format", "json"]).file("wall.yaml", WALL).run_json();
    let rating = &json["ratings"][0];
    assert_eq!(rating["file"], "wall.yaml");
    assert_eq!(rating["bracket_met"], true);
    let coupling = &rating["coupling"][0];
    assert_eq!(coupling["between"], serde_json::json!(["flat", "outdoors"]));
    // Both sides of the bracket are exact here, so only round-off is left.
    for bound in ["low", "value", "high"] {
        assert!((number(&coupling[bound]) - WALL_COUPLING).abs() < 1e-8, "{bound}: {coupling}");
    }
    for system in ["internal", "overall_internal", "external"] {
        assert!(number(&rating["psi"][0][system]["value"]).abs() < 1e-8, "{system}");
    }
    // f_Rsi of a plain wall is 1 − 0.25 · U with ISO 13788's inside resistance in U.
    let expected = 1.0 - 0.25 / (0.25 + 0.4 + 0.04);
    assert!((number(&rating["temperature_factor"][0]["value"]) - expected).abs() < 1e-6);
}

#[test]
fn the_text_report_opens_with_what_is_signed() {
    let printed = Case::args(["rate", "wall.yaml"])
        .file("wall.yaml", WALL)
        .stdout("Plain wall\nwall.yaml, vertical section 600 × 2600 mm\n")
        .stdout("Bracket met: ")
        .stdout("Ψ, internal            0.000 ± 0.001  W/(m·K)  two decimals 0.00")
        .stdout("L, thermal coupling    4.561 ± 0.001  W/(m·K)")
        .stdout("declared by the maker")
        .stdout("local code")
        .run();
    assert_eq!(printed.stderr, "");
    assert!(!printed.stdout.contains('\u{1b}'), "no colour in a pipe");
}

#[test]
fn csv_has_one_row_a_junction_and_pair() {
    let printed = Case::args(["rate", "wall.yaml", "--format", "csv"]).file("wall.yaml", WALL).run();
    let mut rows = csv::Reader::from_reader(printed.stdout.as_bytes());
    let heads = rows.headers().unwrap().clone();
    let rows: Vec<_> = rows.records().map(Result::unwrap).collect();
    let cell = |head: &str| &rows[0][heads.iter().position(|h| h == head).unwrap()];
    assert_eq!(rows.len(), 1);
    assert_eq!([cell("file"), cell("title"), cell("bracket_met")], ["wall.yaml", "Plain wall", "true"]);
    assert!((cell("coupling_w_mk").parse::<f64>().unwrap() - WALL_COUPLING).abs() < 1e-5);
}

/// Ψ_internal − Ψ_external = Σ U · (external length − internal length) = 2 · U · 0.1 m, from ISO 10211's definition.
#[test]
fn a_balcony_meets_its_bracket_and_the_definition_of_psi() {
    let json = Case::args(["rate", "balcony.yaml", "--format", "json"]).file("balcony.yaml", BALCONY).run_json();
    let rating = &json["ratings"][0];
    assert_eq!(rating["bracket_met"], true);
    let coupling = &rating["coupling"][0];
    let [low, value, high] = ["low", "value", "high"].map(|bound| number(&coupling[bound]));
    assert!(low <= value && value <= high && high - low <= 0.001 + 1e-12, "{coupling}");
    let u = 1.0 / (0.04 + 0.015 / 1.0 + 0.14 / 0.035 + 0.2 / 0.5 + 0.013 / 0.57 + 0.13);
    assert!((number(&rating["flanks"][0]["u"]) - u).abs() < 1e-12);
    let psi = |system: &str| number(&rating["psi"][0][system]["value"]);
    assert!((psi("internal") - psi("external") - 2.0 * u * 0.1).abs() < 1e-9);
    assert!((psi("internal") - (value - 2.0 * u * 1.2)).abs() < 1e-9);
}

#[test]
fn results_come_in_the_order_given_whatever_the_threads() {
    let run = |threads| {
        Case::args(["rate", "b.yaml", "folder", "a.yaml", "--format", "json", "--threads", threads])
            .file("b.yaml", BALCONY)
            .file("folder/2.yml", WALL)
            .file("folder/1.yaml", BALCONY)
            .file("folder/.hidden.yaml", "nonsense")
            .file("a.yaml", WALL)
            .run_json()
    };
    let (one, two) = (run("1"), run("2"));
    assert_eq!(one, two, "the same digits");
    let files: Vec<_> = one["ratings"].as_array().unwrap().iter().map(|rating| rating["file"].clone()).collect();
    assert_eq!(files, ["b.yaml", "folder/1.yaml", "folder/2.yml", "a.yaml"]);
}

#[test]
fn a_file_at_fault_does_not_stop_the_others() {
    let case = |format| {
        Case::args(["rate", "torn.yaml", "wall.yaml", "--format", format])
            .file("torn.yaml", &misspelt())
            .file("wall.yaml", WALL)
            .exit(1)
            .stderr("torn.yaml:11:")
            .stderr("{ material: blok, x: [0, 200], y: [0, 2600] }")
            .stderr("block")
    };
    case("text").stdout("Plain wall\n").stdout("torn.yaml").stdout("could not be rated").run();
    let json = case("json").run_json();
    assert_eq!(json["ratings"][0]["file"], "wall.yaml");
    let failed = &json["failed"][0];
    assert_eq!(failed["file"], "torn.yaml");
    let problem = &failed["problems"][0];
    assert_eq!([&problem["line"], &problem["severity"]], [&serde_json::json!(11), &serde_json::json!("error")]);
    assert!(number(&problem["column"]) > 1.0 && problem["message"].as_str().unwrap().contains("blok"), "{problem}");
}

#[test]
fn a_bracket_too_wide_exits_with_3_and_says_what_was_reached() {
    let case = || {
        Case::args(["rate", "balcony.yaml", "--accuracy", "0.000001", "--node-limit", "3000"])
            .file("balcony.yaml", BALCONY)
    };
    case().exit(3).stdout("Bracket not met: a half-width of 0.000001 W/(m·K) was asked").run();
    case().arg("no-such.yaml").exit(1).stdout("Bracket not met").run();
}

#[test]
fn a_first_grid_beyond_the_node_limit_is_refused() {
    let printed = Case::args(["rate", "balcony.yaml", "--node-limit", "4"]).file("balcony.yaml", BALCONY).exit(1).run();
    assert_eq!(printed.stdout, "");
    assert!(printed.stderr.contains("nodes") && !printed.stderr.contains("fault of Coldseam"), "{}", printed.stderr);
}

#[test]
fn inch_pound_units_are_for_the_text() {
    let run = |format| Case::args(["rate", "wall.yaml", "--units", "ip", "--format", format]).file("wall.yaml", WALL);
    // 4.561404 W/(m·K) × 0.577789317 = 2.635530 Btu/(h·ft·°F); −5 °C = 23 °F.
    run("text").stdout("2.6355 ± 0.0001  Btu/(h·ft·°F)").stdout("outdoors: external, 23 °F").run();
    let coupling = run("json").run_json()["ratings"][0]["coupling"][0]["value"].clone();
    assert!((number(&coupling) - WALL_COUPLING).abs() < 1e-8, "JSON is in SI always");
}

#[test]
fn check_prints_what_was_understood_and_solves_nothing() {
    Case::args(["check", "balcony.yaml"])
        .file("balcony.yaml", BALCONY)
        .stdout("x -1200 to 1600, y -1300 to 1300 mm")
        .stdout("mineral wool 140 mm")
        .stdout("wall above")
        .stdout("Nothing was solved")
        .run();
    Case::args(["check", "torn.yaml", "wall.yaml"])
        .file("torn.yaml", &misspelt())
        .file("wall.yaml", WALL)
        .exit(1)
        .stderr("torn.yaml:11:")
        .stdout("Plain wall\n")
        .run();
}

#[test]
fn verify_holds() {
    Case::args(["verify"]).stdout("ISO 10211").stdout(" hold\n").run();
    assert_eq!(Case::args(["verify", "--format", "json"]).run_json()["holds"], true);
}

/// The commonest slips that still make a valid drawing: millimetres read as metres, 35 for 0.035.
#[test]
fn slips_of_unit_and_decimal_point_are_asked_about() {
    let metres = WALL.replacen("title: Plain wall", "title: Slips\nunit: m", 1);
    Case::args(["rate", "slips.yaml"])
        .file("slips.yaml", &metres)
        .stdout("is `unit: m` right for the numbers in the file?")
        .run();
    let wool = WALL.replacen("materials:\n", "materials:\n  mineral wool: { conductivity: 35 }\n", 1);
    Case::args(["check", "slips.yaml"])
        .file("slips.yaml", &wool)
        .stderr("`mineral wool` conducts 35 W/(m·K) here, but 0.036 in the catalogue")
        .run();
}
