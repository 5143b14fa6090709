//! Ring facts of a graph: the smallest ring through a bond or a bend, and the six-rings.
//!
//! A *bend* is a pair of bonds that share an atom. Everything here is asked of an adjacency
//! list alone, so that molecules and skeletons share it.

use std::collections::VecDeque;

/// Neighbour lists of a graph, by atom.
pub type Adjacency = Vec<Vec<usize>>;

/// Size of the smallest ring that holds the bond `a`–`b`; none if the bond is in no ring.
pub fn smallest_ring_through_bond(adjacency: &Adjacency, a: usize, b: usize) -> Option<usize> {
    distance(adjacency, a, b, |x, y| (x, y) != (a, b) && (x, y) != (b, a), None).map(|d| d + 1)
}

/// Size of the smallest ring that holds both `a`–`middle` and `middle`–`b`.
pub fn smallest_ring_through_bend(adjacency: &Adjacency, a: usize, middle: usize, b: usize) -> Option<usize> {
    distance(adjacency, a, b, |_, _| true, Some(middle)).map(|d| d + 2)
}

/// Breadth-first distance over the allowed bonds, never through `closed`.
fn distance(
    adjacency: &Adjacency,
    from: usize,
    to: usize,
    allowed: impl Fn(usize, usize) -> bool,
    closed: Option<usize>,
) -> Option<usize> {
    let mut steps = vec![usize::MAX; adjacency.len()];
    steps[from] = 0;
    let mut queue = VecDeque::from([from]);
    while let Some(x) = queue.pop_front() {
        if x == to {
            return Some(steps[x]);
        }
        for &y in &adjacency[x] {
            if steps[y] == usize::MAX && Some(y) != closed && allowed(x, y) {
                steps[y] = steps[x] + 1;
                queue.push_back(y);
            }
        }
    }
    None
}

/// Every six-ring as its atoms in ring order, each ring once.
pub fn six_rings(adjacency: &Adjacency) -> Vec<[usize; 6]> {
    let mut rings = Vec::new();
    for start in 0..adjacency.len() {
        grow(adjacency, &mut vec![start], &mut rings);
    }
    rings
}

/// Extends a path whose first atom is its smallest and whose second is below its last.
fn grow(adjacency: &Adjacency, path: &mut Vec<usize>, rings: &mut Vec<[usize; 6]>) {
    let (first, last) = (path[0], path[path.len() - 1]);
    if path.len() == 6 {
        if path[1] < last && adjacency[last].contains(&first) {
            rings.push([path[0], path[1], path[2], path[3], path[4], path[5]]);
        }
        return;
    }
    for &next in &adjacency[last] {
        if next > first && !path.contains(&next) {
            path.push(next);
            grow(adjacency, path, rings);
            path.pop();
        }
    }
}

/// Sizes of the rings of a smallest set that makes all others, ascending.
///
/// # Source
/// J. D. Horton, SIAM J. Comput. 16, 358 (1987): the shortest rings through each atom and bond,
/// kept while they are independent.
pub fn smallest_ring_sizes(adjacency: &Adjacency) -> Vec<usize> {
    let mut bonds: Vec<(usize, usize)> =
        (0..adjacency.len()).flat_map(|a| adjacency[a].iter().map(move |&b| (a, b))).filter(|(a, b)| a < b).collect();
    // Neighbours come in no fixed order, and bonds are looked up by halving.
    bonds.sort_unstable();
    let mut rings: Vec<Vec<usize>> = Vec::new();
    for root in 0..adjacency.len() {
        let parents = breadth_first_tree(adjacency, root);
        for &(a, b) in &bonds {
            rings.extend(ring_of(&parents, &bonds, root, a, b));
        }
    }
    rings.sort_by_key(|ring| (ring.len(), ring.clone()));
    let mut basis: Vec<Vec<bool>> = Vec::new();
    let mut sizes = Vec::new();
    for ring in rings {
        let mut row = vec![false; bonds.len()];
        for &bond in &ring {
            row[bond] = true;
        }
        if add_if_independent(&mut basis, row) {
            sizes.push(ring.len());
        }
    }
    sizes
}

fn breadth_first_tree(adjacency: &Adjacency, root: usize) -> Vec<Option<usize>> {
    let mut parents = vec![None; adjacency.len()];
    let mut is_seen = vec![false; adjacency.len()];
    is_seen[root] = true;
    let mut queue = VecDeque::from([root]);
    while let Some(x) = queue.pop_front() {
        for &y in &adjacency[x] {
            if !std::mem::replace(&mut is_seen[y], true) {
                parents[y] = Some(x);
                queue.push_back(y);
            }
        }
    }
    parents
}

/// The ring of a bond and the tree paths from its ends to the root, if they meet only there.
fn ring_of(parents: &[Option<usize>], bonds: &[(usize, usize)], root: usize, a: usize, b: usize) -> Option<Vec<usize>> {
    let path = |end: usize| std::iter::successors(Some(end), |&x| parents[x]).collect::<Vec<_>>();
    let (of_a, of_b) = (path(a), path(b));
    let apart = of_a.iter().filter(|x| **x != root).all(|x| !of_b.contains(x));
    if of_a.last() != Some(&root) || of_b.last() != Some(&root) || !apart || of_a.contains(&b) || of_b.contains(&a) {
        return None;
    }
    let index = |x: usize, y: usize| bonds.binary_search(&(x.min(y), x.max(y))).ok();
    let mut ring: Vec<usize> =
        [&of_a, &of_b].iter().flat_map(|p| p.windows(2)).filter_map(|w| index(w[0], w[1])).collect();
    ring.extend(index(a, b));
    ring.sort_unstable();
    Some(ring)
}

