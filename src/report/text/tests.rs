use super::text;
use crate::rating::{Accuracy, Bracket, Request};
use crate::report::files::{FailedFile, Problem, RatedFile};
use crate::report::sample;
use crate::report::style::Style;
use crate::report::units::Units;

fn printed(file: RatedFile) -> String {
    text(&[file], &[], &Style::default())
}

#[track_caller]
fn assert_holds(text: &str, expected: &str) {
    assert!(text.contains(expected), "{text}\n\nlacks:\n{expected}");
}

const BALCONY: &str = "\
Balcony slab through an externally insulated wall
junctions/balcony-slab.yaml, vertical section 2800 × 2600 mm
flat: internal, 20 °C, 50 % relative humidity; outdoors: external, -5 °C

Bracket met: a half-width of 0.0005 W/(m·K) was asked, reached with 5097 nodes
in 15 passes. ± covers the bracket and the rounding of the figure printed: for
the model as drawn, no numerical error is larger.

Linear thermal transmittance Ψ by dimension system, flat to outdoors
  Ψ, internal           0.843 ± 0.001  W/(m·K)  two decimals 0.84, Σ U·l 0.5194
  Ψ, overall internal   0.800 ± 0.001  W/(m·K)  two decimals 0.80, Σ U·l 0.5627
  Ψ, external           0.800 ± 0.001  W/(m·K)  two decimals 0.80, Σ U·l 0.5627
  L, thermal coupling   1.362 ± 0.001  W/(m·K)  bounds 1.3620 to 1.3624
  heat flow            34.055 ± 0.005  W/m      at a difference of 25 K

Coldest inside surface
  Moisture run with ISO 13788's surface resistances; converged, not bracketed;
  rounded down.
  environment  surface  f_Rsi    °C  at x, y in mm  what meets there
  flat         opaque   0.747  13.6  368, 100       inside corner of gypsum
                                                    plaster and reinforced
                                                    concrete

Flanks, U in W/(m²·K), lengths in m
                                 overall
                   U  internal  internal  external  lengths
  wall above  0.2164     1.200     1.300     1.300  measured
  wall below  0.2164     1.200     1.300     1.300  measured
  wall above, wall below; flat to outdoors: R_s 0.13, gypsum plaster 13 mm,
    hollow block 200 mm, mineral wool 140 mm, cement render 15 mm,
    R_s 0.04 m²·K/W

Surfaces (converged, not bracketed; heat flow into the solid is positive)
  of the heat-flow run; from and to in mm, R_s for heat flow and for moisture in
  m²·K/W, heat flow in W/m, °C
  environ-                                   R_s     R_s    heat   mean  least
  ment      from x, y   to x, y     faces   heat  moist.    flow  temp.  temp.
  flat      368, -100   1600, -100  bottom  0.13    0.25   11.22   17.6   14.6
            368, 100    1600, 100   top     0.13    0.25   10.12   17.9   14.5
            368, -1300  368, -100   right   0.13    0.25    6.35   19.3   15.0
            368, 100    368, 1300   right   0.13    0.25    6.36   19.3   14.9
  outdoors  0, -1300    0, -100     left    0.04    0.04   -6.90   -4.8   -5.0
            0, 100      0, 1300     left    0.04    0.04   -6.90   -4.8   -5.0
            -1000, 100  0, 100      top     0.04    0.04  -20.25   -4.2   -5.0

Probes in °C (converged, not bracketed)
  probe     at x, y in mm  heat-flow run  moisture run
  skirting  368, 180               16.41         15.02

What 1 % more conductivity does to L, flat to outdoors
  reinforced concrete  +0.0041  W/(m·K)  +0.30 %
  mineral wool         +0.0037  W/(m·K)  +0.27 %
  hollow block         +0.0010  W/(m·K)  +0.07 %

Materials
                       λ in W/(m·K)  source
  cement render                   1  the file
  mineral wool                0.035  the file
  hollow block                  0.5  the file: declared by the maker
  gypsum plaster               0.57  the file
  reinforced concrete           2.3  catalogue: ISO 10456, table 3 (1 % of
                                     steel)

Numerical evidence
  bracket              met                asked: a half-width of 0.0005 W/(m·K)
  widest half-width    0.0002 W/(m·K)
  grid                 5097 nodes         passes: 15; node limit: 2 000 000
  heat balance         2.3e-12            ISO 10211 asks for less than 0.0001
  two grids            0.03 %             since at most half the nodes; ISO
                                          10211 asks for at most 1 %
  f_Rsi, flat, opaque  changed by 0.0002  ISO 10211 asks for at most 0.005
  gap identity         4.1e-13            relative departure of the bracket's
                                          width from the sum of its local terms

