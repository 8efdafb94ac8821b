// The one integer that names a row of a machine and a time, in their order.
//
// Pure. A rowid is the only key that SQLite stores without an index beside it.
#pragma once

#include "thermo/reading.h"

#include <cstdint>

namespace lostwork {

inline constexpr int key_time_bits = 44;
inline constexpr Instant first_storable{};                                             // 1970
inline constexpr Instant last_storable{Span{(std::int64_t{1} << key_time_bits) - 1}};  // in 2527

[[nodiscard]] constexpr bool storable(Instant time) {
  return time >= first_storable && time <= last_storable;
}

// machine: machine.number in the database, 1 to 524287; time: storable.
[[nodiscard]] constexpr std::int64_t key_of(std::int64_t machine, Instant time) {
  return (machine << key_time_bits) + time.time_since_epoch().count();
}

[[nodiscard]] constexpr Instant time_of(std::int64_t key) {
  return Instant{Span{key & ((std::int64_t{1} << key_time_bits) - 1)}};
}

// The nearest storable time.
[[nodiscard]] constexpr Instant clamped(Instant time) {
  return time < first_storable ? first_storable : time > last_storable ? last_storable : time;
}

inline constexpr Span minute{60000};
inline constexpr Span hour{3600000};
inline constexpr Span day{86400000};

// The begin of the period of that length that the time is in; periods are counted from 1970 UTC.
[[nodiscard]] constexpr Instant begin_of(Span period, Instant time) {
  const auto count = time.time_since_epoch().count();
  const auto length = period.count();
  const auto rest = count % length;
  return Instant{Span{count - (rest < 0 ? rest + length : rest)}};
}

}  // namespace lostwork
