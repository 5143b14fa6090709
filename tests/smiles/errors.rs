//! What is said about a text that is no compound: sentence, place and hint.

use haloshed::smiles::read;

/// `marks` holds `^` under the bytes that the error points at.
fn check(text: &str, marks: &str, sentence: &str, hint: &str) {
    let error = read(text).expect_err(text);
    assert_eq!(error.to_string(), sentence, "{text}");
    let expected = marks.find('^').map_or(0..0, |start| start..marks.len());
    assert_eq!(error.span, expected, "{text}");
    assert_eq!(error.hint().unwrap_or_default(), hint, "{text}");
    assert!(!error.label().is_empty(), "{text}");
}

#[test]
fn text_that_breaks_off() {
    check("", "", "expected a compound, found no text", "write a compound as SMILES, such as ClC=C(Cl)Cl");
    check("ClC=", "   ^", "bond leads to no atom", "write the atom that the bond leads to, or take the bond away");
    check("C(C=)C", "   ^", "bond leads to no atom", "write the atom that the bond leads to, or take the bond away");
    check("C(=)C", "  ^", "bond leads to no atom", "write the atom that the bond leads to, or take the bond away");
    check("C[CH2", " ^", "bracket is not closed", "close it with `]`");
    check("C[", " ^", "bracket is not closed", "close it with `]`");
    check("CC(Cl", "  ^", "branch is not closed", "close it with `)`");
    check("CC(", "  ^", "branch is not closed", "close it with `)`");
    check("CC)C", "  ^", "branch is closed but was not opened", "take the `)` away, or open the branch with `(`");
    check("CC()C", "  ^^", "branch is empty", "a branch holds at least one atom");
}

#[test]
fn characters_out_of_place() {
    check("=CC", "^", "expected an atom, found `=`", "a bond symbol stands once, between two atoms");
    check("C==C", "  ^", "expected an atom, found `=`", "a bond symbol stands once, between two atoms");
    check("(C)C", "^", "expected an atom, found `(`", "a branch follows the atom that it hangs on");
    check("CC((C))C", "   ^", "expected an atom, found `(`", "a branch follows the atom that it hangs on");
    check("C C", " ^", "a space does not belong here", "a SMILES is one word");
    check("CLCCL", " ^", "`L` does not belong here", "chlorine is written Cl");
    check("C&C", " ^", "`&` does not belong here", "");
    check("C+", " ^", "`+` does not belong here", "a charge is written in brackets, as in [NH4+]");
    check("C@C", " ^", "`@` does not belong here", "configuration is written in brackets, as in [C@H]");
    check("Cé", " ^^", "`é` does not belong here", "");
    check("[C?]", "  ^", "`?` does not belong here", "");
    check("1CC", "^", "expected an atom, found `1`", "a ring number follows its atom");
    let after = "ring numbers stand directly after their atom, before its branches";
    check("C1CC(C)1", "       ^", "ring number does not follow its atom", after);
    check("C%1CC", " ^", "`%` is not followed by two digits", "write %10 to %99; numbers below ten need no `%`");
}

#[test]
fn limits_are_named() {
    let error = read(&"C".repeat(10_001)).unwrap_err();
    assert_eq!(error.to_string(), "text of 10001 bytes; the most is 10000");
    assert_eq!(error.span, 10_000..10_001);
    assert_eq!(error.hint().unwrap(), "a compound is one molecule; was a file pasted?");
    let error = read(&format!("{}C{}", "C(".repeat(101), ")".repeat(101))).unwrap_err();
    assert_eq!(error.to_string(), "branches nested more than 100 deep");
    assert_eq!(error.span, 201..202);
    assert_eq!(error.hint().unwrap(), "write the longest branch as the main chain");
}

#[test]
fn what_is_outside_the_subset() {
    check("[13CH4]", " ^^", "isotopes are not told apart", "leave the mass number out: C instead of 13C");
    check(
        "CCl.Cl",
        "   ^",
        "found `.`: a compound is one molecule",
        "give one compound at a time, without counter-ions",
    );
    check("C*", " ^", "found `*`: every atom must be known", "write the atom that is meant");
    check("[*]C", " ^", "found `*`: every atom must be known", "write the atom that is meant");
    check("[CH3:1]C", "    ^^", "atom classes are not used here", "leave the `:` and its number out");
    check("C$C", " ^", "found `$`: a compound has no quadruple bonds", "the highest bond order is three, `#`");
    let tetrahedral = "tetrahedral configuration is written @ or @@";
    check("C[C@TH1](F)Cl", "   ^^^^", "configuration other than tetrahedral: `@TH1`", tetrahedral);
}

