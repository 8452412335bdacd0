#!/usr/bin/env python3
"""Runs every command of examples/README.md and lets RDKit read what it wrote.

A command must end with 0 or 1 and write the file that it names. Of `place --carry`, RDKit must read the
labels asked for. Exit status 0 if all do, 1 if not, 2 if there is no program.
"""
import os
import re
import shlex
import subprocess
import sys
import tempfile

from labels_vs_rdkit import PROGRAM, TOP, parse, rdkit_labels


def fault(words, folder):
    """What is wrong with a command, or None."""
    result = None
    for i, word in enumerate(words):
        if words[i - 1] == "-o":
            result = os.path.join(folder, word)
            words[i] = result
        elif word.startswith("examples/"):
            words[i] = os.path.join(TOP, word)
    done = subprocess.run([PROGRAM, *words[1:]], capture_output=True, text=True, check=False)
    if done.returncode not in (0, 1) or "panicked" in done.stderr:
        return f"ended with {done.returncode}: {done.stderr.strip()}"
    if result is None:
        return None if done.stdout.strip() else "printed nothing"
    if not os.path.exists(result) or os.path.getsize(result) == 0:
        return f"wrote nothing: {done.stderr.strip()}"
    if "--carry" in words:
        want = parse(words[words.index("--carry") + 1])
        with open(result, encoding="utf-8") as file:
            read = rdkit_labels(file.read()) or {}
        if any(read.get(n) != d for n, d in want.items()):
            return f"RDKit reads {read}"
    return None


def main():
    """Runs all commands."""
    if not os.path.exists(PROGRAM):
        print(f"try_examples: no program at {PROGRAM} (cargo build --release)")
        return 2
    with open(os.path.join(TOP, "examples", "README.md"), encoding="utf-8") as file:
        commands = re.findall(r"`(wedgewright [a-z][^`]*)`", file.read())
    bad = 0
    with tempfile.TemporaryDirectory() as folder:
        for command in commands:
            why = fault(shlex.split(command), folder)
            if why:
                bad += 1
                print(f"  {command}: {why}")
    print(f"examples: {len(commands)} commands, {bad} went wrong")
    return 1 if bad or not commands else 0


if __name__ == "__main__":
    sys.exit(main())
