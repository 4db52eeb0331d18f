//! Where it balances: every shank against every thigh angle.

use crate::{
    angle::Angle,
    balance::{ANGLE_TOL, Balance, Toward, balance_in},
    case::Case,
    row::{LEAN_MIN, Refusal, Row},
};

/// How a cell of the map stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Ground {
    /// On mid-foot.
    Steady,
    /// In the support, towards one end.
    Drifting(Toward),
    /// Needs a hold: outside the support.
    Hold(Toward),
    /// Refused by a range.
    Refused(Refusal),
}

/// One cell, judged at its middle.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Cell {
    /// How it stands.
    pub ground: Ground,
    /// The lean that balances it, rad; NaN where refused.
    pub lean_rad: f64,
}

/// The map: columns of thigh angle, rows of shank angle, both rising.
#[derive(Clone, Debug, PartialEq)]
pub struct Map {
    /// Thigh angles at the outer edges.
    pub thigh: (Angle, Angle),
    /// Shank angles at the outer edges.
    pub shank: (Angle, Angle),
    /// Cells along the thigh.
    pub columns: usize,
    /// Cells along the shank.
    pub rows: usize,
    /// Column by column.
    cells: Vec<Cell>,
}

/// Cells along the thigh.
pub const COLUMNS: usize = 96;
/// Cells along the shank.
pub const ROWS: usize = 64;

impl Map {
    /// A cell by column and row; `None` outside.
    #[must_use]
    pub fn cell(&self, column: usize, row: usize) -> Option<&Cell> {
        (column < self.columns && row < self.rows).then(|| &self.cells[column * self.rows + row])
    }

    /// Thigh angle at the middle of a column.
    #[must_use]
    pub fn thigh_at(&self, column: usize) -> Angle {
        middle(self.thigh, column, self.columns)
    }

    /// Shank angle at the middle of a row.
    #[must_use]
    pub fn shank_at(&self, row: usize) -> Angle {
        middle(self.shank, row, self.rows)
    }
}

fn middle((from, to): (Angle, Angle), k: usize, n: usize) -> Angle {
    from + (to - from) * ((k as f64 + 0.5) / n as f64)
}

/// The map over thigh and shank angles. By rows of one thigh angle: a cell costs one arcsine.
#[must_use]
pub fn map(c: &Case, thigh: (Angle, Angle), shank: (Angle, Angle)) -> Map {
    let mut m = Map { thigh, shank, columns: COLUMNS, rows: ROWS, cells: Vec::with_capacity(COLUMNS * ROWS) };
    let shanks: Vec<Angle> = (0..ROWS).map(|r| m.shank_at(r)).collect();
    for column in 0..COLUMNS {
        let row = Row::new(c, m.thigh_at(column));
        m.cells.extend(column_cells(&row, &shanks));
    }
    m
}

fn column_cells<'a>(row: &'a Row<'_>, shanks: &'a [Angle]) -> impl Iterator<Item = Cell> + 'a {
    let allowed = row.shanks().0;
    let (_, high) = row.ankle_range();
    let stand = &row.case.stand;
    let plane = stand.sin_out == 0.0 && stand.half_stance_m == row.case.body.hip_half_m;
    let folds = row.lean_high.rad() >= LEAN_MIN.rad() - ANGLE_TOL;
    shanks.iter().map(move |&shank| {
        let within = |a: Angle, b: Angle| shank.rad() >= a.rad() - ANGLE_TOL && shank.rad() <= b.rad() + ANGLE_TOL;
        // what the row allows needs no posture, nor do legs in the sagittal plane; the rest is named in the
        // order of a single balance
        let ground = match allowed {
            Ok(s) if within(s.low, s.high) && folds => Ok(()),
            _ if plane && shank.rad() > high.rad() + ANGLE_TOL => Err(Refusal::Ankle),
            Ok(s) if plane && !within(s.low, s.high) => Err(Refusal::Knee),
            _ => match balance_in(row, shank) {
                Balance::Stands { .. } => Ok(()),
                Balance::Refused(why) => Err(why),
            },
        };
        match ground {
            Ok(()) => Cell { ground: stands(row, shank), lean_rad: row.lean(shank).rad() },
            Err(why) => Cell { ground: Ground::Refused(why), lean_rad: f64::NAN },
        }
    })
}

fn stands(row: &Row<'_>, shank: Angle) -> Ground {
    let s = &row.case.stand.support;
    let (back, front) = row.com_reach(shank);
    let com = s.aim_m.min(front).max(back);
    let side = if com < s.aim_m { Toward::Heels } else { Toward::Toes };
    if com >= s.zone_back_m && com <= s.zone_front_m {
        Ground::Steady
    } else if com >= s.edge_back_m && com <= s.edge_front_m {
        Ground::Drifting(side)
    } else {
        Ground::Hold(side)
    }
}
