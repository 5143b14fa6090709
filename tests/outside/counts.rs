//! Numbers of chlorinated alkanes by Burnside's lemma, from symmetries written by hand.
//!
//! A *skeleton* is a carbon chain or tree with its symmetries, each as cycles of carbons. A
//! carbon with `d` carbon neighbours takes up to `4 - d` chlorines, so the decorations of a
//! skeleton are the colourings of its carbons, and two are one constitution when a symmetry
//! turns one into the other. Nothing here uses the library.
//!
//! # Source
//! G. Pólya, Acta Math. 68, 145 (1937); W. Burnside, Theory of Groups of Finite Order (1897),
//! §118. Known counts are marked where they stand.

/// Number of decorations by number of chlorines.
type Polynomial = Vec<u64>;

/// Carbons' chlorine capacities, and all symmetries as cycles of carbons (fixed ones left out).
struct Skeleton {
    capacities: &'static [usize],
    symmetries: &'static [&'static [&'static [usize]]],
}

const METHANE: Skeleton = Skeleton { capacities: &[4], symmetries: &[&[]] };
const ETHANE: Skeleton = Skeleton { capacities: &[3, 3], symmetries: &[&[], &[&[0, 1]]] };
const PROPANE: Skeleton = Skeleton { capacities: &[3, 2, 3], symmetries: &[&[], &[&[0, 2]]] };
const BUTANE: Skeleton = Skeleton { capacities: &[3, 2, 2, 3], symmetries: &[&[], &[&[0, 3], &[1, 2]]] };
const ISOBUTANE: Skeleton = Skeleton {
    capacities: &[1, 3, 3, 3],
    symmetries: &[&[], &[&[1, 2]], &[&[1, 3]], &[&[2, 3]], &[&[1, 2, 3]], &[&[1, 3, 2]]],
};
const PENTANE: Skeleton = Skeleton { capacities: &[3, 2, 2, 2, 3], symmetries: &[&[], &[&[0, 4], &[1, 3]]] };
/// Carbon 0 bears two methyls (1 and 2); 3 and 4 are the ethyl group.
const ISOPENTANE: Skeleton = Skeleton { capacities: &[1, 3, 3, 2, 3], symmetries: &[&[], &[&[1, 2]]] };
/// All 24 permutations of the four methyls: 1 identity, 6 swaps, 3 double swaps, 8 of three, 6 of four.
const NEOPENTANE: Skeleton = Skeleton {
    capacities: &[0, 3, 3, 3, 3],
    symmetries: &[
        &[],
        &[&[1, 2]],
        &[&[1, 3]],
        &[&[1, 4]],
        &[&[2, 3]],
        &[&[2, 4]],
        &[&[3, 4]],
        &[&[1, 2], &[3, 4]],
        &[&[1, 3], &[2, 4]],
        &[&[1, 4], &[2, 3]],
        &[&[1, 2, 3]],
        &[&[1, 3, 2]],
        &[&[1, 2, 4]],
        &[&[1, 4, 2]],
        &[&[1, 3, 4]],
        &[&[1, 4, 3]],
        &[&[2, 3, 4]],
        &[&[2, 4, 3]],
        &[&[1, 2, 3, 4]],
        &[&[1, 2, 4, 3]],
        &[&[1, 3, 2, 4]],
        &[&[1, 3, 4, 2]],
        &[&[1, 4, 2, 3]],
        &[&[1, 4, 3, 2]],
    ],
};

fn times(a: &[u64], b: &[u64]) -> Polynomial {
    let mut product = vec![0; a.len() + b.len() - 1];
    for (i, x) in a.iter().enumerate() {
        for (j, y) in b.iter().enumerate() {
            product[i + j] += x * y;
        }
    }
    product
}

/// Decorations of one cycle of carbons that all hold the same number: 1 + x^n + x^2n + ...
fn of_cycle(capacity: usize, length: usize) -> Polynomial {
    let mut polynomial = vec![0; capacity * length + 1];
    for n in 0..=capacity {
        polynomial[n * length] = 1;
    }
    polynomial
}

/// Decorations of a skeleton by number of chlorines, symmetric ones counted once.
fn decorations(skeleton: &Skeleton) -> Polynomial {
    let mut total = vec![0; skeleton.capacities.iter().sum::<usize>() + 1];
    for cycles in skeleton.symmetries {
        let mut fixed = vec![1];
        for carbon in 0..skeleton.capacities.len() {
            if !cycles.iter().any(|cycle| cycle.contains(&carbon)) {
                fixed = times(&fixed, &of_cycle(skeleton.capacities[carbon], 1));
            }
        }
        for cycle in *cycles {
            fixed = times(&fixed, &of_cycle(skeleton.capacities[cycle[0]], cycle.len()));
        }
        for (sum, n) in total.iter_mut().zip(fixed) {
            *sum += n;
        }
    }
    total.iter().map(|n| n / skeleton.symmetries.len() as u64).collect()
}

/// Compounds that hydrogenolysis alone reaches from the perchlorinated n-alkane, itself and the
/// alkane included, at constitutional identity: a chain read either way is one.
pub(super) fn reached_by_hydrogenolysis(n_carbons: usize) -> u64 {
    let choices = |carbon: usize| match (n_carbons, carbon) {
        (1, _) => 5,
        (n, c) if c == 0 || c == n - 1 => 4,
        _ => 3,
    };
    let all: u64 = (0..n_carbons).map(choices).product();
    let palindromes: u64 = (0..n_carbons.div_ceil(2)).map(choices).product();
    u64::midpoint(all, palindromes)
}

/// Compounds that the three core rules reach from the perchlorinated n-alkane, at
/// constitutional identity.
///
/// Every setting of the chain's bond orders to 1, 2 or 3 within the carbons' valence, with any
/// number of chlorines that then fit, is reached: eliminate first, then replace. The last step
/// may make one saturated carbon a carbene, which holds two ligands fewer.
pub(super) fn reached_by_core_rules(n_carbons: usize) -> u64 {
    let mut all = 0;
    let mut palindromes = 0;
    for code in 0..3usize.pow(n_carbons as u32 - 1) {
        let orders: Vec<usize> = (0..n_carbons - 1).map(|bond| code / 3usize.pow(bond as u32) % 3 + 1).collect();
        let symmetric = orders.iter().eq(orders.iter().rev());
        for carbene in (0..n_carbons).map(Some).chain([None]) {
            let Some(choices) = chlorines_that_fit(&orders, carbene) else { continue };
            all += choices.iter().product::<u64>();
            let middle = n_carbons % 2 == 1 && carbene == Some(n_carbons / 2);
            if symmetric && (carbene.is_none() || middle) {
                palindromes += choices[..n_carbons.div_ceil(2)].iter().product::<u64>();
            }
        }
    }
    u64::midpoint(all, palindromes)
}

/// By carbon, how many numbers of chlorines it may hold; none if the drawing is no molecule.
fn chlorines_that_fit(orders: &[usize], carbene: Option<usize>) -> Option<Vec<u64>> {
    (0..=orders.len())
        .map(|carbon| {
            let around = [carbon.checked_sub(1), Some(carbon)];
            let around: Vec<usize> =
                around.into_iter().flatten().filter_map(|bond| orders.get(bond).copied()).collect();
            let is_carbene = carbene == Some(carbon);
            if is_carbene && around.iter().any(|&order| order > 1) {
                return None;
            }
            let room = if is_carbene { 2usize } else { 4 };
            Some(room.checked_sub(around.iter().sum())? as u64 + 1)
        })
        .collect()
}

#[test]
fn chlorinated_methanes_to_propanes_are_as_many_as_known() {
    // From memory: the chloroethanes count 1, 1, 2, 2, 2, 1, 1 and the chloropropanes 1, 2, 4, 5, 6, 5, 4, 2, 1.
    assert_eq!(decorations(&METHANE), [1, 1, 1, 1, 1]);
    assert_eq!(decorations(&ETHANE), [1, 1, 2, 2, 2, 1, 1]);
    assert_eq!(decorations(&PROPANE), [1, 2, 4, 5, 6, 5, 4, 2, 1]);
}

#[test]
fn mono_and_dichlorides_of_butane_and_pentane_are_as_many_as_known() {
    // From memory: C4H9Cl has 4 constitutional isomers, C4H8Cl2 9, C5H11Cl 8, C5H10Cl2 21.
    let sum = |skeletons: &[&Skeleton], n: usize| skeletons.iter().map(|s| decorations(s)[n]).sum::<u64>();
    assert_eq!([1, 2].map(|n| sum(&[&BUTANE, &ISOBUTANE], n)), [4, 9]);
    assert_eq!([1, 2].map(|n| sum(&[&PENTANE, &ISOPENTANE, &NEOPENTANE], n)), [8, 21]);
    // As many ways to put chlorine for hydrogen as hydrogen for chlorine.
    for skeleton in [&BUTANE, &ISOBUTANE, &PENTANE, &ISOPENTANE, &NEOPENTANE] {
        let counts = decorations(skeleton);
        assert!(counts.iter().eq(counts.iter().rev()), "{counts:?}");
    }
}

#[test]
fn the_chain_formula_agrees_with_the_cycles() {
    for (n_carbons, skeleton) in [(1, &METHANE), (2, &ETHANE), (3, &PROPANE), (4, &BUTANE), (5, &PENTANE)] {
        assert_eq!(reached_by_hydrogenolysis(n_carbons), decorations(skeleton).iter().sum::<u64>());
    }
    assert_eq!(reached_by_hydrogenolysis(8), 5886);
}

#[test]
fn core_rule_counts_agree_with_counting_on_paper() {
    // Methane: 5 chloromethanes and CCl2, CHCl, CH2. Ethane: 10 ethanes, 6 ethenes without
    // geometry, 3 ethynes, and CX3-CY: with 4 x 2 choices.
    assert_eq!(reached_by_core_rules(1), 8);
    assert_eq!(reached_by_core_rules(2), 10 + 6 + 3 + 8);
}
