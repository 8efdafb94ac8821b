// The units that a point may have at the edge, and the way to SI and back.
//
// Conversion factors and 273.15 live in unit.cpp alone. Pure, safe from any thread.
// Source: NIST Special Publication 811 (2008), Appendix B; exact definitions where it names them.
#pragma once

#include "thermo/role.h"

#include <cstdint>
#include <optional>
#include <string_view>

namespace lostwork {

// NOLINTBEGIN(readability-identifier-naming): the symbols of units have their own capitals
enum class Unit : std::uint8_t {
  degC,
  degF,
  K,
  kPa_abs,
  kPa_gauge,
  bar_abs,
  bar_gauge,
  psi_abs,
  psi_gauge,
  l_s,
  m3_h,
  gpm,  // US gallons a minute
  kg_s,
  kW,
  W,
  kWh,
  percent,
  Hz,
  ppm,
  one,
  count
};
// NOLINTEND(readability-identifier-naming)

// "degC", "kPa_gauge", "%", "1": as in the plant file.
[[nodiscard]] std::string_view name(Unit unit);
[[nodiscard]] std::optional<Unit> unit_named(std::string_view name);

// SI: K, Pa absolute, m3/s (kg/s for kg_s), W, J, Hz, and 1 for percent, ppm and one.
// altitude_m of the site above sea level turns gauge into absolute pressure; other units ignore it.
[[nodiscard]] double to_SI(Unit unit, double value, double altitude_m);
[[nodiscard]] double from_SI(Unit unit, double value_SI, double altitude_m);

// SI units in a difference of one unit, > 0: an uncertainty in `unit` times this is one in SI.
[[nodiscard]] double scale_SI(Unit unit);

// Atmospheric pressure of the standard atmosphere, for -500 m to 9000 m.
// Source: p = 101325 (1 - 2.25577e-5 z)^5.25588 Pa, U.S. Standard Atmosphere 1976 (troposphere).
[[nodiscard]] double atmosphere_Pa(double altitude_m);

// Whether a point of this role may be given in this unit.
[[nodiscard]] bool allowed(Unit unit, Role role);

[[nodiscard]] bool is_temperature(Unit unit);

}  // namespace lostwork
