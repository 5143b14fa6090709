//! The groups whose contributions add up to a compound's enthalpy, entropy and solubility.
//!
//! Groups are counted on the hydrogen-suppressed graph. A carbon has a *class*: sp3, sp2, sp
//! (triple bond, or middle of C=C=C), aromatic, or carbene. Ligands are told apart as carbon,
//! F, Cl, Br, I; a fixed atom beside a site (O, N, a carbonyl carbon) is taken as carbon here,
//! and what that costs is accounted for in [`parts`](super::parts). Beside each group of one
//! pair of halogens stands a group of any pair, so that a pair that was never measured takes
//! after its kin.
//!
//! Invariant: [`names`] and `count` agree on what each index means.
//!
//! # Source
//! Additivity of bonds and of next-nearest neighbours: S. W. Benson, J. H. Buss, J. Chem. Phys.
//! 29, 546 (1958). The choice of groups is our own.

use crate::frame::{Decoration, Frame};
use crate::molecule::BondOrder;
use crate::molecule::rings::smallest_ring_sizes;

/// Classes of carbon, by number.
const CLASSES: [&str; 5] = ["sp3", "sp2", "sp", "aromatic", "carbene"];
const SP3: usize = 0;
const SP2: usize = 1;
const SP: usize = 2;
const AROMATIC: usize = 3;
const CARBENE: usize = 4;

/// Kinds of ligand, by number: carbon, then the halogens.
const KINDS: [&str; 5] = ["C", "F", "Cl", "Br", "I"];
const N_KIND_PAIRS: usize = 15;

/// Blocks of groups with the prior family of each: start, then number.
macro_rules! blocks {
    ($($name:ident, $family:literal, $n:expr;)*) => {
        blocks!(@starts 0usize; $($name, $n;)*);
        /// Family and size of each block in order.
        const BLOCKS: &[(&str, usize)] = &[$(($family, $n),)*];
    };
    (@starts $at:expr; $name:ident, $n:expr; $($rest:tt)*) => {
        const $name: usize = $at;
        blocks!(@starts $at + $n; $($rest)*);
    };
    (@starts $at:expr;) => {
        /// Number of groups.
        pub const N_FEATURES: usize = $at;
    };
}

blocks! {
    MOLECULE, "molecule", 1;
    HYDROGEN, "hydrogen", 5;
    ANY_HALOGEN, "halogen", 4;
    HALOGEN, "halogen by class", 20;
    ANY_SINGLE, "carbon bond", 1;
    SINGLE, "carbon bond by class", N_KIND_PAIRS;
    MULTIPLE, "multiple bond", 5;
    GEM3_ANY, "geminal, any", 2;
    GEM3, "geminal", N_KIND_PAIRS;
    GEM2_ANY, "geminal, any", 2;
    GEM2, "geminal", N_KIND_PAIRS;
    GEM_CARBENE, "geminal", 1;
    TRIPLES, "triple", 4;
    VIC_ANY, "vicinal, any", 1;
    VIC, "vicinal", N_KIND_PAIRS;
    BOTH_ENDS, "both ends", 2;
    CIS_ANY, "across, any", 1;
    CIS, "across", N_KIND_PAIRS;
    TRANS_ANY, "across, any", 1;
    TRANS, "across", N_KIND_PAIRS;
    TRIPLE_BOND_ANY, "across, any", 1;
    TRIPLE_BOND, "across", N_KIND_PAIRS;
    BESIDE, "beside", 16;
    ORTHO, "ortho", N_KIND_PAIRS;
    ACID, "acid", 2;
    BRANCH, "branch", 2;
    RING, "ring", 5;
    RING_DOUBLE, "ring double bond", 3;
}

/// The prior family of each group.
pub fn families() -> Vec<&'static str> {
    BLOCKS.iter().flat_map(|&(family, n)| std::iter::repeat_n(family, n)).collect()
}

