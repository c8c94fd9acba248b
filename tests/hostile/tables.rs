//! Tables and files that are missing or broken.

use crate::support::{self, lines};

const SPEC: &str = "
source motor: measured_curve {
    curve = csv \"curves/motor.csv\" (n as speed [rpm], Md as torque [N·m])
    braking = none
}
";

#[track_caller]
fn reads(csv: &str, codes: &[&str]) {
    let files = support::files(&[("curves/motor.csv", csv)]);
    let analysis = layshaft_semantics::analyze("spec.shaft", SPEC.into(), &files);
    assert_eq!(support::codes(&analysis), codes, "{csv:?}: {}", lines(&analysis));
}

#[test]
fn a_good_table() {
    reads("n,Md\n0,9.6\n1200,7.1\n2400,0.2\n", &[]);
    reads("\u{feff}n,Md\r\n0,9.6\r\n1200,7.1\r\n", &[]);
    reads("n;Md\n0;9.6\n1200;7.1\n", &[]);
    reads("Md,note,n\n9.6,cold,0\n7.1,warm,1200\n", &[]);
}

#[test]
fn a_file_that_is_not_there() {
    let analysis = support::analyze(SPEC);
    assert_eq!(support::codes(&analysis), ["missing-file"], "{}", lines(&analysis));
}

#[test]
fn files_outside() {
    for path in
        ["../motor.csv", "/etc/motor.csv", "curves/../../motor.csv", "C:/motor.csv", "curves\\\\motor.csv"]
    {
        let analysis = support::analyze(&SPEC.replace("curves/motor.csv", path));
        assert_eq!(support::codes(&analysis), ["missing-file"], "{path}: {}", lines(&analysis));
    }
    let empty = support::analyze(&SPEC.replace("curves/motor.csv", ""));
    assert_eq!(support::codes(&empty), ["syntax"], "{}", lines(&empty));
}

#[test]
fn holes_texts_and_short_rows() {
    for csv in [
        "n,Md\n0,9.6\n1200,\n2400,0.2\n",
        "n,Md\n0,9.6\n1200,warm\n2400,0.2\n",
        "n,Md\n0,9.6\n1200\n2400,0.2\n",
        "n,Md\n0,9.6\n1200,7.1,3\n2400,0.2\n",
        "n,Md\n0,9.6\n1200,NaN\n2400,0.2\n",
        "n,Md\n0,9.6\n1200,inf\n2400,0.2\n",
        "n,Md\n0,9.6\n1200,1e999\n2400,0.2\n",
        "n,Md\n0,\"9.6\n1200,7.1\n",
        "n,Md\n0,9.6\n1200,7,1\n",
    ] {
        reads(csv, &["bad-table"]);
    }
}

#[test]
fn speeds_twice_and_out_of_order() {
    reads("n,Md\n0,9.6\n1200,7.1\n1200,6.8\n2400,0.2\n", &["bad-table"]);
    reads("n,Md\n0,9.6\n2400,0.2\n1200,7.1\n", &["bad-table"]);
}

#[test]
fn no_rows_and_no_columns() {
    reads("", &["bad-table"]);
    reads("n,Md\n", &["bad-table"]);
    reads("n,Md\n0,9.6\n", &["bad-table"]);
    reads("speed,torque\n0,9.6\n1200,7.1\n", &["bad-table"]);
    reads("n,Md,Md\n0,9.6,9\n1200,7.1,7\n", &["bad-table"]);
}

#[test]
fn more_rows_than_anybody_measures() {
    let mut csv = String::from("n,Md\n");
    for n in 0..1_000_010 {
        csv.push_str(&format!("{n},1\n"));
    }
    let files = support::files(&[("curves/motor.csv", &csv)]);
    let analysis = layshaft_semantics::analyze("spec.shaft", SPEC.into(), &files);
    assert_eq!(support::codes(&analysis), ["too-large"], "{}", lines(&analysis));
}
