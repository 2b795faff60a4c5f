#include "bench/report/picture_data.hpp"

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>

namespace cistern {
namespace {

using Json = nlohmann::ordered_json;

Json number(const std::optional<double>& value) {
  return value && std::isfinite(*value) ? Json(*value) : Json(nullptr);
}

Json whole(const std::optional<std::int64_t>& value) { return value ? Json(*value) : Json(nullptr); }

/// Numbers the names as they come: a series keeps its look in all charts of a report.
class Looks {
 public:
  std::size_t look_of(const std::string& name) {
    const auto known = std::find(names_.begin(), names_.end(), name);
    if (known != names_.end()) return static_cast<std::size_t>(known - names_.begin());
    names_.push_back(name);
    return names_.size() - 1;
  }

 private:
  std::vector<std::string> names_;
};

std::string_view word_of(SeriesDraw draw) {
  switch (draw) {
    case SeriesDraw::Line: return "line";
    case SeriesDraw::Points: return "points";
    case SeriesDraw::Step: return "step";
    case SeriesDraw::Band: return "band";
  }
  return "line";
}

Json axis_json(const ReportAxis& axis) {
  return {{"label", axis.label},
          {"scale", axis.scale == AxisScale::Logarithmic ? "log" : "linear"},
          {"low", number(axis.low)},
          {"high", number(axis.high)}};
}

Json series_json(const ReportSeries& series, std::size_t look) {
  Json points = Json::array();
  for (const ReportPoint& point : series.points) {
    points.push_back(
        {{"x", number(point.x)}, {"y", number(point.y)}, {"low", number(point.low)}, {"high", number(point.high)}});
  }
  return {{"name", series.name},
          {"remark", series.remark},
          {"draw", word_of(series.draw)},
          {"look", look},
          {"points", points}};
}

Json chart_json(const ReportChart& chart, Looks& looks) {
  Json series = Json::array();
  for (const ReportSeries& one : chart.series) series.push_back(series_json(one, looks.look_of(one.name)));
  Json markers = Json::array();
  for (const ReportMarker& marker : chart.markers) {
    markers.push_back({{"label", marker.label}, {"at", number(marker.at)}, {"vertical", marker.is_vertical}});
  }
  return {{"kind", "chart"},
          {"x", axis_json(chart.x)},
          {"y", axis_json(chart.y)},
          {"series", series},
          {"markers", markers}};
}

Json trace_json(const ReportTrace& trace) {
  Json channels = Json::array();
  for (const ReportTraceChannel& channel : trace.channels) {
    channels.push_back({{"name", channel.name},
                        {"codes", channel.codes},
                        {"level", number(channel.level)},
                        {"baseline", number(channel.baseline)}});
  }
  return {{"kind", "trace"},
          {"sample_rate_mhz", trace.sample_rate_mhz},
          {"first_sample", trace.first_sample},
          {"channels", channels},
          {"onset_sample", whole(trace.onset_sample)},
          {"firing_sample", whole(trace.firing_sample)},
          {"window_samples", whole(trace.window_samples)},
          {"trigger", trace.trigger}};
}

}  // namespace

std::string picture_data(const Report& report) {
  Json pictures = Json::array();
  Looks looks;
  for (const ReportBlock& block : report.blocks) {
    if (const auto* chart = std::get_if<ReportChart>(&block)) pictures.push_back(chart_json(*chart, looks));
    if (const auto* trace = std::get_if<ReportTrace>(&block)) pictures.push_back(trace_json(*trace));
  }
  return pictures.dump(-1, ' ', false, Json::error_handler_t::replace);
}

}  // namespace cistern
