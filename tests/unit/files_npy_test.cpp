/// NPY: what is accepted, and every refusal.
#include <fmt/format.h>
#include <gtest/gtest.h>

#include <string>

#include "tests/unit/files_support.hpp"

namespace cistern {
namespace {

/// A file with this dictionary and these bytes of codes.
std::string npy(std::string dictionary, std::string_view codes,
                std::string_view version = std::string_view("\x01\x00", 2)) {
  dictionary += '\n';
  std::string file = "\x93NUMPY" + std::string(version);
  file += static_cast<char>(dictionary.size() % 256);
  file += static_cast<char>(dictionary.size() / 256);
  return file + dictionary + std::string(codes);
}

std::string dictionary(std::string_view descr, std::string_view order, std::string_view shape) {
  return fmt::format("{{'descr': {}, 'fortran_order': {}, 'shape': {}, }}", descr, order, shape);
}

std::string with_type(std::string_view descr) { return npy(dictionary(descr, "False", "(1, 2, 1)"), "abcd"); }
std::string with_shape(std::string_view shape) { return npy(dictionary("'<i2'", "False", shape), "abcd"); }

struct Refusal {
  const char* name;
  std::string bytes;
  std::vector<const char*> says;  ///< the place first
};

class NpyRefusals : public testing::TestWithParam<Refusal> {};

TEST_P(NpyRefusals, name_the_file_the_place_and_what_was_expected) {
  const TraceFolder folder;
  write_bytes(folder / "t.npy", GetParam().bytes);
  expect_refusal(fault_of_reading(folder / "t.npy"), GetParam().says);
}

std::vector<Refusal> refusals() {
  const std::string good = dictionary("'<i2'", "False", "(1, 2, 1)");
  const std::string codes("\x01\x00\x02\x00", 4);
  const std::string negative("\x01\x00\xFF\xFF", 4);
  return {
      {"empty", "", {"t.npy: is empty"}},
      {"text", "trace,sample,ch0\n", {"t.npy: does not start as an NPY file does"}},
      {"short_text", "abc", {"t.npy: does not start as an NPY file does"}},
      {"magic_alone", "\x93NUMPY", {"t.npy: NPY header: ends early"}},
      {"version_2", npy(good, codes, std::string_view("\x02\x00", 2)), {"t.npy: is of NPY format 2.0, expected 1.0"}},
      {"version_1_1", npy(good, codes, "\x01\x01"), {"t.npy: is of NPY format 1.1, expected 1.0"}},
      {"ends_in_the_header", npy(good, codes).substr(0, 40), {"t.npy: NPY header: ends early"}},
      {"no_dictionary", npy("[1, 2]", codes), {"t.npy: NPY header: is not a dictionary"}},
      {"dictionary_without_end", npy("{'descr': '<i2', ", codes), {"t.npy: NPY header: is not a dictionary"}},
      {"key_missing", npy("{'descr': '<i2', 'shape': (1, 2, 1)}", codes), {"t.npy: NPY header: is not a dictionary"}},
      {"key_twice",
       npy("{'descr': '<i2', 'descr': '<i2', 'fortran_order': False, 'shape': (1, 2, 1)}", codes),
       {"t.npy: NPY header: is not a dictionary"}},
      {"key_unknown",
       npy("{'descr': '<i2', 'x': 1, 'fortran_order': False, 'shape': (1, 2, 1)}", codes),
       {"t.npy: NPY header: is not a dictionary"}},
      {"more_after_the_dictionary", npy(good + " 5", codes), {"t.npy: NPY header: is not a dictionary"}},
      {"fortran_order",
       npy(dictionary("'<i2'", "True", "(1, 2, 1)"), codes),
       {"t.npy: NPY header: fortran_order is \"True\", expected False"}},
      {"big_endian", with_type("'>i2'"), {"t.npy: NPY header: descr is \"'>i2'\"", "big-endian", "'<i2' or '<u2'"}},
      {"big_endian_unsigned", with_type("'>u2'"), {"t.npy: NPY header: descr is \"'>u2'\"", "big-endian"}},
      {"int32", with_type("'<i4'"), {"t.npy: NPY header: descr is \"'<i4'\""}},
      {"int8", with_type("'|i1'"), {"t.npy: NPY header: descr is \"'|i1'\""}},
      {"float32", with_type("'<f4'"), {"t.npy: NPY header: descr is \"'<f4'\""}},
      {"records", with_type("[('a', '<i2'), ('b', '<i2')]"), {"t.npy: NPY header: descr is \"[('a', '<i2'),"}},
      {"pickled_objects", with_type("'|O'"), {"t.npy: NPY header: descr is \"'|O'\""}},
      {"one_dimension", with_shape("(2,)"), {"t.npy: NPY header: shape is \"(2,)\"", "(traces, channels, samples)"}},
      {"two_dimensions", with_shape("(2, 1)"), {"t.npy: NPY header: shape is \"(2, 1)\""}},
      {"four_dimensions", with_shape("(1, 1, 2, 1)"), {"t.npy: NPY header: shape is \"(1, 1, 2, 1)\""}},
      {"no_dimension", with_shape("()"), {"t.npy: NPY header: shape is \"()\""}},
      {"shape_of_words", with_shape("(a, b, c)"), {"t.npy: NPY header: shape is \"(a, b, c)\""}},
      {"no_traces", with_shape("(0, 2, 1)"), {"t.npy: NPY header: the array has shape (0, 2, 1)", "at least 1"}},
      {"no_channels", with_shape("(1, 0, 1)"), {"t.npy: NPY header: the array has shape (1, 0, 1)"}},
      {"no_samples", with_shape("(1, 2, 0)"), {"t.npy: NPY header: the array has shape (1, 2, 0)"}},
      {"negative_dimension", with_shape("(-1, 2, 1)"), {"t.npy: NPY header: the array has shape (-1, 2, 1)"}},
      {"seventeen_channels", with_shape("(1, 17, 1)"), {"t.npy: NPY header: has 17 channels, expected 1 to 16"}},
      {"dimension_beyond_all_integers", with_shape("(99999999999999999999, 2, 1)"), {"t.npy: NPY header: shape is"}},
      {"product_beyond_all_integers",
       with_shape("(70368744177664, 2, 70368744177664)"),
       {"t.npy: has", "expected more than any file holds"}},
      {"truncated", npy(good, codes.substr(0, 3)), {"t.npy: has 76 bytes, expected 77", "(1, 2, 1)"}},
      {"bytes_after_the_codes", npy(good, codes + "x"), {"t.npy: has 78 bytes, expected 77"}},
      {"negative_code", npy(good, negative), {"t.npy: trace 0, channel 1, sample 0: code is -1, expected 0 to 32767"}},
      {"uint16_that_does_not_fit",
       npy(dictionary("'<u2'", "False", "(2, 1, 1)"), negative),
       {"t.npy: trace 1, channel 0, sample 0: code is 65535, expected 0 to 32767"}},
  };
}

INSTANTIATE_TEST_SUITE_P(Table, NpyRefusals, testing::ValuesIn(refusals()),
                         [](const auto& row) { return std::string(row.param.name); });

TEST(Npy, any_length_and_padding_of_the_header_is_accepted) {
  const TraceFolder folder;
  for (const char* text : {"{'descr': '<i2', 'fortran_order': False, 'shape': (1, 2, 1), }",
                           "{'shape':(1,2,1),'descr':'<i2','fortran_order':False}",
                           " { 'descr' : '<i2' , 'fortran_order' : False , 'shape' : (1, 2, 1,) }   \n  "}) {
    write_bytes(folder / "t.npy", npy(text, std::string("\x01\x00\x02\x01", 4)));
    const WholeFile file = read_whole(folder / "t.npy");
    EXPECT_EQ(file.traces[0].channel(0)[0], 1);
    EXPECT_EQ(file.traces[0].channel(1)[0], 258);
  }
}

TEST(Npy, the_first_code_that_is_too_large_is_named_wherever_it_is) {
  RandomStream stream(3, Purpose::PropertyTest, 0);
  const TraceFolder folder;
  for (int i = 0; i < 50; ++i) {
    WholeFile file = random_file(4, 3, 101, 8, stream);
    const std::size_t trace = below(stream, 4);
    const std::size_t channel = below(stream, 3);
    const std::size_t sample = below(stream, 101);
    file.traces[trace].channel(channel)[sample] = 256;
    write_whole(folder / "t.npy", file);
    const auto reader = open_trace_file(folder / "t.npy");
    reader->expect_bits(8);
    TraceBlock block;
    try {
      while (reader->next(10, block)) {
      }
      ADD_FAILURE() << "no fault";
    } catch (const InputError& error) {
      EXPECT_EQ(error.place(), fmt::format("{}: trace {}, channel {}, sample {}", (folder / "t.npy").string(), trace,
                                           channel, sample));
    }
  }
}

TEST(Npy, the_largest_code_of_the_bits_expected_is_accepted) {
  const TraceFolder folder;
  RandomStream stream(4, Purpose::PropertyTest, 0);
  WholeFile file = random_file(1, 1, 1, 8, stream);
  file.traces[0].channel(0)[0] = 255;
  write_whole(folder / "t.npy", file);
  const auto reader = open_trace_file(folder / "t.npy");
  reader->expect_bits(8);
  TraceBlock block;
  EXPECT_TRUE(reader->next(1, block));
}

TEST(TraceFiles, what_is_no_trace_file_is_refused) {
  const TraceFolder folder;
  write_bytes(folder / "t.txt", "x");
  std::filesystem::create_directory(folder / "d.npy");
  std::filesystem::create_symlink("nowhere", folder / "link.npy");
  EXPECT_EQ(fault_of_reading(folder / "none.csv"), "none.csv: no such file; expected recorded traces");
  EXPECT_EQ(fault_of_reading(folder / "link.npy"), "link.npy: no such file; expected recorded traces");
  EXPECT_EQ(fault_of_reading(folder / "d.npy"), "d.npy: is a directory; expected a file of recorded traces");
  EXPECT_EQ(fault_of_reading(folder / "t.txt"),
            "t.txt: its name does not end in a known way; expected .csv, .npy, .h5 or .hdf5");
}

}  // namespace
}  // namespace cistern
