"""A compound as a plain graph with explicit hydrogens, and its identity by InChI.

Every tetrahedral atom with four ligands carries a handedness over its ligands, every C=C with
two ligands at each end carries a geometry, whether or not they mean anything: InChI alone
decides which are real. So a branch that is cut leaves the right configuration behind.

A carbene carbon is drawn with two astatine ligands in place of its lone pair (the surrogate).
RDKit reads SMILES, writes SMILES and calls InChI; nothing else of it is used.
"""

import itertools
import random

from rdkit import Chem, RDLogger
from rdkit.Chem import AllChem

RDLogger.DisableLog("rdApp.*")
# The older perception forgets double bonds whose ends differ by configuration alone.
Chem.SetUseLegacyStereoPerception(False)

HALOGENS = ("F", "Cl", "Br", "I")
SMALLEST_RING = 8
LONE = "At"


class Compound:
    def __init__(self):
        self.symbol = []      # by atom; None for an atom that is gone
        self.charge = []
        self.aromatic = []    # by atom
        self.near = []        # by atom: {neighbour: bond order, Kekulé for aromatic bonds}
        self.hand = {}        # atom -> (four ligands, True for anticlockwise from the first)
        self.geom = {}        # (low atom, high atom) -> (ligand of low, ligand of high, is cis)

    def copy(self):
        other = Compound()
        other.symbol, other.charge = self.symbol[:], self.charge[:]
        other.aromatic = self.aromatic[:]
        other.near = [dict(n) for n in self.near]
        other.hand, other.geom = dict(self.hand), dict(self.geom)
        return other

    # Edits.
    def add(self, symbol, to=None, order=1, charge=0):
        self.symbol.append(symbol)
        self.charge.append(charge)
        self.aromatic.append(False)
        self.near.append({})
        new = len(self.symbol) - 1
        if to is not None:
            self.join(to, new, order)
        return new

    def join(self, a, b, order=1):
        self.near[a][b] = self.near[b][a] = order

    def drop(self, atom):
        for n in list(self.near[atom]):
            del self.near[n][atom]
        self.near[atom] = {}
        self.symbol[atom] = None

    # Facts.
    def atoms(self):
        return [i for i, s in enumerate(self.symbol) if s is not None]

    def bonds(self):
        return [(a, b, o) for a in self.atoms() for b, o in self.near[a].items() if a < b]

    def is_carbene(self, atom):
        return sum(self.symbol[n] == LONE for n in self.near[atom]) == 2

    def carbenes(self):
        return [a for a in self.atoms() if self.is_carbene(a)]

    def is_site(self, a):
        """Chemistry.md: a non-aromatic carbon whose multiple bonds all go to carbon."""
        return (
            self.symbol[a] == "C"
            and self.charge[a] == 0
            and not self.aromatic[a]
            and not self.is_carbene(a)
            and all(o == 1 or self.symbol[n] == "C" for n, o in self.near[a].items())
        )

    def is_saturated(self, a):
        return all(o == 1 for o in self.near[a].values())

    def leaving(self, a):
        """The halogens on an atom that can leave it."""
        return [n for n in sorted(self.near[a])
                if self.symbol[n] in HALOGENS and self.charge[n] == 0 and len(self.near[n]) == 1]

    def hydrogens(self, a):
        return [n for n in sorted(self.near[a]) if self.symbol[n] == "H"]

    # Rings.
    def distance(self, a, b, closed=()):
        """Bonds between two atoms, never over the bond a-b and never through `closed`."""
        seen, edge, steps = {a}, [a], 0
        while edge:
            steps += 1
            wave = []
            for x in edge:
                for y in self.near[x]:
                    if (x == a and y == b and not closed) or y in seen or y in closed:
                        continue
                    if y == b:
                        return steps
                    seen.add(y)
                    wave.append(y)
            edge = wave
        return None

    def ring_of_bond(self, a, b):
        d = self.distance(a, b)
        return None if d is None else d + 1

    def ring_of_bend(self, a, middle, b):
        if b in self.near[a]:
            return 3
        d = self.distance(a, b, (middle,))
        return None if d is None else d + 2

    def six_rings(self):
        """Six-rings of carbon, each once, atoms in ring order."""
        found = {}

        def grow(path):
            if len(path) == 6:
                if path[0] in self.near[path[-1]]:
                    found.setdefault(frozenset(path), tuple(path))
                return
            for n in self.near[path[-1]]:
                if self.symbol[n] == "C" and n > path[0] and n not in path:
                    grow(path + [n])

        for a in self.atoms():
            if self.symbol[a] == "C":
                grow([a])
        return list(found.values())

    def perceive_aromatic(self):
        """Marks six-rings that alternate in some Kekulé form."""
        rings = self.six_rings()
        alternating = lambda near, ring: sorted(
            near[ring[i]][ring[i - 1]] for i in range(6)) == [1, 1, 1, 2, 2, 2] and all(
            near[ring[i]][ring[i - 1]] != near[ring[i - 1]][ring[i - 2]] for i in range(6))
        seen, todo, marked = set(), [[dict(n) for n in self.near]], set()
        while todo:
            near = todo.pop()
            key = tuple(near[r[i]][r[i - 1]] for r in rings for i in range(6))
            if key in seen:
                continue
            seen.add(key)
            for ring in rings:
                if alternating(near, ring):
                    marked.update(ring)
                    other = [dict(n) for n in near]
                    for i in range(6):
                        a, b = ring[i], ring[i - 1]
                        other[a][b] = other[b][a] = 3 - near[a][b]
                    todo.append(other)
        for a in marked:
            self.aromatic[a] = True

    # Configuration.
    def centres(self):
        return [a for a in self.atoms()
                if len(self.near[a]) == 4 and self.is_saturated(a)
                and ((self.symbol[a] in ("C", "Si") and self.charge[a] == 0)
                     or (self.symbol[a] in ("N", "P") and self.charge[a] == 1))]

    def double_bonds(self):
        found = []
        for a, b, order in self.bonds():
            if order != 2 or self.symbol[a] != "C" or self.symbol[b] != "C":
                continue
            if self.aromatic[a] and self.aromatic[b]:
                continue
            if len(self.near[a]) != 3 or len(self.near[b]) != 3:
                continue
            ring = self.ring_of_bond(a, b)
            if ring is None or ring >= SMALLEST_RING:
                found.append((a, b))
        return found

    def ends(self, a, b):
        """The first ligand at each end of a double bond."""
        return min(n for n in self.near[a] if n != b), min(n for n in self.near[b] if n != a)

    def complete(self, touched=()):
        """Keeps the configuration that still fits and gives the rest any; units lost go.

        Returns the units that end at a touched atom.
        """
        touched = set(touched)
        centres, bonds = self.centres(), self.double_bonds()
        self.hand = {a: self.hand.get(a) for a in centres}
        self.geom = {k: self.geom.get(k) for k in bonds}
        for a, value in list(self.hand.items()):
            if value is None or set(value[0]) != set(self.near[a]):
                self.hand[a] = (tuple(sorted(self.near[a])), True)
        for (a, b), value in list(self.geom.items()):
            if value is None or value[0] not in self.near[a] or value[1] not in self.near[b]:
                self.geom[(a, b)] = (*self.ends(a, b), True)
        units = [a for a in centres if a in touched]
        return units + [k for k in bonds if k[0] in touched or k[1] in touched]

    def settings(self, units):
        """Every setting of the units, the others kept."""
        for values in itertools.product((True, False), repeat=len(units)):
            other = self.copy()
            for unit, value in zip(units, values):
                store = other.hand if isinstance(unit, int) else other.geom
                store[unit] = (*store[unit][:-1], value)
            yield other

    # Out to RDKit.
    def to_rdkit(self, identity="full", carbene="surrogate"):
        mol, place = Chem.RWMol(), {}
        for a in self.atoms():
            if self.symbol[a] == LONE and carbene == "radical":
                continue
            atom = Chem.Atom(self.symbol[a])
            atom.SetFormalCharge(self.charge[a])
            atom.SetNoImplicit(True)
            if carbene == "radical" and self.is_carbene(a):
                atom.SetNumRadicalElectrons(2)
            place[a] = mol.AddAtom(atom)
        orders = {1: Chem.BondType.SINGLE, 2: Chem.BondType.DOUBLE, 3: Chem.BondType.TRIPLE}
        for a, b, order in self.bonds():
            if a in place and b in place:
                mol.AddBond(place[a], place[b], orders[order])
        if identity == "full":
            for a, (ligands, anticlockwise) in self.hand.items():
                if any(n not in place for n in ligands):
                    continue
                back = {place[n]: n for n in ligands}
                order = [back[b.GetOtherAtomIdx(place[a])] for b in mol.GetAtomWithIdx(place[a]).GetBonds()]
                even = is_even([ligands.index(n) for n in order])
                tag = Chem.ChiralType.CHI_TETRAHEDRAL_CCW if anticlockwise == even \
                    else Chem.ChiralType.CHI_TETRAHEDRAL_CW
                mol.GetAtomWithIdx(place[a]).SetChiralTag(tag)
        if identity != "constitutional":
            for (a, b), (x, y, cis) in self.geom.items():
                bond = mol.GetBondBetweenAtoms(place[a], place[b])
                if bond.GetBeginAtomIdx() != place[a]:
                    x, y = y, x
                bond.SetStereoAtoms(place[x], place[y])
                bond.SetStereo(Chem.BondStereo.STEREOCIS if cis else Chem.BondStereo.STEREOTRANS)
        mol = mol.GetMol()
        mol.UpdatePropertyCache(strict=True)
        Chem.GetSymmSSSR(mol)
        return mol

    def inchi(self, identity="full"):
        """The identity. With centres left open InChI marks a double bond on a ring although
        either mark means the same; such a mark is left out."""
        found = Chem.MolToInchi(self.to_rdkit(identity))
        if identity != "geometric" or "/b" not in found:
            return found
        plain = self.copy()
        for a, b in [k for k in self.geom if any(self.in_ring(end, k) for end in k)]:
            turned = plain.copy()
            x, y, cis = turned.geom[a, b]
            turned.geom[a, b] = (x, y, not cis)
            if Chem.MolToInchi(turned.to_rdkit(identity)) == found:
                del plain.geom[a, b]
                found = Chem.MolToInchi(plain.to_rdkit(identity))
        return found

    def in_ring(self, end, pair):
        """Whether an end of a double bond is in a ring without that bond."""
        around = [n for n in self.near[end] if n not in pair]
        return len(around) == 2 and self.distance(*around, (end,)) is not None

    def smiles(self, identity="full"):
        """A SMILES that reads back to this compound, found by trying; carbenes bracketed."""
        want = self.inchi(identity)
        mol = self.to_rdkit(identity, carbene="radical")
        Chem.SanitizeMol(mol)
        bare = Chem.RemoveHs(Chem.Mol(mol))
        Chem.AssignStereochemistry(bare, cleanIt=False, force=True)
        drafts = [Chem.MolToSmiles(bare)]
        if not self.carbenes():
            drafts.append(Chem.MolToSmiles(Chem.MolFromInchi(want)))
        drafts += [Chem.MolToSmiles(m, doRandom=True) for _ in range(60) for m in (bare, mol)]
        for draft in drafts:
            # Read and written once more, to lose marks that mean nothing; as drafted if that harms.
            again = Chem.MolToSmiles(Chem.MolFromSmiles(draft))
            for text in (again, draft):
                if "[H]" not in text and inchi_as_written(text, identity) == want:
                    return text
        raise ValueError(f"no SMILES reads back to {want}; tried {drafts[:3]}")


