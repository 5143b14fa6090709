//! Enumeration: from the parents outward, generation by generation, until nothing is new.
//!
//! Compounds are expanded in blocks. Within a block they are independent, so threads share
//! them; their products are then numbered one after the other in the order of their parents.
//! So the network is the same for any number of threads.
//!
//! Invariant: when a limit ends it, every expanded compound has all its steps, and every step's
//! target is stored.

use std::time::Instant;

use rayon::prelude::*;

use super::limits::{Limit, Limits, Outcome};
use super::outside::General;
use super::states::StateTable;
use super::store::{CompoundId, FrameStates, Home, Network};
use crate::frame::{Frame, Layout, Prepared, TooLarge, Workspace, compile};
use crate::molecule::{Halogen, Identity, Molecule};
use crate::rules::error::ApplyError;
use crate::rules::{Case, Fraction, Rule};

/// Compounds that one thread expands at a time.
const BLOCK: usize = 128;
/// Blocks that are expanded before their products are numbered.
const BLOCKS_AT_ONCE: usize = 16;
/// Most settings of open configuration that a parent is expanded over.
const MOST_PARENT_SETTINGS: usize = 1 << 16;

/// Why a network could not be made.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[allow(missing_docs)]
pub enum EnumerateError {
    #[error(transparent)]
    TooLarge(#[from] TooLarge),
    #[error(transparent)]
    Apply(#[from] ApplyError),
    #[error("the parent leaves open so much configuration that it stands for {settings} settings, more than {most}")]
    TooManyIsomers { settings: usize, most: usize },
    #[error("{n} rules were chosen, more than the 255 that a network can tell apart")]
    TooManyRules { n: usize },
    #[error("no parent was given")]
    NoParent,
}

/// Enumerates everything that the parents can turn into.
///
/// A parent that leaves configuration open at this depth of identity is taken as all its
/// isomers; [`Network::parents`] then has more compounds than were given.
///
/// # Errors
/// * a skeleton is too large to be packed: `TooLarge`
/// * a parent has too many isomers: `TooManyIsomers`
/// * no parent, or more than 255 rules: `NoParent`, `TooManyRules`
/// * the general engine gave up on a molecule: `Apply`
///
/// # Cost
/// For a chain and in-frame rules about a microsecond a step on one core; memory some tens of
/// bytes a compound and eight a step.
///
/// # Example
/// ```
/// use haloshed::molecule::Identity;
/// use haloshed::network::{Limits, enumerate};
/// use haloshed::rules::{RuleSet, Selection};
///
/// let parent = haloshed::smiles::read("ClC(Cl)=C(Cl)Cl")?;
/// let hydrogenolysis = Selection { only: Some(vec!["hydrogenolysis".to_owned()]), with: vec![] };
/// let rules = RuleSet::shipped().select(&hydrogenolysis)?;
/// let network = enumerate(&[parent], &rules, Identity::Geometric, Limits::default(), 1)?;
/// // PCE, TCE, three DCE, VC and ethene.
/// assert_eq!(network.n_compounds(), 7);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn enumerate(
    parents: &[Molecule],
    rules: &[Rule],
    identity: Identity,
    limits: Limits,
    n_threads: usize,
) -> Result<Network, EnumerateError> {
    if rules.len() > 255 {
        return Err(EnumerateError::TooManyRules { n: rules.len() });
    }
    let started = Instant::now();
    let mut run = Run::new(parents, rules, identity, limits)?;
    run.add_parents(parents)?;
    if n_threads <= 1 {
        run.go(started, false)?;
        return Ok(run.network);
    }
    match rayon::ThreadPoolBuilder::new().num_threads(n_threads).build() {
        Ok(pool) => pool.install(|| run.go(started, true))?,
        // No threads to be had: the result is the same without.
        Err(_) => run.go(started, false)?,
    }
    Ok(run.network)
}

struct Run<'a> {
    network: Network,
    palette: Vec<Halogen>,
    /// Compiled cases with the rule that each belongs to.
    cases: Vec<(u8, &'a Case)>,
    general: General,
    limits: Limits,
}

/// Products of a block of compounds, before they are numbered.
#[derive(Default)]
struct Expansion {
    /// Number of products of each compound.
    counts: Vec<usize>,
    products: Vec<Found>,
    rows: Vec<u64>,
}

/// A product before it is numbered.
enum Found {
    /// A state of its parent's frame, the next row of the block.
    InFrame { rule: u8, degeneracy: Fraction },
    /// A molecule of any frame.
    Outside { rule: u8, degeneracy: Fraction, molecule: Box<Molecule> },
}

impl<'a> Run<'a> {
    fn new(
        parents: &[Molecule],
        rules: &'a [Rule],
        identity: Identity,
        limits: Limits,
    ) -> Result<Run<'a>, EnumerateError> {
        if parents.is_empty() {
            return Err(EnumerateError::NoParent);
        }
        let holds = |h: &Halogen| parents.iter().any(|p| p.halogens()[*h as usize] > 0);
        let palette = Halogen::ALL.into_iter().filter(holds).collect();
        let mut cases = Vec::new();
        for (number, rule) in rules.iter().enumerate().filter(|(_, rule)| rule.generations.is_none()) {
            cases
                .extend(rule.cases.iter().filter(|case| compile::is_compilable(case)).map(|case| (number as u8, case)));
        }
        Ok(Run { network: Network::empty(identity), palette, cases, general: General::of(rules), limits })
    }

