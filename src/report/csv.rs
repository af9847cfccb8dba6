//! Ratings as CSV for a spreadsheet or a building model: one row a junction and pair of airs, units in the heads, SI.
//!
//! A cell is empty where its figure is not settled or does not exist. `f_rsi`, `coldest_c`, `x_m` and `y_m` belong to
//! the warm side's surface class with the lowest temperature factor. A half-width is rounded up together with its
//! value, so that value ± half-width holds the whole bracket. Columns are only ever added, at the end.

use super::caution::CAUTION;
use super::digits::{asked_half_width, covering, decimals, fixed, rounded_cold};
use super::files::RatedFile;
use super::lines::plain;
use super::pairs::{Pair, air_name, pairs};
use crate::rating::{Bracket, Rating, TemperatureFactor};

/// Decimals beyond those of the text report, so that sums in a spreadsheet do not add up roundings.
const MORE_DECIMALS: usize = 2;

const HEADS: [&str; 24] = [
    "file",
    "title",
    "warm",
    "cold",
    "psi_internal_w_mk",
    "psi_internal_half_width_w_mk",
    "psi_overall_internal_w_mk",
    "psi_overall_internal_half_width_w_mk",
    "psi_external_w_mk",
    "psi_external_half_width_w_mk",
    "coupling_w_mk",
    "coupling_half_width_w_mk",
    "f_rsi",
    "coldest_surface",
    "coldest_c",
    "x_m",
    "y_m",
    "near_spaced_bars",
    "bracket_met",
    "nodes",
    "warnings",
    "coldseam",
    "caution",
    "symmetry",
];

/// All ratings as CSV with a row of heads.
///
/// Files that failed have no row: their problems go elsewhere.
pub fn csv(ratings: &[RatedFile]) -> String {
    let mut writer = ::csv::Writer::from_writer(Vec::new());
    let in_memory = "writing to memory does not fail and every row has one cell a head";
    writer.write_record(HEADS).expect(in_memory);
    for rated in ratings {
        for pair in pairs(&rated.rating) {
            writer.write_record(row(rated, &pair)).expect(in_memory);
        }
    }
    String::from_utf8(writer.into_inner().expect(in_memory)).expect("cells are strings")
}

fn row(rated: &RatedFile, pair: &Pair<'_>) -> [String; HEADS.len()] {
    let rating = &rated.rating;
    let junction = &rating.junction;
    let coupling = pair.coupling.and_then(|coupling| coupling.bracket);
    let asked = coupling.map_or(0.0, |l| asked_half_width(rating.request.accuracy, l.value()));
    let psi = |choose: fn(&crate::rating::Psi) -> Option<Bracket>| cells(pair.psi.and_then(choose), asked);
    let [internal, internal_half] = psi(|psi| psi.internal);
    let [overall, overall_half] = psi(|psi| psi.overall_internal);
    let [external, external_half] = psi(|psi| psi.external);
    let [coupling, coupling_half] = cells(coupling, asked);
    let coldest = coldest(rating, pair);
    let of_coldest = |cell: fn(&TemperatureFactor) -> String| coldest.map(cell).unwrap_or_default();
    [
        plain(&rated.file),
        plain(&junction.title),
        plain(air_name(junction, pair.warm)),
        plain(air_name(junction, pair.cold)),
        internal,
        internal_half,
        overall,
        overall_half,
        external,
        external_half,
        coupling,
        coupling_half,
        of_coldest(|factor| factor.value.map(|value| rounded_cold(value, 4)).unwrap_or_default()),
        of_coldest(|factor| factor.class.word().to_owned()),
        of_coldest(|factor| rounded_cold(factor.temperature_c, 2)),
        of_coldest(|factor| fixed(factor.at[0], 5)),
        of_coldest(|factor| fixed(factor.at[1], 5)),
        of_coldest(|factor| factor.near_spaced_bars.to_string()),
        rating.bracket_met.to_string(),
        rating.evidence.nodes.to_string(),
        rating.warnings.len().to_string(),
        env!("CARGO_PKG_VERSION").to_owned(),
        CAUTION.to_owned(),
        junction.symmetry.iter().map(|side| side.word()).collect::<Vec<_>>().join(" "),
    ]
}