/// The name of each group, in words a chemist uses.
pub fn names() -> Vec<String> {
    let mut names = vec!["molecule".to_owned()];
    let all = |f: &dyn Fn(usize) -> String, n: usize| (0..n).map(f).collect::<Vec<_>>();
    let pair = |text: &'static str| move |i: usize| format!("{text} {}", kind_pair_name(i));
    names.extend(all(&|c| format!("C-H, {}", CLASSES[c]), 5));
    names.extend(all(&|x| format!("C-{}, any carbon", KINDS[x + 1]), 4));
    names.extend(all(&|i| format!("C-{}, {}", KINDS[i % 4 + 1], CLASSES[i / 4]), 20));
    names.push("C-C single, any".to_owned());
    names.extend(all(&|i| class_pair_name(i), N_KIND_PAIRS));
    names
        .extend(["C=C", "C=C of a cumulene end", "C=C of a cumulene middle", "C#C", "aromatic C:C"].map(str::to_owned));
    names.extend(["geminal X and X on sp3, any", "geminal X and C on sp3, any"].map(str::to_owned));
    names.extend(all(&pair("geminal on sp3"), N_KIND_PAIRS));
    names.extend(["geminal X and X on sp2, any", "geminal X and C on sp2, any"].map(str::to_owned));
    names.extend(all(&pair("geminal on sp2"), N_KIND_PAIRS));
    names.push("geminal X and X on a carbene".to_owned());
    names.extend(["CF3", "CX3 without F", "CX3, any", "CX4"].map(str::to_owned));
    names.push("vicinal X and X, any".to_owned());
    names.extend(all(&pair("vicinal"), N_KIND_PAIRS));
    names.extend(["CX3-CX3", "CF2-CF2"].map(str::to_owned));
    names.push("cis X and X, any".to_owned());
    names.extend(all(&pair("cis"), N_KIND_PAIRS));
    names.push("trans X and X, any".to_owned());
    names.extend(all(&pair("trans"), N_KIND_PAIRS));
    names.push("X and X across C#C, any".to_owned());
    names.extend(all(&pair("across C#C"), N_KIND_PAIRS));
    let beside = ["allylic", "propargylic", "benzylic", "conjugated"];
    names.extend(all(&|i| format!("{} {}", beside[i / 4], KINDS[i % 4 + 1]), 16));
    names.extend(all(&pair("ortho"), N_KIND_PAIRS));
    names.extend(["H on CX2", "H on CX3"].map(str::to_owned));
    names.extend(["quaternary carbon", "neighbouring branches"].map(str::to_owned));
    names.extend(["ring of 3", "ring of 4", "ring of 5", "ring of 6", "ring of 7 and more"].map(str::to_owned));
    names.extend(all(&|i| format!("C=C in a ring of {}", i + 3), 3));
    names
}

fn kind_pair_name(index: usize) -> String {
    let (a, b) = pair_members(index);
    format!("{} and {}", KINDS[a], KINDS[b])
}

fn class_pair_name(index: usize) -> String {
    let (a, b) = pair_members(index);
    format!("C-C, {} and {}", CLASSES[a], CLASSES[b])
}

/// Number of an unordered pair of five things.
fn pair(a: usize, b: usize) -> usize {
    let (low, high) = if a < b { (a, b) } else { (b, a) };
    high * (high + 1) / 2 + low
}

fn pair_members(index: usize) -> (usize, usize) {
    let high = (0..5).rev().find(|h| h * (h + 1) / 2 <= index).unwrap_or(0);
    (index - high * (high + 1) / 2, high)
}

/// What the groups need to know of a frame, found once.
#[derive(Debug, Clone)]
pub struct FrameFacts {
    /// By site: carbons and fixed atoms beside it.
    n_skeleton: Vec<u8>,
    /// By site: fixed atoms beside it.
    n_fixed: Vec<u8>,
    /// Rings of three, four, five, six, seven and more.
    rings: [u8; 5],
    /// By open bond: the smallest ring it is in, 0 for none.
    ring_of_bond: Vec<u8>,
}

