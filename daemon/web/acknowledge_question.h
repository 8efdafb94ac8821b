// The body of an acknowledgement, checked.
#pragma once

#include "daemon/web/answer.h"

#include <string>
#include <string_view>

#include <tl/expected.hpp>

namespace lostwork {

inline constexpr std::size_t most_comment_bytes = 500;

// {"comment": "..."} or {}; the comment is UTF-8 without control characters but line breaks and
// tabs. The error is the answer to give.
[[nodiscard]] tl::expected<std::string, Answer> comment_of(std::string_view body);

}  // namespace lostwork
