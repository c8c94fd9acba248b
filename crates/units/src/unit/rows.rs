//! The table of unit symbols. Every factor is a fraction of whole numbers from the definition of the unit.
//!
//! Definitions: inch 25.4 mm, pound 0.45359237 kg, free fall g_n = 9.80665 m/s², horsepower 550 ft·lbf/s,
//! metric horsepower 75 kgf·m/s, US gallon 231 in³, imperial gallon 4.54609 l (NIST SP 811, 2008, appendix B).

use crate::dimension::Dim;
use crate::exact::Exact;
use crate::quantity::Tag;

/// Which prefixes a symbol takes.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Prefixes {
    /// None.
    None,
    /// All from pico to tera.
    All,
    /// Those listed.
    Only(&'static [&'static str]),
}

/// What a symbol stands for in the rules that settle the angle of a literal.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Role {
    /// A length to this power: 1 for the metre, 3 for the litre.
    Length(i32),
    Force,
    Mass,
    /// Leaves radians free as a length does: the henry and the farad.
    Reactance,
    /// Counts one radian: the turn itself, or turns per time.
    Angle,
    Other,
}

/// One symbol of the unit table.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct UnitRow {
    /// The symbol as the formatter writes it.
    pub symbol: &'static str,
    /// Other spellings that mean the same.
    pub also: &'static [&'static str],
    /// The name in full, with the definition where it is not plain.
    pub name: &'static str,
    /// Prefixes it takes.
    pub prefixes: Prefixes,
    pub(crate) factor: Exact,
    pub(crate) offset: f64,
    pub(crate) dim: Dim,
    pub(crate) role: Role,
    pub(crate) tag: Option<Tag>,
}

impl UnitRow {
    const fn new(symbol: &'static str, name: &'static str, factor: Exact, dim: Dim) -> UnitRow {
        let (also, prefixes): (&[&str], Prefixes) = (&[], Prefixes::None);
        UnitRow { symbol, also, name, prefixes, factor, offset: 0.0, dim, role: Role::Other, tag: None }
    }
    const fn si(mut self) -> UnitRow {
        self.prefixes = Prefixes::All;
        self
    }
    const fn only(mut self, prefixes: &'static [&'static str]) -> UnitRow {
        self.prefixes = Prefixes::Only(prefixes);
        self
    }
    const fn also(mut self, also: &'static [&'static str]) -> UnitRow {
        self.also = also;
        self
    }
    const fn role(mut self, role: Role) -> UnitRow {
        self.role = role;
        self
    }
    const fn tag(mut self, tag: Tag) -> UnitRow {
        self.tag = Some(tag);
        self
    }
    /// Zero of the scale, in its own degrees above absolute zero.
    const fn zero_at(mut self, offset: f64) -> UnitRow {
        self.offset = offset;
        self
    }
}

const fn dim(length: i16, mass: i16, time: i16) -> Dim {
    Dim::whole(length, mass, time, 0, 0)
}
const fn e(exponent: i32) -> Exact {
    Exact::power_of_ten(exponent)
}
const fn r(num: u128, den: u128) -> Exact {
    Exact::new(num, den)
}

const NUMBER: Dim = Dim::NONE;
const LENGTH: Dim = dim(1, 0, 0);
const AREA: Dim = dim(2, 0, 0);
const VOLUME: Dim = dim(3, 0, 0);
const MASS: Dim = dim(0, 1, 0);
const TIME: Dim = dim(0, 0, 1);
const RATE: Dim = dim(0, 0, -1);
const SPEED: Dim = dim(1, 0, -1);
const FORCE: Dim = dim(1, 1, -2);
const ENERGY: Dim = dim(2, 1, -2);
const POWER: Dim = dim(2, 1, -3);
const PRESSURE: Dim = dim(-1, 1, -2);
const THETA: Dim = Dim::whole(0, 0, 0, 0, 1);
const CHARGE: Dim = Dim::whole(0, 0, 1, 1, 0);
const VOLTAGE: Dim = Dim::whole(2, 1, -3, -1, 0);

const ONE: Exact = Exact::ONE;
const INCH: Exact = r(254, 10_000);
const FOOT: Exact = r(3048, 10_000);
const MILE: Exact = FOOT.times(r(5280, 1));
const POUND: Exact = r(45_359_237, 100_000_000);
const OUNCE: Exact = POUND.over(r(16, 1));
const FREE_FALL: Exact = r(980_665, 100_000);
const POUND_FORCE: Exact = POUND.times(FREE_FALL);
const PSI: Exact = POUND_FORCE.over(INCH.times(INCH));
const US_GALLON: Exact = INCH.times(INCH).times(INCH).times(r(231, 1));
const IMPERIAL_GALLON: Exact = r(454_609, 100_000_000);

