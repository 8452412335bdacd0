#!/usr/bin/env python3
"""Draws tests/corpus/worked.tsv into tests/corpus/worked.sdf.

The labels of a record come from its published name alone. A record is written only if RDKit reads
these labels from the drawing, and InChI reads the same isomer from the drawing as from the structure.

How a record is drawn (second column, words apart by blanks; `-` for the plain layout):
  rot=25     turned by so many degrees         mirror, flip   laid face down, left-right or up-down
  len=0.825  bond length                       engine2        the other layout engine
  H          hydrogen of the first centre drawn                hash  face such that the first mark is hashed
  move       first mark on another bond        half           the bonds of a centre within half a plane
  two        a second mark at a centre with four drawn bonds

Usage: make_worked.py [--check]   (needs rdkit 2026.9.1)
Rewrites worked.sdf and says which records it left out; with --check it only reads what is there. Exit
status 1 if a record was left out or is not as its row in the table.
"""
import math
import os
import re
import sys

from rdkit import Chem, RDLogger
from rdkit.Chem import rdCIPLabeler, rdCoordGen, rdDepictor
from rdkit.Geometry import Point3D

RDLogger.DisableLog("rdApp.*")
Chem.SetUseLegacyStereoPerception(False)
CORPUS = os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "corpus")
SOLID, HASHED = 1, 6
DESCRIPTOR = re.compile(r"^\d*[a-z]?'*([RSrsEZ])$")
SOURCES = {
    "3AA": "IUPAC-IUB 1983, Nomenclature and symbolism for amino acids and peptides",
    "2-Carb": "IUPAC-IUBMB 1996, Nomenclature of carbohydrates",
    "STER": "IUPAC-IUB 1989, Nomenclature of steroids",
    "MI": "The Merck Index",
    "CRC": "CRC Handbook of Chemistry and Physics",
    "HAN": "Hanson et al. 2018, J. Chem. Inf. Model. 58, 1755 (Rule 1b)",
    "ALD": "name in general use in the journals for this reagent",
}


def descriptors(name):
    """Letters of the descriptors of a name, in the order of the name."""
    letters = []
    for group in re.findall(r"\((\w[\w',]*)\)", name):
        parts = [DESCRIPTOR.match(p) for p in group.split(",")]
        if all(parts):
            letters += [p.group(1) for p in parts]
    return letters


def read_labels(mol):
    """Atom number from 1 -> letter, both ends of a double bond, as RDKit labels a molecule."""
    rdCIPLabeler.AssignCIPLabels(mol)
    out = {a.GetIdx() + 1: a.GetProp("_CIPCode") for a in mol.GetAtoms() if a.HasProp("_CIPCode")}
    for b in mol.GetBonds():
        if b.HasProp("_CIPCode"):
            for end in (b.GetBeginAtomIdx(), b.GetEndAtomIdx()):
                out[end + 1] = b.GetProp("_CIPCode")
    return out


def wanted_labels(mol, letters):
    """The same from a name: map number k of an atom carries the k-th descriptor."""
    out = {}
    for atom in mol.GetAtoms():
        if not atom.GetAtomMapNum():
            continue
        letter = letters[atom.GetAtomMapNum() - 1]
        out[atom.GetIdx() + 1] = letter
        if letter in "EZ":
            (other,) = [b.GetOtherAtom(atom) for b in atom.GetBonds() if b.GetBondTypeAsDouble() == 2.0]
            out[other.GetIdx() + 1] = letter
    return out


