#include <charconv>

#include "traces/files/csv_header.hpp"
#include "traces/files/formats.hpp"

namespace cistern {
namespace {

constexpr std::size_t text_size = 1 << 16;
constexpr std::size_t longest_row = 18 * 21;  // 18 numbers of at most 20 characters, each with what ends it

class CsvWriter : public TraceWriter {
 public:
  CsvWriter(const TemporaryFile& file, const TraceFileInfo& info) : file_(file.path(), file.target().string()) {
    file_.append(csv_head(info));
  }

  void append(const TraceBlock& block) override {
    for (std::size_t s = 0; s < block.codes.samples(); ++s) {
      if (length_ + longest_row > text_size) flush();
      put(trace_, ',');
      put(sample_ + static_cast<std::int64_t>(s), ',');
      for (std::size_t c = 0; c < block.codes.channels(); ++c) {
        put(block.codes.channel(c)[s], c + 1 < block.codes.channels() ? ',' : '\n');
      }
    }
    sample_ = block.last_of_trace ? 0 : sample_ + static_cast<std::int64_t>(block.codes.samples());
    if (block.last_of_trace) ++trace_;
  }

  void finish(const std::vector<TruthColumn>&) override { flush(); }

 private:
  void put(std::int64_t number, char end) {
    char* const at = text_.data() + length_;
    char* const behind = std::to_chars(at, text_.data() + text_.size(), number).ptr;
    *behind = end;
    length_ += static_cast<std::size_t>(behind - at) + 1;
  }

  void flush() {
    file_.append({text_.data(), length_});
    length_ = 0;
  }

  OutputFile file_;
  std::vector<char> text_ = std::vector<char>(text_size);
  std::size_t length_{0};
  std::int64_t trace_{0};
  std::int64_t sample_{0};
};

}  // namespace

std::unique_ptr<TraceWriter> create_csv(const TemporaryFile& file, const TraceFileInfo& info) {
  return std::make_unique<CsvWriter>(file, info);
}

}  // namespace cistern
