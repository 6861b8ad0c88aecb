//! Labels side by side: each as near to its place as its neighbours let it.

/// Centres of labels of the given widths that do not overlap, in the order given, within the
/// bounds where these are wide enough. Wished-for centres must rise.
///
/// Labels that touch form a group, and a group stands where the squares of its members' shifts
/// sum to the least.
pub(super) fn spread(wished: &[f64], widths: &[f64], from: f64, to: f64) -> Vec<f64> {
    struct Group {
        members: usize,
        width: f64,
        /// Sum of the left ends that its members would give it.
        sum: f64,
    }
    let left = |group: &Group| {
        let most = (to - group.width).max(from);
        (group.sum / group.members as f64).clamp(from, most)
    };
    let mut groups: Vec<Group> = Vec::new();
    for (centre, width) in wished.iter().zip(widths) {
        let mut group = Group {
            members: 1,
            width: *width,
            sum: centre - 0.5 * width,
        };
        while let Some(before) = groups.pop() {
            if left(&before) + before.width <= left(&group) {
                groups.push(before);
                break;
            }
            let shift = before.width * group.members as f64;
            group = Group {
                members: before.members + group.members,
                sum: before.sum + group.sum - shift,
                width: before.width + group.width,
            };
        }
        groups.push(group);
    }
    let mut centres = Vec::with_capacity(wished.len());
    let mut width = widths.iter();
    for group in &groups {
        let mut at = left(group);
        for width in width.by_ref().take(group.members) {
            centres.push(at + 0.5 * width);
            at += width;
        }
    }
    centres
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn labels_with_room_stay_where_they_are() {
        let centres = spread(&[10.0, 50.0], &[20.0, 20.0], 0.0, 100.0);
        assert_eq!(centres, [10.0, 50.0]);
    }

    #[test]
    fn a_crowd_stands_around_its_middle() {
        let centres = spread(&[50.0; 3], &[20.0; 3], 0.0, 100.0);
        assert_eq!(centres, [30.0, 50.0, 70.0]);
    }

    #[test]
    fn a_crowd_at_the_end_is_pushed_inwards() {
        let centres = spread(&[20.0, 98.0, 99.0], &[20.0; 3], 0.0, 100.0);
        assert_eq!(centres, [20.0, 70.0, 90.0]);
    }
}