impl FrameFacts {
    /// The facts of a frame.
    pub fn of(frame: &Frame) -> FrameFacts {
        let adjacency = frame.skeleton().adjacency();
        let mut rings = [0; 5];
        for size in smallest_ring_sizes(&adjacency) {
            rings[size.clamp(3, 7) - 3] += 1;
        }
        let smallest = |&(a, b): &(usize, usize)| {
            let (a, b) = (frame.sites()[a], frame.sites()[b]);
            crate::molecule::rings::smallest_ring_through_bond(&adjacency, a, b).map_or(0, |n| n.min(255) as u8)
        };
        FrameFacts {
            n_skeleton: frame.sites().iter().map(|&at| frame.skeleton().degree(at) as u8).collect(),
            n_fixed: (0..frame.sites().len()).map(|site| frame.fixed_neighbours(site).count() as u8).collect(),
            rings,
            ring_of_bond: frame.open_bonds().iter().map(smallest).collect(),
        }
    }
}

/// What the groups need to know of each site of one decoration.
#[derive(Debug, Clone, Copy, Default)]
pub(super) struct SiteView {
    class: usize,
    n_hydrogens: u8,
    /// Ligands by kind; for carbon those of the skeleton.
    kinds: [u8; 5],
}

/// Reads a decoration once; `views` is cleared and filled, one a site.
pub(super) fn view(frame: &Frame, facts: &FrameFacts, state: &Decoration, views: &mut Vec<SiteView>) {
    views.clear();
    for site in 0..frame.sites().len() {
        let class = match state.n_pi_bonds(frame, site) {
            _ if state.carbenes[site] => CARBENE,
            _ if state.is_aromatic(frame, site) => AROMATIC,
            0 => SP3,
            1 => SP2,
            _ => SP,
        };
        let [f, cl, br, i] = state.halogens[site];
        let kinds = [facts.n_skeleton[site], f, cl, br, i];
        views.push(SiteView { class, n_hydrogens: state.n_hydrogens(frame, site), kinds });
    }
}

/// Gives `emit` each group of a decoration with its count; a group may come several times.
/// Without geometry in the state (`has_geometry` false) cis and trans count half each.
pub(super) fn count(
    frame: &Frame,
    facts: &FrameFacts,
    state: &Decoration,
    views: &[SiteView],
    has_geometry: bool,
    emit: &mut impl FnMut(usize, f64),
) {
    emit(MOLECULE, 1.0);
    for (site, view) in views.iter().enumerate() {
        count_site(view, facts.n_fixed[site], emit);
    }
    for (bond, &(a, b)) in frame.open_bonds().iter().enumerate() {
        let (of_a, of_b) = (&views[a], &views[b]);
        match state.orders[bond] {
            BondOrder::Single => count_single(of_a, of_b, emit),
            BondOrder::Double => {
                let is_told = has_geometry && state.is_candidate_bond(frame, bond);
                count_double(frame, state, bond, of_a, of_b, is_told, emit);
                let ring = facts.ring_of_bond[bond];
                if (3..=5).contains(&ring) {
                    emit(RING_DOUBLE + usize::from(ring) - 3, 1.0);
                }
            }
            BondOrder::Triple => count_triple(of_a, of_b, emit),
            BondOrder::Aromatic => count_aromatic(of_a, of_b, emit),
        }
    }
    for (index, &n) in facts.rings.iter().enumerate().filter(|(_, n)| **n > 0) {
        emit(RING + index, f64::from(n));
    }
}

