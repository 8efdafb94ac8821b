#include "daemon/web/target.h"

#include "daemon/web/utf8.h"

#include <algorithm>
#include <charconv>
#include <cstddef>

namespace lostwork {
namespace {

bool is_clean(std::string_view text) {
  return is_valid_utf8(text) && std::none_of(text.begin(), text.end(), [](char c) {
           return static_cast<unsigned char>(c) < 0x20 || c == 0x7F;
         });
}

std::optional<std::string> decoded(std::string_view text) {
  std::string plain;
  for (std::size_t i = 0; i < text.size(); ++i) {
    if (text[i] != '%') {
      plain += text[i];
      continue;
    }
    unsigned code = 0;
    const std::string_view digits = text.substr(i + 1, 2);
    const auto [end, error] =
        std::from_chars(digits.data(), digits.data() + digits.size(), code, 16);
    if (digits.size() != 2 || error != std::errc{} || end != digits.data() + 2) {
      return std::nullopt;
    }
    plain += static_cast<char>(code);
    i += 2;
  }
  return is_clean(plain) ? std::optional{plain} : std::nullopt;
}

// Cuts what stands before the next `mark` off the front of `rest`.
std::string_view cut(std::string_view& rest, char mark) {
  const std::size_t at = rest.find(mark);
  const std::string_view piece = rest.substr(0, at);
  rest.remove_prefix(at == std::string_view::npos ? rest.size() : at + 1);
  return piece;
}

}  // namespace

std::optional<Target> target_of(std::string_view text) {
  if (!text.starts_with('/') || text.find('#') != std::string_view::npos) {
    return std::nullopt;
  }
  std::string_view query = text;
  std::string_view path = cut(query, '?').substr(1);
  Target target;
  if (path.ends_with('/')) {
    return std::nullopt;
  }
  while (!path.empty()) {
    const auto segment = decoded(cut(path, '/'));
    if (!segment || segment->empty()) {
      return std::nullopt;
    }
    target.segments.push_back(*segment);
  }
  while (!query.empty()) {
    std::string_view value = cut(query, '&');
    const auto key = decoded(cut(value, '='));
    const auto content = decoded(value);
    if (!key || !content) {
      return std::nullopt;
    }
    target.query.emplace_back(*key, *content);
  }
  return target;
}

}  // namespace lostwork
