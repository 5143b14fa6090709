//! The symmetry of a skeleton: its automorphism group as a chain of stabilisers.
//!
//! Atoms are taken in *base* order, sites first. Level `i` of the chain holds one automorphism
//! for each atom that base atom `i` can be carried to while base atoms 0 to `i - 1` stay where
//! they are. Every automorphism is a product of one element a level in just one way, so the
//! order of the group is the product of the level sizes, known without listing it.
//!
//! # Source
//! C. C. Sims, in Computational Problems in Abstract Algebra, 169 (1970).

use crate::molecule::canonical::refined_classes;
use crate::molecule::{BondOrder, Molecule};

/// An automorphism: the image of each atom.
pub type Permutation = Vec<usize>;

/// The automorphism group of a graph.
#[derive(Debug, Clone)]
pub struct Group {
    /// Elements of each level, the identity first.
    levels: Vec<Vec<Permutation>>,
}

impl Group {
    /// The group of a skeleton, with atoms based in the order given.
    ///
    /// # Cost
    /// A search for each pair of atoms of one refined class; each is linear but for rare graphs.
    pub fn of(skeleton: &Molecule, base: &[usize]) -> Group {
        let graph = Coloured::of(skeleton);
        let identity: Permutation = (0..skeleton.n_atoms()).collect();
        let mut levels = Vec::with_capacity(base.len());
        for (depth, &atom) in base.iter().enumerate() {
            let mut level = vec![identity.clone()];
            for target in 0..skeleton.n_atoms() {
                let is_free = target != atom && !base[..depth].contains(&target);
                if is_free && graph.classes[target] == graph.classes[atom] {
                    level.extend(graph.automorphism(&base[..depth], atom, target));
                }
            }
            levels.push(level);
        }
        Group { levels }
    }

    /// Number of automorphisms; none if it is beyond `u64`.
    pub fn order(&self) -> Option<u64> {
        self.levels.iter().try_fold(1u64, |product, level| product.checked_mul(level.len() as u64))
    }

    /// Elements by level of the chain, the identity first in each.
    pub fn levels(&self) -> &[Vec<Permutation>] {
        &self.levels
    }

    /// Every automorphism, the identity first.
    ///
    /// # Cost
    /// Memory in proportion to the order: ask [`Group::order`] before.
    pub fn elements(&self) -> Vec<Permutation> {
        let mut all: Vec<Permutation> = Vec::new();
        for level in self.levels.iter().rev() {
            if all.is_empty() {
                all.clone_from(level);
                continue;
            }
            if level.len() > 1 {
                all = level.iter().flat_map(|outer| all.iter().map(move |inner| product(outer, inner))).collect();
            }
        }
        all
    }
}

/// First `inner`, then `outer`.
fn product(outer: &[usize], inner: &[usize]) -> Permutation {
    inner.iter().map(|&x| outer[x]).collect()
}

/// A graph ready for the search: classes, neighbour lists, and a table of bonds.
struct Coloured {
    classes: Vec<usize>,
    around: Vec<Vec<(usize, BondOrder)>>,
}

impl Coloured {
    fn of(skeleton: &Molecule) -> Coloured {
        Coloured {
            classes: refined_classes(skeleton),
            around: (0..skeleton.n_atoms())
                .map(|a| skeleton.neighbours(a).map(|(n, order, _)| (n, order)).collect())
                .collect(),
        }
    }

    /// An automorphism that fixes some atoms and carries `from` to `to`, if there is one.
    fn automorphism(&self, fixed: &[usize], from: usize, to: usize) -> Option<Permutation> {
        let n = self.classes.len();
        let mut map = Mapping { image: vec![None; n], is_used: vec![false; n] };
        for &atom in fixed {
            map.set(atom, atom);
        }
        if !self.agrees(&map, from, to) {
            return None;
        }
        map.set(from, to);
        let order = self.search_order(fixed, from);
        self.extend(&mut map, &order).then(|| map.image.into_iter().flatten().collect())
    }

