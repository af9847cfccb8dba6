//! The units a report prints in, with conversions from exact definitions.
//!
//! 1 Btu = 1055.05585262 J (the International Table Btu, ISO 31-4), 1 ft = 12 in = 0.3048 m, 1 °F = 5/9 K.

/// Joules in a Btu (International Table).
const BTU_J: f64 = 1_055.055_852_62;
/// Metres in a foot.
const FOOT_M: f64 = 0.3048;
/// Metres in an inch.
const INCH_M: f64 = 0.0254;
/// Kelvins in a degree Fahrenheit.
const FAHRENHEIT_K: f64 = 5.0 / 9.0;
/// A watt, in Btu per hour.
const WATT_BTU_H: f64 = 3600.0 / BTU_J;

/// The system of units of a text report; JSON and CSV are in SI always.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Units {
    /// W, m, K, °C; thicknesses in mm.
    #[default]
    Si,
    /// Btu, ft, h, °F; thicknesses in inches.
    Ip,
}

/// A unit of measure: how its numbers follow from SI ones, and its symbol.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Unit {
    /// How many of this unit make one SI unit.
    pub(super) per_si: f64,
    /// What it is called in print.
    pub(super) symbol: &'static str,
}

impl Unit {
    /// The number in this unit of a quantity given in SI.
    pub(super) fn of(self, si: f64) -> f64 {
        si * self.per_si
    }
}

impl Units {
    fn choose(self, si: (f64, &'static str), ip: (f64, &'static str)) -> Unit {
        let (per_si, symbol) = match self {
            Self::Si => si,
            Self::Ip => ip,
        };
        Unit { per_si, symbol }
    }

    /// Of Ψ and L; SI: W/(m·K).
    pub(super) fn linear_transmittance(self) -> Unit {
        self.choose((1.0, "W/(m·K)"), (WATT_BTU_H * FOOT_M * FAHRENHEIT_K, "Btu/(h·ft·°F)"))
    }

    /// Of U; SI: W/(m²·K).
    pub(super) fn transmittance(self) -> Unit {
        self.choose((1.0, "W/(m²·K)"), (WATT_BTU_H * FOOT_M * FOOT_M * FAHRENHEIT_K, "Btu/(h·ft²·°F)"))
    }

    /// Of R and R_s; SI: m²·K/W.
    pub(super) fn resistance(self) -> Unit {
        self.choose((1.0, "m²·K/W"), (1.0 / (WATT_BTU_H * FOOT_M * FOOT_M * FAHRENHEIT_K), "h·ft²·°F/Btu"))
    }

    /// Of λ; SI: W/(m·K).
    pub(super) fn conductivity(self) -> Unit {
        let per_si = WATT_BTU_H * FOOT_M * FOOT_M / INCH_M * FAHRENHEIT_K;
        self.choose((1.0, "W/(m·K)"), (per_si, "Btu·in/(h·ft²·°F)"))
    }

    /// Of heat flow per length of junction; SI: W/m.
    pub(super) fn heat_flow(self) -> Unit {
        self.choose((1.0, "W/m"), (WATT_BTU_H * FOOT_M, "Btu/(h·ft)"))
    }

    /// Of a layer's thickness; SI: m, printed in mm.
    pub(super) fn thickness(self) -> Unit {
        self.choose((1e3, "mm"), (1.0 / INCH_M, "in"))
    }

    /// Of a flank's length; SI: m.
    pub(super) fn length(self) -> Unit {
        self.choose((1.0, "m"), (1.0 / FOOT_M, "ft"))
    }

    /// Of a difference of temperature; SI: K.
    pub(super) fn temperature_difference(self) -> Unit {
        self.choose((1.0, "K"), (1.0 / FAHRENHEIT_K, "°F"))
    }

    /// A temperature given in °C, in °C or °F.
    pub(super) fn temperature(self, celsius: f64) -> f64 {
        match self {
            Self::Si => celsius,
            Self::Ip => celsius / FAHRENHEIT_K + 32.0,
        }
    }

    /// °C or °F.
    pub(super) fn temperature_symbol(self) -> &'static str {
        match self {
            Self::Si => "°C",
            Self::Ip => "°F",
        }
    }
}

#[cfg(test)]
mod tests {
    use approx::assert_relative_eq;

    use super::*;

    /// Factors worked out by hand from the definitions named in the module's document:
    /// 3600/1055.05585262 = 3.412141633; × 0.3048 = 1.040020770; × 5/9 = 0.577789317; × 0.3048 = 0.176110184;
    /// its inverse is 5.678263341; 0.577789317 × 12 = 6.933471799.
    #[test]
    fn factors_follow_from_the_definitions() {
        let ip = Units::Ip;
        assert_relative_eq!(ip.heat_flow().of(1.0), 1.040_020_770, max_relative = 1e-9);
        assert_relative_eq!(ip.linear_transmittance().of(1.0), 0.577_789_317, max_relative = 1e-9);
        assert_relative_eq!(ip.transmittance().of(1.0), 0.176_110_184, max_relative = 3e-9);
        assert_relative_eq!(ip.resistance().of(1.0), 5.678_263_341, max_relative = 1e-9);
        assert_relative_eq!(ip.conductivity().of(1.0), 6.933_471_799, max_relative = 1e-9);
    }

    /// 304.8 mm is one foot or twelve inches; 25 K are 45 °F.
    #[test]
    fn lengths_and_differences() {
        assert_relative_eq!(Units::Ip.length().of(0.3048), 1.0);
        assert_relative_eq!(Units::Ip.thickness().of(0.3048), 12.0);
        assert_relative_eq!(Units::Si.thickness().of(0.3048), 304.8);
        assert_relative_eq!(Units::Ip.temperature_difference().of(25.0), 45.0);
    }

    /// Water freezes at 32 °F and boils at 212 °F; the scales meet at −40.
    #[test]
    fn temperatures() {
        for (celsius, fahrenheit) in [(0.0, 32.0), (100.0, 212.0), (-40.0, -40.0), (20.0, 68.0)] {
            assert_relative_eq!(Units::Ip.temperature(celsius), fahrenheit, max_relative = 1e-14);
            assert_relative_eq!(Units::Si.temperature(celsius), celsius);
        }
    }

    #[test]
    fn si_numbers_are_left_alone() {
        let si = Units::Si;
        for unit in [si.linear_transmittance(), si.transmittance(), si.resistance(), si.conductivity(), si.length()] {
            assert_relative_eq!(unit.of(1.362), 1.362);
        }
    }
}
