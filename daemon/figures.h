// Figures for people: as many digits as the uncertainty allows. Pure.
#pragma once

#include "thermo/measured.h"

#include <string>
#include <string_view>

namespace lostwork {

// In another unit.
[[nodiscard]] Measured scaled(const Measured& value, double by);
// Decimals that a value deserves: those that show U = 2u with two digits where these are below 30,
// else with one (the project's own rule, within JCGM 100:2008, 7.2.6: at most two digits). 0 to 6;
// without an uncertainty, those of four significant digits.
[[nodiscard]] int decimals(const Measured& value);
[[nodiscard]] std::string fixed(double value, int decimals);  // never "-0"
// A unit as people write it: the degree sign for "degC"; nothing for "1".
[[nodiscard]] std::string_view shown_unit(std::string_view unit);
// "27.4 kW +/- 1.1 kW (95 %)" with the sign for plus-minus; the unit "1" is left out.
[[nodiscard]] std::string with_interval(const Measured& value, std::string_view unit);

}  // namespace lostwork
