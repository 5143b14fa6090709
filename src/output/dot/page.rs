//! How the figure lies on the page: generations downward or to the right, the page upright or
//! across, whichever lets the type be largest.
//!
//! Graphviz fits the figure to the page; which way to lay it out must be said before. So its
//! size is estimated both ways from counts and lengths of labels. The estimate decides nothing
//! but this, and tests hold the type that results above six points for networks of some
//! dozens of compounds.

use super::text::name_lines;
use crate::output::record::{Compound, Network};

/// Long and short side of an A4 page inside its margins, in inches.
const PAGE_INCHES: [f64; 2] = [11.0, 7.6];
/// Most compounds that are fitted to one page: of more, nothing could be read.
pub(super) const MOST_FOR_A_PAGE: usize = 60;

/// How the figure lies.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Page {
    /// Where the generations run to.
    pub(super) direction: Direction,
    /// Width and height that the figure is fitted to, in inches; none if it cannot be read so.
    pub(super) inches: Option<(f64, f64)>,
}

/// Where the generations run to.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Direction {
    /// From the top down.
    Down,
    /// From the left to the right.
    Right,
}

/// About how much room a generation takes, before the figure is fitted, in inches.
#[derive(Debug, Default, Clone, Copy)]
struct Rank {
    sum_of_widths: f64,
    sum_of_heights: f64,
    widest: f64,
    n_arrows_in: f64,
}

/// Width and height of what stands on an arrow, in inches.
const ARROW_TEXT: (f64, f64) = (0.85, 0.27);
/// Room between two ranks, in inches, its arrows' text not counted.
const BETWEEN: f64 = 0.8;

impl Page {
    /// The page on which the type is largest.
    pub(super) fn of(network: &Network) -> Page {
        let ranks = ranks(network);
        let fits = |size: (f64, f64), page: (f64, f64)| (page.0 / size.0).min(page.1 / size.1);
        let [long, short] = PAGE_INCHES;
        let mut best = (0.0, Page { direction: Direction::Down, inches: Some((short, long)) });
        for (direction, size) in [(Direction::Down, down(&ranks)), (Direction::Right, rightward(&ranks))] {
            for inches in [(short, long), (long, short)] {
                // A figure that fits is not made larger, so there is nothing to gain beyond 1.
                let scale = fits(size, inches).min(1.0);
                if scale > best.0 {
                    best = (scale, Page { direction, inches: Some(inches) });
                }
            }
        }
        if network.compounds.len() > MOST_FOR_A_PAGE {
            best.1.inches = None;
        }
        best.1
    }
}

fn ranks(network: &Network) -> Vec<Rank> {
    let mut ranks: Vec<Rank> = Vec::new();
    let generation = |id: u32| network.compound(id).map_or(0, |c| c.generation as usize);
    for compound in &network.compounds {
        let index = compound.generation as usize;
        if ranks.len() <= index {
            ranks.resize(index + 1, Rank::default());
        }
        let (width, height) = node_size(compound);
        let rank = &mut ranks[index];
        rank.sum_of_widths += width + 0.2;
        rank.sum_of_heights += height + 0.2;
        rank.widest = rank.widest.max(width);
    }
    for step in network.steps.iter().filter(|step| generation(step.to) > generation(step.from)) {
        ranks[generation(step.to)].n_arrows_in += 1.0;
    }
    ranks
}

fn node_size(compound: &Compound) -> (f64, f64) {
    let lines = name_lines(compound);
    let n_lines = lines.iter().filter(|line| !line.is_empty()).count();
    let longest = lines.iter().map(|line| line.chars().count()).max().unwrap_or(0);
    let width = (0.12 * compound.condensed.chars().count() as f64).max(0.095 * longest as f64);
    (width + 0.15, 0.3 + 0.2 * n_lines as f64)
}

fn down(ranks: &[Rank]) -> (f64, f64) {
    let width = ranks.iter().map(|r| r.sum_of_widths.max(r.n_arrows_in * ARROW_TEXT.0)).fold(0.0, f64::max);
    // Long arrows take room beside the boxes; by this much in the figures looked at.
    (1.25 * width.max(5.0) + 0.8, ranks.len() as f64 * (BETWEEN + 0.7) + 2.5)
}

fn rightward(ranks: &[Rank]) -> (f64, f64) {
    let height = ranks.iter().map(|r| r.sum_of_heights.max(r.n_arrows_in * ARROW_TEXT.1)).fold(0.0, f64::max);
    let width = ranks.iter().map(|r| r.widest + BETWEEN + ARROW_TEXT.0).sum::<f64>();
    (width + 3.5, height.max(4.0) + 1.0)
}
