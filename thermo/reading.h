// What comes in: one value of one point, and all of one machine at one instant.
#pragma once

#include <chrono>
#include <cstdint>
#include <optional>
#include <string_view>
#include <vector>

namespace lostwork {

// UTC, to the millisecond: the resolution of files and databases.
using Instant = std::chrono::sys_time<std::chrono::milliseconds>;
using Span = std::chrono::milliseconds;

// Stored in databases: the numbers are never changed, new ones go to the end.
enum class Quality : std::uint8_t {
  good = 0,
  stale = 1,         // older than three of its scan periods
  sentinel = 2,      // a raw value that the device uses to say "none"
  out_of_range = 3,  // outside the point's range, or not finite
  exception = 4,     // the device answered with a Modbus exception
  timeout = 5,       // no answer, no connection, or an empty field
  stuck = 6,
  suspect = 7,
  substituted = 8,
  count
};

[[nodiscard]] std::string_view name(Quality quality);
[[nodiscard]] std::optional<Quality> quality_named(std::string_view name);

// value_SI and u_SI mean something only where quality is good. u_SI: standard uncertainty from the
// sensor's declared accuracy at this value (k = 1).
struct Reading {
  double value_SI = 0.0;
  double u_SI = 0.0;
  Quality quality = Quality::timeout;
  Instant time{};

  friend bool operator==(const Reading&, const Reading&) = default;
};

// All readings of one machine that belong to one instant: readings[i] is of
// MachineModel::points[i].
struct Scan {
  Instant time{};
  std::vector<Reading> readings;
};

}  // namespace lostwork
