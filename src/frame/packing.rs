//! How a decoration is packed into machine words.
//!
//! A state is a row of [`Layout::n_words`] words. Each site has a *digit*, the place of its
//! halogens and lone pair in a list of all that fit on it; each open bond two bits for its
//! order; each unit of configuration one bit, as far as the identity asks for it. Digits come
//! first, from the high end of word 0, so that comparing rows word by word compares digits in
//! site order. No field crosses a word.
//!
//! Invariant: two decorations have one packing exactly when they are equal as far as the
//! identity tells.

use super::decoration::Decoration;
use super::skeleton::Frame;
use crate::molecule::{BondOrder, Halogen, Identity};

/// Most words a state may take. With three bits a carbon and two a bond this is some hundred
/// carbons.
pub const MOST_WORDS: usize = 16;

/// A compound has more places to decorate than a state can hold.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("the skeleton has {n_sites} carbon atoms, more than a state of {MOST_WORDS} words can hold")]
pub struct TooLarge {
    /// Carbon sites of the frame.
    pub n_sites: usize,
}

/// What can stand on a site.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Content {
    /// Whether the carbon is a carbene.
    pub is_carbene: bool,
    /// Halogens, by [`Halogen`].
    pub halogens: [u8; 4],
}

/// Place of some bits in a row of words.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Field {
    /// Index of the word.
    pub word: usize,
    /// Bits to the right of the field.
    pub shift: u32,
    /// The field's bits, moved to the right end.
    pub mask: u64,
}

impl Field {
    /// Reads the field.
    pub fn get(self, row: &[u64]) -> u64 {
        row[self.word] >> self.shift & self.mask
    }

    /// Writes the field.
    pub fn set(self, row: &mut [u64], value: u64) {
        row[self.word] = row[self.word] & !(self.mask << self.shift) | value << self.shift;
    }
}

/// The fields of a frame's states.
#[derive(Debug, Clone)]
pub struct Layout {
    identity: Identity,
    palette: Vec<Halogen>,
    n_words: usize,
    /// By most halogens that fit: what can stand on such a site.
    contents: Vec<Vec<Content>>,
    /// By most halogens that fit: digit of each content, by [`content_index`].
    digits: Vec<Vec<u8>>,
    /// By site: which list of contents is its own.
    list_of: Vec<usize>,
    /// Fields of the sites' digits.
    pub(super) sites: Vec<Field>,
    /// Fields of the open bonds' orders.
    pub(super) orders: Vec<Field>,
    /// Fields of the open bonds' geometry; empty at constitutional identity.
    pub(super) trans: Vec<Field>,
    /// Fields of the centres' handedness; empty below full identity.
    pub(super) clockwise: Vec<Field>,
}

impl Layout {
    /// The layout for states of a frame that hold only the halogens in `palette`.
    ///
    /// # Errors
    /// * more than [`MOST_WORDS`] words would be needed: `TooLarge`
    pub fn new(frame: &Frame, palette: &[Halogen], identity: Identity) -> Result<Layout, TooLarge> {
        let contents: Vec<Vec<Content>> = (0..=4).map(|most| all_contents(palette, most)).collect();
        let digits = contents.iter().map(|list| digits_of(list)).collect();
        let n_sites = frame.sites().len();
        let list_of: Vec<usize> = (0..n_sites).map(|site| usize::from(frame.most_halogens(site))).collect();
        let mut cursor = Cursor::default();
        let sites = list_of.iter().map(|&list| cursor.take(bits_for(contents[list].len()))).collect();
        let n_bonds = frame.open_bonds().len();
        let orders = (0..n_bonds).map(|_| cursor.take(2)).collect();
        let n_geometries = if identity >= Identity::Geometric { n_bonds } else { 0 };
        let trans = (0..n_geometries).map(|_| cursor.take(1)).collect();
        let n_centres = if identity == Identity::Full { frame.centres().len() } else { 0 };
        let clockwise = (0..n_centres).map(|_| cursor.take(1)).collect();
        let n_words = cursor.n_words();
        if n_words > MOST_WORDS {
            return Err(TooLarge { n_sites });
        }
        let palette = palette.to_vec();
        Ok(Layout { identity, palette, n_words, contents, digits, list_of, sites, orders, trans, clockwise })
    }

    /// Words of a state.
    pub fn n_words(&self) -> usize {
        self.n_words
    }

    /// The halogens that states may hold.
    pub fn palette(&self) -> &[Halogen] {
        &self.palette
    }

    /// Depth of identity of the states.
    pub fn identity(&self) -> Identity {
        self.identity
    }

    /// Packs a decoration. `row` is [`Layout::n_words`] long.
    pub fn pack(&self, decoration: &Decoration, row: &mut [u64]) {
        row.fill(0);
        for site in 0..self.sites.len() {
            self.pack_site(decoration, site, row);
        }
        for bond in 0..self.orders.len() {
            self.orders[bond].set(row, order_code(decoration.orders[bond]));
        }
        for (field, &trans) in self.trans.iter().zip(&decoration.trans) {
            field.set(row, u64::from(trans));
        }
        for (field, &clockwise) in self.clockwise.iter().zip(&decoration.clockwise) {
            field.set(row, u64::from(clockwise));
        }
    }

