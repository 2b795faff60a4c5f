#include "bench/report/html_text.hpp"

#include <fmt/format.h>

#include <cmath>

namespace cistern {
namespace {

void replace_all(std::string& text, std::string_view from, std::string_view to) {
  for (auto at = text.find(from); at != std::string::npos; at = text.find(from, at + to.size())) {
    text.replace(at, from.size(), to);
  }
}

}  // namespace

std::string html_text(std::string_view text) {
  std::string out;
  for (const char c : text) {
    switch (c) {
      case '&': out += "&amp;"; break;
      case '<': out += "&lt;"; break;
      case '>': out += "&gt;"; break;
      case '"': out += "&quot;"; break;
      case '\'': out += "&#39;"; break;
      default: out += static_cast<unsigned char>(c) < 0x20 ? ' ' : c;
    }
  }
  return out;
}

std::string script_json(std::string json) {
  replace_all(json, "<", "\\u003c");
  replace_all(json, "\xe2\x80\xa8", "\\u2028");
  replace_all(json, "\xe2\x80\xa9", "\\u2029");
  return json;
}

std::string anchor_of(std::string_view heading) {
  std::string id;
  for (const char c : heading) {
    const bool is_letter = (c >= 'a' && c <= 'z') || (c >= '0' && c <= '9');
    const bool is_capital = c >= 'A' && c <= 'Z';
    if (is_letter || is_capital) {
      id += is_capital ? static_cast<char>(c - 'A' + 'a') : c;
    } else if (!id.empty() && id.back() != '-') {
      id += '-';
    }
  }
  return id.empty() ? "part" : id;
}

std::string number_or_dash(const std::optional<double>& value) {
  return value && std::isfinite(*value) ? fmt::format("{:.4g}", *value) : "-";
}

}  // namespace cistern