def is_even(order):
    return sum(a > b for i, a in enumerate(order) for b in order[i + 1:]) % 2 == 0


def read(smiles):
    """Reads a SMILES; configuration that is not given is set to any."""
    return read_with_open_units(smiles)[0]


def read_with_open_units(smiles):
    """Reads a SMILES; also returns the units whose configuration is not given."""
    drawn = Chem.MolFromSmiles(smiles)
    assert drawn is not None, smiles
    radicals = {a.GetIdx() for a in drawn.GetAtoms() if a.GetNumRadicalElectrons() == 2}
    mol = Chem.AddHs(drawn)
    Chem.Kekulize(mol)
    c = Compound()
    for atom in mol.GetAtoms():
        i = c.add(atom.GetSymbol(), charge=atom.GetFormalCharge())
        c.aromatic[i] = atom.GetIsAromatic()
    for bond in mol.GetBonds():
        c.join(bond.GetBeginAtomIdx(), bond.GetEndAtomIdx(), int(bond.GetBondTypeAsDouble()))
    for a in sorted(radicals):
        c.add(LONE, a)
        c.add(LONE, a)
    for atom in mol.GetAtoms():
        tag = atom.GetChiralTag()
        if tag in (Chem.ChiralType.CHI_TETRAHEDRAL_CCW, Chem.ChiralType.CHI_TETRAHEDRAL_CW):
            ligands = tuple(b.GetOtherAtomIdx(atom.GetIdx()) for b in atom.GetBonds())
            if len(ligands) == 4:
                c.hand[atom.GetIdx()] = (ligands, tag == Chem.ChiralType.CHI_TETRAHEDRAL_CCW)
    for bond in mol.GetBonds():
        if bond.GetStereo() <= Chem.BondStereo.STEREOANY:
            continue
        a, b = bond.GetBeginAtomIdx(), bond.GetEndAtomIdx()
        x, y = bond.GetStereoAtoms()
        cis = bond.GetStereo() in (Chem.BondStereo.STEREOCIS, Chem.BondStereo.STEREOZ)
        c.geom[(min(a, b), max(a, b))] = (x, y, cis) if a < b else (y, x, cis)
    given = set(c.hand) | set(c.geom)
    c.complete()
    return c, [u for u in [*c.hand, *c.geom] if u not in given]


