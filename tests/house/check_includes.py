#!/usr/bin/python3
"""Reads every #include of the four floors and fails when a part looks up or sideways, when a library
is used outside the parts that may know it, or when a public header hands a heavy library on to others.

usage: check_includes.py [ROOT]
"""
import re
import sys
from pathlib import Path

from source_tree import FLOOR_FOLDERS, files_below, part_of, report, targets_of

# --- Who may include whom (docs/architecture.md). A part may always include itself and traces/base.
WAVEFORM = {"traces/waveform"}
STREAM_PARTS = {"traces/particles", "traces/shower", "traces/tank", "traces/frontend", "traces/files"}
TRACES = WAVEFORM | STREAM_PARTS | {"traces/generator"}
MESSAGES = {"comms/messages"}
STATION_LOGIC = {"firmware_model/digitizer", "firmware_model/trigger", "firmware_model/program", "firmware_model/power"}
FIRMWARE = STATION_LOGIC | {"firmware_model/station"}
COMMS = MESSAGES | {"comms/radio", "comms/central", "comms/net"}
BENCH_TOOLS = {"bench/statistics", "bench/campaign", "bench/results", "bench/report"}
BELOW_BENCH = TRACES | FIRMWARE | COMMS

ALLOWED = {
    "traces/base": set(),
    "traces/waveform": set(),
    "traces/particles": WAVEFORM,
    "traces/shower": WAVEFORM,
    "traces/tank": WAVEFORM,
    "traces/frontend": WAVEFORM,
    "traces/files": WAVEFORM,
    "traces/generator": WAVEFORM | STREAM_PARTS,
    "firmware_model/digitizer": TRACES | MESSAGES,
    "firmware_model/trigger": TRACES | MESSAGES,
    "firmware_model/program": TRACES | MESSAGES,
    "firmware_model/power": TRACES | MESSAGES,
    "firmware_model/station": TRACES | MESSAGES | STATION_LOGIC,
    "comms/messages": set(),
    "comms/radio": MESSAGES,
    "comms/central": MESSAGES,
    "comms/net": MESSAGES | {"comms/central"},
    "bench/statistics": set(),
    "bench/campaign": set(),
    "bench/results": set(),
    "bench/report": set(),
    "bench/scenario": BELOW_BENCH,
    "bench/ledger": BELOW_BENCH | BENCH_TOOLS | {"bench/scenario"},
    "bench/experiments": BELOW_BENCH | BENCH_TOOLS | {"bench/scenario", "bench/ledger"},
    "bench/command_line": BELOW_BENCH | BENCH_TOOLS | {"bench/scenario", "bench/ledger", "bench/experiments"},
}


class Library:
    """An outside header, who may include it, and whether our headers may hand it on."""

    def __init__(self, name, pattern, parts, shells=False, in_headers=False):
        self.name = name
        self.pattern = re.compile(pattern)
        self.parts = parts            # parts, or the start of their path
        self.shells = shells          # in targets called NAME_shell
        self.in_headers = in_headers

    def may_be_used_by(self, part, is_shell):
        return (self.shells and is_shell) or any(part == p or part.startswith(p + "/") for p in self.parts)


WIRING = ["bench/experiments"]        # the only place that joins shells
FILES = ["traces/files", "bench/scenario", "bench/results", "bench/report", "bench/campaign", "bench/experiments",
         "bench/command_line"]
LIBRARIES = [
    Library("SystemC", r"^(systemc(\.h)?|tlm(\.h)?|sysc/.*|tlm_\w+/.*)$", WIRING, shells=True),
    Library("Boost.Asio", r"^boost/asio", ["comms/net"], shells=True),
    Library("SQLite", r"^sqlite3\.h$", ["bench/results"]),
    Library("HDF5", r"^(hdf5|H5\w+)\.h(pp)?$", ["traces/files"]),
    Library("toml++", r"^toml(\+\+|plusplus)/", ["bench/scenario"]),
    Library("CLI11", r"^CLI/", ["bench/command_line"]),
    Library("nlohmann json", r"^nlohmann/", ["bench"]),
    Library("Protocol Buffers", r"\.pb\.h$|^google/protobuf/", ["comms/messages"]),
    Library("Highway", r"^hwy/", ["traces", "firmware_model"]),
    Library("Boost.Math", r"^boost/math/", ["bench/statistics", "traces/particles", "traces/frontend"]),
    Library("a random generator of the standard library", r"^random$", []),
    Library("a clock or a thread", r"^(chrono|ctime|time\.h|sys/time\.h|thread|mutex|condition_variable|future)$",
            ["bench/campaign", "bench/command_line", "comms/net"], in_headers=True),
    Library("a file", r"^(fstream|filesystem)$", FILES, in_headers=True),
    Library("the operating system", r"^(unistd\.h|poll\.h|fcntl\.h|sys/.*)$", FILES, in_headers=True),
]

INCLUDE = re.compile(r'^\s*#\s*include\s*([<"])([^>"]+)[>"]')
GENERATED = re.compile(r"\.pb\.h$")


class Source:
    """One of our files, and what its include lines are judged by."""

    def __init__(self, path, part, shells, public):
        self.path = path
        self.part = part
        self.is_shell = path in shells
        self.is_public = path in public   # a header that other parts may include


def fault_of_own(source, included, shells):
    """What is wrong with including one of our own files, or None."""
    target = part_of(included)
    if target is None:
        return f"{included} is not a file of a part; write the path from the project root"
    if target != source.part and target != "traces/base" and target not in ALLOWED[source.part]:
        return f"{source.part} may not include {target}"
    if included in shells and not source.is_shell and source.part not in WIRING:
        return f"pure logic may not include the shell header {included}"
    return None


def fault_of_outside(source, included):
    """What is wrong with including a header from outside, or None."""
    for library in LIBRARIES:
        if not library.pattern.search(included):
            continue
        if not library.may_be_used_by(source.part, source.is_shell):
            return f"{source.part} may not know {library.name} (<{included}>)"
        module_header = source.is_shell and source.path.name.endswith("_module.hpp")
        if source.is_public and not library.in_headers and not module_header:
            return f"a public header may not hand on {library.name} (<{included}>)"
    return None


def faults_of(root):
    """All faults below root, one line each."""
    targets = targets_of(root)
    shells = {file for target in targets if target.is_shell for file in target.headers | target.sources}
    public = {header for target in targets for header in target.headers}
    faults = []
    for path in files_below(root, {".hpp", ".cpp", ".h", ".c"}):
        relative = path.relative_to(root)
        if relative.parts[0] not in FLOOR_FOLDERS:
            continue
        part = part_of(relative)
        if part not in ALLOWED:
            faults.append(f"{relative}: {part or 'a loose file'} is not a part; add it to the table in check_includes.py")
            continue
        source = Source(relative, part, shells, public)
        for number, line in enumerate(path.read_text(errors="replace").splitlines(), 1):
            match = INCLUDE.match(line)
            if match:
                quoted = match.group(1) == '"' and not GENERATED.search(match.group(2))
                fault = (fault_of_own(source, Path(match.group(2)), shells) if quoted
                         else fault_of_outside(source, match.group(2)))
                if fault:
                    faults.append(f"{relative}:{number}: {fault}")
    return faults


if __name__ == "__main__":
    sys.exit(report(faults_of(Path(sys.argv[1] if len(sys.argv) > 1 else Path(__file__).parents[2]).resolve())))
