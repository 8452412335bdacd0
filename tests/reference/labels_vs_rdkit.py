#!/usr/bin/env python3
"""Compares the program with two outside readers of drawings, RDKit and InChI.

  labels  of the drawings and structures that RDKit's own package ships, and of the worked examples:
          `wedgewright labels` against RDKit's newer labeller; where the two differ on whether a place
          is defined at all (drawings that overlap, rings of delocalised bonds), InChI has the last word
  marks   drawings of both kinds without their marks, put back by `wedgewright place`: RDKit must read
          the labels asked for, and InChI the same isomer as from the drawing before

RDKit's package ships one file of flat drawings (NCI/first_200.props.sdf: drawn and crossed double bonds,
no wedge); its other files are models in space and line notations. These are laid out flat and wedged by
RDKit first, which makes them drawings of its own hand.

The program is target/release/wedgewright of the folder above, or $WEDGEWRIGHT.
Exit status 0 if nothing differs without a reason in EXPLAINED, 1 if something does, 2 if it cannot run.
"""
import os
import re
import subprocess
import sys
import tempfile

try:
    from rdkit import Chem, RDConfig, RDLogger
    from rdkit.Chem import rdCIPLabeler, rdDepictor
except ImportError:
    print("labels_vs_rdkit: needs rdkit (pip install rdkit==2026.9.1)")
    sys.exit(2)

