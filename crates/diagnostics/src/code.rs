//! The table of codes: one row a code, one page a row.
//!
//! A code is a word, never reused for another meaning. Its page (`pages/<word>.md`) holds a wrong and a right
//! example; both run as tests.

/// How grave a finding is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Severity {
    /// The spec cannot be judged as it stands.
    Error,
    /// The spec is judged, but a colleague would raise this; can be accepted with `allow`.
    Warning,
    /// Worth knowing.
    Hint,
}

/// One row of the table.
#[derive(Debug)]
pub struct CodeRow {
    /// The code as it is written after `allow`.
    pub word: &'static str,
    /// Its severity in language 1.
    pub severity: Severity,
    /// What it says, in one line.
    pub summary: &'static str,
    /// The page of the code, in Markdown.
    pub page: &'static str,
}

macro_rules! codes {
    ($($name:ident = $word:literal, $severity:ident, $summary:literal;)*) => {
        /// A code: the identity of a kind of finding.
        #[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
        pub enum Code {
            $(#[doc = $summary] $name,)*
        }

        /// Every code, in the order of the table.
        pub const CODES: &[Code] = &[$(Code::$name),*];

        impl Code {
            /// The row of the code.
            #[must_use]
            pub const fn row(self) -> &'static CodeRow {
                match self {
                    $(Code::$name => &CodeRow {
                        word: $word,
                        severity: Severity::$severity,
                        summary: $summary,
                        page: include_str!(concat!("../pages/", $word, ".md")),
                    },)*
                }
            }

            /// The code that is written so.
            #[must_use]
            pub fn from_word(word: &str) -> Option<Self> {
                match word {
                    $($word => Some(Code::$name),)*
                    _ => None,
                }
            }
        }
    };
}

codes! {
    // -- text and grammar
    BadText = "bad-text", Error, "the file holds bytes or characters that cannot stand in a spec";
    WritingDirection = "writing-direction", Warning, "a mark that turns the direction in which the text is shown";
    TooLarge = "too-large", Error, "a limit on size, nesting or length is passed";
    Syntax = "syntax", Error, "something else was expected here";
    UnclosedBracket = "unclosed-bracket", Error, "a bracket is opened and not closed, or closed and not opened";
    BadNumber = "bad-number", Error, "a number is written in a way that can be misread";
    BadName = "bad-name", Error, "a name is written in a way that cannot be a name";
    // -- units and kinds
    UnknownUnit = "unknown-unit", Error, "no unit is written so";
    AmbiguousUnit = "ambiguous-unit", Error, "a unit that two trades read differently";
    MissingUnit = "missing-unit", Error, "a quantity without its unit";
    KindMismatch = "kind-mismatch", Error, "a value of another kind than the place wants";
    UnitHidesName = "unit-hides-name", Warning, "a unit is read where a name of the spec may be meant";
    CountsTurnTwice = "counts-turn-twice", Warning, "pi and the radians of a rotational speed count one turn twice";
    TypedFactor = "typed-factor", Hint, "a conversion factor typed by hand that is not needed here";
    // -- names
    UnknownName = "unknown-name", Error, "no declaration, field or result has this name";
    DoubledName = "doubled-name", Error, "two declarations or fields of the same name";
    Cycle = "cycle", Error, "a value depends on itself";
    MissingFile = "missing-file", Error, "a file that is used cannot be read";
    BadTable = "bad-table", Error, "a table of points that cannot be read as a curve";
    // -- fields
    UnknownField = "unknown-field", Error, "the kind has no such field";
    MissingField = "missing-field", Error, "a field that the kind or the question needs is not given";
    WrongValue = "wrong-value", Error, "a value that the field cannot take";
    OutOfRange = "out-of-range", Error, "a value outside the range in which the law makes sense";
    Implausible = "implausible", Warning, "a value far outside what the trade meets";
    Contradiction = "contradiction", Error, "values given together that cannot all be true";
    AmbiguousPercentTolerance = "ambiguous-percent-tolerance", Error, "a tolerance in per cent on a value in per cent";
    // -- drives, cases and criteria
    BadChain = "bad-chain", Error, "a drive whose parts do not fit one another";
    BadCase = "bad-case", Error, "a case that changes nothing or what cannot be changed";
    BrakingUnknown = "braking-unknown", Error, "the load drives and nothing says how the source brakes";
    NotJudged = "not-judged", Error, "a criterion that could not be judged";
    NeverJudged = "never-judged", Error, "a criterion that no case asks";
    UnusedAllow = "unused-allow", Warning, "an allow that accepts nothing";
    BadAllow = "bad-allow", Error, "an allow of a code that cannot be allowed";
    // -- what a colleague would raise
    HoistWithoutBrake = "hoist-without-brake", Warning, "a load that falls and no brake to hold it";
    SelfLockingTrusted = "self-locking-trusted", Warning, "a load that falls, held by nothing but a part that locks itself";
    PullUpDip = "pull-up-dip", Warning, "the source's dip on the way up leaves the drive hanging or nearly";
    UnstablePoint = "unstable-point", Warning, "an operating point where the curves only touch, or that is left for good when pushed";
    PeakAsContinuous = "peak-as-continuous", Warning, "the drive runs on more than the source can give for long";
    Overspeed = "overspeed", Warning, "the drive can pass the highest speed a part allows";
    Runaway = "runaway", Warning, "nothing bounds the speed of the drive";
    HalfSpeedPeak = "half-speed-peak", Warning, "a motor runs near its peak power, where half of what it takes in warms it";
    NoDerating = "no-derating", Warning, "the site is high or hot, and no table says what that takes from the source";
    LoadShare = "load-share", Warning, "sources on one shaft do not share the load, or one drives another";
    OutsideData = "outside-data", Warning, "a result taken outside the range in which a curve was measured";
    PiledMargins = "piled-margins", Warning, "a criterion whose margin stands upon margins already put in";
    PartLimit = "part-limit", Warning, "a part is loaded above its own limit";
    Slips = "slips", Warning, "a wheel, belt or clutch is asked for more than its friction passes";
}
