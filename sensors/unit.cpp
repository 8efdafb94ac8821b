#include "sensors/unit.h"

#include <array>
#include <cmath>
#include <cstddef>

namespace lostwork {
namespace {

enum class Kind : std::uint8_t {
  temperature,
  absolute_pressure,
  gauge_pressure,
  volume_flow,
  mass_flow,
  power,
  energy,
  percent,
  frequency,
  concentration,
  one
};

struct Row {
  std::string_view name;
  Kind kind;
  double scale_SI;
  double zero_SI;  // SI value at 0 in the unit, of a temperature
};

constexpr double zero_celsius_K = 273.15;                        // SP 811, B.9: exact
constexpr double zero_fahrenheit_K = zero_celsius_K - 32 / 1.8;  // SP 811, B.9: exact
// Pound-force (4.4482216152605 N) on a square inch (0.0254 m squared): SP 811, B.8, exact parts.
constexpr double psi_Pa = 4.4482216152605 / (0.0254 * 0.0254);
constexpr double gallon_m3 = 231 * 0.0254 * 0.0254 * 0.0254;  // SP 811, B.8: 231 cubic inches

constexpr std::array<Row, static_cast<std::size_t>(Unit::count)> rows{
    {
     {"degC", Kind::temperature, 1.0, zero_celsius_K},
     {"degF", Kind::temperature, 1 / 1.8, zero_fahrenheit_K},
     {"K", Kind::temperature, 1.0, 0.0},
     {"kPa_abs", Kind::absolute_pressure, 1e3, 0.0},
     {"kPa_gauge", Kind::gauge_pressure, 1e3, 0.0},
     {"bar_abs", Kind::absolute_pressure, 1e5, 0.0},
     {"bar_gauge", Kind::gauge_pressure, 1e5, 0.0},
     {"psi_abs", Kind::absolute_pressure, psi_Pa, 0.0},
     {"psi_gauge", Kind::gauge_pressure, psi_Pa, 0.0},
     {"l_s", Kind::volume_flow, 1e-3, 0.0},
     {"m3_h", Kind::volume_flow, 1.0 / 3600, 0.0},
     {"gpm", Kind::volume_flow, gallon_m3 / 60, 0.0},
     {"kg_s", Kind::mass_flow, 1.0, 0.0},
     {"kW", Kind::power, 1e3, 0.0},
     {"W", Kind::power, 1.0, 0.0},
     {"kWh", Kind::energy, 3.6e6, 0.0},
     {"%", Kind::percent, 1e-2, 0.0},
     {"Hz", Kind::frequency, 1.0, 0.0},
     {"ppm", Kind::concentration, 1e-6, 0.0},
     {"1", Kind::one, 1.0, 0.0},
     }
};

const Row& row(Unit unit) {
  return rows.at(static_cast<std::size_t>(unit));
}

double zero_SI(Unit unit, double altitude_m) {
  return row(unit).kind == Kind::gauge_pressure ? atmosphere_Pa(altitude_m) : row(unit).zero_SI;
}

}  // namespace

std::string_view name(Unit unit) {
  return row(unit).name;
}

std::optional<Unit> unit_named(std::string_view name) {
  for (std::size_t i = 0; i < rows.size(); ++i) {
    if (rows.at(i).name == name) {
      return static_cast<Unit>(i);
    }
  }
  return std::nullopt;
}

double to_SI(Unit unit, double value, double altitude_m) {
  return value * row(unit).scale_SI + zero_SI(unit, altitude_m);
}

double from_SI(Unit unit, double value_SI, double altitude_m) {
  return (value_SI - zero_SI(unit, altitude_m)) / row(unit).scale_SI;
}

double scale_SI(Unit unit) {
  return row(unit).scale_SI;
}

double atmosphere_Pa(double altitude_m) {
  return 101325 * std::pow(1 - 2.25577e-5 * altitude_m, 5.25588);
}

bool allowed(Unit unit, Role role) {
  const Kind kind = row(unit).kind;
  switch (dimension(role)) {
    case Dimension::temperature: return kind == Kind::temperature;
    case Dimension::pressure:
      return kind == Kind::absolute_pressure || kind == Kind::gauge_pressure;
    case Dimension::flow: return kind == Kind::volume_flow || kind == Kind::mass_flow;
    case Dimension::power: return kind == Kind::power;
    case Dimension::frequency: return kind == Kind::frequency;
    case Dimension::fraction: return kind == Kind::percent || kind == Kind::one;
    case Dimension::concentration:
      return kind == Kind::concentration || kind == Kind::percent || kind == Kind::one;
    case Dimension::state: return kind == Kind::one;
  }
  return false;
}

bool is_temperature(Unit unit) {
  return row(unit).kind == Kind::temperature;
}

}  // namespace lostwork