fn count_site(view: &SiteView, n_fixed: u8, emit: &mut impl FnMut(usize, f64)) {
    emit(HYDROGEN + view.class, f64::from(view.n_hydrogens));
    for x in 0..4 {
        let n = f64::from(view.kinds[x + 1]);
        if n > 0.0 {
            emit(ANY_HALOGEN + x, n);
            emit(HALOGEN + 4 * view.class + x, n);
        }
    }
    // A fixed neighbour's bond counts as a carbon bond to sp3; see `parts`.
    if n_fixed > 0 {
        emit(ANY_SINGLE, f64::from(n_fixed));
        emit(SINGLE + pair(SP3, view.class), f64::from(n_fixed));
    }
    match view.class {
        SP3 => {
            count_geminal(view, GEM3, GEM3_ANY, 0, emit);
            count_triples(view, emit);
        }
        // The double bond's partner is no ligand here.
        SP2 => count_geminal(view, GEM2, GEM2_ANY, 1, emit),
        CARBENE => {
            let n: u8 = view.kinds[1..].iter().sum();
            emit(GEM_CARBENE, f64::from(n * n.saturating_sub(1) / 2));
        }
        _ => {}
    }
}

/// Pairs of ligands on one carbon, hydrogens and `n_apart` of the carbons left out.
fn count_geminal(view: &SiteView, block: usize, any: usize, n_apart: u8, emit: &mut impl FnMut(usize, f64)) {
    let mut kinds = view.kinds;
    kinds[0] = kinds[0].saturating_sub(n_apart);
    let n_halogens: u8 = kinds[1..].iter().sum();
    if n_halogens == 0 && kinds[0] < 2 {
        return;
    }
    emit(any, f64::from(n_halogens * n_halogens.saturating_sub(1) / 2));
    emit(any + 1, f64::from(n_halogens * kinds[0]));
    for a in 0..5 {
        for b in a..5 {
            let n = if a == b { kinds[a] * kinds[a].saturating_sub(1) / 2 } else { kinds[a] * kinds[b] };
            if n > 0 {
                emit(block + pair(a, b), f64::from(n));
            }
        }
    }
}

fn count_triples(view: &SiteView, emit: &mut impl FnMut(usize, f64)) {
    let n: u8 = view.kinds[1..].iter().sum();
    if n >= 3 {
        emit(TRIPLES, f64::from(u8::from(view.kinds[1] >= 3)));
        emit(TRIPLES + 1, f64::from(u8::from(view.kinds[1] == 0)));
        emit(TRIPLES + 2, 1.0);
        emit(TRIPLES + 3, f64::from(u8::from(n == 4)));
    }
    if n >= 2 && view.n_hydrogens > 0 {
        emit(ACID + usize::from(n > 2), f64::from(view.n_hydrogens));
    }
    if view.kinds[0] == 4 {
        emit(BRANCH, 1.0);
    }
}

fn count_single(a: &SiteView, b: &SiteView, emit: &mut impl FnMut(usize, f64)) {
    emit(ANY_SINGLE, 1.0);
    emit(SINGLE + pair(a.class, b.class), 1.0);
    if a.class == SP3 && b.class == SP3 {
        count_across(a, b, VIC, Some(VIC_ANY), 1.0, emit);
        let n = |v: &SiteView| v.kinds[1..].iter().sum::<u8>();
        emit(BOTH_ENDS, f64::from(u8::from(n(a) == 3 && n(b) == 3)));
        emit(BOTH_ENDS + 1, f64::from(u8::from(a.kinds[1] >= 2 && b.kinds[1] >= 2)));
        let branches = |v: &SiteView| f64::from(v.kinds[0].saturating_sub(2));
        emit(BRANCH + 1, branches(a) * branches(b));
    }
    count_beside(a, b, emit);
    count_beside(b, a, emit);
}

/// Halogens on `a` that stand beside an unsaturated `b`.
fn count_beside(a: &SiteView, b: &SiteView, emit: &mut impl FnMut(usize, f64)) {
    let which = match (a.class, b.class) {
        (SP3, SP2) => 0,
        (SP3, SP) => 1,
        (SP3, AROMATIC) => 2,
        (SP2 | SP | AROMATIC, SP2 | SP | AROMATIC) => 3,
        _ => return,
    };
    for x in 0..4 {
        if a.kinds[x + 1] > 0 {
            emit(BESIDE + 4 * which + x, f64::from(a.kinds[x + 1]));
        }
    }
}

