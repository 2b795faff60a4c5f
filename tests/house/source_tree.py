"""What the checks of the house share: the files of the project and what CMake is told about them."""
import re
from pathlib import Path

FLOOR_FOLDERS = ("traces", "firmware_model", "comms", "bench")
LEFT_OUT = {"build", "node_modules", "cistern-run", "__pycache__"}


def files_below(root, suffixes):
    """Files of the project with one of these suffixes, sorted; no build output, no hidden folders but .ci."""
    found = []
    for path in sorted(root.rglob("*")):
        folders = path.relative_to(root).parts[:-1]
        hidden = any(name.startswith(".") and name != ".ci" for name in folders)
        if not hidden and not LEFT_OUT & set(folders) and path.suffix in suffixes and path.is_file():
            found.append(path)
    return found


def part_of(file):
    """The part a file belongs to, "traces/base"; file is relative to the root."""
    return "/".join(file.parts[:2]) if len(file.parts) > 2 and file.parts[0] in FLOOR_FOLDERS else None


class Target:
    """One cistern_part(NAME HEADERS ... SOURCES ...) call; files are relative to the root."""

    def __init__(self, name, headers, sources):
        self.name = name
        self.headers = headers
        self.sources = sources
        self.is_shell = name.endswith("_shell")


def targets_of(root):
    """All targets that cistern_part makes."""
    targets = []
    for lists in files_below(root, {".txt"}):
        if lists.name == "CMakeLists.txt" and lists.parent != root:
            folder = lists.parent.relative_to(root)
            for call in re.finditer(r"^\s*cistern_part\(([^)]*)\)", lists.read_text(), re.MULTILINE):
                targets.append(_target(call.group(1), folder))
    return targets


def _target(arguments, folder):
    words = re.sub(r"#.*", "", arguments).split()
    lists = {"HEADERS": set(), "SOURCES": set(), "LINKS": set(), "PRIVATE_LINKS": set()}
    current = None
    for word in words[1:]:
        if word in lists:
            current = lists[word]
        elif current is not None:
            current.add(folder / word)
    return Target(words[0], lists["HEADERS"], lists["SOURCES"])


def report(faults):
    """Prints one line a fault and gives the exit status."""
    for fault in faults:
        print(fault)
    return 1 if faults else 0
