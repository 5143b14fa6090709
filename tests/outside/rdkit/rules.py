"""The rules of the chemistry page, each as a function from a compound to its matches.

A match is the set of bonds it cuts (or, where it cuts none, the place), the graph afterwards,
and the atoms it touches. Written from the chemistry page alone.
"""

import itertools
from fractions import Fraction

from compound import HALOGENS, LONE, SMALLEST_RING


class Match:
    def __init__(self, cut, compound, touched, raised=(), allowed=True):
        self.cut = frozenset(cut)          # what tells matches apart
        self.compound = compound           # after the step, configuration not yet settled
        self.touched = set(touched)
        self.raised = raised               # bonds whose order the step raises
        self.allowed = allowed


def bond(a, b):
    return frozenset((a, b))


def replace(c, old, symbol):
    """Puts a new atom in the place of a ligand; returns it. The seat keeps nothing else."""
    (seat,) = c.near[old]
    c.drop(old)
    return c.add(symbol, seat)


def site_bonds(c, order):
    """Ordered pairs of carbon sites joined by a bond of this order."""
    return [(a, b) for x, y, o in c.bonds() if o == order and c.is_site(x) and c.is_site(y)
            for a, b in ((x, y), (y, x))]


# Core rules.

def hydrogenolysis(c):
    for a in filter(c.is_site, c.atoms()):
        for x in c.leaving(a):
            after = c.copy()
            replace(after, x, "H")
            yield Match([bond(a, x)], after, [a])


def vicinal_elimination(c):
    for order in (1, 2):
        for a, b in site_bonds(c, order):
            if a > b:
                continue
            for x, y in itertools.product(c.leaving(a), c.leaving(b)):
                after = c.copy()
                after.drop(x)
                after.drop(y)
                after.join(a, b, order + 1)
                yield Match([bond(a, x), bond(b, y)], after, [a, b], [(a, b)])


def geminal_elimination(c):
    for a in filter(c.is_site, c.atoms()):
        if not c.is_saturated(a):
            continue
        for x, y in itertools.combinations(c.leaving(a), 2):
            after = c.copy()
            replace(after, x, LONE)
            replace(after, y, LONE)
            yield Match([bond(a, x), bond(a, y)], after, [a])


# Follow-up rules.

def alkyne_hydrogenation(c):
    return hydrogenation(c, 3)


def alkene_hydrogenation(c):
    if any(c.symbol[a] in HALOGENS for a in c.atoms()):
        return []
    return hydrogenation(c, 2)


def hydrogenation(c, order):
    for a, b in site_bonds(c, order):
        if a < b:
            after = c.copy()
            after.join(a, b, order - 1)
            after.add("H", a)
            after.add("H", b)
            yield Match([(a, b)], after, [a, b])


def carbene_hydration(c):
    for a in c.carbenes():
        lone = [n for n in c.near[a] if c.symbol[n] == LONE]
        others = [n for n in c.near[a] if n not in lone]
        halogens = c.leaving(a)
        after = c.copy()
        if len(halogens) == 2:
            for n in lone + halogens:
                after.drop(n)
            after.add("O", a, 3, charge=1)
            after.charge[a] = -1
            yield Match([bond(a, x) for x in halogens], after, [a])
        elif len(halogens) == 1 and c.hydrogens(a):
            for n in lone + halogens:
                after.drop(n)
            after.add("H", a)
            after.add("O", a, 2)
            yield Match([bond(a, x) for x in halogens], after, [a])
        else:
            assert len(others) == 2
            for n in lone:
                after.drop(n)
            after.add("H", a)
            after.add("H", after.add("O", a))
            yield Match([a], after, [a])


def carbene_shift(c):
    for a in c.carbenes():
        for b in c.near[a]:
            if not c.is_site(b) or not c.is_saturated(b):
                continue
            for h in c.hydrogens(b):
                after = c.copy()
                for n in list(c.near[a]):
                    if c.symbol[n] == LONE:
                        after.drop(n)
                after.drop(h)
                after.add("H", a)
                after.join(a, b, 2)
                yield Match([bond(b, h)], after, [a, b], [(a, b)])


def aryl_hydrogenolysis(c):
    for a in c.atoms():
        if c.symbol[a] == "C" and c.aromatic[a]:
            for x in c.leaving(a):
                after = c.copy()
                replace(after, x, "H")
                yield Match([bond(a, x)], after, [a])


def conjugate_elimination(c):
    for b, d in site_bonds(c, 2):
        if b > d:
            continue
        ends = lambda here, besides: [n for n, o in c.near[here].items()
                                      if o == 1 and n != besides and c.is_site(n)]
        for a, e in itertools.product(ends(b, d), ends(d, b)):
            if a == e:
                continue
            for x, y in itertools.product(c.leaving(a), c.leaving(e)):
                after = c.copy()
                after.drop(x)
                after.drop(y)
                after.join(a, b, 2)
                after.join(b, d, 1)
                after.join(d, e, 2)
                yield Match([bond(a, x), bond(e, y)], after, [a, b, d, e], [(a, b), (d, e)])


