// Puts the pieces of a sentence for people together.
//
// In place of operator+: a literal before a temporary string raises a false -Wrestrict in GCC 12
// (bug 105651).
#pragma once

#include <initializer_list>
#include <string>
#include <string_view>

namespace lostwork {

[[nodiscard]] inline std::string sentence(std::initializer_list<std::string_view> pieces) {
  std::string whole;
  for (const std::string_view piece : pieces) {
    whole += piece;
  }
  return whole;
}

}  // namespace lostwork
