//! Values on a grid of points as regions above a level and lines at it.
//!
//! A cell between four points is cut into four triangles about its middle, whose value is their mean; on each
//! triangle the value is linear. A cell with a step at one of its sides (the strength jumps) is not interpolated: each
//! of its points fills a quarter, and lines run at most between the quarters. A cell with a gap at one of its sides,
//! or with a point that has no value, stays blank; a point between blank cells alone stands for itself.

/// A point in units of the grid.
pub(super) type Place = [f64; 2];

/// Values on a grid.
#[derive(Debug, Clone)]
pub(super) struct Field {
    columns: usize,
    rows: usize,
    /// Row by row.
    values: Vec<Option<f64>>,
    /// By cell, row by row: the gravest of its sides.
    seams: Vec<Seam>,
}

/// What lies between two neighbouring points.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Seam {
    /// The value runs on.
    Joined,
    /// The value steps somewhere between.
    Step,
    /// Nothing is known of what lies between.
    Gap,
}

/// A triangle with the values at its corners.
type Triangle = [(Place, f64); 3];

impl Field {
    /// `value(column, row)`, and what lies between a point and its neighbour in column or row.
    pub(super) fn new(
        columns: usize,
        rows: usize,
        value: impl Fn(usize, usize) -> Option<f64>,
        seam: impl Fn([usize; 2], [usize; 2]) -> Seam,
    ) -> Self {
        let values = (0..rows).flat_map(|row| (0..columns).map(move |column| (column, row)));
        let values: Vec<Option<f64>> =
            values.map(|(column, row)| value(column, row).filter(|value| value.is_finite())).collect();
        let mut cells = Vec::new();
        for row in 1..rows {
            for column in 1..columns {
                let [a, b] = [[column - 1, row - 1], [column, row - 1]];
                let [c, d] = [[column, row], [column - 1, row]];
                cells.push(seam(a, b).max(seam(b, c)).max(seam(d, c)).max(seam(a, d)));
            }
        }
        Self { columns, rows, values, seams: cells }
    }

    /// Smallest and largest value.
    pub(super) fn extent(&self) -> Option<[f64; 2]> {
        let mut extent: Option<[f64; 2]> = None;
        for value in self.values.iter().flatten() {
            let [least, most] = extent.unwrap_or([*value, *value]);
            extent = Some([least.min(*value), most.max(*value)]);
        }
        extent
    }

    fn value(&self, column: usize, row: usize) -> Option<f64> {
        self.values[row * self.columns + column]
    }

    fn seam(&self, column: usize, row: usize) -> Seam {
        self.seams[row * (self.columns - 1) + column]
    }

    /// Whether a cell is filled.
    fn is_filled(&self, column: usize, row: usize) -> bool {
        let corners = corners(column, row);
        self.seam(column, row) != Seam::Gap
            && corners.iter().all(|(column, row)| self.value(*column, *row).is_some())
    }

    /// Points with a value that no filled cell touches.
    pub(super) fn alone(&self) -> Vec<(Place, f64)> {
        let mut touched = vec![false; self.values.len()];
        for (column, row) in self.cells().filter(|(column, row)| self.is_filled(*column, *row)) {
            for (column, row) in corners(column, row) {
                touched[row * self.columns + column] = true;
            }
        }
        let points = (0..self.rows).flat_map(|row| (0..self.columns).map(move |column| (column, row)));
        points
            .filter(|(column, row)| !touched[row * self.columns + column])
            .filter_map(|(column, row)| Some((place(column, row), self.value(column, row)?)))
            .collect()
    }

    /// The corners of a cell, anticlockwise from its least; `None` when it is not interpolated.
    fn cell(&self, column: usize, row: usize) -> Option<[(Place, f64); 4]> {
        if self.seam(column, row) != Seam::Joined {
            return None;
        }
        let corner = |column: usize, row: usize| Some((place(column, row), self.value(column, row)?));
        Some([
            corner(column, row)?,
            corner(column + 1, row)?,
            corner(column + 1, row + 1)?,
            corner(column, row + 1)?,
        ])
    }