    /// The atoms still to be mapped, each next to one before it where possible.
    fn search_order(&self, fixed: &[usize], from: usize) -> Vec<usize> {
        let n = self.classes.len();
        let mut seen = vec![false; n];
        let mut walk: Vec<usize> = fixed.iter().copied().chain([from]).collect();
        for &atom in &walk {
            seen[atom] = true;
        }
        let given = walk.len();
        let mut next = 0;
        while walk.len() < n {
            if next == walk.len() {
                let fresh = seen.iter().position(|&s| !s).expect("fewer than n are seen");
                seen[fresh] = true;
                walk.push(fresh);
            }
            for &(b, _) in &self.around[walk[next]] {
                if !seen[b] {
                    seen[b] = true;
                    walk.push(b);
                }
            }
            next += 1;
        }
        walk.split_off(given)
    }

    fn extend(&self, map: &mut Mapping, order: &[usize]) -> bool {
        let Some((&atom, rest)) = order.split_first() else { return true };
        for target in 0..self.classes.len() {
            if !map.is_used[target] && self.agrees(map, atom, target) {
                map.set(atom, target);
                if self.extend(map, rest) {
                    return true;
                }
                map.unset(atom, target);
            }
        }
        false
    }

    /// Whether carrying `atom` to `target` keeps class and bonds to the atoms mapped so far.
    fn agrees(&self, map: &Mapping, atom: usize, target: usize) -> bool {
        self.classes[atom] == self.classes[target]
            && self.around[atom].len() == self.around[target].len()
            && self.around[atom]
                .iter()
                .all(|&(n, order)| map.image[n].is_none_or(|m| self.around[target].contains(&(m, order))))
            && {
                let n_mapped = self.around[atom].iter().filter(|&&(n, _)| map.image[n].is_some()).count();
                n_mapped == self.around[target].iter().filter(|&&(n, _)| map.is_used[n]).count()
            }
    }
}

struct Mapping {
    image: Vec<Option<usize>>,
    is_used: Vec<bool>,
}

impl Mapping {
    fn set(&mut self, atom: usize, target: usize) {
        self.image[atom] = Some(target);
        self.is_used[target] = true;
    }

    fn unset(&mut self, atom: usize, target: usize) {
        self.image[atom] = None;
        self.is_used[target] = false;
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::molecule::{Atom, Element};

    fn order_of(n: usize, bonds: &[(usize, usize)]) -> Option<u64> {
        let mut skeleton = Molecule::new();
        for _ in 0..n {
            skeleton.add_atom(Atom::neutral(Element::C, 0));
        }
        for &(a, b) in bonds {
            skeleton.add_bond(a, b, BondOrder::Single);
        }
        let base: Vec<usize> = (0..n).collect();
        let group = Group::of(&skeleton, &base);
        assert_eq!(group.order(), Some(group.elements().len() as u64));
        group.order()
    }

    #[test]
    fn orders_of_known_groups() {
        let cube: Vec<(usize, usize)> =
            (0..8usize).flat_map(|a| [1, 2, 4].map(move |bit| (a, a ^ bit))).filter(|(a, b)| a < b).collect();
        assert_eq!(order_of(1, &[]), Some(1));
        assert_eq!(order_of(2, &[(0, 1)]), Some(2));
        assert_eq!(order_of(5, &[(0, 1), (0, 2), (0, 3), (0, 4)]), Some(24));
        assert_eq!(order_of(6, &[(0, 1), (1, 2), (2, 3), (3, 4), (4, 5), (5, 0)]), Some(12));
        assert_eq!(order_of(8, &cube), Some(48));
    }

    #[test]
    fn a_dendrimer_has_more_than_thirty_thousand() {
        let mut bonds = Vec::new();
        let mut n = 1;
        for _ in 0..4 {
            let arm = n;
            bonds.push((0, arm));
            bonds.extend((1..4).map(|i| (arm, arm + i)));
            n += 4;
        }
        assert_eq!(order_of(n, &bonds), Some(24 * 6 * 6 * 6 * 6));
    }
}
