//! The stored network: compounds as states of frames, steps as compressed rows.
//!
//! Compounds are numbered as they are found, generation by generation, so a generation is a
//! range and every number is the same on each run. A step is eight bytes: its target, its rule
//! and a number into the list of distinct degeneracies. Steps of one compound stand together,
//! sorted by rule and target; `(from, to, rule)` is unique.
//!
//! Nothing here is a string or a molecule: [`Network::molecule`] makes one when asked.

use std::ops::Range;

use super::limits::Outcome;
use super::states::StateTable;
use crate::frame::{Decoration, Prepared};
use crate::molecule::{Identity, Molecule};
use crate::rules::Fraction;

/// Number of a compound in its network.
pub type CompoundId = u32;

/// A frame with the states found in it.
#[derive(Debug, Clone)]
pub struct FrameStates {
    /// The frame and its compiled rules.
    pub prepared: Prepared,
    pub(super) states: StateTable,
    /// Compound of each state.
    pub(super) compounds: Vec<CompoundId>,
}

/// Where a compound lives.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Home {
    pub(super) frame: u32,
    pub(super) state: u32,
}

#[derive(Debug, Clone, Copy)]
struct PackedStep {
    to: CompoundId,
    /// Rule in the low byte, degeneracy number above it.
    rule_and_degeneracy: u32,
}

/// One step of a network.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Step {
    /// Number of the step, in order of its compound.
    pub index: usize,
    /// What reacts.
    pub from: CompoundId,
    /// What it becomes.
    pub to: CompoundId,
    /// Index of the rule among the rules of the network.
    pub rule: usize,
    /// Path degeneracy.
    pub degeneracy: Fraction,
}

/// All that was reached from some parents by some rules.
#[derive(Debug, Clone)]
pub struct Network {
    pub(super) identity: Identity,
    pub(super) frames: Vec<FrameStates>,
    pub(super) homes: Vec<Home>,
    pub(super) n_parents: usize,
    /// First compound of each generation, and the number of compounds at the end.
    pub(super) generations: Vec<usize>,
    /// First step of each expanded compound, and the number of steps at the end.
    row_starts: Vec<usize>,
    steps: Vec<PackedStep>,
    degeneracies: Vec<Fraction>,
    pub(super) outcome: Outcome,
}

impl Network {
    pub(super) fn empty(identity: Identity) -> Network {
        Network {
            identity,
            frames: Vec::new(),
            homes: Vec::new(),
            n_parents: 0,
            generations: vec![0],
            row_starts: vec![0],
            steps: Vec::new(),
            degeneracies: Vec::new(),
            outcome: Outcome::Complete,
        }
    }

    /// Depth of identity.
    pub fn identity(&self) -> Identity {
        self.identity
    }

    /// How the enumeration ended.
    pub fn outcome(&self) -> Outcome {
        self.outcome
    }

    /// Number of compounds.
    pub fn n_compounds(&self) -> usize {
        self.homes.len()
    }

    /// Number of distinct steps.
    pub fn n_steps(&self) -> usize {
        self.steps.len()
    }

    /// The parents: the first compounds.
    pub fn parents(&self) -> Range<CompoundId> {
        0..self.n_parents as CompoundId
    }

    /// Number of generations, that of the parents included.
    pub fn n_generations(&self) -> usize {
        self.generations.len() - 1
    }

    /// Compounds first reached in a generation; none beyond the last.
    pub fn generation(&self, generation: usize) -> Range<CompoundId> {
        match (self.generations.get(generation), self.generations.get(generation + 1)) {
            (Some(&start), Some(&end)) => start as CompoundId..end as CompoundId,
            _ => 0..0,
        }
    }

    /// Fewest steps from a parent to a compound.
    pub fn generation_of(&self, compound: CompoundId) -> usize {
        self.generations.partition_point(|&start| start <= compound as usize) - 1
    }

    /// Whether the compound's steps are listed; if not, a limit was reached before.
    pub fn is_expanded(&self, compound: CompoundId) -> bool {
        (compound as usize) < self.row_starts.len() - 1
    }

