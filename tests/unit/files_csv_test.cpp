/// CSV: what is accepted, and every refusal with its line.
#include <gtest/gtest.h>

#include <string>

#include "tests/unit/files_support.hpp"

namespace cistern {
namespace {

const std::string head = "trace,sample,ch0,ch1\n";

WholeFile read_text(std::string_view text) {
  const TraceFolder folder;
  write_bytes(folder / "t.csv", text);
  return read_whole(folder / "t.csv");
}

struct Refusal {
  const char* name;
  std::string text;
  std::vector<const char*> says;  ///< the place first
};

class CsvRefusals : public testing::TestWithParam<Refusal> {};

TEST_P(CsvRefusals, name_the_file_the_place_and_what_was_expected) {
  const TraceFolder folder;
  write_bytes(folder / "t.csv", GetParam().text);
  expect_refusal(fault_of_reading(folder / "t.csv"), GetParam().says);
}

std::vector<Refusal> refusals() {
  const std::string good = head + "0,0,1,2\n0,1,1,2\n1,0,1,2\n";
  const std::string nul("0,\0,1,2\n", 8);
  return {
      {"empty", "", {"t.csv: is empty"}},
      {"comments_alone", "# bits=12\n", {"t.csv: has no header", "trace,sample,ch0"}},
      {"header_alone", head, {"t.csv: has no samples"}},
      {"no_header", "0,0,1,2\n", {"t.csv:1: header is \"0,0,1,2\""}},
      {"empty_first_line", "\n" + head, {"t.csv:1: header is \"\""}},
      {"wrong_column_name", "trace,sample,adc0\n0,0,1\n", {"t.csv:1: header", "adc0"}},
      {"columns_in_another_order", "sample,trace,ch0\n0,0,1\n", {"t.csv:1: header"}},
      {"gap_in_the_channels", "trace,sample,ch0,ch2\n0,0,1,1\n", {"t.csv:1: header", "ch0,ch2"}},
      {"channels_from_one", "trace,sample,ch1,ch2\n0,0,1,1\n", {"t.csv:1: header", "ch1,ch2"}},
      {"no_channel", "trace,sample\n0,0\n", {"t.csv:1: header"}},
      {"seventeen_channels",
       "trace,sample,ch0,ch1,ch2,ch3,ch4,ch5,ch6,ch7,ch8,ch9,ch10,ch11,ch12,ch13,ch14,ch15,ch16\n",
       {"t.csv:1: header", "1 to 16"}},
      {"blanks_in_the_header", "trace, sample, ch0\n0,0,1\n", {"t.csv:1: header"}},
      {"byte_order_mark", "\xEF\xBB\xBF" + head + "0,0,1,2\n", {"t.csv:1: header", "\\xef"}},
      {"too_few_fields", head + "0,0,1\n", {"t.csv:2: has 3 fields, expected 4"}},
      {"too_many_fields", good + "1,1,1,2,3\n", {"t.csv:5: has 5 fields, expected 4"}},
      {"comma_at_the_end", head + "0,0,1,2,\n", {"t.csv:2: has 5 fields, expected 4"}},
      {"empty_field", head + "0,0,,2\n", {"t.csv:2: ch0 is \"\"", "whole number"}},
      {"fraction", head + "0,0,1,2.5\n", {"t.csv:2: ch1 is \"2.5\"", "whole number"}},
      {"exponent", head + "0,0,1e3,2\n", {"t.csv:2: ch0 is \"1e3\""}},
      {"blank_in_a_field", head + "0,0, 1,2\n", {"t.csv:2: ch0 is \" 1\""}},
      {"word", head + "0,0,1,nan\n", {"t.csv:2: ch1 is \"nan\""}},
      {"sign", head + "0,0,+1,2\n", {"t.csv:2: ch0 is \"+1\""}},
      {"semicolons", head + "0;0;1;2\n", {"t.csv:2: has 1 fields"}},
      {"too_large_for_any_integer", head + "0,0,99999999999999999999,2\n", {"t.csv:2: ch0 is \"9999", "whole number"}},
      {"too_large_for_32_bits", head + "0,0,4294967297,2\n", {"t.csv:2: ch0 is 4294967297", "0 to 32767"}},
      {"control_characters", head + "0,0,1\x1b[2J,2\n", {"t.csv:2: ch0 is \"1\\x1b[2J\""}},
      {"negative_code", head + "0,0,1,-1\n", {"t.csv:2: ch1 is -1", "0 to 32767"}},
      {"code_above_15_bits", head + "0,0,1,32768\n", {"t.csv:2: ch1 is 32768", "15 bits"}},
      {"code_above_its_bits", "# bits=8\n" + head + "0,0,255,2\n0,1,256,2\n", {"t.csv:4: ch0 is 256", "0 to 255"}},
      {"first_sample_is_one", head + "0,1,1,2\n", {"t.csv:2: starts with trace 0, sample 1"}},
      {"first_trace_is_one", head + "1,0,1,2\n", {"t.csv:2: starts with trace 1, sample 0"}},
      {"gap_in_the_samples", head + "0,0,1,2\n0,2,1,2\n", {"t.csv:3: sample is 2, expected 1"}},
      {"sample_twice", head + "0,0,1,2\n0,0,1,2\n", {"t.csv:3: sample is 0, expected 1"}},
      {"gap_in_the_traces", head + "0,0,1,2\n2,0,1,2\n", {"t.csv:3: trace is 2, expected 0 or 1"}},
      {"trace_again", head + "0,0,1,2\n1,0,1,2\n0,0,1,2\n", {"t.csv:4: trace is 0, expected 1 or 2"}},
      {"new_trace_not_from_zero", head + "0,0,1,2\n1,1,1,2\n", {"t.csv:3: sample is 1, expected 0"}},
      {"trace_too_short", good, {"t.csv:4: trace 1 has 1 samples, expected 2"}},
      {"trace_too_short_in_the_middle", good + "2,0,1,2\n", {"t.csv:5: trace 1 has 1 samples, expected 2"}},
      {"trace_too_long", good + "1,1,1,2\n1,2,1,2\n", {"t.csv:6: trace 1 goes on, expected 2"}},
      {"empty_line", head + "0,0,1,2\n\n0,1,1,2\n", {"t.csv:3: is an empty line"}},
      {"comment_among_samples", head + "0,0,1,2\n# break\n", {"t.csv:3: is a comment"}},
      {"nul_in_a_row", head + nul, {"t.csv:2: holds a NUL byte"}},
      {"nul_in_a_comment", std::string("# a\0b\n", 6) + head, {"t.csv:1: holds a NUL byte"}},
      {"endless_line", head + std::string(1 << 20, '1'), {"t.csv:2: the line is too long"}},
      {"unknown_key", "# sample_rate=100\n" + head, {"t.csv:1: unknown key \"sample_rate\"; nearest: sample_rate_mhz"}},
      {"key_of_hdf5_alone", "# start_ns=5\n" + head, {"t.csv:1: unknown key \"start_ns\""}},
      {"key_twice", "# bits=12\n# bits=12\n" + head, {"t.csv:2: \"bits\" is said again"}},
      {"key_twice_in_a_line", "# bits=12 bits=12\n" + head, {"t.csv:1: \"bits\" is said again"}},
      {"blanks_around_equals", "# bits = 12\n" + head, {"t.csv:1: \"bits\" is not key=value"}},
      {"list_with_blanks", "# baseline_counts=1 2\n" + head, {"t.csv:1: \"2\" is not key=value"}},
      {"no_key", "# =5\n" + head, {"t.csv:1: \"=5\" is not key=value"}},
      {"bits_not_whole", "# bits=12.0\n" + head, {"t.csv:1: bits is \"12.0\""}},
      {"bits_too_few", "# bits=3\n" + head, {"t.csv:1: bits is 3, expected 4 to 15"}},
      {"bits_too_many", "# bits=16\n" + head, {"t.csv:1: bits is 16, expected 4 to 15"}},
      {"rate_zero", "# sample_rate_mhz=0\n" + head, {"t.csv:1: sample_rate_mhz is 0"}},
      {"rate_negative", "# sample_rate_mhz=-1\n" + head, {"t.csv:1: sample_rate_mhz is -1"}},
      {"rate_infinite", "# sample_rate_mhz=inf\n" + head, {"t.csv:1: sample_rate_mhz is inf"}},
      {"rate_nan", "# sample_rate_mhz=nan\n" + head, {"t.csv:1: sample_rate_mhz is nan"}},
      {"rate_with_unit", "# sample_rate_mhz=100MHz\n" + head, {"t.csv:1: sample_rate_mhz is \"100MHz\""}},
      {"rate_empty", "# sample_rate_mhz=\n" + head, {"t.csv:1: sample_rate_mhz is \"\""}},
      {"live_time_zero", "# live_time_s=0\n" + head, {"t.csv:1: live_time_s is 0"}},
      {"live_time_infinite", "# live_time_s=1e999\n" + head, {"t.csv:1: live_time_s is \"1e999\""}},
      {"selection_unknown", "# selection=random\n" + head, {"t.csv:1: selection is \"random\"", "triggered_by:NAME"}},
      {"selection_of_nothing", "# selection=triggered_by:\n" + head, {"t.csv:1: selection is \"triggered_by:\""}},
      {"contiguous_one", "# contiguous=1\n" + head, {"t.csv:1: contiguous is \"1\"", "true or false"}},
      {"baselines_too_many",
       "# bits=12\n# baseline_counts=1,2,3\n" + head,
       {"t.csv:2: baseline_counts has 3 values, expected one or 2"}},
      {"baselines_malformed", "# baseline_counts=1,,3\n" + head, {"t.csv:1: baseline_counts is \"\""}},
      {"baseline_negative", "# baseline_counts=-1\n" + head, {"t.csv:1: baseline_counts holds -1"}},
      {"baseline_above_bits", "# baseline_counts=256\n# bits=8\n" + head, {"t.csv:1: baseline_counts holds 256"}},
  };
}

INSTANTIATE_TEST_SUITE_P(Table, CsvRefusals, testing::ValuesIn(refusals()),
                         [](const auto& row) { return std::string(row.param.name); });

TEST(Csv, line_ends_of_other_systems_are_accepted) {
  const WholeFile file = read_text("# bits=12\r\ntrace,sample,ch0,ch1\r\n0,0,1,2\r\n0,1,3,4\r\n");
  ASSERT_EQ(file.traces.size(), 1U);
  EXPECT_EQ(file.info.bits, 12);
  EXPECT_EQ(file.traces[0].channel(1)[1], 4);
}

TEST(Csv, a_missing_last_line_end_is_accepted) { EXPECT_EQ(read_text(head + "0,0,1,2").traces[0].channel(1)[0], 2); }

TEST(Csv, a_comment_without_equals_is_free_text) {
  EXPECT_EQ(read_text("#\n# taken in the rain\n##bits\n# bits=9\n" + head + "0,0,1,2\n").info.bits, 9);
}

TEST(Csv, several_keys_may_share_a_line) {
  const TraceFileInfo info =
      read_text("#bits=9\tsample_rate_mhz=40.5  live_time_s=1e-3\n#contiguous=true\n" + head + "0,0,1,2\n").info;
  EXPECT_EQ(info.bits, 9);
  EXPECT_EQ(info.sample_rate_mhz, 40.5);
  EXPECT_EQ(info.live_time_s, 1e-3);
  EXPECT_TRUE(info.contiguous);
}

TEST(Csv, one_baseline_stands_for_all_channels) {
  EXPECT_EQ(read_text("# baseline_counts=212\n" + head + "0,0,1,2\n").info.baseline_counts, (std::vector{212, 212}));
  EXPECT_EQ(read_text("# baseline_counts=212,0\n" + head + "0,0,1,2\n").info.baseline_counts, (std::vector{212, 0}));
}

TEST(Csv, the_largest_code_of_its_bits_is_accepted) {
  EXPECT_EQ(read_text("# bits=4\n" + head + "0,0,15,0\n").traces[0].channel(0)[0], 15);
  EXPECT_EQ(read_text(head + "0,0,32767,0\n").traces[0].channel(0)[0], 32767);
}

TEST(Csv, lines_may_lie_across_the_ends_of_the_buffer) {
  std::string text = head;
  for (int s = 0; s < 60'000; ++s) text += "0," + std::to_string(s) + "," + std::to_string(s % 4096) + ",7\n";
  const WholeFile file = read_text(text);
  ASSERT_EQ(file.info.samples, 60'000U);
  for (int s = 0; s < 60'000; ++s) ASSERT_EQ(file.traces[0].channel(0)[static_cast<std::size_t>(s)], s % 4096);
}

TEST(Csv, codes_are_checked_against_the_bits_expected_where_the_file_says_none) {
  const TraceFolder folder;
  write_bytes(folder / "first.csv", head + "0,0,256,2\n");
  EXPECT_THROW(open_trace_file(folder / "first.csv")->expect_bits(8), InputError);
  write_bytes(folder / "second.csv", head + "0,0,255,2\n0,1,256,2\n");
  const auto reader = open_trace_file(folder / "second.csv");
  reader->expect_bits(8);
  TraceBlock block;
  EXPECT_THROW((void)reader->next(10, block), InputError);
}

TEST(Csv, bits_of_the_file_are_not_overruled) {
  const TraceFolder folder;
  write_bytes(folder / "t.csv", "# bits=12\n" + head + "0,0,256,2\n");
  const auto reader = open_trace_file(folder / "t.csv");
  reader->expect_bits(8);
  TraceBlock block;
  EXPECT_TRUE(reader->next(10, block));
}

}  // namespace
}  // namespace cistern
