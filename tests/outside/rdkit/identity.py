"""Writes identity.csv: compounds, five random SMILES of each, and their standard InChI."""

import csv
import sys

from compound import fits_in_space, isomers, random_smiles

# Configuration left open is expanded to isomers (at most MOST of them, evenly picked).
MOST = 6
PARENTS = """
ClC=C(Cl)Cl
ClC=CCl
FC(Cl)=C(Br)I
ClC=CC=CCl
ClC=CC(Cl)=CCl
ClC=CC=CC=CCl
CC=CC(=CC)C(C)Cl
ClC=CC(Cl)C=CCl
CC(Cl)C=CC(C)Cl
CC(Cl)C=CC=CC(C)Cl
ClC=C(C(C)Cl)C(C)Cl
ClC=CC(C=CCl)=CBr
CC(Cl)C(Cl)C
CC(Cl)C(Cl)C(C)Cl
CC(Cl)C(F)C(Cl)C
CC(Cl)C(Cl)C(Cl)C(C)Cl
CC(Br)C(O)C(Br)C
FC(F)(F)C(Cl)Br
C(F)(Cl)(Br)I
ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1Cl
ClC1C(Cl)C(Cl)C(Cl)C1Cl
ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1
CC1CC(C)CC(C)C1
ClC1CC(Br)C1
ClC1CC1Cl
FC1C(F)C1F
ClC1CCCCC1Cl
ClC1=CCCCCCC1
ClC1=CCCCC=CCC1
CC=C1CC(=CC)C1
CC=C1CCC(C)CC1
ClC1CC2CCC1C2
ClC1(Cl)C2(Cl)C(Cl)=C(Cl)C1(Cl)C1C2C2C=CC1C2
C1CCC2CCCCC2C1
CC1(C)C2CCC1(C)C(Cl)C2
C1CC2CCC1CC2
ClC1C2CCC(C2)C1Cl
ClC1CC2CC1C=C2
C=C=C
ClC=C=CCl
CC(Cl)=C=C=C
CC(Cl)C=C=C(Cl)C
ClC#CC(Cl)C
C#CC=CCl
ClC#CC#CCl
c1ccccc1
Clc1cc(Cl)cc(Cl)c1Cl
c1ccc2ccccc2c1
Clc1cccc2c1cccc2Cl
Clc1ccc(cc1)C(c1ccc(Cl)cc1)C(Cl)(Cl)Cl
Clc1ccc(cc1)C(c1ccccc1Cl)C(Cl)Cl
ClC=Cc1ccccc1
Clc1ccncc1
Clc1ccc(C(Cl)Br)o1
ClC(Br)c1cccs1
Clc1c[nH]cc1
NC(=O)C(Cl)(Cl)Br
O=CC(Cl)(Cl)Cl
OC(O)C(Cl)(Cl)Cl
CC(Cl)C(=O)Cl
CC(Cl)OC(C)Br
ClCOCCl
CC(Cl)C#N
N[C@@H](C)C(=O)O
CC(Cl)C(=O)[O-]
C[N+](C)(C)CC(C)Cl
C[N+](CC)(CCl)CCC
C[P+](CC)(CCl)c1ccccc1
C[Si](F)(Cl)CC
C[Si](C)(C)C=CCl
COP(=O)(OC)OC=C(Cl)Cl
COP(=O)(OC)OC(Br)C(Cl)(Cl)Br
ClCCSCCCl
CS(=O)(=O)C(Cl)C
OB(O)C=CCl
O=[N+]([O-])C(Cl)(Cl)Cl
CC(Cl)[N+](=O)[O-]
CC1OC1Cl
ClC1OC(Cl)C(Cl)O1
CC1NC(Cl)C1Br
[O-]C(=O)C(Cl)=CCl
Cl[C-](Cl)Cl
C[N+]1(CCl)CCC(Cl)C1
""".split()


def main(path):
    with open(path, "w", newline="") as out:
        table = csv.writer(out, lineterminator="\n")
        table.writerow(["parent", "inchi", "smiles_1", "smiles_2", "smiles_3", "smiles_4", "smiles_5"])
        for parent in PARENTS:
            found = list(isomers(parent, "full").items())
            if "2" in parent:
                found = [(i, c) for i, c in found if fits_in_space(c.smiles())]
            step = -(-len(found) // MOST)
            for n, (inchi, compound) in enumerate(found[::step]):
                texts = random_smiles(compound, "full", 5, f"{parent} {n}")
                # Small molecules have fewer than five texts; those are repeated.
                texts = [texts[i % len(texts)] for i in range(5)]
                table.writerow([parent, inchi, *texts])


main(sys.argv[1] if len(sys.argv) > 1 else "identity.csv")
