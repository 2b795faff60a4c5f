/// \file
/// Mutated scenarios and overrides load or are refused as bad input, in one line; nothing else happens.
#include <fmt/core.h>

#include <array>
#include <cstdlib>

#include "tests/unit/scenario_text.hpp"
#include "traces/base/random.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t default_seed = 20817;
constexpr int mutants = 4000;

/// CISTERN_FUZZ_SEED=N repeats a run or tries another.
std::uint64_t seed() {
  const char* text = std::getenv("CISTERN_FUZZ_SEED");
  return text == nullptr ? default_seed : std::strtoull(text, nullptr, 10);
}

std::size_t below(RandomStream& stream, std::size_t count) {
  return count == 0 ? 0 : static_cast<std::size_t>(stream.next_word()) % count;
}

std::string demo_text() {
  std::ifstream stream(std::string(CISTERN_SOURCE_DIR) + "/bench/scenarios/kestrel-heath.toml", std::ios::binary);
  return {std::istreambuf_iterator<char>(stream), {}};
}

/// What tends to upset readers of TOML or of numbers.
constexpr std::array<std::string_view, 36> fragments{"nan",
                                                     "-inf",
                                                     "1e999",
                                                     "-0",
                                                     "0",
                                                     "-1",
                                                     "65537",
                                                     "9223372036854775807",
                                                     "1e-320",
                                                     "true",
                                                     "\"\"",
                                                     "\"\\u0000\"",
                                                     "\"\\u2028\"",
                                                     "'''",
                                                     "\"\"\"",
                                                     "[",
                                                     "]",
                                                     "{",
                                                     "}",
                                                     "[[",
                                                     "]]",
                                                     "[[trigger]]",
                                                     "[tank]",
                                                     "[trigger]",
                                                     "name = \"long\"",
                                                     "2020-01-01T00:00:00Z",
                                                     "[[[[[[[[1]]]]]]]]",
                                                     "{a={a={a={a=1}}}}",
                                                     "\n",
                                                     "=",
                                                     ".",
                                                     "#",
                                                     "\xff",
                                                     "\xc2\x85",
                                                     "\x1b[2J",
                                                     "="};

std::vector<std::string> lines_of(const std::string& text) {
  std::vector<std::string> lines(1);
  for (const char c : text) {
    lines.back() += c;
    if (c == '\n') lines.emplace_back();
  }
  return lines;
}

/// One change of a few bytes, a fragment, a value or whole lines.
std::string mutate(std::string text, RandomStream& stream) {
  const std::size_t at = below(stream, text.size());
  const std::string_view fragment = fragments[below(stream, fragments.size())];
  switch (below(stream, 6)) {
    case 0: return text.erase(at, 1 + below(stream, 12));
    case 1: return text.insert(at, fragment);
    case 2: return text.replace(at, 1, 1, static_cast<char>(below(stream, 256)));
    case 3: {
      const std::size_t equals = text.find("= ", at);
      const std::size_t end = equals == std::string::npos ? equals : text.find('\n', equals);
      return end == std::string::npos ? text : text.replace(equals + 2, end - equals - 2, fragment);
    }
    default: {
      auto lines = lines_of(text);
      const std::size_t from = below(stream, lines.size());
      const std::size_t to = below(stream, lines.size());
      if (stream.uniform() < 0.5) {
        std::swap(lines[from], lines[to]);
      } else {
        lines[to] += lines[from];
      }
      std::string joined;
      for (const std::string& line : lines) joined += line;
      return joined;
    }
  }
}

std::string mutated_text(const std::string& text, RandomStream& stream) {
  std::string mutant = text;
  for (std::size_t changes = 1 + below(stream, 3); changes > 0 && !mutant.empty(); --changes)
    mutant = mutate(mutant, stream);
  return mutant;
}

/// How many were loaded and how many refused; any other exception leaves the test, a crash kills it.
struct Outcomes {
  int loaded{0};
  int refused{0};
};

void try_to_load(const std::filesystem::path& path, const std::vector<Override>& overrides, Outcomes& outcomes) {
  try {
    const Scenario scenario = load_scenario(path, overrides);
    StationFacts facts = scenario.digitizer.baseline_counts.empty() ? StationFacts{{0}, {}, {}} : facts_of(scenario);
    if (!facts.height_counts_per_vem) facts.height_counts_per_vem = {140};
    if (!facts.area_counts_per_vem) facts.area_counts_per_vem = {1000};
    for (const TriggerSettings& trigger : resolve_triggers(scenario, facts)) {
      assert_valid(trigger, static_cast<std::size_t>(scenario.digitizer.channels));
    }
    ++outcomes.loaded;
  } catch (const InputError& error) {
    ++outcomes.refused;
    for (const char c : std::string(error.what())) {
      ASSERT_TRUE(static_cast<unsigned char>(c) >= 0x20 && c != 0x7f) << error.what();
    }
  }
}

TEST(ScenarioFuzz, mutated_scenarios_load_or_are_bad_input) {
  fmt::print("seed {} (CISTERN_FUZZ_SEED repeats it)\n", seed());
  const ScenarioFile file("");
  const std::string text = demo_text();
  ASSERT_GT(text.size(), 3000U);
  Outcomes outcomes;
  for (int i = 0; i < mutants && !HasFatalFailure(); ++i) {
    RandomStream stream(seed(), Purpose::PropertyTest, static_cast<std::uint64_t>(i));
    std::ofstream(file.path(), std::ios::binary) << mutated_text(text, stream);
    SCOPED_TRACE(fmt::format("mutant {}", i));
    try_to_load(file.path(), {}, outcomes);
  }
  fmt::print("{} loaded, {} refused\n", outcomes.loaded, outcomes.refused);
  EXPECT_GT(outcomes.loaded, mutants / 20) << "the mutants are too wild to reach the checks";
  EXPECT_GT(outcomes.refused, mutants / 20) << "the mutants are too tame";
}

TEST(ScenarioFuzz, mutated_overrides_load_or_are_bad_input) {
  fmt::print("seed {} (CISTERN_FUZZ_SEED repeats it)\n", seed());
  const ScenarioFile file(demo_text());
  const std::array<Override, 5> plain{{{"trigger.long.majority", "3"},
                                       {"digitizer.baseline_counts", "[1, 2, 3, 4]"},
                                       {"scenario.title", "\"a title\""},
                                       {"requirements.quiet.at_most", "12.5"},
                                       {"signal.muon.sizes_vem", "[1, 2]"}}};
  Outcomes outcomes;
  for (int i = 0; i < mutants / 4 && !HasFatalFailure(); ++i) {
    RandomStream stream(seed(), Purpose::PropertyTest, (1ULL << 32U) + static_cast<std::uint64_t>(i));
    Override override = plain[below(stream, plain.size())];
    std::string& changed = stream.uniform() < 0.5 ? override.key : override.value;
    changed = mutated_text(changed, stream);
    SCOPED_TRACE(fmt::format("mutant {}", i));
    try_to_load(file.path(), {override}, outcomes);
  }
  fmt::print("{} loaded, {} refused\n", outcomes.loaded, outcomes.refused);
  EXPECT_GT(outcomes.loaded, 0);
  EXPECT_GT(outcomes.refused, 0);
}

}  // namespace
}  // namespace cistern