    fn add_parents(&mut self, parents: &[Molecule]) -> Result<(), EnumerateError> {
        for parent in parents {
            let isomers = parent
                .isomers(self.network.identity, MOST_PARENT_SETTINGS)
                .map_err(|settings| EnumerateError::TooManyIsomers { settings, most: MOST_PARENT_SETTINGS })?;
            for isomer in isomers {
                self.intern(&isomer)?;
            }
        }
        self.network.n_parents = self.network.n_compounds();
        Ok(())
    }

    fn go(&mut self, started: Instant, is_parallel: bool) -> Result<(), EnumerateError> {
        let mut start = 0;
        loop {
            let end = self.network.n_compounds();
            self.network.generations.push(end);
            if start == end {
                self.network.generations.pop();
                break;
            }
            let generation = (self.network.generations.len() - 2) as u32;
            if self.limits.max_generation.is_some_and(|most| generation >= most) {
                if self.has_products(start, end, generation)? {
                    self.cut(Limit::Generation(generation), start);
                }
                break;
            }
            if let Some((limit, at)) = self.expand_generation(start, end, generation, started, is_parallel)? {
                self.cut(limit, at);
                let n = self.network.n_compounds();
                if n > end {
                    self.network.generations.push(n);
                }
                break;
            }
            start = end;
        }
        self.network.shrink();
        Ok(())
    }

    fn cut(&mut self, limit: Limit, first_unexpanded: usize) {
        self.network.outcome = Outcome::Cut { limit, first_unexpanded };
    }

    fn has_products(&self, start: usize, end: usize, generation: u32) -> Result<bool, EnumerateError> {
        for compound in start..end {
            if !self.expand_block(compound, compound + 1, generation)?.products.is_empty() {
                return Ok(true);
            }
        }
        Ok(false)
    }

    /// Expands a generation; gives the limit and the first compound left if one was reached.
    fn expand_generation(
        &mut self,
        start: usize,
        end: usize,
        generation: u32,
        started: Instant,
        is_parallel: bool,
    ) -> Result<Option<(Limit, usize)>, EnumerateError> {
        for batch in (start..end).step_by(BLOCK * BLOCKS_AT_ONCE) {
            if let Some(time) = self.limits.time.filter(|&time| started.elapsed() >= time) {
                return Ok(Some((Limit::Time(time), batch)));
            }
            let batch_end = end.min(batch + BLOCK * BLOCKS_AT_ONCE);
            let blocks: Vec<usize> = (batch..batch_end).step_by(BLOCK).collect();
            let expand = |&block: &usize| self.expand_block(block, batch_end.min(block + BLOCK), generation);
            let expansions: Result<Vec<Expansion>, EnumerateError> =
                if is_parallel { blocks.par_iter().map(expand).collect() } else { blocks.iter().map(expand).collect() };
            let mut next = batch;
            for expansion in expansions? {
                if let Some(stopped) = self.number(next, expansion)? {
                    return Ok(Some((Limit::Compounds(self.limits.max_compounds), stopped)));
                }
                next = batch_end.min(next + BLOCK);
            }
        }
        Ok(None)
    }

    fn expand_block(&self, start: usize, end: usize, generation: u32) -> Result<Expansion, EnumerateError> {
        let mut expansion = Expansion::default();
        let mut work: Option<(usize, Workspace)> = None;
        for compound in start as CompoundId..end as CompoundId {
            let before = expansion.products.len();
            let frame = self.network.frame_of(compound);
            let (prepared, row) = self.network.state(compound);
            let buffers = match &mut work {
                Some((of, buffers)) if *of == frame => buffers,
                stale => &mut stale.insert((frame, Workspace::new(prepared))).1,
            };
            let Expansion { products, rows, .. } = &mut expansion;
            prepared.expand(row, buffers, &mut |product| {
                let rule = self.cases[product.case].0;
                products.push(Found::InFrame {
                    rule,
                    degeneracy: Fraction::new(u64::from(product.n_matches), u64::from(product.n_outcomes)),
                });
                rows.extend_from_slice(product.row);
            });
            self.general.expand(&self.network, compound, generation, |rule, degeneracy, molecule| {
                products.push(Found::Outside { rule, degeneracy, molecule: Box::new(molecule) });
            })?;
            expansion.counts.push(expansion.products.len() - before);
        }
        Ok(expansion)
    }

