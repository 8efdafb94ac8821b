// What the plant file says of a sensor's accuracy, as a standard uncertainty.
//
// Limits are taken as rectangular: u = limit / sqrt(3) (JCGM 100:2008, 4.3.7). Components are
// independent and add in quadrature. Pure.
#pragma once

#include "sensors/unit.h"

#include <cstdint>
#include <optional>
#include <span>
#include <string_view>
#include <variant>

namespace lostwork {

// Limits of error of platinum resistance thermometers, K, t in degC: AA 0.1 + 0.0017|t|,
// A 0.15 + 0.002|t|, B 0.3 + 0.005|t|, C 0.6 + 0.01|t|. Source: IEC 60751:2008, tolerance classes.
enum class Pt100Class : std::uint8_t { aa, a, b, c };

struct AccuracyLimit {
  double limit;  // in the point's unit, > 0
};
struct PercentOfReading {
  double percent;  // of the value in the point's unit; a limit
};
struct PercentOfSpan {
  double percent;  // of high - low; a limit
  double low;      // in the point's unit
  double high;     // > low
};
struct StandardUncertainty {
  double u;  // k = 1, in the point's unit
};
using Accuracy =
    std::variant<Pt100Class, AccuracyLimit, PercentOfReading, PercentOfSpan, StandardUncertainty>;

// "Pt100 AA", "Pt100 A", "Pt100 B", "Pt100 C".
[[nodiscard]] std::optional<Pt100Class> pt100_class_named(std::string_view name);

// A Pt100 class belongs to a temperature; everything else to any unit.
[[nodiscard]] bool allowed(const Accuracy& accuracy, Unit unit);

// Combined standard uncertainty at `value` (in `unit`), in SI. 0 for no component.
// quantum: step of the digital value in `unit`, rectangular over one step (quantum / sqrt(12)); 0:
// none.
[[nodiscard]] double standard_u_SI(std::span<const Accuracy> accuracies, Unit unit, double value,
                                   double quantum);

}  // namespace lostwork