def inchi_as_written(smiles, identity):
    """InChI of a SMILES with nothing set that it leaves open."""
    c, open_units = read_with_open_units(smiles)
    for unit in open_units:
        (c.hand if isinstance(unit, int) else c.geom).pop(unit)
    return c.inchi(identity)


def isomers(smiles, identity):
    """The isomers that a SMILES stands for, one compound by InChI, in the order of InChI."""
    c, open_units = read_with_open_units(smiles)
    kinds = {"full": (int, tuple), "geometric": (tuple,), "constitutional": ()}[identity]
    units = [u for u in open_units if isinstance(u, kinds)]
    # Units that never matter by themselves (CH2, CCl3) need no trying.
    twins = lambda a, besides: len(ls := [n for n in c.near[a] if n != besides]) != len(
        {(c.symbol[n], n if len(c.near[n]) > 1 else -1) for n in ls})
    units = [u for u in units
             if not (twins(u, None) if isinstance(u, int) else twins(u[0], u[1]) or twins(u[1], u[0]))]
    found = {}
    for setting in c.settings(units):
        found.setdefault(setting.inchi(identity), setting)
    return dict(sorted(found.items()))


def random_smiles(compound, identity, how_many, seed):
    """Different random SMILES that RDKit reads back to the same InChI.

    The random writer sometimes gives a first atom the wrong handedness: those texts are thrown
    away. At least one text is found, at most `how_many`.
    """
    want = compound.inchi(identity)
    found = [compound.smiles(identity)]
    mol = Chem.MolFromSmiles(found[0])
    raw = Chem.RemoveHs(compound.to_rdkit(identity))
    picker = random.Random(seed)
    for attempt in range(400):
        source = raw if attempt % 4 == 3 else mol
        atoms = list(range(source.GetNumAtoms()))
        picker.shuffle(atoms)
        shuffled = Chem.RenumberAtoms(source, atoms)
        text = Chem.MolToSmiles(shuffled, canonical=False)
        if text in found or "H2]" in text or "H3]" in text or "[H]" in text:
            continue
        back = Chem.MolFromSmiles(text)
        if back is not None and Chem.MolToInchi(back) == want:
            found.append(text)
        if len(found) > how_many:
            break
    return (found[1:] or found)[:how_many]


def fits_in_space(smiles):
    """Whether RDKit can build the isomer in space: a small bridged system has no in,out form."""
    mol = Chem.AddHs(Chem.MolFromSmiles(smiles))
    return AllChem.EmbedMolecule(mol, randomSeed=7, maxAttempts=20) == 0
