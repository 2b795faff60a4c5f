#!/usr/bin/python3
"""Fails on long files, tabs, notes to self, paths of one machine, and on tests, sources and headers
that CMake does not know: they would never run or be compiled alone, and nothing would say so.

usage: check_sources.py [ROOT]
"""
import re
import sys
from pathlib import Path

from source_tree import FLOOR_FOLDERS, files_below, part_of, report, targets_of

LINES_MAX = 450
CODE = {".hpp", ".cpp", ".h", ".c", ".py", ".js", ".mjs", ".ts"}
TEXT = CODE | {".sh", ".cmake", ".txt", ".md", ".toml", ".proto", ".v", ".html", ".css", ""}
NOTE_TO_SELF = re.compile(r"\b(TO" r"DO|FIX" r"ME|XX" r"X|HA" r"CK)\b")
INCLUDED = re.compile(r'^\s*#\s*include\s*"([^"]+)"', re.MULTILINE)
MACHINE_PATH = re.compile(r"(?<![\w.$}])/(?:work|farm|tmp|home|root)/")


def faults_of_text(path, relative):
    """What one file alone shows."""
    lines = path.read_text(errors="replace").splitlines()
    if path.suffix in CODE and len(lines) > LINES_MAX:
        yield f"{relative}: {len(lines)} lines; is there a second idea in it? At most {LINES_MAX}"
    for number, line in enumerate(lines, 1):
        if "\t" in line:
            yield f"{relative}:{number}: a tab"
        if path.suffix != ".md" and NOTE_TO_SELF.search(line):
            yield f"{relative}:{number}: a note to self: {line.strip()[:80]}"
        if MACHINE_PATH.search(line):
            yield f"{relative}:{number}: a path of one machine: {line.strip()[:80]}"


def is_listed(root, file):
    """Whether a CMakeLists.txt in the file's folder or above names it."""
    for folder in file.parents:
        lists = root / folder / "CMakeLists.txt"
        if lists.is_file():
            name = re.escape(file.relative_to(folder).as_posix())
            text = re.sub(r"#.*", "", lists.read_text())
            if re.search(rf"(?<![\w./-])(\S*\}}/)?{name}(?![\w.-])", text):
                return True
    return False


def faults_of_build(root):
    """Sources and tests that CMake is not told about, and headers that are used abroad but not public."""
    targets = targets_of(root)
    public = {header for target in targets for header in target.headers}
    parts_with_target = {part_of(file) for target in targets for file in target.headers | target.sources}
    named = set()
    for path in files_below(root, {".cpp", ".hpp", ".h"}):
        file = path.relative_to(root)
        if file.suffix == ".cpp" and (file.parts[0] in FLOOR_FOLDERS or file.name.endswith("_test.cpp")):
            if not is_listed(root, file):
                yield f"{file}: no CMakeLists.txt names it, so it is never built"
        for included in map(Path, INCLUDED.findall(path.read_text(errors="replace"))):
            abroad = part_of(included) in parts_with_target and part_of(included) != part_of(file)
            if abroad and included not in public | named:
                named.add(included)
                yield f"{included}: {file} includes it, so it belongs among the HEADERS of its part"


def faults_of(root):
    """All faults below root, one line each."""
    faults = []
    for path in files_below(root, TEXT):
        relative = path.relative_to(root)
        if path.suffix or path.name in {"run"}:
            faults += faults_of_text(path, relative)
    return faults + list(faults_of_build(root))


if __name__ == "__main__":
    sys.exit(report(faults_of(Path(sys.argv[1] if len(sys.argv) > 1 else Path(__file__).parents[2]).resolve())))
