// A value, or the reason why there is none.
#pragma once

#include <cstdint>
#include <limits>
#include <string_view>

#include <tl/expected.hpp>

namespace lostwork {

// Why a quantity has no value. Stored in databases: the numbers are never changed, new ones go to
// the end.
enum class ReasonCode : std::uint8_t {
  no_sensor = 0,          // the machine has no point for an input that is needed
  not_read = 1,           // no answer from the bus yet, or an empty field
  bad_quality = 2,        // the reading is not good: blame names its role
  implausible = 3,        // outside the range that the input can physically have
  outside_fluid = 4,      // outside the published range of the equation of state
  not_converged = 5,      // the iteration limit came first
  machine_off = 6,        // the balance has no meaning at this power
  not_needed = 7,         // the hot reservoir is not above the cold one: no lift is needed
  lift_too_small = 8,     // the ratio would be noise
  zero_flow = 9,          // a stream carries no heat without flow
  contradicts = 10,       // states that the first or the second law forbids
  no_baseline = 11,       // still learning
  outside_baseline = 12,  // conditions that the baseline has not seen
  not_applicable = 13,    // has no meaning for this kind of machine
  load_too_small = 14,    // heat or power below what the meters resolve
  count                   // not a reason: the number of them
};

struct Reason {
  ReasonCode code{};
  std::string_view blame;  // a literal: the input at fault
  double value_SI =
      std::numeric_limits<double>::quiet_NaN();  // what it was, where there is a figure
};

template <class T>
using Result = tl::expected<T, Reason>;  // the one line to change when the library has its own

using Refusal = tl::unexpected<Reason>;

// The name in files and JSON ("no_sensor"), and the words for people ("a sensor is missing").
[[nodiscard]] std::string_view name(ReasonCode code);
[[nodiscard]] std::string_view text(ReasonCode code);

}  // namespace lostwork
