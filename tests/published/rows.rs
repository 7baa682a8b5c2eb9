//! Creep and shrinkage of EN 1992-1-1 row by row: `tests/python/creep_shrinkage.py` computes the rows with structuralcodes
//! 0.7.2 (fib), and CI computes them again.

use tautplan::job::Cement;

use crate::en1992::{eps_cs, phi};
use crate::near;

const ROWS: &str = include_str!("../data/creep-shrinkage.csv");

/// Strength, humidity, size, age at its start, cement, age.
type Work = fn(f64, f64, f64, f64, Cement, f64) -> f64;

#[test]
fn every_row_agrees() {
    let mut counts = [0, 0];
    for row in csv::Reader::from_reader(ROWS.as_bytes()).records() {
        let row = row.expect("the rows are of one length");
        let number = |column: usize| row[column].parse::<f64>().expect("a number");
        let cement = Cement::of(&row[5]).expect("S, N or R");
        let (work, count): (Work, _) = match &row[0] {
            "creep" => (phi, 0),
            "shrinkage" => (eps_cs, 1),
            other => panic!("no row is called {other}"),
        };
        let [f_ck, rh, h_0, from, t, value] = [1, 2, 3, 4, 6, 7].map(number);
        near(work(f_ck, rh, h_0, from, cement, t), value, 1e-10);
        counts[count] += 1;
    }
    assert_eq!(counts, [30, 30]);
}
