#include "label_text.hpp"

#include <algorithm>

namespace gapwright::label_text {

namespace {

constexpr long largest_number = 1'000'000'000;

bool is_digit(char c) {
  return c >= '0' && c <= '9';
}

bool is_blank(char c) {
  return c == ' ' || c == '\t' || c == '\n' || c == '\r';
}

bool is_mark(char c) {
  return c == '(' || c == ')' || c == ',' || c == '@';
}

/// Bytes of the UTF-8 character at the front, 0 when it is broken or a control character.
std::size_t printable_length(std::string_view text) {
  const auto lead = static_cast<unsigned char>(text.front());
  if (lead < 0x80) return lead >= 0x20 && lead != 0x7f ? 1 : 0;
  const std::size_t length = lead >= 0xf0 ? 4 : lead >= 0xe0 ? 3 : 2;
  if (lead < 0xc2 || lead > 0xf4 || text.size() < length) return 0;
  for (std::size_t i = 1; i < length; ++i)
    if ((static_cast<unsigned char>(text[i]) & 0xc0) != 0x80) return 0;
  // U+0080 … U+009F are control characters too.
  return lead == 0xc2 && static_cast<unsigned char>(text[1]) < 0xa0 ? 0 : length;
}

long capped_number(std::string_view digits) {
  long value = 0;
  for (const char c : digits) value = std::min(value * 10 + (c - '0'), largest_number);
  return value;
}

std::optional<long> whole_number(std::string_view text) {
  const bool signed_text = !text.empty() && (text.front() == '-' || text.front() == '+');
  const std::string_view digits = text.substr(signed_text ? 1 : 0);
  if (digits.empty() || !std::all_of(digits.begin(), digits.end(), is_digit)) return std::nullopt;
  return text.front() == '-' ? -capped_number(digits) : capped_number(digits);
}

}  // namespace

std::string quoted(std::string_view text) {
  constexpr std::size_t longest = 60;
  std::string out = "'";
  std::size_t at = 0;
  while (at < text.size() && at < longest) {
    const std::size_t length = printable_length(text.substr(at));
    if (length == 0) out += "\uFFFD";
    out += text.substr(at, length);
    at += std::max<std::size_t>(length, 1);
  }
  return out + (at < text.size() ? "…'" : "'");
}

std::string blanks_removed(std::string_view text) {
  std::string out;
  bool pending = false;
  for (const char c : text) {
    if (is_blank(c)) {
      pending = true;
      continue;
    }
    if (pending && !out.empty() && !is_mark(out.back()) && !is_mark(c)) out += ' ';
    pending = false;
    out += c;
  }
  return out;
}

std::vector<std::string> split(std::string_view text, char separator) {
  std::vector<std::string> parts;
  for (;;) {
    const std::size_t end = text.find(separator);
    parts.emplace_back(text.substr(0, end));
    if (end == std::string_view::npos) return parts;
    text.remove_prefix(end + 1);
  }
}

std::optional<std::vector<long>> whole_numbers(std::string_view text, char separator) {
  std::vector<long> numbers;
  for (const std::string& part : split(text, separator)) {
    const auto number = whole_number(part);
    if (!number) return std::nullopt;
    numbers.push_back(*number);
  }
  return numbers;
}

std::optional<std::vector<long>> two_numbers(std::string_view text) {
  std::vector<long> numbers;
  for (auto at = text.begin(); at != text.end();) {
    const auto start = std::find_if(at, text.end(), is_digit);
    at = std::find_if_not(start, text.end(), is_digit);
    if (start != at) numbers.push_back(capped_number({start, at}));
  }
  if (numbers.size() != 2) return std::nullopt;
  return numbers;
}

bool is_ribbon(std::string_view text) {
  std::string upper(text);
  for (char& c : upper)
    if (c >= 'a' && c <= 'z') c = static_cast<char>(c - 'a' + 'A');
  return upper.find("GNR") != std::string::npos;
}

}  // namespace gapwright::label_text
