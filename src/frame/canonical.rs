//! The canonical form of a state: the smallest packing over the skeleton's automorphisms.
//!
//! An automorphism carries digits, orders and configuration bits to other fields; the bit of a
//! unit is also reversed where the automorphism reverses the order of the unit's ligands, but
//! only if the unit is a candidate in this state. So a state comes with its *candidate mask*,
//! a row with a one at each configuration bit that means something.
//!
//! Small groups are listed. A group of more than [`LONGEST_LIST`] elements is walked along its
//! stabiliser chain instead: at each level only the images with the smallest digit go on, each
//! distinct image once. Both ways give the same row.

use super::automorphism::{Group, Permutation};
use super::packing::{Field, Layout};
use super::skeleton::Frame;
use crate::molecule::graph::is_odd;

/// Most automorphisms that are listed.
pub const LONGEST_LIST: u64 = 2_000;

/// Finds canonical forms for one frame and layout.
#[derive(Debug, Clone)]
pub struct Canonicaliser {
    n_words: usize,
    elements: Elements,
}

#[derive(Debug, Clone)]
enum Elements {
    /// All automorphisms but the identity.
    Listed(Vec<Action>),
    /// By level of the chain: its elements but the identity, and the digit fixed next.
    Chain(Vec<(Vec<Action>, Option<Field>)>),
}

/// An automorphism as it acts on packed states.
#[derive(Debug, Clone)]
struct Action {
    /// Image of each skeleton atom.
    permutation: Permutation,
    /// Fields and where they go, grouped by word of destination.
    moves: Vec<Vec<Move>>,
    /// Configuration bits, before they are moved, whose ligands end in reversed order.
    reversed: Vec<u64>,
}

#[derive(Debug, Clone, Copy)]
struct Move {
    from: Field,
    to_shift: u32,
}

impl Canonicaliser {
    /// The canonicaliser of a frame for states of a layout.
    pub fn new(frame: &Frame, layout: &Layout) -> Canonicaliser {
        Canonicaliser::with_longest_list(frame, layout, LONGEST_LIST)
    }

    /// The same with another bound on what is listed: tests hold the two ways together.
    pub fn with_longest_list(frame: &Frame, layout: &Layout, longest: u64) -> Canonicaliser {
        let fixed = (0..frame.skeleton().n_atoms()).filter(|&a| frame.site_of(a).is_none());
        let base: Vec<usize> = frame.sites().iter().copied().chain(fixed).collect();
        let group = Group::of(frame.skeleton(), &base);
        let act = |permutation: &Permutation| Action::new(frame, layout, permutation.clone());
        let elements = if group.order().is_some_and(|order| order <= longest) {
            Elements::Listed(group.elements().iter().skip(1).map(act).collect())
        } else {
            let levels = group.levels().iter().enumerate();
            let chain = levels.map(|(depth, level)| {
                // The element that carries base atom i to v, turned round, brings v to place i.
                let inward = level.iter().skip(1).map(|outward| act(&inverse(outward)));
                (inward.collect(), layout.sites.get(depth).copied())
            });
            Elements::Chain(chain.collect())
        };
        Canonicaliser { n_words: layout.n_words(), elements }
    }

    /// Writes the canonical form of `state` to `out`. `candidates` is the state's candidate
    /// mask. All rows are [`Layout::n_words`] long.
    ///
    /// # Cost
    /// O(automorphisms x fields), leaving an automorphism at the first word that is too large.
    pub fn canonical(&self, state: &[u64], candidates: &[u64], out: &mut [u64]) {
        match &self.elements {
            Elements::Listed(actions) => {
                out.copy_from_slice(state);
                for action in actions {
                    action.keep_smaller(state, candidates, out);
                }
            }
            Elements::Chain(levels) => smallest_along_chain(levels, state, candidates, out),
        }
    }

    /// Automorphisms but the identity that leave a state as it is, as atom permutations; none
    /// are given when the group is too large to list.
    pub fn stabiliser(&self, state: &[u64], candidates: &[u64]) -> Vec<&Permutation> {
        let Elements::Listed(actions) = &self.elements else { return Vec::new() };
        let mut image = vec![0; self.n_words];
        let mut fixing = Vec::new();
        for action in actions {
            action.apply(state, candidates, &mut image);
            if image == state {
                fixing.push(&action.permutation);
            }
        }
        fixing
    }
}

