#include "sensors/accuracy.h"

#include <array>
#include <cmath>
#include <cstddef>
#include <numbers>

namespace lostwork {
namespace {

struct Pt100Row {
  std::string_view name;
  double fixed_K;
  double per_degree_K;
};

constexpr std::array<Pt100Row, 4> pt100_rows{
    {
     {"Pt100 AA", 0.1, 0.0017},
     {"Pt100 A", 0.15, 0.002},
     {"Pt100 B", 0.3, 0.005},
     {"Pt100 C", 0.6, 0.01},
     }
};

constexpr double rectangular = std::numbers::inv_sqrt3;

// Standard uncertainty of one component, in SI.
struct ComponentU {
  Unit unit;
  double value;

  double operator()(Pt100Class grade) const {
    const Pt100Row& row = pt100_rows.at(static_cast<std::size_t>(grade));
    const double t = from_SI(Unit::degC, to_SI(unit, value, 0.0), 0.0);  // the standard's letter
    return (row.fixed_K + row.per_degree_K * std::abs(t)) * rectangular;
  }
  double operator()(const AccuracyLimit& part) const { return in_SI(part.limit) * rectangular; }
  double operator()(const PercentOfReading& part) const {
    return in_SI(part.percent / 100 * std::abs(value)) * rectangular;
  }
  double operator()(const PercentOfSpan& part) const {
    return in_SI(part.percent / 100 * (part.high - part.low)) * rectangular;
  }
  double operator()(const StandardUncertainty& part) const { return in_SI(part.u); }

 private:
  [[nodiscard]] double in_SI(double difference) const { return difference * scale_SI(unit); }
};

}  // namespace

std::optional<Pt100Class> pt100_class_named(std::string_view name) {
  for (std::size_t i = 0; i < pt100_rows.size(); ++i) {
    if (pt100_rows.at(i).name == name) {
      return static_cast<Pt100Class>(i);
    }
  }
  return std::nullopt;
}

bool allowed(const Accuracy& accuracy, Unit unit) {
  return !std::holds_alternative<Pt100Class>(accuracy) || is_temperature(unit);
}

double standard_u_SI(std::span<const Accuracy> accuracies, Unit unit, double value,
                     double quantum) {
  const double step_SI = quantum * scale_SI(unit);
  double variance = step_SI * step_SI / 12;
  for (const Accuracy& accuracy : accuracies) {
    const double u = std::visit(ComponentU{.unit = unit, .value = value}, accuracy);
    variance += u * u;
  }
  return std::sqrt(variance);
}

}  // namespace lostwork
