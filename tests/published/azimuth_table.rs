//! Cells of a printed nineteenth-century time-azimuth table (out of copyright, probably Burdwood's), read from a scan.

use super::file;
use shadowpin::angle::Latitude;
use shadowpin::horizon::triangle;

/// The printed azimuths are to the minute, and a few cells are a minute out of the exact triangle: 1.3' covers them all,
/// and the worst is 1.304'.
#[test]
fn every_cell_within_its_printing() {
    let (mut rows, mut worst) = (0, 0.0_f64);
    for row in csv::Reader::from_reader(file("old_azimuth_table.csv").as_bytes()).records() {
        let row = row.unwrap();
        let number = |i: usize| row[i].parse::<f64>().unwrap();
        let declination = if &row[1] == "same" { number(2) } else { -number(2) };
        // West of the meridian; the table's angle is reckoned from the elevated pole.
        let seen = triangle(Latitude::from_deg(number(0)).unwrap(), declination, number(3)).unwrap();
        rows += 1;
        worst = worst.max((360.0 - seen.azimuth.deg() - number(4)).abs() * 60.0);
    }
    println!("old azimuth table: {rows} cells, worst {worst:.4}'");
    assert!(rows == 127 && worst < 1.31);
}