The bracket bounds the numerical error for the model as drawn; it says nothing
about the inputs, the workmanship or the weather. Whether a detail is acceptable
is settled by the local code and by a qualified person who has checked the
drawing against the building.
";

#[test]
fn a_whole_report() {
    let text = printed(sample::balcony());
    assert_eq!(text, BALCONY, "\n{text}");
}

#[test]
fn a_bracket_not_met_says_what_was_reached_and_what_to_do() {
    let text = printed(sample::unsettled());
    assert_holds(
        &text,
        "\
Bracket not met: a half-width of 0.00002 W/(m·K) was asked, 0.016 W/(m·K) was
reached with 9998 nodes. The figures carry their true, wider bracket. Allow more
nodes (--node-limit, now 10 000) or ask for less (--accuracy).
",
    );
    assert_holds(&text, "Ψ, internal          -0.006 ± 0.016  W/(m·K)  two decimals -0.02 to 0.01");
    assert_holds(&text, "L, thermal coupling   1.357 ± 0.016  W/(m·K)  bounds 1.3410 to 1.3720");
}

#[test]
fn an_open_length_leaves_psi_open_and_offers_the_block_to_paste() {
    let text = printed(sample::unsettled());
    assert_holds(&text, "Ψ, external             not settled           a length is open: see flanks\n");
    assert_holds(
        &text,
        "
  The drawing does not settle every length. Complete this block and paste it
  into the file:

  flanks:
    - { name: wall above, cut: top, internal: 1200, external:  }
    - { name: wall below, cut: bottom }
",
    );
}

#[test]
fn given_lengths_and_transmittances_are_told_from_drawn_ones() {
    let text = printed(sample::unsettled());
    assert_holds(
        &text,
        "\
  wall above  0.2164        1.150  not settled  not settled  given; measured
                                                             internal 1.200
  wall below  0.2100  not settled  not settled  not settled  open
",
    );
    let unbroken = text.split_whitespace().collect::<Vec<_>>().join(" ");
    assert_holds(&unbroken, "R_s 0.04 m²·K/W; U is given, that of the layers drawn is 0.2164 W/(m²·K) The drawing");
}

