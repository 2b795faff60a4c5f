#include <fmt/format.h>

#include "bench/experiments/trace_tools.hpp"

namespace cistern {
namespace {

constexpr std::size_t samples_per_block = 65'536;

/// What the file says; what the user says where the file says nothing.
template <typename Value>
void add_said(std::optional<Value>& from_file, const std::optional<Value>& said, const char* option,
              const std::string& file) {
  if (!said) return;
  if (from_file && !(*from_file == *said)) {
    throw InputError(option, fmt::format("{} says otherwise itself; expected no {} or the same value", file, option));
  }
  from_file = said;
}

TraceFileInfo complete_info(const ConvertRequest& request, const TraceFileInfo& in) {
  TraceFileInfo info = in;
  const std::string file = request.in.string();
  add_said(info.sample_rate_mhz, request.said.sample_rate_mhz, "--sample-rate-mhz", file);
  add_said(info.bits, request.said.bits, "--bits", file);
  add_said(info.baseline_counts, request.said.baseline_counts, "--baseline-counts", file);
  add_said(info.selection, request.said.selection, "--selection", file);
  add_said(info.live_time_s, request.said.live_time_s, "--live-time-s", file);
  info.contiguous = info.contiguous || request.said.contiguous;
  if (info.baseline_counts && info.baseline_counts->size() == 1)
    info.baseline_counts->resize(info.channels, info.baseline_counts->front());
  return info;
}

/// NPY states the number of traces first; a CSV file tells it only at its end.
std::int64_t count_traces(const std::filesystem::path& file) {
  const auto reader = open_trace_file(file);
  TraceBlock block;
  std::int64_t traces = 0;
  while (reader->next(samples_per_block, block)) traces = block.trace + 1;
  return traces;
}

}  // namespace

void convert_traces(const ConvertRequest& request, const TraceProgress& progress) {
  const TraceFormat out_format = format_of(request.out);
  const auto reader = open_trace_file(request.in);
  TraceFileInfo info = complete_info(request, reader->info());
  if (info.bits) reader->expect_bits(*info.bits);
  if (!info.traces && out_format == TraceFormat::Npy) info.traces = count_traces(request.in);
  std::error_code ignored;
  if (std::filesystem::equivalent(request.in, request.out, ignored)) {
    throw InputError(request.out.string(), "is the input file too; expected another name");
  }
  const auto writer = create_trace_file(request.out, info);
  TraceBlock block;
  while (reader->next(samples_per_block, block)) {
    writer->append(block);
    if (block.last_of_trace) progress(block.trace + 1, info.traces.value_or(0));
  }
  const bool keeps_truth = out_format == TraceFormat::Hdf5 && format_of(request.in) == TraceFormat::Hdf5;
  writer->finish(keeps_truth ? read_truth(request.in) : std::vector<TruthColumn>{});
}

}  // namespace cistern
