// The enumerator that a name in a table stands for.
#pragma once

#include <array>
#include <cstddef>
#include <optional>
#include <string_view>

namespace lostwork {

// names[i] is the name of the enumerator i; E ends with `count`.
template <class E, std::size_t n>
[[nodiscard]] constexpr std::optional<E> enumerator_named(
    const std::array<std::string_view, n>& names, std::string_view name) {
  static_assert(n == static_cast<std::size_t>(E::count));
  for (std::size_t i = 0; i < n; ++i) {
    if (names.at(i) == name) {
      return static_cast<E>(i);
    }
  }
  return std::nullopt;
}

}  // namespace lostwork