    /// Packs one site's digit.
    pub(super) fn pack_site(&self, decoration: &Decoration, site: usize, row: &mut [u64]) {
        let content = Content { is_carbene: decoration.carbenes[site], halogens: decoration.halogens[site] };
        let digit = self.digits[self.list_of[site]][content_index(content)];
        self.sites[site].set(row, u64::from(digit));
    }

    /// Packs one open bond's order.
    pub(super) fn pack_order(&self, decoration: &Decoration, bond: usize, row: &mut [u64]) {
        self.orders[bond].set(row, order_code(decoration.orders[bond]));
    }

    /// Writes the candidate mask of a decoration: a one at each configuration bit that means
    /// something. `row` is [`Layout::n_words`] long.
    pub fn candidates(&self, frame: &Frame, decoration: &Decoration, row: &mut [u64]) {
        row.fill(0);
        for (bond, field) in self.trans.iter().enumerate() {
            field.set(row, u64::from(decoration.is_candidate_bond(frame, bond)));
        }
        for (centre, field) in self.clockwise.iter().enumerate() {
            field.set(row, u64::from(decoration.is_candidate_centre(frame, centre)));
        }
    }

    /// Whether any site of a state is a carbene.
    pub fn is_transient(&self, row: &[u64]) -> bool {
        (0..self.sites.len())
            .any(|site| self.contents[self.list_of[site]][self.sites[site].get(row) as usize].is_carbene)
    }

    /// Unpacks a state into a decoration of the same frame, whose buffers are reused.
    pub fn unpack(&self, row: &[u64], decoration: &mut Decoration) {
        for site in 0..self.sites.len() {
            let content = self.contents[self.list_of[site]][self.sites[site].get(row) as usize];
            decoration.halogens[site] = content.halogens;
            decoration.carbenes[site] = content.is_carbene;
        }
        for bond in 0..self.orders.len() {
            decoration.orders[bond] = order_of(self.orders[bond].get(row));
        }
        for (field, trans) in self.trans.iter().zip(&mut decoration.trans) {
            *trans = field.get(row) == 1;
        }
        for (field, clockwise) in self.clockwise.iter().zip(&mut decoration.clockwise) {
            *clockwise = field.get(row) == 1;
        }
    }
}

/// Gives out fields from the high end of word 0 on.
#[derive(Default)]
struct Cursor {
    word: usize,
    used: u32,
}

impl Cursor {
    fn take(&mut self, bits: u32) -> Field {
        if self.used + bits > u64::BITS {
            self.word += 1;
            self.used = 0;
        }
        self.used += bits;
        Field { word: self.word, shift: u64::BITS - self.used, mask: (1 << bits) - 1 }
    }

    fn n_words(&self) -> usize {
        self.word + 1
    }
}

fn bits_for(n_values: usize) -> u32 {
    n_values.next_power_of_two().trailing_zeros().max(1)
}

/// Everything that fits on a site with `most` free bonds, bare carbon first.
fn all_contents(palette: &[Halogen], most: u8) -> Vec<Content> {
    let mut list = Vec::new();
    for (is_carbene, room) in [(false, Some(most)), (true, most.checked_sub(2))] {
        let Some(room) = room else { continue };
        let mut halogens = vec![[0u8; 4]];
        for &halogen in palette {
            let more: Vec<[u8; 4]> = halogens
                .iter()
                .flat_map(|&counts| {
                    let left = room - counts.iter().sum::<u8>();
                    (1..=left).map(move |n| {
                        let mut counts = counts;
                        counts[halogen as usize] = n;
                        counts
                    })
                })
                .collect();
            halogens.extend(more);
        }
        list.extend(halogens.into_iter().map(|halogens| Content { is_carbene, halogens }));
    }
    list.sort_unstable_by_key(|c| (c.is_carbene, c.halogens.iter().sum::<u8>(), c.halogens));
    list
}

/// A content as a number below 1,250.
fn content_index(content: Content) -> usize {
    let [f, cl, br, i] = content.halogens.map(usize::from);
    (((usize::from(content.is_carbene) * 5 + f) * 5 + cl) * 5 + br) * 5 + i
}

fn digits_of(list: &[Content]) -> Vec<u8> {
    let mut digits = vec![u8::MAX; 1250];
    for (digit, &content) in list.iter().enumerate() {
        digits[content_index(content)] = digit as u8;
    }
    digits
}

fn order_code(order: BondOrder) -> u64 {
    order as u64
}

fn order_of(code: u64) -> BondOrder {
    match code {
        0 => BondOrder::Single,
        1 => BondOrder::Double,
        2 => BondOrder::Triple,
        _ => BondOrder::Aromatic,
    }
}
