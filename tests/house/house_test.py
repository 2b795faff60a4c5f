#!/usr/bin/python3
"""Plants faults in a small tree and sees whether the checks of the house find them, and only them."""
import tempfile
import unittest
from pathlib import Path

import check_includes
import check_sources

GOOD = {
    "CMakeLists.txt": "add_subdirectory(traces)\n",
    "traces/base/CMakeLists.txt": "cistern_part(base\n  HEADERS errors.hpp\n  SOURCES errors.cpp)\n",
    "traces/base/errors.hpp": "#pragma once\n#include <string>\n",
    "traces/base/errors.cpp": '#include "traces/base/errors.hpp"\n',
    "traces/files/CMakeLists.txt": "cistern_part(files HEADERS trace_file.hpp SOURCES trace_file.cpp)  # streamed\n",
    "traces/files/trace_file.hpp": '#pragma once\n#include "traces/base/errors.hpp"\n',
    "traces/files/trace_file.cpp": '#include "traces/files/trace_file.hpp"\n#include <hdf5.h>\n',
    "firmware_model/station/CMakeLists.txt":
        "cistern_part(station HEADERS book.hpp SOURCES book.cpp)\n"
        "cistern_part(station_shell HEADERS station_module.hpp SOURCES station_module.cpp)\n",
    "firmware_model/station/book.hpp": '#pragma once\n#include "traces/base/errors.hpp"\n',
    "firmware_model/station/book.cpp": '#include "firmware_model/station/book.hpp"\n',
    "firmware_model/station/station_module.hpp": "#pragma once\n#include <systemc>\n",
    "firmware_model/station/station_module.cpp": '#include "firmware_model/station/station_module.hpp"\n',
    "comms/messages/CMakeLists.txt": "cistern_part(messages SOURCES tag.cpp)\n",
    "comms/messages/tag.cpp": '#include "tag.pb.h"\n',
    "tests/unit/CMakeLists.txt": "cistern_test(book_test SOURCES book_test.cpp)\n",
    "tests/unit/book_test.cpp": '#include "firmware_model/station/book.hpp"\n',
}

# what is planted where, and a word of the one fault that it must raise
PLANTED_INCLUDES = [
    ("looks up", "traces/base/errors.cpp", '#include "traces/files/trace_file.hpp"', "traces/base may not include"),
    ("looks sideways", "comms/messages/tag.cpp", '#include "firmware_model/station/book.hpp"', "comms/messages may not"),
    ("comms sees base alone", "comms/messages/tag.cpp", '#include "traces/files/trace_file.hpp"', "comms/messages may not"),
    ("kernel in pure logic", "firmware_model/station/book.cpp", "#include <systemc>", "may not know SystemC"),
    ("shell header in pure logic", "firmware_model/station/book.cpp",
     '#include "firmware_model/station/station_module.hpp"', "shell header"),
    ("sockets in pure logic", "firmware_model/station/book.cpp", "# include <boost/asio/post.hpp>", "Boost.Asio"),
    ("database below", "traces/files/trace_file.cpp", "#include <sqlite3.h>", "SQLite"),
    ("heavy public header", "traces/files/trace_file.hpp", "#include <hdf5.h>", "hand on HDF5"),
    ("generated code outside messages", "firmware_model/station/book.cpp", '#include "tag.pb.h"', "Protocol Buffers"),
    ("a clock in pure logic", "firmware_model/station/book.cpp", "#include <chrono>", "a clock or a thread"),
    ("other random numbers", "traces/files/trace_file.cpp", "#include <random>", "random generator"),
    ("not from the root", "traces/files/trace_file.cpp", '#include "trace_file.hpp"', "from the project root"),
    ("no such part", "bench/odd/odd.cpp", "int odd;", "is not a part"),
]
PLANTED_SOURCES = [
    ("a tab", "traces/base/errors.cpp", "\tint tabbed;", "a tab"),
    ("a note to self", "traces/base/errors.cpp", "// TO" "DO: later", "a note to self"),
    ("a machine's path", "traces/base/errors.cpp", '// see "/' 'home/someone/notes"', "path of one machine"),
    ("too long", "traces/base/errors.cpp", "\n" * 450, "450"),
    ("a test that never runs", "tests/unit/other_test.cpp", "int other;", "never built"),
    ("a source that is never built", "traces/base/other.cpp", "int other;", "never built"),
    ("a private header used abroad", "tests/unit/book_test.cpp", '#include "traces/files/inner.hpp"', "among the HEADERS"),
]


class House(unittest.TestCase):
    def setUp(self):
        self.folder = tempfile.TemporaryDirectory()
        self.root = Path(self.folder.name)
        for name, text in GOOD.items():
            self.write(name, text)

    def tearDown(self):
        self.folder.cleanup()

    def write(self, name, text):
        path = self.root / name
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_text(text)

    def expect_one_fault(self, check, rows):
        for name, file, line, word in rows:
            with self.subTest(name):
                before = (self.root / file).read_text() if (self.root / file).exists() else None
                self.write(file, (before or "") + line + "\n")
                faults = check.faults_of(self.root)
                self.assertEqual(len(faults), 1, faults)
                self.assertIn(word, faults[0])
                (self.root / file).unlink()
                if before is not None:
                    self.write(file, before)

    def test_finds_nothing_in_a_tidy_house(self):
        self.assertEqual(check_includes.faults_of(self.root), [])
        self.assertEqual(check_sources.faults_of(self.root), [])

    def test_finds_each_planted_include(self):
        self.expect_one_fault(check_includes, PLANTED_INCLUDES)

    def test_finds_each_planted_source(self):
        self.expect_one_fault(check_sources, PLANTED_SOURCES)

    def test_ignores_build_output(self):
        self.write("build/release/traces/base/generated.cpp", '#include "traces/files/trace_file.hpp"\n\t\n')
        self.assertEqual(check_includes.faults_of(self.root), [])
        self.assertEqual(check_sources.faults_of(self.root), [])

    def test_tells_a_name_from_a_longer_one(self):
        self.write("tests/unit/ook_test.cpp", "int other;\n")  # "book_test.cpp" is listed, it is not
        self.assertEqual(len(check_sources.faults_of(self.root)), 1)


if __name__ == "__main__":
    unittest.main()
