// The target of a request (RFC 9112, 3.2.1: origin form), taken apart.
#pragma once

#include <optional>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

namespace lostwork {

struct Target {
  std::vector<std::string> segments;  // "/api/v1" has two, "/" none; percent-decoded
  std::vector<std::pair<std::string, std::string>> query;  // in their order; "+" stands for itself
};

// None: does not begin with "/", a percent sign without two hexadecimal digits, an empty segment,
// bytes that are no UTF-8, or a control character.
[[nodiscard]] std::optional<Target> target_of(std::string_view text);

}  // namespace lostwork
