#include "traces/files/hdf5_facts.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "traces/base/spelling.hpp"
#include "traces/files/file_facts.hpp"
#include "traces/files/hdf5_attributes.hpp"

namespace cistern {
namespace {

const std::vector<std::string> known_names{
    "sample_rate_mhz",     "bits",      "baseline_counts", "height_counts_per_vem",
    "area_counts_per_vem", "selection", "live_time_s",     "contiguous"};
/// Names this near to a known one are taken for a slip of the pen.
constexpr std::size_t misspelt_distance = 2;

class Facts {
 public:
  Facts(hid_t file, hid_t codes, const std::string& name) : file_(file), codes_(codes), name_(name) {
    for (const hid_t object : {file, codes}) {
      for (const std::string& attribute : attribute_names(object, name)) check_spelling(attribute);
    }
  }

  [[nodiscard]] std::optional<std::vector<double>> numbers(const char* key) const {
    return one_of(key, read_numbers_attribute(file_, name_, key), read_numbers_attribute(codes_, name_, key));
  }

  [[nodiscard]] std::optional<std::string> text(const char* key) const {
    return one_of(key, read_text_attribute(file_, name_, key), read_text_attribute(codes_, name_, key));
  }

  [[nodiscard]] std::optional<double> number(const char* key) const {
    const auto values = numbers(key);
    if (!values) return {};
    if (values->size() == 1) return values->front();
    throw InputError(place(key), fmt::format("{} has {} values, expected one", key, values->size()));
  }

  [[nodiscard]] std::optional<std::vector<std::int32_t>> whole_numbers(const char* key) const {
    const auto values = numbers(key);
    if (!values) return {};
    std::vector<std::int32_t> result;
    for (const double value : *values) {
      if (!(value == std::floor(value) && std::abs(value) <= 1e9)) {
        throw InputError(place(key), fmt::format("{} is {}, expected whole numbers", key, value));
      }
      result.push_back(static_cast<std::int32_t>(value));
    }
    return result;
  }

  [[nodiscard]] std::string place(const char* key) const { return fmt::format("{}: attribute {}", name_, key); }

 private:
  template <typename Value>
  std::optional<Value> one_of(const char* key, std::optional<Value> of_file, std::optional<Value> of_codes) const {
    if (of_file && of_codes && *of_file != *of_codes) {
      throw InputError(place(key), "differs between the file and /codes, expected the same or only one");
    }
    return of_file ? of_file : of_codes;
  }

  void check_spelling(const std::string& attribute) const {
    const std::string nearest = nearest_word(attribute, known_names);
    const std::size_t distance = edit_distance(attribute, nearest);
    if (distance == 0 || distance > misspelt_distance) return;
    throw InputError(name_, fmt::format("unknown attribute {}; nearest: {}", in_quotes(attribute), nearest));
  }

  hid_t file_;
  hid_t codes_;
  const std::string& name_;
};

std::optional<std::vector<double>> read_calibration(const Facts& facts, const char* key, std::size_t channels) {
  const auto values = facts.numbers(key);
  if (!values) return {};
  for (const double value : *values) {
    if (std::isfinite(value) && value > 0) continue;
    throw InputError(facts.place(key), fmt::format("{} is {}, expected more than 0", key, value));
  }
  return one_per_channel(facts.place(key), key, *values, channels);
}

std::optional<std::int32_t> read_bits(const Facts& facts) {
  if (!facts.number("bits")) return {};
  const std::int32_t bits = facts.whole_numbers("bits")->front();
  check_bits(facts.place("bits"), bits);
  return bits;
}

bool read_contiguous(const Facts& facts) {
  const double value = facts.number("contiguous").value_or(0);
  if (value == 0 || value == 1) return value == 1;
  throw InputError(facts.place("contiguous"), fmt::format("contiguous is {}, expected 0 or 1", value));
}

}  // namespace

void read_hdf5_facts(hid_t file, hid_t codes, const std::string& name, TraceFileInfo& info) {
  const Facts facts(file, codes, name);
  info.sample_rate_mhz = facts.number("sample_rate_mhz");
  if (info.sample_rate_mhz) check_rate(facts.place("sample_rate_mhz"), *info.sample_rate_mhz);
  info.bits = read_bits(facts);
  if (auto baselines = facts.whole_numbers("baseline_counts")) {
    info.baseline_counts =
        checked_baselines(facts.place("baseline_counts"), *std::move(baselines), info.channels, info.bits);
  }
  info.height_counts_per_vem = read_calibration(facts, "height_counts_per_vem", info.channels);
  info.area_counts_per_vem = read_calibration(facts, "area_counts_per_vem", info.channels);
  info.selection = facts.text("selection");
  if (info.selection) check_selection(facts.place("selection"), *info.selection);
  info.live_time_s = facts.number("live_time_s");
  if (info.live_time_s) check_live_time(facts.place("live_time_s"), *info.live_time_s);
  info.contiguous = read_contiguous(facts);
}

void write_hdf5_facts(hid_t object, const std::string& name, const TraceFileInfo& info) {
  const auto write_list = [&](const char* key, const auto& values) {
    if (values) write_numbers_attribute(object, name, key, *values);
  };
  if (info.sample_rate_mhz) write_numbers_attribute(object, name, "sample_rate_mhz", {*info.sample_rate_mhz});
  if (info.bits) write_integers_attribute(object, name, "bits", {*info.bits});
  if (info.baseline_counts) write_integers_attribute(object, name, "baseline_counts", *info.baseline_counts);
  write_list("height_counts_per_vem", info.height_counts_per_vem);
  write_list("area_counts_per_vem", info.area_counts_per_vem);
  if (info.selection) write_text_attribute(object, name, "selection", *info.selection);
  if (info.live_time_s) write_numbers_attribute(object, name, "live_time_s", {*info.live_time_s});
  write_flag_attribute(object, name, "contiguous", info.contiguous);
}

}  // namespace cistern