/// Halogen pairs (and none with carbon) across a bond.
fn count_across(
    a: &SiteView,
    b: &SiteView,
    block: usize,
    any: Option<usize>,
    weight: f64,
    emit: &mut impl FnMut(usize, f64),
) {
    for x in 1..5 {
        for y in 1..5 {
            let n = f64::from(a.kinds[x] * b.kinds[y]);
            if n > 0.0 {
                emit(block + pair(x, y), weight * n);
                if let Some(any) = any {
                    emit(any, weight * n);
                }
            }
        }
    }
}

fn count_double(
    frame: &Frame,
    state: &Decoration,
    bond: usize,
    a: &SiteView,
    b: &SiteView,
    is_told: bool,
    emit: &mut impl FnMut(usize, f64),
) {
    let n_sp = usize::from(a.class == SP) + usize::from(b.class == SP);
    emit(MULTIPLE + n_sp, 1.0);
    if n_sp > 0 || a.class == CARBENE || b.class == CARBENE {
        return;
    }
    let (at_a, at_b) = frame.open_bonds()[bond];
    let (of_a, of_b) = (sides(state, at_a, a), sides(state, at_b, b));
    for (i, &x) in of_a.iter().enumerate() {
        for (j, &y) in of_b.iter().enumerate() {
            let (Some(x), Some(y)) = (x, y) else { continue };
            // The first ligand of each end is its reference.
            let is_trans = state.trans[bond] == (i == j);
            let (cis, trans) =
                if is_told { (f64::from(u8::from(!is_trans)), f64::from(u8::from(is_trans))) } else { (0.5, 0.5) };
            for (weight, block, any) in [(cis, CIS, CIS_ANY), (trans, TRANS, TRANS_ANY)] {
                if weight > 0.0 {
                    emit(block + pair(x, y), weight);
                    if x > 0 && y > 0 {
                        emit(any, weight);
                    }
                }
            }
        }
    }
}

/// Kinds of the two ligands of a double bond's end, the reference first; none for hydrogen.
fn sides(state: &Decoration, site: usize, view: &SiteView) -> [Option<usize>; 2] {
    let mut found = [None; 2];
    let n_carbons = usize::from(view.kinds[0]).saturating_sub(1);
    let mut next = 0;
    for _ in 0..n_carbons.min(2) {
        found[next] = Some(0);
        next += 1;
    }
    for x in (0..4).rev() {
        for _ in 0..state.halogens[site][x] {
            if next < 2 {
                found[next] = Some(x + 1);
                next += 1;
            }
        }
    }
    found
}

fn count_triple(a: &SiteView, b: &SiteView, emit: &mut impl FnMut(usize, f64)) {
    emit(MULTIPLE + 3, 1.0);
    count_across(a, b, TRIPLE_BOND, Some(TRIPLE_BOND_ANY), 1.0, emit);
}

fn count_aromatic(a: &SiteView, b: &SiteView, emit: &mut impl FnMut(usize, f64)) {
    emit(MULTIPLE + 4, 1.0);
    let ligand = |v: &SiteView| (1..5).find(|&x| v.kinds[x] > 0).or((v.kinds[0] > 2).then_some(0));
    if let (Some(x), Some(y)) = (ligand(a), ligand(b)) {
        emit(ORTHO + pair(x, y), 1.0);
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_families_and_groups_agree_in_number() {
        assert_eq!(names().len(), N_FEATURES);
        assert_eq!(families().len(), N_FEATURES);
        let mut unique = names();
        unique.sort();
        unique.dedup();
        assert_eq!(unique.len(), N_FEATURES);
    }

    #[test]
    fn pairs_are_numbered_without_gaps() {
        for index in 0..N_KIND_PAIRS {
            let (a, b) = pair_members(index);
            assert_eq!((pair(a, b), pair(b, a)), (index, index));
        }
    }
}
