//! Where each row of a log stands among the rows of others, when its own time may be a slip.

/// For each row a time that it goes by: its own where the rows from first to last go on with it; that of the row before where its own
/// would send it back or far ahead, or where it has none. A log that is in no such order, newest first for instance, goes by its times.
pub fn settled(times: &[Option<i64>]) -> Vec<i64> {
    let timed: Vec<(usize, i64)> = times.iter().enumerate().filter_map(|(at, time)| Some((at, (*time)?))).collect();
    let mut kept = longest_run(&timed);
    if kept.len() * 2 < timed.len() {
        kept = timed;
    }
    let mut kept = kept.into_iter().peekable();
    // Rows above the first that counts stand with it.
    let mut now = kept.peek().map_or(i64::MIN, |(_, time)| *time);
    (0..times.len())
        .map(|at| {
            if let Some((_, time)) = kept.next_if(|(row, _)| *row == at) {
                now = time;
            }
            now
        })
        .collect()
}

/// A longest run of rows that never goes back in time.
fn longest_run(timed: &[(usize, i64)]) -> Vec<(usize, i64)> {
    // The last place of the best run of each length, and which came before it.
    let mut ends: Vec<usize> = Vec::new();
    let mut before: Vec<Option<usize>> = Vec::with_capacity(timed.len());
    for (at, (_, time)) in timed.iter().enumerate() {
        let length = ends.partition_point(|&end| timed.get(end).is_some_and(|t| t.1 <= *time));
        before.push(length.checked_sub(1).and_then(|l| ends.get(l).copied()));
        match ends.get_mut(length) {
            Some(end) => *end = at,
            None => ends.push(at),
        }
    }
    let mut run = Vec::with_capacity(ends.len());
    let mut at = ends.last().copied();
    while let Some(place) = at {
        run.extend(timed.get(place));
        at = before.get(place).copied().flatten();
    }
    run.reverse();
    run
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_slip_moves_no_other_row() {
        let times = [None, Some(10), Some(20), Some(900), Some(30), None, Some(5), Some(40)];
        assert_eq!(settled(&times), [10, 10, 20, 20, 30, 30, 30, 40]);
        assert_eq!(settled(&[Some(4), Some(3), Some(2), Some(1)]), [4, 3, 2, 1]);
        assert_eq!(settled(&[None, None]), [i64::MIN; 2]);
        assert!(settled(&[]).is_empty());
    }
}
