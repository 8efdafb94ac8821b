#include "daemon/figures.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <cstdio>

namespace lostwork {

Measured scaled(const Measured& value, double by) {
  return {.value = value.value * by, .u = value.u * std::abs(by)};
}

int decimals(const Measured& value) {
  constexpr int most = 6;
  const double U = 2.0 * value.u;
  if (!(U > 0.0) || !std::isfinite(U)) {
    const double size = std::abs(value.value);
    const int before =
        size > 0.0 && std::isfinite(size) ? static_cast<int>(std::floor(std::log10(size))) + 1 : 1;
    return std::clamp(4 - before, 0, most);
  }
  int exponent = static_cast<int>(std::floor(std::log10(U)));
  double two_digits = std::round(U / std::pow(10.0, exponent - 1));
  if (two_digits >= 100.0) {  // 0.0996 is 0.10
    two_digits = 10.0;
    ++exponent;
  }
  return std::clamp(two_digits < 30.0 ? 1 - exponent : -exponent, 0, most);
}

std::string fixed(double value, int decimals) {
  std::array<char, 400> buffer{};  // the largest double has 309 digits before the point
  std::snprintf(buffer.data(), buffer.size(), "%.*f", decimals, value);
  std::string text{buffer.data()};
  if (text.front() == '-' && text.find_first_not_of("-0.") == std::string::npos) {
    text.erase(0, 1);
  }
  return text;
}

std::string_view shown_unit(std::string_view unit) {
  if (unit == "1") {
    return "";
  }
  return unit == "degC" ? "\u00b0C" : unit;
}

std::string with_interval(const Measured& value, std::string_view unit) {
  const int places = decimals(value);
  const std::string shown{shown_unit(unit)};
  const std::string tail = shown.empty() ? "" : ' ' + shown;
  std::string text = fixed(value.value, places) + tail;
  if (value.u > 0.0) {
    text += " \u00b1 " + fixed(2.0 * value.u, places) + tail + " (95 %)";
  }
  return text;
}

}  // namespace lostwork
