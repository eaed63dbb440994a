#include <gapwright/catalog/input_error.hpp>

#include <algorithm>
#include <cctype>
#include <numeric>
#include <utility>

namespace gapwright {
namespace {

std::string message(const InputError::Parts& parts) {
  std::string text = parts.where.empty() ? parts.what : parts.where + ": " + parts.what;
  if (!parts.excerpt.empty()) text += "\n" + parts.excerpt;
  if (!parts.expected.empty()) text += "\n  expected " + parts.expected;
  if (!parts.nearest.empty()) text += "\n  nearest: " + parts.nearest;
  return text;
}

char lower(char c) {
  return static_cast<char>(std::tolower(static_cast<unsigned char>(c)));
}

// Insertions, deletions, replacements and swaps of neighbours (Damerau, Commun. ACM 7, 171 (1964));
// letters are compared without case.
std::size_t edit_distance(std::string_view a, std::string_view b) {
  std::vector<std::size_t> before, above, row(b.size() + 1);
  std::iota(row.begin(), row.end(), std::size_t{0});
  const auto same = [&](std::size_t i, std::size_t j) {
    return lower(a[i - 1]) == lower(b[j - 1]);
  };
  for (std::size_t i = 1; i <= a.size(); ++i) {
    before = std::exchange(above, row);
    row[0] = i;
    for (std::size_t j = 1; j <= b.size(); ++j) {
      const std::size_t replaced = above[j - 1] + (same(i, j) ? 0 : 1);
      row[j] = std::min({replaced, above[j] + 1, row[j - 1] + 1});
      if (i > 1 && j > 1 && same(i, j - 1) && same(i - 1, j))
        row[j] = std::min(row[j], before[j - 2] + 1);
    }
  }
  return row.back();
}

// A word that continues what was typed, or the other way round, is near whatever its length.
bool one_begins_other(std::string_view a, std::string_view b) {
  const std::size_t length = std::min(a.size(), b.size());
  return length >= 3 && a.substr(0, length) == b.substr(0, length);
}

}  // namespace

InputError::InputError(Parts parts)
    : std::runtime_error(message(parts)), parts_(std::move(parts)) {}

std::string nearest_word(std::string_view typed, const std::vector<std::string>& choices) {
  std::string best;
  std::size_t best_distance = std::string::npos;
  for (const std::string& choice : choices) {
    const std::size_t distance = edit_distance(typed, choice);
    const std::size_t allowed = std::max<std::size_t>(1, std::max(typed.size(), choice.size()) / 3);
    if (distance > allowed && !one_begins_other(typed, choice)) continue;
    if (distance < best_distance) {
      best = choice;
      best_distance = distance;
    }
  }
  return best;
}

std::string joined(const std::vector<std::string>& words) {
  std::string text;
  for (const std::string& word : words) text += (text.empty() ? "" : ", ") + word;
  return text;
}

}  // namespace gapwright
