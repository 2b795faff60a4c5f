#include "bench/report/picture_data.hpp"

#include <cmath>
#include <nlohmann/json.hpp>

namespace cistern {
namespace {

using Json = nlohmann::ordered_json;

Json number(const std::optional<double>& value) { return value && std::isfinite(*value) ? Json(*value) : Json(nullptr); }
Json whole(const std::optional<std::int64_t>& value) { return value ? Json(*value) : Json(nullptr); }

Json axis_json(const ReportAxis& axis) {
  return {{"label", axis.label}, {"scale", axis.scale == AxisScale::Logarithmic ? "log" : "linear"}, {"low", number(axis.low)}, {"high", number(axis.high)}};
}

Json chart_json(const ReportChart& chart) {
  Json series = Json::array();
  for (const ReportSeries& one : chart.series) {
    Json points = Json::array();
    for (const ReportPoint& point : one.points) points.push_back({{"x", point.x}, {"y", number(point.y)}, {"low", number(point.low)}, {"high", number(point.high)}});
    series.push_back({{"name", one.name}, {"points", points}});
  }
  Json markers = Json::array();
  for (const ReportMarker& marker : chart.markers) markers.push_back({{"label", marker.label}, {"at", marker.at}, {"vertical", marker.is_vertical}});
  return {{"kind", "chart"}, {"x", axis_json(chart.x)}, {"y", axis_json(chart.y)}, {"series", series}, {"markers", markers}};
}

Json trace_json(const ReportTrace& trace) {
  Json channels = Json::array();
  for (const ReportTraceChannel& channel : trace.channels) channels.push_back({{"name", channel.name}, {"codes", channel.codes}, {"level", number(channel.level)}});
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
  for (const ReportBlock& block : report.blocks) {
    if (const auto* chart = std::get_if<ReportChart>(&block)) pictures.push_back(chart_json(*chart));
    if (const auto* trace = std::get_if<ReportTrace>(&block)) pictures.push_back(trace_json(*trace));
  }
  return pictures.dump(-1, ' ', false, Json::error_handler_t::replace);
}

}  // namespace cistern
