#include "layout_fields.hpp"

#include <gapwright/catalog/input_error.hpp>

#include <algorithm>
#include <cctype>
#include <fstream>
#include <sstream>
#include <utility>

namespace gapwright {
namespace {

constexpr int widest = 64;
constexpr int most_digits = 17;
constexpr std::size_t largest_file = 1 << 20;

const char* const field_form =
    "{NAME}, {NAME UNIT}, {NAME FORMAT} or {NAME UNIT FORMAT}; {{ and }} for braces";

struct Word {
  std::string text;
  std::size_t column;  // of its first byte in the line
};

std::vector<Word> words_between(std::string_view line, std::size_t begin, std::size_t end) {
  std::vector<Word> words;
  for (std::size_t i = begin; i < end;) {
    if (line[i] == ' ' || line[i] == '\t') {
      ++i;
      continue;
    }
    std::size_t stop = i;
    while (stop < end && line[stop] != ' ' && line[stop] != '\t') ++stop;
    words.push_back({std::string(line.substr(i, stop - i)), i});
    i = stop;
  }
  return words;
}

bool is_digit(char c) {
  return std::isdigit(static_cast<unsigned char>(c)) != 0;
}

// Formats begin with a digit, a point or a sign, units never do; a lone letter is a format, too.
bool looks_like_format(const std::string& word) {
  return is_digit(word.front()) || word.front() == '.' || word.front() == '-' ||
         word.front() == '+' || (word.size() == 1 && word.find_first_of("efgd") == 0);
}

// The digits at a place, no more than `most`; -1 where the number is larger, 0 where none stand.
int number_at(const std::string& word, std::size_t& i, int most) {
  int number = 0;
  for (; i < word.size() && is_digit(word[i]); ++i)
    number = std::min(most + 1, 10 * number + (word[i] - '0'));
  return number > most ? -1 : number;
}

/// A format for fmt, or nothing for a word that is none of its type.
std::optional<std::string> fmt_format(const std::string& word, LayoutType type) {
  std::size_t i = 0;
  const bool left = type == LayoutType::text && word[0] == '-';
  const bool sign = type == LayoutType::number && word[0] == '+';
  if (left || sign) ++i;
  const int width = number_at(word, i, widest);
  if (width < 0 || (left && width == 0)) return std::nullopt;
  std::string format = "{:";
  if (type == LayoutType::text) format += left ? "<" : ">";
  if (sign) format += "+";
  if (width > 0) format += std::to_string(width);
  if (type == LayoutType::number && i < word.size() && word[i] == '.') {
    const std::size_t begin = ++i;
    const int digits = number_at(word, i, most_digits);
    if (digits < 0 || i == begin) return std::nullopt;
    format += "." + std::to_string(digits);
  }
  const std::string end = word.substr(i);
  const bool good = type == LayoutType::number  ? end == "e" || end == "f" || end == "g"
                    : type == LayoutType::count ? end == "d"
                                                : end.empty() && width > 0;
  if (!good) return std::nullopt;
  return format + end + "}";
}

std::string format_form(LayoutType type) {
  switch (type) {
    case LayoutType::number:
      return "a format such as 12.6f, .8e or .10g: width up to 64, digits up to 17";
    case LayoutType::count:
      return "a format such as d or 6d: width up to 64";
    case LayoutType::text:
      return "a width up to 64, such as 12, or -12 for text to the left";
  }
  return {};
}

}  // namespace

/// One pass over a layout text.
class LayoutReader {
 public:
  LayoutReader(std::string_view text, const std::string& name, TableKind kind)
      : text_(text), name_(name), kind_(kind) {}

  Layout read() {
    if (text_.find('\0') != std::string_view::npos)
      throw InputError({"is no text", name_, {}, "a text with a part [row]", {}});
    bool row_seen = false;
    for (std::size_t begin = 0; begin < text_.size();) {
      const std::size_t end = std::min(text_.find('\n', begin), text_.size());
      line_ = text_.substr(begin, end - begin);
      if (line_.ends_with('\r')) line_.remove_suffix(1);
      ++number_;
      begin = end + 1;
      if (start_part()) {
        row_seen = row_seen || part_ == &layout_.row_;
        continue;
      }
      if (part_)
        read_line();
      else if (!line_.empty() && line_.front() != '#' &&
               line_.find_first_not_of(" \t") != std::string_view::npos)
        throw error(0, "text before the first part", "[header], [row] or [footer], or a # comment",
                    "[header]");
    }
    if (!row_seen) throw InputError({"no part [row]", name_, {}, "a line [row], then the row", {}});
    for (Layout::Part* part : {&layout_.header_, &layout_.row_, &layout_.footer_}) close(*part);
    if (std::none_of(layout_.row_.begin(), layout_.row_.end(),
                     [](const Layout::Piece& piece) { return piece.field >= 0; }))
      throw InputError({"the row has no field", name_, {}, "fields such as {distance}", {}});
    return std::move(layout_);
  }

 private:
  // A line "[name]" begins a part; only lines that name one, or stand before all parts, are taken.
  bool start_part() {
    std::string_view word = line_;
    while (word.ends_with(' ')) word.remove_suffix(1);
    if (!word.starts_with('[') || !word.ends_with(']')) return false;
    const std::vector<std::string> names = {"[header]", "[row]", "[footer]"};
    Layout::Part* parts[] = {&layout_.header_, &layout_.row_, &layout_.footer_};
    for (std::size_t i = 0; i < names.size(); ++i) {
      if (word != names[i]) continue;
      if (std::exchange(seen_[i], true))
        throw error(0, "a second part " + names[i], "each part once", {});
      part_ = parts[i];
      return true;
    }
    const std::string nearest = nearest_word(word, names);
    if (part_ && nearest.empty()) return false;  // a line of the user's own
    throw error(0, "unknown part " + std::string(word), "one of [header], [row], [footer]",
                nearest);
  }

