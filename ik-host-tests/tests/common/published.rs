//! The tables in `check-values/`, in our frame and signs.

use super::checks::published_pose::Published;
use ik_host_tests::reference::{Bend, Leg, Pose, Shape};

/// The rows of a table, each column by its name.
pub struct Table {
    headers: csv::StringRecord,
    records: Vec<csv::StringRecord>,
}

impl Table {
    pub fn read(file: &str) -> Self {
        let path = format!("{}/check-values/{file}", env!("CARGO_MANIFEST_DIR"));
        let mut reader =
            csv::ReaderBuilder::new().comment(Some(b'#')).from_path(&path).expect("a readable table");
        let headers = reader.headers().expect("a header").clone();
        let records = reader.records().collect::<Result<_, _>>().expect("whole rows");
        Self { headers, records }
    }

    pub fn rows(&self) -> impl Iterator<Item = Row<'_>> {
        self.records.iter().map(|record| Row { headers: &self.headers, record })
    }
}

pub struct Row<'a> {
    headers: &'a csv::StringRecord,
    record: &'a csv::StringRecord,
}

impl Row<'_> {
    pub fn text(&self, column: &str) -> &str {
        let at = self.headers.iter().position(|h| h == column).expect("a column of that name");
        self.record.get(at).expect("a value in that column")
    }

    pub fn number(&self, column: &str) -> f64 {
        self.text(column).parse().unwrap_or_else(|_| panic!("{column}: {} is no number", self.text(column)))
    }
}

/// The legs and poses of `leg-poses.csv`: found by mpmath's root finder on products of 4×4 homogeneous transforms.
///
/// Its turns are right-handed about y, so that thigh and femur change sign; its yaw-hip frame has x outboard and
/// y backward seen from our left leg; a right leg is mirrored.
pub fn leg_poses() -> Vec<(Leg, Published)> {
    let table = Table::read("leg-poses.csv");
    table
        .rows()
        .map(|row| {
            let [x, y, z] = ["x_mm", "y_mm", "z_mm"].map(|c| row.number(c));
            let [q1, q2, q3] = ["q1_rad", "q2_rad", "q3_rad"].map(|c| row.number(c));
            let first_bend = row.number("knee_sign") > 0.0;
            let (shape, bend, foot, hip) = match row.text("leg") {
                "rpp" => {
                    let side = row.number("side");
                    let bend = if first_bend { Bend::Forward } else { Bend::Backward };
                    (Shape::Roll, bend, [x, side * y, z], side * q1)
                }
                "ypp" => {
                    let bend = if first_bend { Bend::Up } else { Bend::Down };
                    (Shape::Yaw, bend, [-y, x, z], -q1)
                }
                other => panic!("{other} is no leg"),
            };
            let [offset, thigh, shank] = ["l1_mm", "l2_mm", "l3_mm"].map(|c| row.number(c));
            let name = format!("{} {bend:?}", row.text("case"));
            let pose = Pose { hip, thigh: -q2, knee: q3.abs() };
            (Leg { shape, offset, thigh, shank, bend }, Published { name, foot, pose, given_to: 0.0 })
        })
        .collect()
}
