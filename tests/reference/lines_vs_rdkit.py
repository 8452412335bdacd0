#!/usr/bin/env python3
"""Compares how the program and RDKit read line notation.

  labels   lines that RDKit's own package ships, those of the worked examples, and the open data beside the
           project where they are there: `wedgewright labels` against RDKit's newer labeller
  written  lines as given and as the program wrote them (left in target/tmp by `cargo test -p checks --test
           smiles`): RDKit must read the same isomer from both

The program is target/release/wedgewright of the folder above, or $WEDGEWRIGHT; the open data lie in
$OPEN_DATA (default ../shared).
Exit status 0 if nothing differs without a reason in EXPLAINED, 1 if something does, 2 if it cannot run.
"""
import os
import re
import subprocess
import sys
import tempfile

try:
    from rdkit import Chem, RDConfig, RDLogger
    from rdkit.Chem import rdCIPLabeler
except ImportError:
    print("lines_vs_rdkit: needs rdkit (pip install rdkit==2026.9.1)")
    sys.exit(2)

RDLogger.DisableLog("rdApp.*")
Chem.SetUseLegacyStereoPerception(False)
TOP = os.path.normpath(os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", ".."))
PROGRAM = os.environ.get("WEDGEWRIGHT", os.path.join(TOP, "target", "release", "wedgewright"))
WRITTEN = os.path.join(TOP, "target", "tmp", "written.tsv")
OPEN_DATA = os.environ.get("OPEN_DATA", os.path.join(TOP, "..", "shared"))
MOST_STEPS = 100_000

# A cause of differences: what a line has where only this one is at work, and why the two differ.
EXPLAINED = [
    (r"P\S*=N\[?P", "phosphazenes: RDKit's label depends on where the ring's double bonds are written"),
    (r"\[[NP]@+\]\d", "three neighbours and one ring number: RDKit turns such a centre, against the order of "
                      "writing; a cage it labels so cannot be embedded"),
    (r"=\[C@+(AL\d)?\]=|=C=C=", "RDKit reads no axes and no cumulated chains"),
]


def rdkit_mol(line):
    """A molecule with the hydrogens that the line draws, so that atom numbers stay; None if it is refused."""
    params = Chem.SmilesParserParams()
    params.removeHs = False
    return Chem.MolFromSmiles(line, params)


def rdkit_labels(line):
    """Labels of a line; None where RDKit cannot read or label it."""
    mol = rdkit_mol(line)
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


def shipped():
    """Line notations with stereo anywhere in RDKit's package."""
    seen = set()
    for root in (RDConfig.RDContribDir, RDConfig.RDDataDir):
        for folder, _, names in sorted(os.walk(root)):
            for name in sorted(names):
                if not name.endswith((".smi", ".txt", ".csv")):
                    continue
                with open(os.path.join(folder, name), encoding="utf-8", errors="replace") as file:
                    words = re.split(r'[\s,;"]+', file.read())
                for word in words:
                    if (word not in seen and len(word) < 1000 and re.search(r"@|/C=|/N=|\\C=", word)
                            and Chem.MolFromSmiles(word) is not None):
                        seen.add(word)
                        yield word


def worked():
    """Structures of the worked examples."""
    with open(os.path.join(TOP, "tests", "corpus", "worked.tsv"), encoding="utf-8") as file:
        for row in file:
            if not row.startswith("#"):
                yield row.split("\t")[3]


def open_data(name):
    """Lines of a file of the open data; none if it is not there."""
    path = os.path.join(OPEN_DATA, "data", name)
    if not os.path.exists(path):
        print(f"  {name}: not present")
        return
    with open(path, encoding="utf-8") as file:
        for row in file:
            if not row.startswith("#"):
                yield row.split("\t")[0].strip()


def our_labels(lines, folder):
    """Labels of all lines, in one run of the program; None for a line that it refuses."""
    path = os.path.join(folder, "set.smi")
    with open(path, "w", encoding="utf-8", newline="\n") as out:
        out.writelines(f"{line}\tn{number}\n" for number, line in enumerate(lines, 1))
    done = subprocess.run([PROGRAM, "labels", path], capture_output=True, text=True, check=False)
    if done.returncode not in (0, 1):
        print(f"lines_vs_rdkit: labels ended with {done.returncode}: {done.stderr.strip()[-1000:]}")
        sys.exit(2)
    found = {}
    for row in done.stdout.splitlines():
        number, _, labels = row.split("\t")
        found[int(number)] = {int(n): d for n, d in re.findall(r"(\d+)([A-Za-z]+)", labels)}
    return [found.get(number) for number in range(1, len(lines) + 1)]


def why(line):
    """The known reason for a difference, if there is one."""
    return next((reason for pattern, reason in EXPLAINED if re.search(pattern, line)), None)


def older_labels(line):
    """Labels of RDKit's older assignment, R and S only."""
    Chem.SetUseLegacyStereoPerception(True)
    try:
        mol = rdkit_mol(line)
        Chem.AssignStereochemistry(mol, cleanIt=True, force=True)
    finally:
        Chem.SetUseLegacyStereoPerception(False)
    return {a.GetIdx() + 1: a.GetProp("_CIPCode") for a in mol.GetAtoms() if a.HasProp("_CIPCode")}


def labellers_differ(line, ours, theirs):
    """The reason that RDKit's older assignment says what we say wherever its newer labeller does not."""
    older = older_labels(line)
    places = [n for n in set(theirs) | set(ours or {}) if theirs.get(n) != (ours or {}).get(n)]
    if ours and all(n in older and older[n] == ours.get(n) for n in places):
        return "RDKit's older assignment says what we say, its newer labeller does not"
    return None


def depends_on_writing(line):
    """The reason that RDKit reads some of its own rewritings of a line as another isomer."""
    mol = rdkit_mol(line)
    for atom in mol.GetAtoms():
        atom.SetAtomMapNum(0)
    own = Chem.MolToRandomSmilesVect(mol, 200, randomSeed=7)
    if all(is_same(line, other) for other in own):
        return None
    return "RDKit reads some of its own rewritings of the line as another isomer"


def show(labels):
    """A dictionary as '3R 7E 8E'."""
    if labels is None:
        return "no answer"
    return " ".join(f"{n}{labels[n]}" for n in sorted(labels)) or "nothing"


def compare_labels(name, lines, folder):
    """Labels of one set; number of differences without a reason."""
    lines = list(lines)
    if not lines:
        return 0
    labels = unread = bad = 0
    explained = {}
    for line, ours in zip(lines, our_labels(lines, folder)):
        theirs = rdkit_labels(line)
        if theirs is None:
            unread += 1
            continue
        labels += len(theirs)
        if ours == theirs:
            continue
        reason = why(line) or labellers_differ(line, ours, theirs)
        if reason is not None:
            explained.setdefault(reason, []).append(line)
            continue
        bad += 1
        if bad <= 20:
            places = sorted(n for n in set(theirs) | set(ours or {}) if theirs.get(n) != (ours or {}).get(n))
            print(f"  {line}: RDKit {show({n: theirs[n] for n in places if n in theirs})}, ours "
                  + show(None if ours is None else {n: ours[n] for n in places if n in ours}))
    print(f"labels, {name}: {len(lines)} lines, {labels} labels by RDKit, {bad} differ, "
          f"{sum(map(len, explained.values()))} differ for a known reason, {unread} not labelled by RDKit")
    for reason, those in explained.items():
        print(f"  {len(those)} x {reason}")
    return bad


def isomer(line):
    """RDKit's molecule without map numbers, and its canonical line; nothing if it refuses the line."""
    mol = rdkit_mol(line)
    if mol is None:
        return None, None
    for atom in mol.GetAtoms():
        atom.SetAtomMapNum(0)
    # once more, so that what its writer drops is dropped on both sides
    again = rdkit_mol(Chem.MolToSmiles(mol))
    return mol, again and Chem.MolToSmiles(again)


def is_same(given, written):
    """Whether two lines are one isomer to RDKit.

    Its canonical line is not always one where units depend on each other (4-alkylidenecyclohexanols,
    inositols); the molecules then are laid on each other with their configurations.
    """
    (a, line_a), (b, line_b) = isomer(given), isomer(written)
    if a is None or b is None:
        return a is b
    if line_a == line_b:
        return True
    # of large symmetric molecules that could take for ever
    return a.GetNumAtoms() == b.GetNumAtoms() <= 60 and a.GetNumBonds() == b.GetNumBonds() and all(
        x.HasSubstructMatch(y, useChirality=True) for x, y in ((a, b), (b, a)))


def compare_written():
    """Lines as given and as written; number of differences without a reason."""
    if not os.path.exists(WRITTEN):
        print(f"lines_vs_rdkit: {WRITTEN} is not there (cargo test -p checks --test smiles)")
        return 1
    tried = unread = bad = 0
    explained = {}
    with open(WRITTEN, encoding="utf-8") as file:
        for row in file:
            given, written = row.rstrip("\n").split("\t")
            if rdkit_mol(given) is None:
                unread += 1
                continue
            tried += 1
            if is_same(given, written):
                continue
            reason = why(given) or why(written) or depends_on_writing(given)
            if reason is not None:
                explained.setdefault(reason, []).append(given)
                continue
            bad += 1
            if bad <= 20:
                print(f"  {given}\n    written {written}\n    RDKit {isomer(written)[1]}, not {isomer(given)[1]}")
    print(f"written: {tried} lines, {bad} mean another isomer to RDKit, "
          f"{sum(map(len, explained.values()))} for a known reason, {unread} that it does not read")
    for reason, those in explained.items():
        print(f"  {len(those)} x {reason}")
    return bad + (tried == 0)


def main():
    """Runs every comparison."""
    if not os.path.exists(PROGRAM):
        print(f"lines_vs_rdkit: no program at {PROGRAM} (cargo build --release)")
        return 2
    bad = 0
    with tempfile.TemporaryDirectory() as folder:
        for name, lines in (("shipped lines", shipped()), ("worked", worked()),
                            ("open data", open_data("stereo.smi"))):
            bad += compare_labels(name, lines, folder)
    bad += compare_written()
    return 1 if bad else 0


if __name__ == "__main__":
    sys.exit(main())