    /// Numbers the products of a block and stores the steps; gives the compound at which the
    /// limit of compounds stopped it.
    fn number(&mut self, start: usize, expansion: Expansion) -> Result<Option<usize>, EnumerateError> {
        let mut products = expansion.products.into_iter();
        let mut rows = expansion.rows.as_slice();
        let mut steps: Vec<(u8, CompoundId, Fraction)> = Vec::new();
        for (offset, n_products) in expansion.counts.into_iter().enumerate() {
            let compound = start + offset;
            let frame = self.network.frame_of(compound as CompoundId);
            let n_words = self.network.frames[frame].prepared.layout.n_words();
            let own: Vec<Found> = products.by_ref().take(n_products).collect();
            let n_rows = own.iter().filter(|f| matches!(f, Found::InFrame { .. })).count();
            let (own_rows, rest) = rows.split_at(n_rows * n_words);
            rows = rest;
            let is_tight = self.network.n_compounds() + n_products > self.limits.max_compounds;
            if is_tight
                && self.count_new(frame, own_rows, &own) + self.network.n_compounds() > self.limits.max_compounds
            {
                return Ok(Some(compound));
            }
            steps.clear();
            let mut own_rows = own_rows.chunks_exact(n_words);
            for found in own {
                steps.push(match found {
                    Found::InFrame { rule, degeneracy } => {
                        let row = own_rows.next().expect("a row for each product in the frame");
                        (rule, self.insert(frame, row), degeneracy)
                    }
                    Found::Outside { rule, degeneracy, molecule } => (rule, self.intern(&molecule)?, degeneracy),
                });
            }
            merge(&mut steps);
            self.network.push_row(&steps);
        }
        Ok(None)
    }

    /// How many compounds that are not yet stored a compound's products would add.
    fn count_new(&self, frame: usize, rows: &[u64], products: &[Found]) -> usize {
        let frame = &self.network.frames[frame];
        let mut new: Vec<&[u64]> =
            rows.chunks_exact(frame.prepared.layout.n_words()).filter(|row| frame.states.find(row).is_none()).collect();
        new.sort_unstable();
        new.dedup();
        let outside = products
            .iter()
            .filter(|f| matches!(f, Found::Outside { molecule, .. } if self.network.find(molecule).is_none()));
        new.len() + outside.count()
    }

    fn insert(&mut self, frame: usize, row: &[u64]) -> CompoundId {
        let states = &mut self.network.frames[frame];
        let (state, is_new) = states.states.insert(row);
        if is_new {
            states.compounds.push(self.network.homes.len() as CompoundId);
            self.network.homes.push(Home { frame: frame as u32, state: state as u32 });
        }
        states.compounds[state]
    }

    /// Stores a molecule, in a frame of its own if its skeleton is new.
    fn intern(&mut self, molecule: &Molecule) -> Result<CompoundId, EnumerateError> {
        let frame = Frame::of(molecule);
        let known = self.network.frames.iter().position(|f| f.prepared.frame.key() == frame.key());
        let number = match known {
            Some(number) => number,
            None => self.add_frame(frame)?,
        };
        let prepared = &self.network.frames[number].prepared;
        let row = prepared.canonical_row(&prepared.frame.decompose(molecule));
        Ok(self.insert(number, &row))
    }

    fn add_frame(&mut self, frame: Frame) -> Result<usize, EnumerateError> {
        let layout = Layout::new(&frame, &self.palette, self.network.identity)?;
        let places =
            self.cases.iter().enumerate().flat_map(|(n, (_, case))| compile::places(&frame, n, case)).collect();
        let states = StateTable::new(layout.n_words());
        let prepared = Prepared::new(frame, layout, places);
        self.network.frames.push(FrameStates { prepared, states, compounds: Vec::new() });
        Ok(self.network.frames.len() - 1)
    }
}

/// Sorts steps by rule and target and adds up the degeneracies of equal ones.
fn merge(steps: &mut Vec<(u8, CompoundId, Fraction)>) {
    steps.sort_by_key(|&(rule, to, _)| (rule, to));
    let mut kept = 0;
    for next in 1..steps.len() {
        let (rule, to, degeneracy) = steps[next];
        if (steps[kept].0, steps[kept].1) == (rule, to) {
            steps[kept].2 = steps[kept].2.plus(degeneracy);
        } else {
            kept += 1;
            steps[kept] = steps[next];
        }
    }
    steps.truncate(kept + 1);
}