/// Every unit symbol, by what it measures.
pub(crate) static ROWS: &[UnitRow] = &[
    // Numbers and angles
    UnitRow::new("%", "per cent", r(1, 100), NUMBER),
    UnitRow::new("‰", "per mille", r(1, 1000), NUMBER),
    UnitRow::new("ppm", "parts per million", e(-6), NUMBER),
    UnitRow::new("rad", "radian", ONE, NUMBER).only(&["m", "μ"]).role(Role::Angle),
    UnitRow::new("°", "degree of angle", Exact::of_pi(1, 180), NUMBER).also(&["deg"]).role(Role::Angle),
    UnitRow::new("rev", "revolution, a full turn", Exact::of_pi(2, 1), NUMBER).also(&["r"]).role(Role::Angle),
    // Length, area, volume
    UnitRow::new("m", "metre", ONE, LENGTH).si().role(Role::Length(1)),
    UnitRow::new("in", "inch, 25.4 mm", INCH, LENGTH).also(&["inch"]).role(Role::Length(1)),
    UnitRow::new("ft", "foot, 12 in", FOOT, LENGTH).role(Role::Length(1)),
    UnitRow::new("yd", "yard, 3 ft", FOOT.times(r(3, 1)), LENGTH).role(Role::Length(1)),
    UnitRow::new("mi", "mile, 5280 ft", MILE, LENGTH).role(Role::Length(1)),
    UnitRow::new("nmi", "nautical mile, 1852 m", r(1852, 1), LENGTH).role(Role::Length(1)),
    UnitRow::new("mil", "thousandth of an inch", INCH.times(e(-3)), LENGTH)
        .also(&["thou"])
        .role(Role::Length(1)),
    UnitRow::new("ha", "hectare, 10 000 m²", e(4), AREA).role(Role::Length(2)),
    UnitRow::new("l", "litre", e(-3), VOLUME).also(&["L"]).si().role(Role::Length(3)),
    UnitRow::new("gal_us", "US gallon, 231 in³", US_GALLON, VOLUME).role(Role::Length(3)),
    UnitRow::new("gal_imp", "imperial gallon, 4.54609 l", IMPERIAL_GALLON, VOLUME).role(Role::Length(3)),
    // Time and rates
    UnitRow::new("s", "second", ONE, TIME).only(&["m", "μ", "n", "p"]),
    UnitRow::new("min", "minute", r(60, 1), TIME),
    UnitRow::new("h", "hour", r(3600, 1), TIME),
    UnitRow::new("d", "day", r(86_400, 1), TIME),
    UnitRow::new("Hz", "hertz, cycles per second", ONE, RATE).si(),
    UnitRow::new("rpm", "revolutions per minute", Exact::of_pi(1, 30), RATE).role(Role::Angle),
    UnitRow::new("krpm", "thousand revolutions per minute", Exact::of_pi(100, 3), RATE).role(Role::Angle),
    UnitRow::new("rps", "revolutions per second", Exact::of_pi(2, 1), RATE).role(Role::Angle),
    UnitRow::new("mph", "mile per hour", MILE.over(r(3600, 1)), SPEED),
    UnitRow::new("kn", "knot, nautical mile per hour", r(1852, 3600), SPEED),
    UnitRow::new("g_n", "standard acceleration of free fall, 9.80665 m/s²", FREE_FALL, dim(1, 0, -2)),
    UnitRow::new("cfm", "cubic foot per minute", FOOT.times(FOOT).times(FOOT).over(r(60, 1)), dim(3, 0, -1)),
    // Mass
    UnitRow::new("g", "gram", e(-3), MASS).si().role(Role::Mass),
    UnitRow::new("t", "tonne, 1000 kg", e(3), MASS).role(Role::Mass),
    UnitRow::new("lb", "pound (mass), 0.45359237 kg", POUND, MASS).also(&["lbm"]).role(Role::Mass),
    UnitRow::new("oz", "ounce (mass), 1/16 lb", OUNCE, MASS).role(Role::Mass),
    UnitRow::new("slug", "slug, lbf·s²/ft", POUND_FORCE.over(FOOT), MASS).role(Role::Mass),
    UnitRow::new("short_ton", "short (US) ton, 2000 lb", POUND.times(r(2000, 1)), MASS).role(Role::Mass),
    UnitRow::new("long_ton", "long (imperial) ton, 2240 lb", POUND.times(r(2240, 1)), MASS).role(Role::Mass),
    // Force
    UnitRow::new("N", "newton", ONE, FORCE).si().role(Role::Force),
    UnitRow::new("kgf", "kilogram-force, 9.80665 N", FREE_FALL, FORCE).also(&["kp"]).role(Role::Force),
    UnitRow::new("gf", "gram-force, 1/1000 kgf", FREE_FALL.times(e(-3)), FORCE).role(Role::Force),
    UnitRow::new("tf", "tonne-force, 1000 kgf", FREE_FALL.times(e(3)), FORCE).role(Role::Force),
    UnitRow::new("lbf", "pound-force, 4.4482216152605 N", POUND_FORCE, FORCE).role(Role::Force),
    UnitRow::new("ozf", "ounce-force, 1/16 lbf", POUND_FORCE.over(r(16, 1)), FORCE).role(Role::Force),
    // Energy and power
    UnitRow::new("J", "joule", ONE, ENERGY).si(),
    UnitRow::new("Wh", "watt-hour, 3600 J", r(3600, 1), ENERGY).si(),
    UnitRow::new("W", "watt", ONE, POWER).si(),
    UnitRow::new("VA", "volt-ampere, of apparent power", ONE, POWER).si(),
    UnitRow::new(
        "hp",
        "horsepower, 550 ft·lbf/s = 745.6999 W",
        POUND_FORCE.times(FOOT).times(r(550, 1)),
        POWER,
    ),
    UnitRow::new("PS", "metric horsepower, 75 kgf·m/s = 735.49875 W", FREE_FALL.times(r(75, 1)), POWER),
    UnitRow::new("hp_electric", "electric horsepower, 746 W", r(746, 1), POWER),
    UnitRow::new("hp_boiler", "boiler horsepower, 9809.5 W", r(98_095, 10), POWER),
    // Pressure and viscosity
    UnitRow::new("Pa", "pascal", ONE, PRESSURE).si(),
    UnitRow::new("bar", "bar, 100 kPa", e(5), PRESSURE).only(&["m"]),
    UnitRow::new("barg", "bar above the surroundings", e(5), PRESSURE).tag(Tag::Gauge),
    UnitRow::new("bara", "bar above vacuum", e(5), PRESSURE).tag(Tag::Absolute),
    UnitRow::new("psi", "pound-force per square inch", PSI, PRESSURE),
    UnitRow::new("psig", "psi above the surroundings", PSI, PRESSURE).tag(Tag::Gauge),
    UnitRow::new("psia", "psi above vacuum", PSI, PRESSURE).tag(Tag::Absolute),
    UnitRow::new("atm", "standard atmosphere, 101 325 Pa", r(101_325, 1), PRESSURE),
    UnitRow::new("mmH2O", "millimetre of water (conventional), 9.80665 Pa", FREE_FALL, PRESSURE),
    UnitRow::new("mH2O", "metre of water (conventional), 9806.65 Pa", FREE_FALL.times(e(3)), PRESSURE),
    UnitRow::new(
        "inH2O",
        "inch of water (conventional), 249.08891 Pa",
        FREE_FALL.times(INCH).times(e(3)),
        PRESSURE,
    ),
    UnitRow::new("cP", "centipoise, mPa·s", e(-3), dim(-1, 1, -1)),
    UnitRow::new("cSt", "centistokes, mm²/s", e(-6), dim(2, 0, -1)),
    // Electricity
    UnitRow::new("A", "ampere", ONE, Dim::whole(0, 0, 0, 1, 0)).si(),
    UnitRow::new("V", "volt", ONE, VOLTAGE).si(),
    UnitRow::new("Ω", "ohm", ONE, Dim::whole(2, 1, -3, -2, 0)).also(&["Ohm", "ohm"]).si(),
    UnitRow::new("S", "siemens", ONE, Dim::whole(-2, -1, 3, 2, 0)).only(&["m", "μ"]),
    UnitRow::new("H", "henry", ONE, Dim::whole(2, 1, -2, -2, 0)).si().role(Role::Reactance),
    UnitRow::new("F", "farad", ONE, Dim::whole(-2, -1, 4, 2, 0)).si().role(Role::Reactance),
    UnitRow::new("C", "coulomb", ONE, CHARGE).si(),
    UnitRow::new("Ah", "ampere-hour, 3600 C", r(3600, 1), CHARGE).si(),
    UnitRow::new("Wb", "weber", ONE, Dim::whole(2, 1, -2, -1, 0)).si(),
    UnitRow::new("T", "tesla", ONE, Dim::whole(0, 1, -2, -1, 0)).si(),
    // Temperature, amount, light
    UnitRow::new("K", "kelvin", ONE, THETA).only(&["m"]),
    UnitRow::new("°C", "degree Celsius", ONE, THETA).also(&["degC"]).zero_at(273.15),
    UnitRow::new("°F", "degree Fahrenheit", r(5, 9), THETA).also(&["degF"]).zero_at(459.67),
    UnitRow::new("mol", "mole", ONE, Dim([0, 0, 0, 0, 0, 6, 0])).only(&["m", "k"]),
    UnitRow::new("cd", "candela", ONE, Dim([0, 0, 0, 0, 0, 0, 6])),
];

/// Prefixes with their spellings and powers of ten.
pub(crate) static PREFIXES: &[(&str, &[&str], i32)] = &[
    ("T", &[], 12),
    ("G", &[], 9),
    ("M", &[], 6),
    ("k", &[], 3),
    ("h", &[], 2),
    ("da", &[], 1),
    ("d", &[], -1),
    ("c", &[], -2),
    ("m", &[], -3),
    ("μ", &["u"], -6),
    ("n", &[], -9),
    ("p", &[], -12),
];