    fn cells(&self) -> impl Iterator<Item = (usize, usize)> + '_ {
        (1..self.rows).flat_map(|row| (1..self.columns).map(move |column| (column - 1, row - 1)))
    }

    /// Polygons that cover where the value is at least `level`; whole cells of one row are joined.
    pub(super) fn above(&self, level: f64) -> Vec<Vec<Place>> {
        let mut polygons = Vec::new();
        // The row of a run of whole cells, its first column and the column behind it.
        let mut whole: Option<[usize; 3]> = None;
        let joined =
            |[row, first, behind]: [usize; 3]| rectangle([place(first, row), place(behind, row + 1)]);
        for (column, row) in self.cells() {
            let corners = self.cell(column, row);
            let is_whole = corners.is_some_and(|corners| corners.iter().all(|(_, value)| *value >= level));
            match (&mut whole, is_whole) {
                (Some([of, _, behind]), true) if *of == row && *behind == column => *behind = column + 1,
                (run, true) => polygons.extend(run.replace([row, column, column + 1]).map(joined)),
                (run, false) => polygons.extend(run.take().map(joined)),
            }
            if is_whole {
                continue;
            }
            match corners {
                Some(corners) => {
                    let cut = triangles(&corners).map(|triangle| part_above(&triangle, level));
                    polygons.extend(cut.into_iter().filter(|polygon| polygon.len() > 2));
                }
                None => polygons.extend(self.quarters(column, row, level)),
            }
        }
        polygons.extend(whole.map(joined));
        polygons
    }

    /// The quarters of a cell with a step.
    fn quarters(&self, column: usize, row: usize, level: f64) -> Vec<Vec<Place>> {
        if !self.is_filled(column, row) {
            return Vec::new();
        }
        let middle = place(column, row).map(|coordinate| coordinate + 0.5);
        let above =
            |(column, row): &(usize, usize)| self.value(*column, *row).is_some_and(|value| value >= level);
        let quarter = |(column, row): (usize, usize)| rectangle([place(column, row), middle]);
        corners(column, row).into_iter().filter(above).map(quarter).collect()
    }

    /// Borders between quarters on either side of a level.
    pub(super) fn steps(&self, level: f64) -> Vec<[Place; 2]> {
        let mut borders = Vec::new();
        for (column, row) in self.cells().filter(|(column, row)| self.is_filled(*column, *row)) {
            if self.seam(column, row) != Seam::Step {
                continue;
            }
            let middle = place(column, row).map(|coordinate| coordinate + 0.5);
            let corners = corners(column, row);
            for (index, (column, row)) in corners.iter().enumerate() {
                let (next_column, next_row) = corners[(index + 1) % 4];
                let above = |column, row| self.value(column, row).is_some_and(|value| value >= level);
                if above(*column, *row) != above(next_column, next_row) {
                    let (one, next) = (place(*column, *row), place(next_column, next_row));
                    borders.push([[0.5 * (one[0] + next[0]), 0.5 * (one[1] + next[1])], middle]);
                }
            }
        }
        borders
    }

    /// Pieces of the line at which the value is `level`.
    pub(super) fn line(&self, level: f64) -> Vec<[Place; 2]> {
        let whole = self.cells().filter_map(|(column, row)| self.cell(column, row));
        whole
            .flat_map(|corners| triangles(&corners))
            .filter_map(|triangle| crossing(&triangle, level))
            .collect()
    }
}

/// The points of a cell, anticlockwise from its least.
fn corners(column: usize, row: usize) -> [(usize, usize); 4] {
    [(column, row), (column + 1, row), (column + 1, row + 1), (column, row + 1)]
}

fn place(column: usize, row: usize) -> Place {
    [super::super::count::as_float(column), super::super::count::as_float(row)]
}

fn rectangle([[x, y], [to_x, to_y]]: [Place; 2]) -> Vec<Place> {
    vec![[x, y], [to_x, y], [to_x, to_y], [x, to_y]]
}

fn triangles(corners: &[(Place, f64); 4]) -> [Triangle; 4] {
    let mean = |of: fn(&(Place, f64)) -> f64| 0.25 * corners.iter().map(of).sum::<f64>();
    let middle = ([mean(|corner| corner.0[0]), mean(|corner| corner.0[1])], mean(|corner| corner.1));
    [0, 1, 2, 3].map(|index| [corners[index], corners[(index + 1) % 4], middle])
}

/// Where the value is `level` between two corners on either side of it.
fn between((from, low): (Place, f64), (to, high): (Place, f64), level: f64) -> Place {
    let share = (level - low) / (high - low);
    [from[0] + share * (to[0] - from[0]), from[1] + share * (to[1] - from[1])]
}

/// The part of a triangle at or above a level. Source: Sutherland and Hodgman (1974), clipping by a half plane.
fn part_above(triangle: &Triangle, level: f64) -> Vec<Place> {
    let mut polygon = Vec::new();
    for index in 0..3 {
        let (here, next) = (triangle[index], triangle[(index + 1) % 3]);
        if here.1 >= level {
            polygon.push(here.0);
        }
        if (here.1 >= level) != (next.1 >= level) {
            polygon.push(between(here, next, level));
        }
    }
    polygon
}

