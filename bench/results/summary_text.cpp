#include "bench/results/summary_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>
#include <string_view>

namespace cistern {
namespace {

using Json = nlohmann::ordered_json;

Json number(const std::optional<double>& value) {
  return value && std::isfinite(*value) ? Json(*value) : Json(nullptr);
}

Json figure_json(const Figure& figure) {
  return {{"name", figure.name},
          {"value", number(figure.value)},
          {"low", number(figure.low)},
          {"high", number(figure.high)},
          {"systematic_low", number(figure.systematic_low)},
          {"systematic_high", number(figure.systematic_high)},
          {"unit", figure.unit},
          {"note", figure.note}};
}

Json requirement_json(const RequirementOutcome& outcome) {
  return {{"name", outcome.name},       {"bound", outcome.bound},       {"value", number(outcome.value)},
          {"low", number(outcome.low)}, {"high", number(outcome.high)}, {"verdict", outcome.verdict},
          {"reason", outcome.reason}};
}

template <typename Item, typename Convert>
Json list_of(const std::vector<Item>& items, Convert convert) {
  Json list = Json::array();
  for (const Item& item : items) list.push_back(convert(item));
  return list;
}

std::string xml_text(std::string_view text) {
  std::string out;
  for (const char c : text) {
    switch (c) {
      case '&': out += "&amp;"; break;
      case '<': out += "&lt;"; break;
      case '>': out += "&gt;"; break;
      case '"': out += "&quot;"; break;
      default: out += static_cast<unsigned char>(c) < 0x20 ? ' ' : c;
    }
  }
  return out;
}

std::string test_case_xml(const RequirementOutcome& outcome, const std::string& command) {
  const std::string head =
      fmt::format("  <testcase classname=\"{}\" name=\"{}\"", xml_text(command), xml_text(outcome.name));
  if (outcome.verdict == "met") return head + "/>\n";
  return fmt::format("{}>\n    <failure type=\"{}\" message=\"{}\">{}</failure>\n  </testcase>\n", head,
                     xml_text(outcome.verdict), xml_text(outcome.bound), xml_text(outcome.reason));
}

}  // namespace

std::string summary_json(const Summary& summary) {
  Json json = {{"command", summary.command},
               {"scenario", summary.scenario},
               {"scenario_digest", summary.scenario_digest},
               {"title", summary.title},
               {"seed", summary.seed},
               {"version", summary.version},
               {"verdict", summary.verdict},
               {"requirements", list_of(summary.requirements, requirement_json)},
               {"figures", list_of(summary.figures, figure_json)},
               {"notes", summary.notes},
               {"complete", true}};
  return json.dump(2, ' ', false, Json::error_handler_t::replace) + "\n";
}

std::string junit_xml(const Summary& summary) {
  const auto failures = std::count_if(summary.requirements.begin(), summary.requirements.end(),
                                      [](const RequirementOutcome& outcome) { return outcome.verdict != "met"; });
  std::string xml = fmt::format(
      "<?xml version=\"1.0\" encoding=\"UTF-8\"?>\n<testsuite name=\"cistern {}\" tests=\"{}\" failures=\"{}\">\n",
      xml_text(summary.command), summary.requirements.size(), failures);
  for (const auto& outcome : summary.requirements) xml += test_case_xml(outcome, summary.command);
  return xml + "</testsuite>\n";
}

}  // namespace cistern