impl Action {
    fn new(frame: &Frame, layout: &Layout, permutation: Permutation) -> Action {
        let mut action =
            Action { moves: vec![Vec::new(); layout.n_words()], reversed: vec![0; layout.n_words()], permutation };
        for (site, &atom) in frame.sites().iter().enumerate() {
            let to = frame.site_of(action.permutation[atom]).expect("sites go to sites");
            action.add(layout.sites[site], layout.sites[to]);
        }
        for bond in 0..layout.orders.len() {
            let to = action.image_of_bond(frame, bond);
            action.add(layout.orders[bond], layout.orders[to]);
        }
        for bond in 0..layout.trans.len() {
            let to = action.image_of_bond(frame, bond);
            action.add(layout.trans[bond], layout.trans[to]);
            if action.reverses_bond(frame, bond) {
                layout.trans[bond].set(&mut action.reversed, 1);
            }
        }
        for (centre, &atom) in frame.centres().iter().enumerate().take(layout.clockwise.len()) {
            let image = action.permutation[atom];
            let to = frame.centres().iter().position(|&a| a == image).expect("centres go to centres");
            action.add(layout.clockwise[centre], layout.clockwise[to]);
            if action.reverses_centre(frame, atom) {
                layout.clockwise[centre].set(&mut action.reversed, 1);
            }
        }
        action
    }

    fn add(&mut self, from: Field, to: Field) {
        self.moves[to.word].push(Move { from, to_shift: to.shift });
    }

    fn image_of_bond(&self, frame: &Frame, bond: usize) -> usize {
        let (a, b) = frame.open_bonds()[bond];
        let image = |site: usize| frame.site_of(self.permutation[frame.sites()[site]]).expect("sites go to sites");
        frame.open_bond(image(a), image(b)).expect("bonds go to bonds")
    }

    /// Whether the skeleton ligands of an atom end in an order of the other parity.
    fn reverses_centre(&self, frame: &Frame, atom: usize) -> bool {
        let mut ligands: Vec<usize> = frame.skeleton().neighbours(atom).map(|(n, _, _)| n).collect();
        ligands.sort_unstable();
        let images: Vec<usize> = ligands.iter().map(|&n| self.permutation[n]).collect();
        is_odd(&images)
    }

    /// Whether the reference ligands of a double bond's ends end as one reference and one other.
    fn reverses_bond(&self, frame: &Frame, bond: usize) -> bool {
        let (a, b) = frame.open_bonds()[bond];
        let (a, b) = (frame.sites()[a], frame.sites()[b]);
        let reference = |end: usize, other: usize| {
            frame.skeleton().neighbours(end).map(|(n, _, _)| n).filter(|&n| n != other).min()
        };
        let moves_off = |end: usize, other: usize| {
            let image = reference(end, other).map(|n| self.permutation[n]);
            image != reference(self.permutation[end], self.permutation[other])
        };
        moves_off(a, b) != moves_off(b, a)
    }

    fn image_of_word(&self, word: usize, state: &[u64], candidates: &[u64]) -> u64 {
        let mut image = 0;
        for m in &self.moves[word] {
            let from = m.from.word;
            let source = state[from] ^ (candidates[from] & self.reversed[from]);
            image |= (source >> m.from.shift & m.from.mask) << m.to_shift;
        }
        image
    }

    fn apply(&self, state: &[u64], candidates: &[u64], out: &mut [u64]) {
        for word in 0..out.len() {
            out[word] = self.image_of_word(word, state, candidates);
        }
    }

    /// The image of a candidate mask, which has no signs.
    fn apply_to_candidates(&self, candidates: &[u64], out: &mut [u64]) {
        let none = [0; super::packing::MOST_WORDS];
        self.apply(candidates, &none[..candidates.len()], out);
    }

    /// Replaces `best` by the image of `state` if that is smaller.
    fn keep_smaller(&self, state: &[u64], candidates: &[u64], best: &mut [u64]) {
        for word in 0..best.len() {
            let image = self.image_of_word(word, state, candidates);
            if image > best[word] {
                return;
            }
            if image < best[word] {
                best[word] = image;
                for later in word + 1..best.len() {
                    best[later] = self.image_of_word(later, state, candidates);
                }
                return;
            }
        }
    }
}

fn inverse(permutation: &Permutation) -> Permutation {
    let mut inverse = vec![0; permutation.len()];
    for (atom, &image) in permutation.iter().enumerate() {
        inverse[image] = atom;
    }
    inverse
}

/// The smallest image, found level by level.
fn smallest_along_chain(levels: &[(Vec<Action>, Option<Field>)], state: &[u64], candidates: &[u64], out: &mut [u64]) {
    let n = state.len();
    // Each image is a state row followed by its candidate row.
    let mut images: Vec<Vec<u64>> = vec![[state, candidates].concat()];
    for (actions, digit) in levels {
        let mut next = images.clone();
        for image in &images {
            let (row, mask) = image.split_at(n);
            for action in actions {
                let mut moved = vec![0; 2 * n];
                let (moved_row, moved_mask) = moved.split_at_mut(n);
                action.apply(row, mask, moved_row);
                action.apply_to_candidates(mask, moved_mask);
                next.push(moved);
            }
        }
        if let Some(digit) = digit {
            let smallest = next.iter().map(|image| digit.get(image)).min().unwrap_or(0);
            next.retain(|image| digit.get(image) == smallest);
        }
        next.sort_unstable();
        next.dedup();
        images = next;
    }
    if let Some(smallest) = images.iter().min() {
        out.copy_from_slice(&smallest[..n]);
    }
}
