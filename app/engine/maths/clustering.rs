//! An order of things that puts like beside like: average linkage, read off as the leaves of its tree.

/// A cluster: its members in order.
type Cluster = Vec<usize>;

/// Order of `n` things with these distances (n x n, symmetric, row per thing): the two nearest clusters, by the mean
/// distance of their members, are joined until one is left, each time turned so that their nearer ends meet. Of equals
/// the first are joined, so that the order is the same on every machine.
///
/// Source: Sokal and Michener (1958), average linkage; from memory.
pub fn leaf_order(n: usize, distances: &[f64]) -> Vec<usize> {
    let mut clusters: Vec<Cluster> = (0..n).map(|at| vec![at]).collect();
    // Mean distances between clusters, kept as they merge: the mean over members, weighted by their numbers.
    let mut means: Vec<Vec<f64>> = (0..n).map(|row| distances[row * n..(row + 1) * n].to_vec()).collect();
    while clusters.len() > 1 {
        let (one, other) = nearest(&means);
        let taken = clusters.remove(other);
        let (size, added) = (clusters[one].len() as f64, taken.len() as f64);
        let gone = means.remove(other);
        for row in &mut means {
            row.remove(other);
        }
        let merged: Vec<f64> = means[one]
            .iter()
            .zip(gone.iter().enumerate().filter(|(at, _)| *at != other).map(|(_, mean)| mean))
            .map(|(here, there)| (size * here + added * there) / (size + added))
            .collect();
        for (at, mean) in merged.iter().enumerate() {
            means[at][one] = *mean;
        }
        means[one] = merged;
        let kept = std::mem::take(&mut clusters[one]);
        clusters[one] = joined(kept, taken, |a, b| distances[a * n + b]);
    }
    clusters.pop().unwrap_or_default()
}

/// The two nearest clusters, the earlier first.
fn nearest(means: &[Vec<f64>]) -> (usize, usize) {
    let mut best = (0, 1, f64::INFINITY);
    for (other, row) in means.iter().enumerate() {
        for (one, mean) in row.iter().enumerate().take(other) {
            if *mean < best.2 {
                best = (one, other, *mean);
            }
        }
    }
    (best.0, best.1)
}

/// Two clusters end to end, each turned so that the ends that meet are the nearest of the four pairs.
fn joined(mut left: Cluster, mut right: Cluster, distance: impl Fn(usize, usize) -> f64) -> Cluster {
    let ends = |cluster: &Cluster| [cluster[0], cluster[cluster.len() - 1]];
    let ([left_first, left_last], [right_first, right_last]) = (ends(&left), ends(&right));
    let ways = [
        (distance(left_last, right_first), false, false),
        (distance(left_last, right_last), false, true),
        (distance(left_first, right_first), true, false),
        (distance(left_first, right_last), true, true),
    ];
    let best = ways.iter().fold(ways[0], |best, way| if way.0 < best.0 { *way } else { best });
    if best.1 {
        left.reverse();
    }
    if best.2 {
        right.reverse();
    }
    left.extend(right);
    left
}
