#include <algorithm>

#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

struct RequirementKeys {
  Requirement requirement;
  std::optional<double> at_most;
  std::optional<double> at_least;
};

bool is_figure_name(const std::string& text) {
  const bool good = std::all_of(text.begin(), text.end(), [](char c) {
    return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || (c >= '0' && c <= '9') || c == '_' || c == '-' ||
           c == '.';
  });
  return good && text.find('.') != std::string::npos && text.front() != '.' && text.back() != '.' &&
         text.find("..") == std::string::npos;
}

std::vector<Key<RequirementKeys>> requirement_keys() {
  using R = RequirementKeys;
  return {{"figure", "", "required", "quantity.subject[.condition]",
           "The figure that is judged; summary.json lists all names.",
           [](R& r, const auto& node, const auto& at) {
             r.requirement.figure = read_text(node, at, {});
             if (!is_figure_name(r.requirement.figure))
               reject(at, node, "a figure, quantity.subject[.condition], such as background_rate.long");
           }},
          number_key<R>("at_most", "of the figure", "none", {}, "Upper bound; either this or at_least.", &R::at_most),
          number_key<R>("at_least", "of the figure", "none", {}, "Lower bound.", &R::at_least),
          number_key<R>("confidence", "", from_config, {0.5, 1, true, true}, "One-sided confidence of the verdict.",
                        [](R& r) -> double& { return r.requirement.confidence; })};
}

}  // namespace

Table requirements_table() {
  Table table;
  table.name = "requirements";
  table.shape = TableShape::Named;
  table.sentence = "One written requirement, judged met, not met or undecided by one-sided limits.";
  const auto keys = requirement_keys();
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name,
                      Scenario& scenario) {
    RequirementKeys values;
    read_keys(context, keys, toml, full_name, values);
    const KeyPlace at = context.at(full_name, toml);
    if (values.at_most.has_value() == values.at_least.has_value()) {
      const TableView view{context, &toml, full_name};
      complain({view.blame({"at_most", "at_least"}).place, full_name},
               fmt::format("got {}, expected one of at_most and at_least", values.at_most ? "both" : "neither"));
    }
    values.requirement.name = full_name.substr(full_name.find('.') + 1);
    values.requirement.place = at.place;
    values.requirement.kind = values.at_most ? BoundKind::AtMost : BoundKind::AtLeast;
    values.requirement.bound = values.at_most.value_or(values.at_least.value_or(0));
    scenario.requirements.push_back(values.requirement);
  };
  return table;
}

}  // namespace cistern
