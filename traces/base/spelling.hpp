#pragma once
/// \file
/// The nearest valid word, for messages about a word that is not known.
#include <span>
#include <string>
#include <string_view>

namespace cistern {

/// Number of insertions, deletions, replacements and neighbour swaps between two words.
[[nodiscard]] std::size_t edit_distance(std::string_view a, std::string_view b);

/// The known word with the smallest edit distance (the first of equals); empty when `known` is.
[[nodiscard]] std::string nearest_word(std::string_view word, std::span<const std::string> known);

}  // namespace cistern
