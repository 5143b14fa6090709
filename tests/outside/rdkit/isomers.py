"""Writes isomers.csv: the isomers of parents whose configuration is open, at two depths."""

import csv
import sys

from compound import isomers

PARENTS = """
ClC=CCl
ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl
ClC=CC=CCl
ClC=CC(Cl)=CCl
ClC=CC=CC=CCl
ClC=CC(Cl)C=CCl
ClC=C(C=CCl)C=CCl
CC=CC(=CC)C=CC
ClC=C(C(C)Cl)C(C)Cl
CC(Cl)C=CC(C)Cl
CC(Cl)C=CC=CC(C)Cl
ClC=CC#CC=CCl
CC(Cl)C(Cl)C
CC(Cl)C(Cl)C(C)Cl
CC(Cl)C(Cl)C(Cl)C(C)Cl
CC(Cl)C(C(C)Cl)C(C)Cl
ClC1CC1Cl
FC1C(F)C1F
ClC1CC(Cl)C1
ClC1C(Cl)C(Cl)C1Cl
ClC1C(Cl)C(Cl)C(Cl)C1Cl
ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1Cl
ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1
CC1CC(C)CC(C)C1
CC=C1CC(=CC)C1
CC=C1CCC(=CC)CC1
CC=C1CCC(C)CC1
ClC1=CCCCCCC1
ClC1=CCCC(Cl)=CCC1
C1CCC2CCCCC2C1
OC(=O)C=CC(Cl)Br
CC(Cl)OC(C)Cl
C[Si](F)(Cl)C(C)Cl
C[N+](CC)(CCl)C(C)Cl
FC(F)(F)C(Cl)Br
NC(=O)C(Cl)Br
ClC(c1ccccc1)C(Cl)c1ccccc1
ClC=Cc1ccccc1
CC(Cl)C=C=CC
""".split()


def main(path):
    with open(path, "w", newline="") as out:
        table = csv.writer(out, lineterminator="\n")
        table.writerow(["parent", "identity", "smiles", "inchi"])
        for parent in PARENTS:
            for identity in ("geometric", "full"):
                for inchi, compound in isomers(parent, identity).items():
                    table.writerow([parent, identity, compound.smiles(identity), inchi])


main(sys.argv[1] if len(sys.argv) > 1 else "isomers.csv")