fn crossing(triangle: &Triangle, level: f64) -> Option<[Place; 2]> {
    let mut ends = (0..3).filter_map(|index| {
        let (here, next) = (triangle[index], triangle[(index + 1) % 3]);
        ((here.1 >= level) != (next.1 >= level)).then(|| between(here, next, level))
    });
    Some([ends.next()?, ends.next()?])
}

#[cfg(test)]
#[allow(clippy::float_cmp)] // places and empty sums are exact
mod tests {
    use super::*;

    fn area(polygons: &[Vec<Place>]) -> f64 {
        let one = |polygon: &Vec<Place>| {
            let next = polygon.iter().cycle().skip(1);
            0.5 * polygon.iter().zip(next).map(|(a, b)| a[0] * b[1] - b[0] * a[1]).sum::<f64>().abs()
        };
        polygons.iter().map(one).sum()
    }

    fn plane(columns: usize, rows: usize) -> Field {
        let value = |column: usize, row: usize| Some(place(column, row)[0] + 2.0 * place(column, row)[1]);
        Field::new(columns, rows, value, |_, _| Seam::Joined)
    }

    #[test]
    fn regions_of_a_plane_have_its_exact_area() {
        // Independent: x + 2 y >= 3.5 on [0, 4] x [0, 3]; the part below is a triangle of 3.5 by 1.75.
        let field = plane(5, 4);
        assert!((area(&field.above(3.5)) - (12.0 - 0.5 * 3.5 * 1.75)).abs() < 1e-12);
        assert!((area(&field.above(-1.0)) - 12.0).abs() < 1e-12);
        assert!(field.above(-1.0).len() == 3, "whole rows are joined");
        assert!(field.above(11.0).is_empty());
        assert_eq!(field.extent(), Some([0.0, 10.0]));
    }

    #[test]
    fn lines_of_a_plane_are_straight_and_whole() {
        let pieces = plane(5, 4).line(3.5);
        let length: f64 = pieces.iter().map(|[a, b]| (a[0] - b[0]).hypot(a[1] - b[1])).sum();
        assert!((length - 3.5_f64.hypot(1.75)).abs() < 1e-12, "{length}");
        assert!(pieces.iter().flatten().all(|[x, y]| (x + 2.0 * y - 3.5).abs() < 1e-12));
    }

    #[test]
    fn a_jump_is_a_step_half_way_between_the_points() {
        let value = |column: usize, _: usize| Some(if column < 2 { 1.0 } else { 5.0 });
        let torn =
            |[a, _]: [usize; 2], [b, _]: [usize; 2]| if a == 1 && b == 2 { Seam::Step } else { Seam::Joined };
        let field = Field::new(4, 3, value, torn);
        for level in [1.5, 3.0, 4.9] {
            assert!((area(&field.above(level)) - 3.0).abs() < 1e-12);
            assert!(field.line(level).is_empty());
        }
        // The border of the step runs half way over both rows, and only at levels between the two values.
        let length = |level: f64| -> f64 {
            field.steps(level).iter().map(|[a, b]| (a[0] - b[0]).hypot(a[1] - b[1])).sum()
        };
        assert!((length(3.0) - 2.0).abs() < 1e-12 && length(0.5) == 0.0 && length(6.0) == 0.0);
        // The same without the jump: the edge moves with the level.
        let smooth = Field::new(4, 3, value, |_, _| Seam::Joined);
        assert!((area(&smooth.above(2.0)) - 3.5).abs() < 1e-12);
    }

    #[test]
    fn a_point_beside_gaps_stands_for_itself() {
        let gap =
            |[a, _]: [usize; 2], [b, _]: [usize; 2]| if a == 0 && b == 1 { Seam::Gap } else { Seam::Joined };
        let field = Field::new(4, 3, |column, _| Some(if column == 0 { 9.0 } else { 1.0 }), gap);
        assert!((area(&field.above(0.0)) - 4.0).abs() < 1e-12);
        let alone: Vec<Place> = field.alone().into_iter().map(|(place, _)| place).collect();
        assert_eq!(alone, [[0.0, 0.0], [0.0, 1.0], [0.0, 2.0]]);
    }

    #[test]
    fn cells_about_a_point_without_value_stay_blank() {
        let field =
            Field::new(4, 3, |column, row| (column != 1 || row != 1).then_some(1.0), |_, _| Seam::Joined);
        assert!((area(&field.above(0.0)) - 2.0).abs() < 1e-12);
    }
}
