"""Writes networks.csv and network_compounds.csv: whole networks under the core rules."""

import csv
from fractions import Fraction

from compound import isomers
from rules import CORE, products

PARENTS = """
ClC(Cl)(Cl)Cl
ClC(Cl)=C(Cl)Cl
ClC(Cl)C(Cl)Cl
ClC(Cl)(Cl)C(Cl)(Cl)Cl
ClCC(Cl)CCl
BrCC(Br)CCl
FC(F)(F)C(Cl)Br
FC(F)(Cl)C(F)(Cl)Cl
NC(=O)C(Cl)(Cl)Br
O=CC(Cl)(Cl)Cl
CC(Cl)OC(Cl)CCl
ClC1CCC1Cl
ClC1C(Cl)C(Cl)C1Cl
ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1Cl
ClC1C2CCC(C2)C1Cl
ClC1CCCCCCC1Cl
ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl
ClC(Cl)=C(Cl)C=CC(Cl)Cl
Clc1ccc(cc1)C(c1ccc(Cl)cc1)C(Cl)(Cl)Cl
ClC(Cl)C(Cl)(Cl)C(Cl)Cl
ClC(Cl)=C=C(Cl)Cl
ClC(Cl)=C(CCl)CCl
""".split()
# Compounds are listed for networks of fewer than this.
LISTED = 200


def network(drawn):
    """{InChI: compound} and {(from, to, rule): degeneracy}."""
    compounds = dict(isomers(drawn, "geometric"))
    todo, steps = list(compounds), {}
    for start in todo:
        for rule in CORE:
            for inchi, (product, degeneracy) in products(compounds[start], rule, "geometric").items():
                steps[start, inchi, rule] = degeneracy
                if inchi not in compounds:
                    compounds[inchi] = product
                    todo.append(inchi)
    return compounds, steps


def main():
    with open("networks.csv", "w", newline="") as out, \
            open("network_compounds.csv", "w", newline="") as listed:
        table = csv.writer(out, lineterminator="\n")
        table.writerow(["parent", "parents", "compounds", "transients", "steps",
                        "hydrogenolysis", "vicinal_elimination", "geminal_elimination", "degeneracy"])
        rows = csv.writer(listed, lineterminator="\n")
        rows.writerow(["parent", "smiles", "inchi"])
        for drawn in PARENTS:
            compounds, steps = network(drawn)
            by_rule = [sum(rule == name for _, _, rule in steps) for name in CORE]
            transients = sum(bool(c.carbenes()) for c in compounds.values())
            table.writerow([drawn, len(isomers(drawn, "geometric")), len(compounds), transients,
                            len(steps), *by_rule, sum(steps.values(), Fraction(0))])
            if len(compounds) < LISTED:
                for inchi, compound in sorted(compounds.items()):
                    rows.writerow([drawn, compound.smiles("geometric"), inchi])


main()