def vinylidene_elimination(c):
    for a, b in site_bonds(c, 2):
        if len(c.leaving(a)) == 2:
            for h in c.hydrogens(b):
                x, y = c.leaving(a)
                after = c.copy()
                after.drop(x)
                after.drop(y)
                after.drop(h)
                after.add("H", a)
                after.join(a, b, 3)
                yield Match([bond(a, x), bond(a, y), bond(b, h)], after, [a, b], [(a, b)])


def dehydrohalogenation(c):
    for a, b in site_bonds(c, 1):
        for h, x in itertools.product(c.hydrogens(a), c.leaving(b)):
            after = c.copy()
            after.drop(h)
            after.drop(x)
            after.join(a, b, 2)
            yield Match([bond(a, h), bond(b, x)], after, [a, b], [(a, b)])


def hydrolysis(c):
    for a in filter(c.is_site, c.atoms()):
        if c.is_saturated(a):
            for x in c.leaving(a):
                after = c.copy()
                after.add("H", replace(after, x, "O"))
                yield Match([bond(a, x)], after, [a])


def coupling(c):
    places = [(a, x) for a in c.atoms() if c.is_site(a) for x in c.leaving(a)]
    for (a, x), (b, y) in itertools.combinations_with_replacement(places, 2):
            after, shift = c.copy(), len(c.symbol)
            after.symbol += c.symbol
            after.charge += c.charge
            after.aromatic += c.aromatic
            after.near += [{n + shift: o for n, o in near.items()} for near in c.near]
            for k, (ligands, sign) in c.hand.items():
                after.hand[k + shift] = (tuple(n + shift for n in ligands), sign)
            for (k, m), (p, q, cis) in c.geom.items():
                after.geom[(k + shift, m + shift)] = (p + shift, q + shift, cis)
            after.drop(x)
            after.drop(y + shift)
            after.join(a, b + shift)
            yield Match([(x, y)], after, [a, b + shift])


RULES = {
    "hydrogenolysis": hydrogenolysis,
    "vicinal-elimination": vicinal_elimination,
    "geminal-elimination": geminal_elimination,
    "alkyne-hydrogenation": alkyne_hydrogenation,
    "alkene-hydrogenation": alkene_hydrogenation,
    "carbene-hydration": carbene_hydration,
    "carbene-shift": carbene_shift,
    "aryl-hydrogenolysis": aryl_hydrogenolysis,
    "conjugate-elimination": conjugate_elimination,
    "vinylidene-elimination": vinylidene_elimination,
    "dehydrohalogenation": dehydrohalogenation,
    "hydrolysis": hydrolysis,
    "coupling": coupling,
}
CORE = ("hydrogenolysis", "vicinal-elimination", "geminal-elimination")
NAMES_A_CARBENE = ("carbene-hydration", "carbene-shift")


# Ring limits, asked of the bonds that a step raises.

def small(ring):
    return ring is not None and ring < SMALLEST_RING


def keeps_ring_limits(c, raised):
    for a, b in raised:
        if c.near[a][b] == 3 and small(c.ring_of_bond(a, b)):
            return False
        for middle, end in ((a, b), (b, a)):
            for n, order in c.near[middle].items():
                if n != end and order == 2 and c.near[a][b] == 2 and small(c.ring_of_bend(n, middle, end)):
                    return False
        if breaks_bredt(c, a, b) or breaks_bredt(c, b, a):
            return False
    return True


def breaks_bredt(c, head, other):
    """Whether `head` is a bridgehead of a bridged system of rings that are all small, with
    the bond head=other in it: some atom `foot` is joined to it by three bridges with no atom
    in common, each at least one atom long, any two of which make a ring below the limit."""
    for foot in c.atoms():
        if foot == head or len(c.near[foot]) < 3:
            continue
        bridges = []

        def walk(path):
            for n in c.near[path[-1]]:
                if n == foot and len(path) > 1:
                    bridges.append(frozenset(path[1:]))
                    starts.append(path[1])
                elif n != head and n != foot and n not in path and len(path) + 1 < SMALLEST_RING:
                    walk(path + [n])

        starts = []
        walk([head])
        for trio in itertools.combinations(range(len(bridges)), 3):
            if other in (starts[i] for i in trio) and all(
                    not bridges[i] & bridges[j] and len(bridges[i]) + len(bridges[j]) + 2 < SMALLEST_RING
                    for i, j in itertools.combinations(trio, 2)):
                return True
    return False


def products(c, rule, identity):
    """{InChI: (compound, path degeneracy)} of one rule on one compound."""
    if c.carbenes() and rule not in NAMES_A_CARBENE:
        return {}
    matches = {}
    for match in RULES[rule](c):
        after = match.compound
        after.perceive_aromatic()
        if not keeps_ring_limits(after, match.raised):
            continue
        units = after.complete(match.touched)
        if identity == "geometric":
            units = [u for u in units if isinstance(u, tuple)]
        elif identity == "constitutional":
            units = []
        outcomes = matches.setdefault(match.cut, {})
        for setting in after.settings(units):
            outcomes.setdefault(setting.inchi(identity), setting)
    found = {}
    for outcomes in matches.values():
        for inchi, compound in outcomes.items():
            first, total = found.get(inchi, (compound, Fraction(0)))
            found[inchi] = (first, total + Fraction(1, len(outcomes)))
    return dict(sorted(found.items()))
