#include "daemon/web/utf8.h"

#include <algorithm>
#include <array>
#include <cstddef>

namespace lostwork {
namespace {

// One row of the table of well-formed sequences in RFC 3629, section 4.
struct Sequence {
  unsigned char first_low;
  unsigned char first_high;
  unsigned char second_low;
  unsigned char second_high;
  std::size_t length;
};
constexpr std::array<Sequence, 9> sequences{
    {
     {0x00, 0x7F, 0x00, 0x00, 1},
     {0xC2, 0xDF, 0x80, 0xBF, 2},
     {0xE0, 0xE0, 0xA0, 0xBF, 3},
     {0xE1, 0xEC, 0x80, 0xBF, 3},
     {0xED, 0xED, 0x80, 0x9F, 3},
     {0xEE, 0xEF, 0x80, 0xBF, 3},
     {0xF0, 0xF0, 0x90, 0xBF, 4},
     {0xF1, 0xF3, 0x80, 0xBF, 4},
     {0xF4, 0xF4, 0x80, 0x8F, 4},
     }
};

unsigned char byte(std::string_view text, std::size_t at) {
  return static_cast<unsigned char>(text[at]);
}

// How many bytes the sequence at the front has; 0: none that is well formed.
std::size_t front_length(std::string_view text) {
  const unsigned char first = byte(text, 0);
  const auto* const row = std::find_if(
      sequences.begin(), sequences.end(),
      [first](const Sequence& s) { return first >= s.first_low && first <= s.first_high; });
  if (row == sequences.end() || text.size() < row->length) {
    return 0;
  }
  for (std::size_t i = 1; i < row->length; ++i) {
    const unsigned char low = i == 1 ? row->second_low : 0x80;
    const unsigned char high = i == 1 ? row->second_high : 0xBF;
    if (byte(text, i) < low || byte(text, i) > high) {
      return 0;
    }
  }
  return row->length;
}

}  // namespace

bool is_valid_utf8(std::string_view text) {
  while (!text.empty()) {
    const std::size_t length = front_length(text);
    if (length == 0) {
      return false;
    }
    text.remove_prefix(length);
  }
  return true;
}

std::string valid_utf8(std::string_view text) {
  std::string valid;
  valid.reserve(text.size());
  while (!text.empty()) {
    const std::size_t length = front_length(text);
    valid += length == 0 ? std::string_view{"\xEF\xBF\xBD"} : text.substr(0, length);
    text.remove_prefix(std::max<std::size_t>(length, 1));
  }
  return valid;
}

}  // namespace lostwork