#[test]
fn warnings_are_numbered_and_come_before_the_details() {
    let text = printed(sample::unsettled());
    assert_holds(
        &text,
        "
Warnings
  1. The cut plane at the top is 0.9 m from the nearest change of layers; ISO
     10211 asks for 1.1 m (three times the flank's thickness)
  2. internal length of \"wall above\" is given as 1150 mm; the drawing's rule
     gives 1200 mm
",
    );
    assert!(text.find("Warnings") < text.find("Flanks"));
}

#[test]
fn a_point_near_spaced_bars_is_not_for_a_verdict() {
    let text = printed(sample::unsettled());
    assert_holds(&text, "flat         opaque    none  13.6  368, 100");
    assert_holds(&text, "f_Rsi needs one external temperature below that indoors.");
    assert_holds(&text, "Do not judge condensation or mould by this value.");
}

#[test]
fn an_infinite_coupling_has_no_figures() {
    let text = printed(sample::infinite());
    assert_holds(&text, "No bracket exists where surfaces of different prescribed temperatures touch");
    assert!(!text.contains("Bracket not met") && !text.contains("--node-limit"), "no number of nodes helps: {text}");
    assert_holds(&text, "Ψ, internal              none    the coupling is infinite\n");
    assert_holds(&text, "L, thermal coupling  infinite    prescribed temperatures touch\n");
    assert!(!text.contains("heat flow  "), "{text}");
}

#[test]
fn narrow_brackets_but_a_moving_temperature_factor() {
    let mut file = sample::balcony();
    file.rating.bracket_met = false;
    let text = printed(file);
    assert_holds(
        &text,
        "Not settled: every coupling's bracket is as narrow as asked (a half-width of\n0.0005 W/(m·K))",
    );
}

#[test]
fn several_airs_each_have_their_coupling() {
    let text = printed(sample::crowded());
    assert_holds(
        &text,
        "
Thermal coupling coefficient L, flat to unheated stair between the flats
  L, thermal coupling  0.331 ± 0.001  W/(m·K)  bounds 0.3311 to 0.3313
  No Ψ: no flank is known to separate the two (see flanks).
",
    );
    assert_holds(&text, "L, thermal coupling  0.000 ± 0.001  W/(m·K)  bounds -0.0001 to 0.0001\n");
    assert_holds(&text, "  flat         frame    0.699  12.4");
    assert_holds(&text, "\n  stainless steel bars 78.5 mm²");
    assert_holds(&text, "1.235  area-weighted\n");
}

#[test]
fn long_lists_of_surfaces_are_shortened_to_those_that_matter() {
    let text = printed(sample::crowded());
    assert_holds(&text, "  and 13 more with less heat flow: --format json lists them\n");
    assert_holds(&text, "-1000, 100  0, 100      top     0.04    0.04  -20.25   -4.2   -5.0");
    assert!(!text.contains("  400, 100 "), "the surface without heat flow is left out: {text}");
}

#[test]
fn every_line_fits_the_page() {
    for (width, units) in [(80, Units::Si), (80, Units::Ip), (120, Units::Si), (400, Units::Ip)] {
        let style = Style { width, units, ..Style::default() };
        let files = [sample::balcony(), sample::unsettled(), sample::infinite(), sample::crowded()];
        for line in text(&files, &[], &style).lines() {
            assert!(line.chars().count() <= width.min(120), "{width}: {line}");
            assert!(!line.ends_with(' ') && !line.contains('\t'), "{line:?}");
            assert!(!line.contains('\u{a0}'), "held spaces are printed as ordinary ones: {line:?}");
        }
    }
}

#[test]
fn escape_sequences_only_where_asked_and_never_from_a_title() {
    let coloured = Style { colour: true, ..Style::default() };
    assert!(!printed(sample::crowded()).contains('\u{1b}'));
    let with_colour = text(&[sample::crowded()], &[], &coloured);
    assert_holds(&with_colour, "\u{1b}[1mStair [31m core with an unheated stair\u{1b}[0m\n");
    let mut plain = with_colour;
    for code in ["\u{1b}[1m", "\u{1b}[2m", "\u{1b}[1;33m", "\u{1b}[0m"] {
        plain = plain.replace(code, "");
    }
    assert_eq!(plain, printed(sample::crowded()));
}

/// 0.8428 W/(m·K) × 0.577789317 = 0.48696; 1.362 and 1.3624 × 0.577789317 = 0.786949 and 0.787180;
/// 0.2164 W/(m²·K) × 0.176110184 = 0.03811; 13.69 °C = 56.642 °F (factors: see `units`).
#[test]
fn inch_pound_units() {
    let text = text(&[sample::balcony()], &[], &Style { units: Units::Ip, ..Style::default() });
    assert_holds(&text, "Ψ, internal          0.4870 ± 0.0002  Btu/(h·ft·°F)  two decimals 0.49");
    assert_holds(&text, "bounds 0.78694 to 0.78719\n");
    assert_holds(&text, "wall above  0.0381     3.937     4.265     4.265  measured\n");
    assert_holds(&text, "flat         opaque   0.747  56.6  368, 100");
    assert!(!text.contains("W/(m"), "{text}");
}

#[test]
fn relative_accuracy_is_in_percent() {
    let mut file = sample::balcony();
    file.rating.request = Request { accuracy: Accuracy::Relative(0.001), ..Request::default() };
    assert_holds(&printed(file), "Bracket met: a half-width of 0.1 % of L was asked");
}

#[test]
fn a_quotable_value_on_the_edge_is_said_to_be_on_the_edge() {
    let mut file = sample::balcony();
    file.rating.psi[0].internal = Some(Bracket { low: 0.8447, high: 0.8453 });
    assert_holds(&printed(file), "Ψ, internal           0.845 ± 0.001  W/(m·K)  two decimals 0.84 or 0.85");
}

#[test]
fn several_files_close_with_a_summary_and_one_caution() {
    let failed = [FailedFile {
        file: "junctions/torn.yaml".into(),
        problems: vec![Problem::of_whole_file("the file is empty", None)],
    }];
    let text = text(&[sample::balcony(), sample::unsettled()], &failed, &Style::default());
    assert_holds(
        &text,
        "
Summary, Ψ in W/(m·K)
  junction               Ψ internal     Ψ external  f_Rsi
  balcony-slab.yaml   0.843 ± 0.001  0.800 ± 0.001  0.747
  unsettled.yaml     -0.006 ± 0.016    not settled   none  bracket not met; 2
                                                           warnings
  torn.yaml                                                could not be rated
",
    );
    assert_eq!(text.matches("The bracket bounds the numerical error").count(), 1);
}

#[test]
fn files_of_one_name_keep_their_folders_in_the_summary() {
    let mut other = sample::balcony();
    other.file = "older/balcony-slab.yaml".into();
    let text = text(&[sample::balcony(), other], &[], &Style { width: 120, ..Style::default() });
    assert_holds(&text, "  junctions/balcony-slab.yaml  0.843");
    assert_holds(&text, "  older/balcony-slab.yaml      0.843");
}

#[test]
fn nothing_rated_prints_nothing() {
    assert_eq!(text(&[], &[], &Style::default()), "");
}