fn cells(bracket: Option<Bracket>, asked: f64) -> [String; 2] {
    let Some(bracket) = bracket else { return [String::new(), String::new()] };
    let printed = covering(bracket, decimals(bracket.half_width(), asked) + MORE_DECIMALS);
    [printed.value, printed.reach]
}

/// The warm side's coldest point: lowest factor, or lowest temperature where there are no factors.
fn coldest<'a>(rating: &'a Rating, pair: &Pair<'_>) -> Option<&'a TemperatureFactor> {
    let of_warm = rating.temperature_factors.iter().filter(|factor| factor.air == pair.warm);
    of_warm.min_by(|a, b| {
        let order = |f: &TemperatureFactor| f.value.unwrap_or(f64::INFINITY);
        order(a).total_cmp(&order(b)).then(a.temperature_c.total_cmp(&b.temperature_c))
    })
}

#[cfg(test)]
mod tests {
    use std::collections::BTreeMap;

    use super::*;
    use crate::report::sample;

    /// Rows by head, read back.
    fn rows(ratings: &[RatedFile]) -> Vec<BTreeMap<String, String>> {
        let text = csv(ratings);
        ::csv::Reader::from_reader(text.as_bytes()).deserialize().map(Result::unwrap).collect()
    }

    #[test]
    fn a_row_holds_the_figures_with_units_in_the_heads() {
        let rows = rows(&[sample::balcony()]);
        let expected = [
            ("file", "junctions/balcony-slab.yaml"),
            ("warm", "flat"),
            ("cold", "outdoors"),
            ("psi_internal_w_mk", "0.84280"),
            ("psi_internal_half_width_w_mk", "0.00020"),
            ("psi_external_w_mk", "0.79955"),
            ("psi_external_half_width_w_mk", "0.00025"),
            ("coupling_w_mk", "1.36220"),
            ("f_rsi", "0.7476"),
            ("coldest_surface", "opaque"),
            ("coldest_c", "13.69"),
            ("x_m", "0.36800"),
            ("y_m", "0.10000"),
            ("bracket_met", "true"),
            ("warnings", "0"),
            ("caution", CAUTION),
        ];
        for (head, cell) in expected {
            assert_eq!(rows[0][head], cell, "{head}");
        }
        assert_eq!(rows.len(), 1);
    }

    #[test]
    fn cells_without_a_figure_are_empty_and_commas_survive() {
        let rows = rows(&[sample::unsettled(), sample::infinite()]);
        assert_eq!(rows[0]["title"], "Three flanks, \"quoted\", with a comma");
        for head in ["psi_external_w_mk", "psi_external_half_width_w_mk", "f_rsi"] {
            assert_eq!(rows[0][head], "", "{head}");
        }
        assert_eq!(rows[0]["warnings"], "2");
        assert_eq!(rows[1]["coupling_w_mk"], "");
        assert_eq!(rows[1]["psi_internal_w_mk"], "");
    }

    #[test]
    fn each_pair_has_its_row_with_the_lowest_factor_of_its_warm_side() {
        let rows = rows(&[sample::crowded()]);
        let pairs: Vec<_> = rows.iter().map(|row| [row["warm"].as_str(), row["cold"].as_str()]).collect();
        let stair = "unheated stair between the flats";
        assert_eq!(pairs, [["flat", "outdoors"], ["flat", stair], [stair, "outdoors"]]);
        assert_eq!([&rows[0]["f_rsi"], &rows[0]["coldest_surface"]], ["0.6999", "frame"]);
        assert_eq!(rows[2]["f_rsi"], "");
        assert!(rows.iter().all(|row| !row["title"].contains(char::is_control)));
    }

    #[test]
    fn nothing_rated_still_has_its_heads() {
        assert_eq!(csv(&[]).lines().count(), 1);
    }
}
