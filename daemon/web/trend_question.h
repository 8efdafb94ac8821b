// The parameters of a question for a trend, checked.
#pragma once

#include "daemon/web/answer.h"
#include "storage/history.h"

#include <string>
#include <utility>
#include <vector>

#include <tl/expected.hpp>

namespace lostwork {

inline constexpr std::size_t most_trend_points = 5000;
inline constexpr std::chrono::days most_trend_days{3660};  // ten years

// quantity, from, to (ISO 8601) and points (default 500), each at most once and no other. The
// error is the answer to give: it names the parameter, what it was and what is allowed. The
// machine is left empty.
[[nodiscard]] tl::expected<TrendRequest, Answer> trend_request(
    const std::vector<std::pair<std::string, std::string>>& query);

}  // namespace lostwork
