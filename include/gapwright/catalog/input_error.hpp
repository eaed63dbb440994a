// The one exception for everything a user typed or wrote that cannot be used.
#pragma once

#include <stdexcept>
#include <string>
#include <string_view>
#include <vector>

namespace gapwright {

/// What was wrong, where it stands, what was expected, and the nearest valid choice (may be empty).
/// what() is the whole message, ready to show; in files it carries line, text and a caret.
class InputError : public std::runtime_error {
 public:
  struct Parts {
    std::string what;      ///< e.g. "unknown key 'diametr_nm'"
    std::string where;     ///< e.g. "plan.toml:4" or "--diameter-nm"
    std::string excerpt;   ///< the line and a caret under the place, or empty
    std::string expected;  ///< e.g. "one of diameter_nm, index"
    std::string nearest;   ///< e.g. "diameter_nm"
  };
  explicit InputError(Parts parts);
  const Parts& parts() const { return parts_; }

 private:
  Parts parts_;
};

/// The word of `choices` nearest to `typed` by edit distance, or "" when none is near.
std::string nearest_word(std::string_view typed, const std::vector<std::string>& choices);

/// "a, b, c" for messages.
std::string joined(const std::vector<std::string>& words);

}  // namespace gapwright
