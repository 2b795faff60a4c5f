#include "comms/messages/tag.hpp"

#include <gtest/gtest.h>

#include <limits>
#include <vector>

#include "traces/base/random.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t seed = 20260712;

Tag usual_tag() {
  Tag tag;
  tag.station_number = 17;
  tag.trigger_index = 1;
  tag.capture_number = 90'321;
  tag.firing_time_ns = 1'450'000'000'123'456'789;
  tag.onset_time_ns = tag.firing_time_ns - 1'490;
  tag.time_error_ns = 7.5F;
  return tag;
}

TEST(Tag, comes_back_as_it_was_encoded) {
  struct Row {
    const char* name;
    Tag tag;
  };
  std::vector<Row> rows = {{"usual", usual_tag()}};
  const auto add = [&](const char* name, auto change) {
    rows.push_back({name, usual_tag()});
    change(rows.back().tag);
  };
  add("first trigger", [](Tag& tag) { tag.trigger_index = 0; });
  add("last trigger", [](Tag& tag) { tag.trigger_index = 65'534; });
  add("no onset", [](Tag& tag) { tag.onset_time_ns.reset(); });
  add("onset at the firing", [](Tag& tag) { tag.onset_time_ns = tag.firing_time_ns; });
  add("earliest onset", [](Tag& tag) { tag.onset_time_ns = tag.firing_time_ns - 4'294'967'295; });
  add("onset before the epoch", [](Tag& tag) { tag.firing_time_ns = 5, tag.onset_time_ns = -20; });
  add("at the epoch", [](Tag& tag) { tag.firing_time_ns = 0, tag.onset_time_ns.reset(); });
  add("end of time",
      [](Tag& tag) { tag.firing_time_ns = std::numeric_limits<std::int64_t>::max(), tag.onset_time_ns.reset(); });
  add("perfect clock", [](Tag& tag) { tag.time_error_ns = 0; });
  add("start unknown", [](Tag& tag) { tag.start_unknown = true; });
  add("largest numbers", [](Tag& tag) {
    tag.station_number = std::numeric_limits<std::uint32_t>::max();
    tag.capture_number = std::numeric_limits<std::uint64_t>::max();
  });
  for (const Row& row : rows) EXPECT_EQ(decode_tag(encode(row.tag)), row.tag) << row.name;
}

Tag random_tag(RandomStream& stream) {
  Tag tag;
  tag.station_number = 1 + stream.next_word() % 5'000;
  tag.trigger_index = stream.next_word() % 65'535;
  tag.capture_number = 1 + (static_cast<std::uint64_t>(stream.next_word()) << (stream.next_word() % 32));
  tag.firing_time_ns = static_cast<std::int64_t>(stream.uniform(0, 9.2e18));
  if (stream.next_word() % 3 != 0) tag.onset_time_ns = tag.firing_time_ns - stream.next_word();
  tag.time_error_ns = static_cast<float>(stream.exponential(20));
  tag.start_unknown = stream.next_word() % 2 == 0;
  return tag;
}

TEST(Tag, comes_back_for_random_tags) {
  RandomStream stream(seed, Purpose::PropertyTest, 1);
  for (int k = 0; k < 20'000; ++k) {
    const Tag tag = random_tag(stream);
    ASSERT_EQ(decode_tag(encode(tag)), tag) << "seed " << seed << " tag " << k;
  }
}

TEST(Tag, takes_few_bytes_of_airtime) { EXPECT_EQ(encode(usual_tag()).size(), 2U + 2U + 4U + 3U + 5U + 9U); }

TEST(Tag, is_refused_whatever_is_cut_off_its_end) {
  RandomStream stream(seed, Purpose::PropertyTest, 2);
  for (int k = 0; k < 500; ++k) {
    const std::string bytes = encode(random_tag(stream));
    for (std::size_t length = 0; length < bytes.size(); ++length) {
      ASSERT_FALSE(decode_tag(std::string_view(bytes).substr(0, length))) << "seed " << seed << " tag " << k;
    }
  }
}

/// Every byte replaced, in turn, by random others: an error or a tag that can be sent again.
TEST(Tag, with_damaged_bytes_is_refused_or_possible) {
  RandomStream stream(seed, Purpose::PropertyTest, 3);
  int refused = 0;
  int possible = 0;
  for (int k = 0; k < 30'000; ++k) {
    std::string bytes = encode(random_tag(stream));
    for (std::uint32_t damages = 1 + stream.next_word() % 3; damages > 0; --damages) {
      bytes[stream.next_word() % bytes.size()] = static_cast<char>(stream.next_word());
    }
    const auto tag = decode_tag(bytes);
    ++(tag ? possible : refused);
    ASSERT_TRUE(!tag || decode_tag(encode(*tag)) == *tag) << "seed " << seed << " tag " << k;
  }
  EXPECT_GT(refused, 1'000);
  EXPECT_GT(possible, 1'000);
}

TEST(Tag, from_random_bytes_never_crashes) {
  RandomStream stream(seed, Purpose::PropertyTest, 4);
  for (int k = 0; k < 30'000; ++k) {
    std::string bytes(stream.next_word() % 40, '\0');
    for (char& byte : bytes) byte = static_cast<char>(stream.next_word());
    const auto tag = decode_tag(bytes);
    ASSERT_TRUE(!tag || decode_tag(encode(*tag)) == *tag) << "seed " << seed << " bytes " << k;
  }
}

/// Messages written by hand, field by field: key byte (number << 3 | wire type), then the value.
const std::string station = "\x08\x11";
const std::string trigger = "\x10\x02";
const std::string capture = "\x18\x05";
const std::string onset{"\x28\x64", 2};
const std::string time_error{"\x35\x00\x00\xf0\x40", 5};                   // 7.5
const std::string firing_time{"\x79\x00\x01\x00\x00\x00\x00\x00\x00", 9};  // 256 ns

TEST(Tag, is_read_from_bytes_written_by_hand) {
  const Tag expected{.station_number = 17,
                     .trigger_index = 1,
                     .capture_number = 5,
                     .firing_time_ns = 256,
                     .onset_time_ns = 156,
                     .time_error_ns = 7.5F};
  EXPECT_EQ(decode_tag(station + trigger + capture + onset + time_error + firing_time), expected);
}

TEST(Tag, with_an_unknown_field_is_read_all_the_same) {
  const std::string unknown = "\xa0\x06\x07";  // field 100, a number
  EXPECT_TRUE(decode_tag(station + trigger + unknown + capture + time_error + firing_time));
}

TEST(Tag, that_is_damaged_names_the_right_error) {
  struct Row {
    const char* name;
    std::string bytes;
    MessageError error;
  };
  const Row rows[] = {
      {"nothing", "", MessageError::MissingField},
      {"cut inside the time", station + trigger + capture + time_error + firing_time.substr(0, 5),
       MessageError::Malformed},
      {"number without an end", station + trigger + "\x18\xff\xff\xff\xff\xff\xff\xff\xff\xff\xff\xff",
       MessageError::Malformed},
      {"field number zero", std::string("\x00\x01", 2) + station + trigger + capture + time_error + firing_time,
       MessageError::Malformed},
      {"wire type that does not exist", "\x0f" + station, MessageError::Malformed},
      {"no station", trigger + capture + time_error + firing_time, MessageError::MissingField},
      {"station zero", std::string("\x08\x00", 2) + trigger + capture + time_error + firing_time,
       MessageError::MissingField},
      {"no trigger", station + capture + time_error + firing_time, MessageError::MissingField},
      {"no capture", station + trigger + time_error + firing_time, MessageError::MissingField},
      {"no time error", station + trigger + capture + firing_time, MessageError::MissingField},
      {"no time", station + trigger + capture + time_error, MessageError::MissingField},
      {"trigger 65,536", station + "\x10\x80\x80\x04" + capture + time_error + firing_time, MessageError::OutOfRange},
      {"negative time error", station + trigger + capture + std::string("\x35\x00\x00\xf0\xc0", 5) + firing_time,
       MessageError::OutOfRange},
      {"time error not a number", station + trigger + capture + std::string("\x35\x00\x00\xc0\x7f", 5) + firing_time,
       MessageError::OutOfRange},
      {"infinite time error", station + trigger + capture + std::string("\x35\x00\x00\x80\x7f", 5) + firing_time,
       MessageError::OutOfRange},
      {"time before the epoch", station + trigger + capture + time_error + "\x79" + std::string(8, '\xff'),
       MessageError::OutOfRange},
  };
  for (const Row& row : rows) {
    const auto tag = decode_tag(row.bytes);
    ASSERT_FALSE(tag) << row.name;
    EXPECT_EQ(tag.error(), row.error) << row.name << ": " << text_of(tag.error());
  }
}

TEST(MessageError, has_a_text_of_its_own) {
  EXPECT_NE(text_of(MessageError::Malformed), text_of(MessageError::MissingField));
  EXPECT_NE(text_of(MessageError::MissingField), text_of(MessageError::OutOfRange));
}

TEST(TagDeathTest, is_not_encoded_when_it_is_impossible) {
  EXPECT_DEATH(static_cast<void>(encode(Tag{})), "is_possible");
}

}  // namespace
}  // namespace cistern