  void read_line() {
    for (std::size_t i = 0; i < line_.size();) {
      const char c = line_[i];
      if ((c == '{' || c == '}') && i + 1 < line_.size() && line_[i + 1] == c) {
        literal_ += c;
        i += 2;
      } else if (c == '}') {
        throw error(i, "'}' without '{'", field_form, "}}");
      } else if (c == '{') {
        const std::size_t end = line_.find('}', i);
        if (end == std::string_view::npos) throw error(i, "'{' without '}'", field_form, "{{");
        read_field(i, end);
        i = end + 1;
      } else {
        literal_ += c;
        ++i;
      }
    }
    literal_ += '\n';
    part_->push_back({std::exchange(literal_, {}), -1, 1.0, {}});
  }

  void read_field(std::size_t open, std::size_t end) {
    const std::vector<Word> words = words_between(line_, open + 1, end);
    if (words.empty()) throw error(open, "a field without a name", field_form, {});
    const int index = field_index(words[0]);
    const LayoutField& field = layout_fields()[std::size_t(index)];
    Layout::Piece piece{std::exchange(literal_, {}), index, 1.0, "{}"};
    std::size_t next = 1;
    if (next < words.size() && !looks_like_format(words[next].text))
      piece.unit_size = unit_size(field, words[next++]);
    if (next < words.size()) {
      const auto format = fmt_format(words[next].text, field.type);
      if (!format)
        throw error(words[next].column,
                    "'" + words[next].text + "' is no format of " + std::string(field.name),
                    format_form(field.type), {});
      piece.format = *format;
      ++next;
    }
    if (next < words.size())
      throw error(words[next].column, "'" + words[next].text + "' is one word too many", field_form,
                  {});
    part_->push_back(std::move(piece));
  }

  int field_index(const Word& word) const {
    std::vector<std::string> names = layout_table_fields();
    if (part_ == &layout_.row_) {
      const auto more = layout_row_fields();
      names.insert(names.begin(), more.begin(), more.end());
    }
    const auto& fields = layout_fields();
    for (std::size_t i = 0; i < fields.size(); ++i) {
      if (fields[i].name != word.text) continue;
      if (fields[i].of_row && part_ != &layout_.row_)
        throw error(word.column, "'" + word.text + "' is a field of rows",
                    "in header and footer one of " + joined(names), nearest_word(word.text, names));
      if (fields[i].crossed_only && kind_ != TableKind::crossed)
        throw error(word.column, "'" + word.text + "' is a field of crossed tables",
                    "a field of " + std::string(table_kind_word(kind_)) + " tables", {});
      return int(i);
    }
    throw error(word.column, "unknown field '" + word.text + "'", "one of " + joined(names),
                nearest_word(word.text, names));
  }

  double unit_size(const LayoutField& field, const Word& word) const {
    const Dimension wanted = field.dimension(kind_);
    const std::vector<std::string> usual = usual_units(wanted);
    if (usual.empty())
      throw error(word.column, "'" + std::string(field.name) + "' has no unit to choose",
                  format_form(field.type), {});
    const std::optional<Unit> unit = parse_unit(word.text);
    if (unit && unit->dimension == wanted) return unit->size;
    throw error(word.column,
                unit ? "'" + word.text + "' is no unit of '" + std::string(field.name) +
                           "' in a table of this kind"
                     : "unknown unit '" + word.text + "'",
                "one of " + joined(usual), nearest_word(word.text, usual));
  }

  // What stands before the first field of the next line belongs to nobody yet.
  void close(Layout::Part& part) {
    Layout::Part merged;
    for (Layout::Piece& piece : part) {
      if (!merged.empty() && merged.back().field < 0) {
        piece.literal = merged.back().literal + piece.literal;
        merged.pop_back();
      }
      merged.push_back(std::move(piece));
    }
    part = std::move(merged);
  }

  InputError error(std::size_t column, const std::string& what, const std::string& expected,
                   const std::string& nearest) const {
    std::string pad;
    for (std::size_t i = 0; i < column; ++i) {
      const auto c = static_cast<unsigned char>(line_[i]);
      if ((c & 0xc0U) != 0x80U) pad += c == '\t' ? '\t' : ' ';
    }
    return InputError({what, name_ + ":" + std::to_string(number_),
                       "  " + std::string(line_) + "\n  " + pad + "^", expected, nearest});
  }

  std::string_view text_;
  std::string name_;
  TableKind kind_;
  Layout layout_;
  Layout::Part* part_ = nullptr;
  bool seen_[3] = {false, false, false};
  std::string_view line_;
  std::string literal_;
  int number_ = 0;
};

Layout Layout::from_text(std::string_view text, const std::string& name, TableKind kind) {
  return LayoutReader(text, name, kind).read();
}

Layout Layout::from_file(const std::filesystem::path& file, TableKind kind) {
  std::error_code problem;
  if (std::filesystem::is_directory(file, problem))
    throw InputError({"is a folder", file.string(), {}, "a text with a part [row]", {}});
  std::ifstream stream(file, std::ios::binary);
  std::string text(largest_file + 1, '\0');
  stream.read(text.data(), std::streamsize(text.size()));
  if (stream.bad() || (stream.fail() && !stream.eof()))
    throw InputError({"cannot be read", file.string(), {}, "an existing text file", {}});
  text.resize(std::size_t(stream.gcount()));
  if (text.size() > largest_file)
    throw InputError({"is too long", file.string(), {}, "a text of at most 1 MiB", {}});
  return from_text(text, file.string(), kind);
}

}  // namespace gapwright