class Sheet:
    """A drawing to be changed: places, and marks as bond index -> (narrow atom, code)."""

    def __init__(self, mol, options):
        for atom in mol.GetAtoms():
            atom.SetAtomMapNum(0)
        self.mol = mol
        self.options = options
        flat = rdCoordGen.AddCoords if "engine2" in options else rdDepictor.Compute2DCoords
        flat(mol)
        conf = mol.GetConformer()
        points = [(x, y) for x, y, _ in conf.GetPositions()]
        lengths = sorted(math.dist(points[b.GetBeginAtomIdx()], points[b.GetEndAtomIdx()]) for b in mol.GetBonds())
        scale = float(options.get("len", 1.5)) / lengths[len(lengths) // 2]
        angle = math.radians(float(options.get("rot", 0)))
        fx = -1 if "mirror" in options else 1
        fy = -1 if "flip" in options else 1
        c, s = math.cos(angle), math.sin(angle)
        self.points = [(scale * (fx * x * c - fy * y * s), scale * (fx * x * s + fy * y * c)) for x, y in points]
        self.wedge()

    def wedge(self):
        """Marks by RDKit for the present places."""
        mol = Chem.Mol(self.mol)
        conf = mol.GetConformer()
        for i, (x, y) in enumerate(self.points):
            conf.SetAtomPosition(i, Point3D(x, y, 0.0))
        Chem.Kekulize(mol)
        Chem.WedgeMolBonds(mol, conf)
        self.kekule = mol
        codes = {Chem.BondDir.BEGINWEDGE: SOLID, Chem.BondDir.BEGINDASH: HASHED}
        self.marks = {b.GetIdx(): (b.GetBeginAtomIdx(), codes[b.GetBondDir()])
                      for b in mol.GetBonds() if b.GetBondDir() in codes}

    def block(self, title):
        """The molfile, V2000."""
        atoms, bonds = self.kekule.GetAtoms(), self.kekule.GetBonds()
        lines = [title, " " * 20 + "2D", "", f"{len(atoms):3d}{len(bonds):3d}  0  0  0  0  0  0  0  0999 V2000"]
        for atom, (x, y) in zip(atoms, self.points):
            lines.append(f"{x:10.4f}{y:10.4f}{0:10.4f} {atom.GetSymbol():<3} 0" + "  0" * 11)
        for bond in bonds:
            ends = [bond.GetBeginAtomIdx(), bond.GetEndAtomIdx()]
            narrow, code = self.marks.get(bond.GetIdx(), (ends[0], 0))
            if narrow == ends[1]:
                ends.reverse()
            lines.append(f"{ends[0] + 1:3d}{ends[1] + 1:3d}{int(bond.GetBondTypeAsDouble()):3d}{code:3d}  0  0  0")
        for tag, value in (("CHG", lambda a: a.GetFormalCharge()), ("ISO", lambda a: a.GetIsotope())):
            items = [(a.GetIdx() + 1, value(a)) for a in atoms if value(a)]
            for i in range(0, len(items), 8):
                part = items[i:i + 8]
                lines.append(f"M  {tag}{len(part):3d}" + "".join(f"{n:4d}{v:4d}" for n, v in part))
        return "\n".join(lines + ["M  END", ""])

    def around(self, center):
        """Bonds of an atom as (angle, bond index, neighbour), by angle."""
        out = []
        for bond in self.mol.GetAtomWithIdx(center).GetBonds():
            other = bond.GetOtherAtomIdx(center)
            (x, y), (u, v) = self.points[center], self.points[other]
            out.append((math.atan2(v - y, u - x), bond.GetIdx(), other))
        return sorted(out)

    def is_single(self, bond):
        """Whether a bond can bear a mark."""
        return self.kekule.GetBondWithIdx(bond).GetBondTypeAsDouble() == 1.0


def moves(sheet):
    """Every way to put one mark on another bond of its centre."""
    for bond, (center, _) in list(sheet.marks.items()):
        for _, other, _ in sheet.around(center):
            if other in sheet.marks or not sheet.is_single(other):
                continue
            for code in (HASHED, SOLID):
                marks = {b: m for b, m in sheet.marks.items() if b != bond}
                marks[other] = (center, code)
                yield marks


def seconds(sheet):
    """Every way to add a mark of the other kind beside a mark at a centre with four drawn bonds."""
    for bond, (center, code) in list(sheet.marks.items()):
        ring = [b for _, b, _ in sheet.around(center)]
        if len(ring) != 4:
            continue
        at = ring.index(bond)
        for other in (ring[(at + 1) % 4], ring[at - 1]):
            if other not in sheet.marks and sheet.is_single(other):
                yield dict(sheet.marks) | {other: (center, SOLID + HASHED - code)}


def halves(sheet):
    """Every way to swing a terminal ligand between the two others, the mark on an outer bond."""
    for bond, (center, _) in list(sheet.marks.items()):
        ring = sheet.around(center)
        for angle, _, leaf in ring if len(ring) == 3 else []:
            if sheet.mol.GetAtomWithIdx(leaf).GetDegree() != 1:
                continue
            (x, y), before = sheet.points[center], sheet.points[leaf]
            sheet.points[leaf] = (2 * x - before[0], 2 * y - before[1])
            for _, outer, other in ring:
                for code in (SOLID, HASHED):
                    if other != leaf and sheet.is_single(outer):
                        yield {b: m for b, m in sheet.marks.items() if b != bond} | {outer: (center, code)}
            sheet.points[leaf] = before


WAYS = {"move": moves, "two": seconds, "half": halves}


def is_right(block, want, inchi):
    """Whether both outside readers read the wanted isomer from a drawing."""
    mol = Chem.MolFromMolBlock(block, removeHs=False)
    return mol is not None and read_labels(mol) == want and Chem.MolBlockToInchi(block) == inchi


def meaning(name, smiles):
    """The structure (map numbers kept), its labels by the name, and its InChI.

    Raises ValueError with the reason where name and structure do not agree.
    """
    letters = descriptors(name)
    mol = Chem.MolFromSmiles(smiles)
    if sorted(a.GetAtomMapNum() for a in mol.GetAtoms() if a.GetAtomMapNum()) != list(range(1, len(letters) + 1)):
        raise ValueError("map numbers and descriptors do not match")
    want = wanted_labels(mol, letters)
    plain = Chem.Mol(mol)
    for atom in plain.GetAtoms():
        atom.SetAtomMapNum(0)
    if read_labels(plain) != want:
        raise ValueError(f"the structure has {read_labels(plain)}, the name {want}")
    return mol, want, Chem.MolToInchi(plain)


def draw(title, options, name, smiles):
    """The record's molfile. Raises ValueError with the reason where there is none."""
    mol, want, inchi = meaning(name, smiles)
    centers = [a.GetIdx() for a in sorted(mol.GetAtoms(), key=lambda a: a.GetAtomMapNum())
               if a.GetAtomMapNum() and want[a.GetIdx() + 1] not in "EZ" and a.GetTotalNumHs() == 1]
    if ("H" in options or "two" in options) and centers:
        mol = Chem.AddHs(mol, onlyOnAtoms=centers[:1])
    sheet = Sheet(mol, options)
    if "hash" in options and next(iter(sheet.marks.values()))[1] != HASHED:
        sheet.points = [(-x, y) for x, y in sheet.points]
        sheet.wedge()
    blocks = [sheet.block(title)]
    for word, ways in WAYS.items():
        if word in options:
            blocks = []
            for marks in ways(sheet):
                kept, sheet.marks = sheet.marks, marks
                blocks.append(sheet.block(title))
                sheet.marks = kept
    for block in blocks:
        if is_right(block, want, inchi):
            return block
    raise ValueError(f"no drawing of {len(blocks)} is read as wanted")


def show(labels):
    """Labels as '3R 7E 8E'."""
    return " ".join(f"{n}{labels[n]}" for n in sorted(labels))


def table():
    """Rows of worked.tsv: title, options, name, structure, source."""
    with open(os.path.join(CORPUS, "worked.tsv"), encoding="utf-8") as file:
        for line in file:
            if not line.startswith("#"):
                title, how, name, smiles, source = line.rstrip("\n").split("\t")
                options = dict(word.partition("=")[::2] for word in how.split() if word != "-")
                yield title, options, name, smiles, SOURCES.get(source, f"IUPAC 2013 recommendations, {source}")


def make(path):
    """Writes worked.sdf; number of records left out."""
    lost = 0
    with open(path, "w", encoding="utf-8", newline="\n") as out:
        for title, options, name, smiles, source in table():
            try:
                block = draw(title, options, name, smiles)
            except ValueError as why:
                lost += 1
                print(f"{title}: left out: {why}")
                continue
            labels = show(meaning(name, smiles)[1])
            for field, value in (("NAME", name), ("LABELS", labels), ("SOURCE", source + "; from memory")):
                block += f"> <{field}>\n{value}\n\n"
            out.write(block + "$$$$\n")
    return lost


def check(path):
    """Whether both outside readers read from every record what its name says; number of faults."""
    with open(path, encoding="utf-8") as file:
        records = file.read().split("$$$$\n")[:-1]
    rows = list(table())
    bad = len(records) != len(rows)
    for record, (title, _, name, smiles, _) in zip(records, rows):
        _, want, inchi = meaning(name, smiles)
        block = record[: record.index("M  END") + 7]
        fields = dict(re.findall(r"> <(\w+)>\n(.*)", record))
        if (fields["NAME"], fields["LABELS"]) != (name, show(want)) or not is_right(block, want, inchi):
            bad += 1
            print(f"  {title}: is not as its row in the table")
    print(f"worked examples: {len(records)} records of {len(rows)} rows, {int(bad)} faults")
    return bad


def main():
    """Writes or checks."""
    path = os.path.join(CORPUS, "worked.sdf")
    return 1 if (check if "--check" in sys.argv[1:] else make)(path) else 0


if __name__ == "__main__":
    sys.exit(main())