/// Adds a row to a basis over GF(2) in echelon form; false if it was in the span.
fn add_if_independent(basis: &mut Vec<Vec<bool>>, mut row: Vec<bool>) -> bool {
    for known in basis.iter() {
        let lead = known.iter().position(|&x| x);
        if lead.is_some_and(|lead| row[lead]) {
            row.iter_mut().zip(known).for_each(|(x, y)| *x ^= y);
        }
    }
    let is_new = row.contains(&true);
    if is_new {
        basis.push(row);
    }
    is_new
}

/// Whether each bond `a`–`b` may not become double by Bredt's rule, asked for the end `a`.
///
/// True when some bridgehead partner `c` of `a` is joined to it by three separate bridges of
/// at least one atom each, one of them by way of `b`, and every ring of two of these bridges
/// has fewer than `smallest_allowed` atoms.
///
/// # Source
/// J. Bredt, Liebigs Ann. Chem. 437, 1 (1924); the ring-size form is common practice.
pub fn is_strained_bridgehead(adjacency: &Adjacency, a: usize, b: usize, smallest_allowed: usize) -> bool {
    if adjacency[a].len() < 3 {
        return false;
    }
    (0..adjacency.len()).any(|c| {
        if c == a || c == b && adjacency[a].contains(&c) || adjacency[c].len() < 3 {
            return false;
        }
        let bridges = bridges_between(adjacency, a, c, smallest_allowed);
        has_small_triple(&bridges, b, smallest_allowed)
    })
}

/// Interiors of the simple paths from `a` to `c` that can be part of a small ring.
fn bridges_between(adjacency: &Adjacency, a: usize, c: usize, smallest_allowed: usize) -> Vec<Vec<usize>> {
    let mut found = Vec::new();
    let mut stack = vec![vec![a]];
    while let Some(path) = stack.pop() {
        let last = path[path.len() - 1];
        for &next in &adjacency[last] {
            if next == c {
                if path.len() > 1 {
                    found.push(path[1..].to_vec());
                }
            } else if !path.contains(&next) && path.len() + 3 < smallest_allowed {
                let mut longer = path.clone();
                longer.push(next);
                stack.push(longer);
            }
        }
    }
    found
}

fn has_small_triple(bridges: &[Vec<usize>], by_way_of: usize, smallest_allowed: usize) -> bool {
    let apart = |x: &[usize], y: &[usize]| x.iter().all(|atom| !y.contains(atom));
    let small = |x: &[usize], y: &[usize]| x.len() + y.len() + 2 < smallest_allowed;
    let fits = |x: &[usize], y: &[usize]| apart(x, y) && small(x, y);
    bridges.iter().filter(|first| first[0] == by_way_of).any(|first| {
        bridges
            .iter()
            .enumerate()
            .filter(|(_, second)| fits(first, second))
            .any(|(i, second)| bridges[i + 1..].iter().any(|third| fits(first, third) && fits(second, third)))
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn graph(n: usize, bonds: &[(usize, usize)]) -> Adjacency {
        let mut adjacency = vec![Vec::new(); n];
        for &(a, b) in bonds {
            adjacency[a].push(b);
            adjacency[b].push(a);
        }
        adjacency
    }

    #[test]
    fn norbornane_bridgeheads_take_no_double_bond() {
        let norbornane = graph(7, &[(0, 1), (1, 2), (2, 3), (3, 4), (4, 5), (5, 0), (0, 6), (6, 3)]);
        assert!(is_strained_bridgehead(&norbornane, 0, 1, 8));
        assert!(is_strained_bridgehead(&norbornane, 0, 6, 8));
        assert!(!is_strained_bridgehead(&norbornane, 1, 2, 8));
        assert_eq!(smallest_ring_sizes(&norbornane), [5, 5]);
    }

    #[test]
    fn ring_sizes_do_not_depend_on_the_order_of_neighbours() {
        for n in 3..10 {
            let mut ring: Vec<(usize, usize)> = (0..n).map(|a| (a, (a + 1) % n)).collect();
            ring.push((0, n));
            let mut adjacency = graph(n + 1, &ring);
            assert_eq!(smallest_ring_sizes(&adjacency), [n]);
            for around in &mut adjacency {
                around.sort_unstable();
            }
            assert_eq!(smallest_ring_sizes(&adjacency), [n]);
            for around in &mut adjacency {
                around.reverse();
            }
            assert_eq!(smallest_ring_sizes(&adjacency), [n]);
        }
    }

    #[test]
    fn bicyclo_3_3_1_nonane_may_have_one() {
        let bonds = [(0, 1), (1, 2), (2, 3), (3, 4), (4, 5), (5, 6), (6, 7), (7, 0), (0, 8), (8, 4)];
        let nonane = graph(9, &bonds);
        assert!(!is_strained_bridgehead(&nonane, 0, 1, 8));
    }

    #[test]
    fn fused_rings_are_not_bridged() {
        let decalin =
            graph(10, &[(0, 1), (1, 2), (2, 3), (3, 4), (4, 5), (5, 0), (4, 6), (6, 7), (7, 8), (8, 9), (9, 5)]);
        assert!(!is_strained_bridgehead(&decalin, 4, 5, 8));
        assert!(!is_strained_bridgehead(&decalin, 4, 3, 8));
        assert_eq!(six_rings(&decalin).len(), 2);
        assert_eq!(smallest_ring_sizes(&decalin), [6, 6]);
        assert_eq!(smallest_ring_through_bond(&decalin, 4, 5), Some(6));
        assert_eq!(smallest_ring_through_bend(&decalin, 3, 4, 6), Some(10));
    }
}
