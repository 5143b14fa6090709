"""Writes steps.csv: the first-generation products of every rule, with path degeneracy."""

import csv
import sys

from compound import fits_in_space, isomers
from parents import BRIDGEHEAD_HALIDES, PARENTS
from rules import RULES, products

# Isomers taken of a parent whose configuration is left open.
MOST = 4


def main(path):
    with open(path, "w", newline="") as out:
        table = csv.writer(out, lineterminator="\n")
        table.writerow(["identity", "parent", "rule", "product", "inchi", "degeneracy"])
        for drawn in PARENTS:
            for identity in ("geometric", "full"):
                if identity == "full" and drawn in BRIDGEHEAD_HALIDES:
                    continue
                found = list(isomers(drawn, identity).values())
                if identity == "full" and "2" in drawn:
                    found = [c for c in found if fits_in_space(c.smiles())]
                for compound in found[:MOST]:
                    parent = compound.smiles(identity)
                    for rule in RULES:
                        found = products(compound, rule, identity)
                        for inchi, (product, degeneracy) in found.items():
                            table.writerow(
                                [identity, parent, rule, product.smiles(identity), inchi, degeneracy])
                        if not found:
                            table.writerow([identity, parent, rule, "", "", ""])


main(sys.argv[1] if len(sys.argv) > 1 else "steps.csv")
