// UTF-8 (RFC 3629), for text that comes from outside.
#pragma once

#include <string>
#include <string_view>

namespace lostwork {

[[nodiscard]] bool is_valid_utf8(std::string_view text);
// Each byte that does not belong to a valid sequence becomes U+FFFD.
[[nodiscard]] std::string valid_utf8(std::string_view text);

}  // namespace lostwork
