#include "config/near_name.h"

#include <algorithm>
#include <cstddef>
#include <iterator>
#include <string>
#include <utility>

namespace lostwork {
namespace {

std::string small_letters(std::string_view text) {
  std::string out{text};
  for (char& c : out) {
    c = c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c;
  }
  return out;
}

// Where two names differ: what is left of each between their common beginning and common end.
std::pair<std::string_view, std::string_view> differing_parts(std::string_view a,
                                                              std::string_view b) {
  const auto [a_first, b_first] = std::mismatch(a.begin(), a.end(), b.begin(), b.end());
  const auto [a_last, b_last] = std::mismatch(a.rbegin(), std::make_reverse_iterator(a_first),
                                              b.rbegin(), std::make_reverse_iterator(b_first));
  return {
      {a_first, a_last.base()},
      {b_first, b_last.base()}
  };
}

}  // namespace

bool is_slip_of(std::string_view written, std::string_view meant) {
  if (written == meant) {
    return false;
  }
  const std::string a = small_letters(written);
  const std::string b = small_letters(meant);
  const auto [wrong, right] = differing_parts(a, b);
  const bool are_swapped =
      wrong.size() == 2 && right.size() == 2 && wrong[0] == right[1] && wrong[1] == right[0];
  const std::size_t most = std::min<std::size_t>(2, meant.size() / 3);
  return are_swapped || std::max(wrong.size(), right.size()) <= most;
}

}  // namespace lostwork