    /// Steps that start at a compound, by rule and target.
    pub fn steps_from(&self, compound: CompoundId) -> impl ExactSizeIterator<Item = Step> + '_ {
        let row = match self.row_starts.get(compound as usize + 1) {
            Some(&end) => self.row_starts[compound as usize]..end,
            None => 0..0,
        };
        row.map(move |index| self.step(index, compound))
    }

    /// Every step, by compound.
    pub fn steps(&self) -> impl Iterator<Item = Step> + '_ {
        (0..self.n_compounds() as CompoundId).flat_map(|compound| self.steps_from(compound))
    }

    fn step(&self, index: usize, from: CompoundId) -> Step {
        let packed = self.steps[index];
        let degeneracy = self.degeneracies[(packed.rule_and_degeneracy >> 8) as usize];
        Step { index, from, to: packed.to, rule: (packed.rule_and_degeneracy & 0xFF) as usize, degeneracy }
    }

    /// The compound with a canonical state of a frame, if it is in the network.
    pub fn find_state(&self, frame: usize, row: &[u64]) -> Option<CompoundId> {
        let states = &self.frames[frame];
        states.states.find(row).map(|state| states.compounds[state])
    }

    /// Frames with their states.
    pub fn frames(&self) -> &[FrameStates] {
        &self.frames
    }

    /// The frame a compound lives in, and its packed state there.
    pub fn state(&self, compound: CompoundId) -> (&Prepared, &[u64]) {
        let home = self.homes[compound as usize];
        let frame = &self.frames[home.frame as usize];
        (&frame.prepared, frame.states.row(home.state as usize))
    }

    /// Number of the frame a compound lives in.
    pub fn frame_of(&self, compound: CompoundId) -> usize {
        self.homes[compound as usize].frame as usize
    }

    /// Whether a compound is a carbene.
    pub fn is_transient(&self, compound: CompoundId) -> bool {
        let (prepared, row) = self.state(compound);
        prepared.layout.is_transient(row)
    }

    /// A compound's decoration of its frame.
    pub fn decoration(&self, compound: CompoundId) -> Decoration {
        let (prepared, row) = self.state(compound);
        let mut decoration = Decoration::bare(&prepared.frame);
        prepared.layout.unpack(row, &mut decoration);
        decoration
    }

    /// A compound as a molecule, with the configuration that is real.
    pub fn molecule(&self, compound: CompoundId) -> Molecule {
        let mut molecule = self.molecule_as_stored(compound);
        molecule.keep_real_units(self.identity);
        molecule
    }

    /// A compound as a molecule with every candidate unit set, real or not.
    pub(super) fn molecule_as_stored(&self, compound: CompoundId) -> Molecule {
        let (prepared, _) = self.state(compound);
        prepared.frame.compose(&self.decoration(compound))
    }

    /// The compound that a molecule is, if it is in the network. Configuration that the
    /// molecule leaves open is not guessed: see [`Molecule::isomers`].
    pub fn find(&self, molecule: &Molecule) -> Option<CompoundId> {
        let key = crate::frame::Frame::of(molecule).key().clone();
        let states = self.frames.iter().find(|f| *f.prepared.frame.key() == key)?;
        let row = states.prepared.canonical_row_of(molecule)?;
        states.states.find(&row).map(|state| states.compounds[state])
    }

    /// Bytes of memory that compounds and steps take.
    pub fn n_bytes(&self) -> (usize, usize) {
        let states: usize =
            self.frames.iter().map(|f| f.states.n_bytes() + f.compounds.capacity() * size_of::<CompoundId>()).sum();
        let compounds =
            states + self.homes.capacity() * size_of::<Home>() + self.row_starts.capacity() * size_of::<usize>();
        (compounds, self.steps.capacity() * size_of::<PackedStep>())
    }

    /// Stores the steps of the next compound, in order of compounds.
    pub(super) fn push_row(&mut self, row: &[(u8, CompoundId, Fraction)]) {
        for &(rule, to, degeneracy) in row {
            let number = self.degeneracies.iter().position(|&d| d == degeneracy).unwrap_or_else(|| {
                self.degeneracies.push(degeneracy);
                self.degeneracies.len() - 1
            });
            self.steps.push(PackedStep { to, rule_and_degeneracy: (number as u32) << 8 | u32::from(rule) });
        }
        self.row_starts.push(self.steps.len());
    }

    /// Gives back memory that was taken in reserve.
    pub(super) fn shrink(&mut self) {
        self.steps.shrink_to_fit();
        self.row_starts.shrink_to_fit();
        self.homes.shrink_to_fit();
    }
}
