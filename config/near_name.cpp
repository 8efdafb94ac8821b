#include "config/near_name.h"

#include <algorithm>
#include <cstddef>
#include <string>
#include <vector>

namespace lostwork {
namespace {

std::string small_letters(std::string_view text) {
  std::string out{text};
  for (char& c : out) {
    c = c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c;
  }
  return out;
}

// Optimal string alignment: the least number of changes, losses, gains and swaps of neighbours.
std::size_t distance(const std::string& a, const std::string& b) {
  std::vector<std::vector<std::size_t>> d(a.size() + 1, std::vector<std::size_t>(b.size() + 1));
  for (std::size_t i = 0; i <= a.size(); ++i) {
    for (std::size_t j = 0; j <= b.size(); ++j) {
      if (i == 0 || j == 0) {
        d[i][j] = i + j;
        continue;
      }
      const std::size_t change = a[i - 1] == b[j - 1] ? 0 : 1;
      d[i][j] = std::min({d[i - 1][j] + 1, d[i][j - 1] + 1, d[i - 1][j - 1] + change});
      if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1]) {
        d[i][j] = std::min(d[i][j], d[i - 2][j - 2] + 1);
      }
    }
  }
  return d[a.size()][b.size()];
}

}  // namespace

bool is_slip_of(std::string_view written, std::string_view meant) {
  const std::size_t most = std::min<std::size_t>(2, meant.size() / 3);
  if (written == meant || written.size() > meant.size() + most) {
    return false;
  }
  return distance(small_letters(written), small_letters(meant)) <= most;
}

}  // namespace lostwork