#[test]
fn elements_outside_the_set() {
    let may_hold = "a compound may hold H, B, C, N, O, F, Si, P, S, Cl, Br and I";
    check("C[Hg]C", "  ^^", "`Hg` is outside the elements that a compound may hold", may_hold);
    check("[Na]Cl", " ^^", "`Na` is outside the elements that a compound may hold", may_hold);
    check("NaCl", "^^", "`Na` is outside the elements that a compound may hold", may_hold);
    check("HgC", "^^", "`Hg` is outside the elements that a compound may hold", may_hold);
    check("c1cc[se]c1", "     ^^", "`se` is outside the elements that a compound may hold", may_hold);
    check("[Qx]C", " ^^", "unknown element `Qx`", may_hold);
    let silane = "write it as [Si], with its hydrogens, as in [SiH4]";
    check("CSiC", " ^^", "`Si` without brackets", silane);
    check("CH3Cl", " ^", "`H` without brackets", "hydrogens are implied; one that must be written is [H]");
}

#[test]
fn rings_that_cannot_be() {
    check("C1CCC", " ^", "ring 1 is not closed", "write 1 again at the atom that closes the ring");
    check("CC%12CC", "  ^^^", "ring 12 is not closed", "write %12 again at the atom that closes the ring");
    check("C11C", "  ^", "ring 1 bonds an atom to itself", "a ring has three atoms or more");
    check("C1C1", "   ^", "ring 1 bonds two atoms that are bonded already", "write a double bond as `=`");
    check("C12CCC12", "       ^", "ring 2 bonds two atoms that are bonded already", "write a double bond as `=`");
    let once = "write the bond symbol at one of the two numbers only";
    check("C=1CCC#1", "      ^", "ring 1 is opened with `=` and closed with `#`", once);
    let turned = "seen from its two ends a mark is turned around: leave one of them out";
    check("C/1=CCC/1", "       ^", "ring 1 is opened with `/` and closed with `/`", turned);
}

#[test]
fn valences_that_cannot_be() {
    let four = "a carbon site takes four bonds; was a bracket atom meant?";
    check("ClC(Cl)(Cl)(Cl)Cl", "  ^", "carbon has 5 bonds", four);
    check("C=C=C=C(=C)=C", "      ^", "carbon has 6 bonds", four);
    let one = "a halogen takes one bond; does it belong in a branch, as in C(Cl)C?";
    check("CClC", " ^^", "chlorine has 2 bonds", one);
    check("C=F", "  ^", "fluorine has 2 bonds", one);
    check("O(C)(C)C", "^", "oxygen has 3 bonds", "oxygen takes two bonds, or three as [O+]; was a bracket atom meant?");
    let nitrogen = "nitrogen takes three bonds, or four as [N+]; was a bracket atom meant?";
    check("CN=N#N", "   ^", "nitrogen has 5 bonds", nitrogen);
    check("[CH5]", "^^^^^", "carbon has 5 bonds", four);
    check("[NH5+]", "^^^^^^", "nitrogen has 5 bonds", "check the charge and the hydrogens written in the brackets");
    let written = "hydrogens of an atom in brackets are written out, as in [CH3]";
    check("CC(C)=[CH]", "      ^^^^", "carbon has 3 bonds, which leaves it a radical", written);
    check("C[CH2]", " ^^^^^", "carbon has 3 bonds, which leaves it a radical", written);
    check("[Cl]", "^^^^", "chlorine has no bonds, which leaves it a radical", written);
    check("C[O]", " ^^^", "oxygen has 1 bond, which leaves it a radical", written);
    check("[C]", "^^^", "carbon has no bonds, which leaves it a radical", written);
    check("[C+5]", "^^^^^", "carbon cannot carry a charge of +5", "take the charge away, or put it on another atom");
    let implied = "hydrogens are implied, or written in brackets with their atom, as in [CH2]";
    for (text, marks) in [("[H][H]", "^^^"), ("C[H]C", " ^^^"), ("[H+]", "^^^^"), ("C=[H]", "  ^^^"), ("[H]", "^^^")] {
        check(text, marks, "hydrogen is not bonded to one atom by a single bond", implied);
    }
}

#[test]
fn aromatic_rings_that_cannot_be() {
    let with_nitrogen = "a ring nitrogen that bears hydrogen is written [nH]";
    check("c1ccnc1", "    ^", "aromatic ring has no alternating double bonds", with_nitrogen);
    let check_ring = "check the hydrogens and charges of the ring, or write its double bonds out";
    check("c1cccc1", "  ^", "aromatic ring has no alternating double bonds", check_ring);
    let capital = "lower case is for atoms of aromatic rings; write a capital";
    check("cC", "^", "aromatic carbon is in no aromatic ring", capital);
    check("Cc1ccccc1n", "         ^", "aromatic nitrogen is in no aromatic ring", capital);
    check("C:C", " ^", "aromatic bond to an atom that is not aromatic", "aromatic atoms are written in lower case");
}

#[test]
fn configuration_that_cannot_be() {
    let turn = "turn one of the two marks around, or leave it out";
    check("F/C(\\Cl)=C/F", "    ^", "marks put two ligands of one double-bonded atom on one side", turn);
    let leave = "leave the mark out; configuration is kept at atoms with four ligands";
    check("C[C@]#CF", "   ^", "`@` at carbon with 2 ligands, not four", leave);
    check("C[S@](=O)CC", "   ^", "`@` at sulfur with 3 ligands, not four", leave);
    check("N[C@@](F)=C", "   ^^", "`@` at carbon with 3 ligands, not four", leave);
}
