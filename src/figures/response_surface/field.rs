//! A field of values on a grid, linear between its nodes: where it passes a limit, and what stands between two limits.

/// Values at nodes, each warming's over all precipitation changes.
pub(super) struct Field<'a> {
    pub warmings: &'a [f64],
    pub changes: &'a [f64],
    /// All changes of the first warming before those of the second.
    pub values: &'a [f64],
}

/// A part of a column between two limits.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Part {
    /// How many limits its values reach.
    pub class: usize,
    pub from: f64,
    pub to: f64,
}

impl Field<'_> {
    /// The values over all changes at a warming within the grid, linear between its neighbours.
    pub fn column(&self, warming: f64) -> Vec<f64> {
        let last = self.warmings.len() - 2;
        let left = self.warmings.partition_point(|of| *of <= warming).saturating_sub(1).min(last);
        let share = (warming - self.warmings[left]) / (self.warmings[left + 1] - self.warmings[left]);
        let count = self.changes.len();
        let of = |column: usize| &self.values[column * count..(column + 1) * count];
        of(left).iter().zip(of(left + 1)).map(|(left, right)| left + share * (right - left)).collect()
    }

    /// Where a column first passes a limit upwards.
    pub fn passes(&self, column: &[f64], limit: f64) -> Option<f64> {
        let ends = column.windows(2).zip(self.changes.windows(2));
        ends.filter(|(values, _)| values[0] < limit && limit <= values[1])
            .map(|(values, changes)| {
                changes[0] + (changes[1] - changes[0]) * (limit - values[0]) / (values[1] - values[0])
            })
            .next()
    }

    /// A column in parts, from the lowest change, by which of the ascending limits its values reach.
    pub fn parts(&self, column: &[f64], limits: &[f64]) -> Vec<Part> {
        let class = |value: f64| limits.partition_point(|limit| *limit <= value);
        let mut parts: Vec<Part> = Vec::new();
        let mut add = |part: Part| match parts.last_mut() {
            Some(last) if last.class == part.class => last.to = part.to,
            _ => parts.push(part),
        };
        for (values, changes) in column.windows(2).zip(self.changes.windows(2)) {
            let (low, high) = (values[0].min(values[1]), values[0].max(values[1]));
            let mut cuts: Vec<f64> = limits
                .iter()
                .filter(|limit| low < **limit && **limit < high)
                .map(|limit| (limit - values[0]) / (values[1] - values[0]))
                .collect();
            cuts.sort_by(f64::total_cmp);
            let ends = [&[0.0], cuts.as_slice(), &[1.0]].concat();
            for pair in ends.windows(2) {
                let middle = f64::midpoint(pair[0], pair[1]);
                let at = |share: f64| changes[0] + share * (changes[1] - changes[0]);
                let value = values[0] + middle * (values[1] - values[0]);
                add(Part { class: class(value), from: at(pair[0]), to: at(pair[1]) });
            }
        }
        parts
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: a plane of 10 a warming and 1 a percent.
    #[test]
    fn a_plane_is_cut_where_it_should_be() {
        let values = [-20.0, 0.0, 20.0, -10.0, 10.0, 30.0];
        let field = Field { warmings: &[0.0, 1.0], changes: &[-20.0, 0.0, 20.0], values: &values };
        let column = field.column(0.5);
        assert_eq!(column, [-15.0, 5.0, 25.0]);
        assert_eq!(field.passes(&column, 0.0), Some(-5.0));
        assert_eq!(field.passes(&column, 40.0), None);
        let parts = field.parts(&column, &[0.0, 10.0]);
        let expected = [(0, -20.0, -5.0), (1, -5.0, 5.0), (2, 5.0, 20.0)];
        assert_eq!(parts, expected.map(|(class, from, to)| Part { class, from, to }));
    }
}
