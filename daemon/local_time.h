// The plant's clock on the wall. UTC is used everywhere else.
#pragma once

#include "thermo/reading.h"

#include <chrono>
#include <functional>
#include <optional>
#include <string>
#include <string_view>

namespace lostwork {

// Local time less UTC at an instant, summer time included.
using UtcOffset = std::function<std::chrono::seconds(Instant)>;

// By IANA name ("Europe/London") from the system's time zone files. None: no such zone here.
[[nodiscard]] std::optional<UtcOffset> utc_offset_of(const std::string& timezone);

// "14:02" on the day of `now`, "3 May, 14:02" before it, "3 May 2023, 14:02" in another year.
[[nodiscard]] std::string time_text(Instant time, Instant now, const UtcOffset& offset);
// "3 May", or "3 May 2023" where that is another year than the one of `now`.
[[nodiscard]] std::string day_text(Instant time, Instant now, const UtcOffset& offset);

// ISO 8601 in UTC: "2024-05-03T14:02:00Z", with ".250" where it is not a whole second.
[[nodiscard]] std::string iso_text(Instant time);
// Takes "2024-05-03T14:02Z", with seconds, up to three digits of a fraction, and "+01:00" in place
// of "Z". None: anything else, or a year outside 1970 to 9999.
[[nodiscard]] std::optional<Instant> instant_of(std::string_view iso);

}  // namespace lostwork