RDLogger.DisableLog("rdApp.*")
Chem.SetUseLegacyStereoPerception(False)
TOP = os.path.normpath(os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", ".."))
PROGRAM = os.environ.get("WEDGEWRIGHT", os.path.join(TOP, "target", "release", "wedgewright"))
WORKED = os.path.join(TOP, "tests", "corpus", "worked.sdf")
MOST_STEPS = 1_000_000

# Name of a record (set/number) -> why the two differ, where InChI does not settle it.
EXPLAINED = {
    "shipped-lines/114": "two bonds of atom 59 lie on each other in RDKit's layout: we read nothing there",
    "shipped-lines/675": "phthalocyanines: we label the double bonds of the delocalised ring as they are drawn",
}


def blocks_of(path):
    """The molfile part and the data part of every record of an SDF."""
    with open(path, encoding="utf-8", errors="replace") as file:
        text = file.read().replace("\r\n", "\n")
    for record in text.split("$$$$\n"):
        end = record.find("M  END\n")
        if end >= 0:
            yield record[: end + 7], record[end + 7:]


def parse(line):
    """'3R 7E 8E' as a dictionary."""
    return {int(n): d for n, d in re.findall(r"(\d+)([A-Za-z]+)", line or "")}


def show(labels):
    """A dictionary as '3R 7E 8E'."""
    return " ".join(f"{n}{labels[n]}" for n in sorted(labels)) or "nothing"


def rdkit_labels(block):
    """Labels that RDKit reads from a molfile; None if it cannot."""
    mol = Chem.MolFromMolBlock(block, removeHs=False)
    if mol is None:
        return None
    try:
        rdCIPLabeler.AssignCIPLabels(mol, maxRecursiveIterations=MOST_STEPS)
    except RuntimeError:
        return None
    out = {a.GetIdx() + 1: a.GetProp("_CIPCode") for a in mol.GetAtoms() if a.HasProp("_CIPCode")}
    for bond in mol.GetBonds():
        if bond.HasProp("_CIPCode"):
            for end in (bond.GetBeginAtomIdx(), bond.GetEndAtomIdx()):
                out[end + 1] = bond.GetProp("_CIPCode")
    return out


def flat(mol):
    """A molfile that RDKit lays out and wedges; None where it cannot."""
    try:
        mol = Chem.RemoveHs(mol)
        rdDepictor.Compute2DCoords(mol)
        return Chem.MolToMolBlock(mol)
    except (ValueError, RuntimeError):
        return None


def is_stereo(mol):
    """Whether a molecule has a centre or double bond of defined configuration."""
    return mol is not None and any(
        e.specified == Chem.StereoSpecified.Specified for e in Chem.FindPotentialStereo(mol))


def shipped_drawings():
    """Flat drawings in RDKit's package, as they are."""
    for block, _ in blocks_of(os.path.join(RDConfig.RDDataDir, "NCI", "first_200.props.sdf")):
        if Chem.MolFromMolBlock(block) is not None:
            yield block


def shipped_models():
    """Models in space in RDKit's package, laid flat."""
    for path in ("PBF/testData/egfr.sdf", "Fastcluster/testdata/cdk2.sdf", "FreeWilson/data/cmet_ligands.sdf"):
        for block, _ in blocks_of(os.path.join(RDConfig.RDContribDir, *path.split("/"))):
            mol = Chem.MolFromMolBlock(block)
            if is_stereo(mol):
                yield flat(mol)


def shipped_lines():
    """Line notations with stereo anywhere in RDKit's package, drawn."""
    seen = set()
    for root in (RDConfig.RDContribDir, RDConfig.RDDataDir):
        for folder, _, names in sorted(os.walk(root)):
            for name in sorted(names):
                if not name.endswith((".smi", ".txt", ".csv")):
                    continue
                with open(os.path.join(folder, name), encoding="utf-8", errors="replace") as file:
                    words = re.split(r'[\s,;"]+', file.read())
                for word in words:
                    if word in seen or not re.search(r"@|/C=|/N=|\\C=", word) or not re.search(r"[CcNn]", word):
                        continue
                    seen.add(word)
                    mol = Chem.MolFromSmiles(word) if len(word) < 1000 else None
                    if is_stereo(mol):
                        yield flat(mol)


def worked():
    """The worked examples."""
    for block, _ in blocks_of(WORKED):
        yield block


def inchi_units(block):
    """Atom numbers at which InChI sees a defined centre or double bond; None where it gives no answer.

    The stereo layers name atoms by canonical number; the auxiliary data say which atom of the file has it.
    """
    inchi, aux = Chem.MolBlockToInchiAndAuxInfo(block, "")
    order = re.search(r"/N:([\d,]+)(?:/|$)", aux)
    if not inchi or order is None:
        return None
    atoms = [int(n) for n in order.group(1).split(",")]
    defined = set()
    for layer in inchi.split("/"):
        if layer.startswith("t"):
            defined |= {atoms[int(n) - 1] for n in re.findall(r"(\d+)[+-]", layer)}
        elif layer.startswith("b"):
            for pair in re.findall(r"(\d+)-(\d+)[+-]", layer):
                defined |= {atoms[int(n) - 1] for n in pair}
    return defined


def inchi_sides_with_us(block, ours, theirs):
    """Whether RDKit and we differ only on what is defined at all, and InChI sees it as we do."""
    places = [n for n in set(ours) | set(theirs) if ours.get(n) != theirs.get(n)]
    defined = inchi_units(block)
    return defined is not None and all(
        (n in ours) != (n in theirs) and (n in ours) == (n in defined) for n in places)


def run(*args):
    """Standard output of the program."""
    done = subprocess.run([PROGRAM, *args], capture_output=True, text=True, check=False)
    if done.returncode not in (0, 1):
        print(f"labels_vs_rdkit: {' '.join(args)} ended with {done.returncode}: {done.stderr.strip()[-1000:]}")
        sys.exit(2)
    return done.stdout


def compare_labels(name, blocks, folder):
    """Labels of one set; number of differences without a reason."""
    blocks = [b for b in blocks if b is not None]
    path = os.path.join(folder, "set.sdf")
    with open(path, "w", encoding="utf-8", newline="\n") as out:
        out.writelines(b + "$$$$\n" for b in blocks)
    ours = {}
    for line in run("labels", path).splitlines():
        parts = line.split("\t")
        if len(parts) >= 2 and parts[0].isdigit():
            ours[int(parts[0])] = parse(parts[2]) if len(parts) > 2 else {}
    labels = unread = settled = explained = bad = 0
    for number, block in enumerate(blocks, 1):
        theirs = rdkit_labels(block)
        if theirs is None:
            unread += 1
            continue
        labels += len(theirs)
        got = ours.get(number)
        if got == theirs:
            continue
        if got is not None and inchi_sides_with_us(block, got, theirs):
            settled += 1
            continue
        if f"{name}/{number}" in EXPLAINED:
            explained += 1
            continue
        bad += 1
        if bad <= 20:
            places = sorted(n for n in set(theirs) | set(got or {}) if theirs.get(n) != (got or {}).get(n))
            print(f"  {name}/{number} {block.splitlines()[0]}: RDKit "
                  f"{show({n: theirs[n] for n in places if n in theirs})}, ours "
                  + ("no line" if got is None else show({n: got[n] for n in places if n in got})))
    print(f"labels, {name}: {len(blocks)} drawings, {labels} labels by RDKit, {bad} differ, "
          f"{settled} differ and InChI sees it as we do, {explained} differ for a known reason, "
          f"{unread} not labelled by RDKit")
    if not blocks:
        print(f"  {name}: nothing to compare")
    return bad + (not blocks)


def bare(block):
    """A molfile without the marks of its single bonds."""
    lines = block.split("\n")
    atoms, bonds = int(lines[3][:3]), int(lines[3][3:6])
    for i in range(4 + atoms, 4 + atoms + bonds):
        if lines[i][6:9].strip() == "1":
            lines[i] = lines[i][:9] + "  0" + lines[i][12:]
    return "\n".join(lines)


def compare_marks(name, drawings, folder):
    """Marks placed on bare drawings that carried (block, labels) before; number of faults."""
    source, result = os.path.join(folder, "bare.sdf"), os.path.join(folder, "placed.sdf")
    with open(source, "w", encoding="utf-8", newline="\n") as out:
        out.writelines(f"{bare(block)}> <ASKED>\n{show(labels)}\n\n$$$$\n" for block, labels in drawings)
    run("place", source, "--carry-field", "ASKED", "-o", result)
    after = list(blocks_of(result))
    bad = 0
    for number, ((block, want), (placed, data)) in enumerate(zip(drawings, after), 1):
        title, refusal = f"{name}/{number} {block.splitlines()[0]}", re.search(r"<REASON>\n(.*)", data)
        theirs = rdkit_labels(placed)
        inchi, before = Chem.MolBlockToInchi(placed), Chem.MolBlockToInchi(block)
        if refusal:
            bad += 1
            print(f"  {title}: asked {show(want)}, refused: {refusal.group(1)}")
        elif theirs != want:
            bad += 1
            print(f"  {title}: asked {show(want)}, RDKit reads {show(theirs or {})}")
        elif inchi != before:
            bad += 1
            print(f"  {title}: InChI of our drawing\n    {inchi}\n  of the one before\n    {before}")
    if len(after) != len(drawings) or not drawings:
        bad += 1
        print(f"  {name}: {len(drawings)} records in, {len(after)} out")
    print(f"marks, {name}: {len(after)} drawings placed, {bad} not read as asked by RDKit and InChI")
    return bad


def published(blocks):
    """Drawings with the labels that their record gives."""
    for block, data in blocks:
        yield block, parse(re.search(r"<LABELS>\n(.*)", data).group(1))


def sound(blocks):
    """Drawings that RDKit labels and InChI reads alike."""
    for block in blocks:
        labels = rdkit_labels(block) if block else None
        if labels and inchi_units(block) == set(labels):
            yield block, labels


def main():
    """Runs every comparison."""
    if not os.path.exists(PROGRAM):
        print(f"labels_vs_rdkit: no program at {PROGRAM} (cargo build --release)")
        return 2
    bad = 0
    with tempfile.TemporaryDirectory() as folder:
        for name, blocks in (("shipped-drawings", shipped_drawings()), ("shipped-models", shipped_models()),
                             ("shipped-lines", shipped_lines()), ("worked", worked())):
            bad += compare_labels(name, blocks, folder)
        bad += compare_marks("worked", list(published(blocks_of(WORKED))), folder)
        bad += compare_marks("shipped-lines", list(sound(shipped_lines())), folder)
    return 1 if bad else 0


if __name__ == "__main__":
    sys.exit(main())
