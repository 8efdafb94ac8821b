#include "thermo/streams/stream.h"

#include "thermo/fluids/density.h"
#include "thermo/fluids/fluids.h"

#include <array>
#include <charconv>
#include <cmath>
#include <cstddef>
#include <numbers>
#include <system_error>

namespace lostwork {
namespace {

constexpr double ice_point_T_K = 273.15;
constexpr double least_T_K = 273.16;  // the triple point, 0.01 degC
constexpr double most_T_K = 423.15;   // 150 degC
constexpr double stream_p_Pa = 300e3;

// Chebyshev polynomials on [least_T_K, most_T_K] through the equation's values at their own nodes.
// Degree 19 leaves 1e-10 of each quantity (tests/thermo/streams/stream_test.cpp), which is what
// makes cp = dh/dT and T ds/dT the same number.
constexpr std::size_t node_count = 20;
using Polynomial = std::array<double, node_count>;

struct ValueSlope {
  double value;
  double slope;  // by T
};

double mapped(double T_K) {
  return (2.0 * T_K - (least_T_K + most_T_K)) / (most_T_K - least_T_K);
}

double node(std::size_t k) {
  return std::cos(std::numbers::pi * (static_cast<double>(k) + 0.5) / node_count);
}

Polynomial through(const Polynomial& at_nodes) {
  Polynomial sum{};
  for (std::size_t order = 0; order < node_count; ++order) {
    for (std::size_t k = 0; k < node_count; ++k) {
      const double angle = std::numbers::pi * static_cast<double>(order) *
                           (static_cast<double>(k) + 0.5) / node_count;
      sum[order] += at_nodes[k] * std::cos(angle);
    }
    sum[order] *= (order == 0 ? 1.0 : 2.0) / node_count;
  }
  return sum;
}

// Clenshaw's recurrence, and its derivative beside it.
ValueSlope evaluate(const Polynomial& polynomial, double x) {
  double b1 = 0.0;
  double b2 = 0.0;
  double d1 = 0.0;
  double d2 = 0.0;
  for (std::size_t order = node_count - 1; order > 0; --order) {
    const double d0 = 2.0 * b1 + 2.0 * x * d1 - d2;
    const double b0 = polynomial[order] + 2.0 * x * b1 - b2;
    d2 = d1;
    d1 = d0;
    b2 = b1;
    b1 = b0;
  }
  return {polynomial[0] + x * b1 - b2, (b1 + x * d1 - d2) * 2.0 / (most_T_K - least_T_K)};
}

struct WaterFit {
  Polynomial rho;
  Polynomial h;
  Polynomial s;
};

// Once, at the first question. The liquid branch continues smoothly above the boiling point at this
// pressure (133.5 degC), where a loop that is still liquid is at a higher pressure.
WaterFit fitted() {
  WaterFit values{};
  for (std::size_t k = 0; k < node_count; ++k) {
    const double T_K = 0.5 * (least_T_K + most_T_K + (most_T_K - least_T_K) * node(k));
    const Isotherm isotherm{r718, T_K};
    const double guess = guessed_rho_kgm3(isotherm, Branch::liquid, stream_p_Pa);
    // A refusal here would be a mistake of ours: NaN then shows in every value.
    const double rho = density_kgm3(isotherm, Branch::liquid, stream_p_Pa, guess)
                           .value_or(std::numeric_limits<double>::quiet_NaN());
    const Properties at = isotherm.properties(rho);
    values.rho[k] = rho;
    values.h[k] = at.h_Jkg;
    values.s[k] = at.s_JkgK;
  }
  return {through(values.rho), through(values.h), through(values.s)};
}

Result<StreamState> state_of(const WaterStream& /*water*/, double T_K) {
  if (T_K < least_T_K || T_K > most_T_K) {
    return Refusal{
        Reason{ReasonCode::outside_fluid, "temperature", T_K}
    };
  }
  static const WaterFit fit = fitted();
  const double x = mapped(T_K);
  const ValueSlope rho = evaluate(fit.rho, x);
  const ValueSlope h = evaluate(fit.h, x);
  const ValueSlope s = evaluate(fit.s, x);
  return StreamState{.rho_kgm3 = rho.value,
                     .h_Jkg = h.value,
                     .s_JkgK = s.value,
                     .cp_JkgK = h.slope,
                     .expansion_beta = -rho.slope / rho.value};
}

Result<StreamState> state_of(const ConstantStream& stream, double T_K) {
  const bool sound = std::isfinite(stream.rho_cp_SI) && stream.rho_cp_SI > 0.0 &&
                     std::isfinite(stream.rho_kgm3) && stream.rho_kgm3 > 0.0;
  if (!sound) {
    return Refusal{
        Reason{ReasonCode::implausible, "stream", stream.rho_cp_SI}
    };
  }
  const double cp_JkgK = stream.rho_cp_SI / stream.rho_kgm3;
  return StreamState{.rho_kgm3 = stream.rho_kgm3,
                     .h_Jkg = cp_JkgK * (T_K - ice_point_T_K),
                     .s_JkgK = cp_JkgK * std::log(T_K / ice_point_T_K),
                     .cp_JkgK = cp_JkgK,
                     .expansion_beta = 0.0};
}

// Of a cubic in T: itself, its derivative, its integral, and the integral of it over T.
double value(const Brine::Cubic& c, double T_K) {
  return c[0] + T_K * (c[1] + T_K * (c[2] + T_K * c[3]));
}
double slope(const Brine::Cubic& c, double T_K) {
  return c[1] + T_K * (2.0 * c[2] + T_K * 3.0 * c[3]);
}
double integral(const Brine::Cubic& c, double T_K) {
  return T_K * (c[0] + T_K * (c[1] / 2.0 + T_K * (c[2] / 3.0 + T_K * c[3] / 4.0)));
}
double integral_over_T(const Brine::Cubic& c, double T_K) {
  return c[0] * std::log(T_K) + T_K * (c[1] + T_K * (c[2] / 2.0 + T_K * c[3] / 3.0));
}

Result<StreamState> state_of(const Brine& brine, double T_K) {
  if (T_K < brine.freezing_T_K || T_K > brine.max_T_K) {
    return Refusal{
        Reason{ReasonCode::outside_fluid, "temperature", T_K}
    };
  }
  const double rho_kgm3 = value(brine.rho_kgm3, T_K);
  return StreamState{
      .rho_kgm3 = rho_kgm3,
      .h_Jkg = integral(brine.cp_JkgK, T_K) - integral(brine.cp_JkgK, ice_point_T_K),
      .s_JkgK = integral_over_T(brine.cp_JkgK, T_K) - integral_over_T(brine.cp_JkgK, ice_point_T_K),
      .cp_JkgK = value(brine.cp_JkgK, T_K),
      .expansion_beta = -slope(brine.rho_kgm3, T_K) / rho_kgm3};
}

}  // namespace

std::optional<StreamFluid> stream_named(std::string_view name) {
  if (name == "water") {
    return WaterStream{};
  }
  // "<solution> <percent> %"
  constexpr std::string_view unit = " %";
  if (!name.ends_with(unit)) {
    return std::nullopt;
  }
  name.remove_suffix(unit.size());
  const std::size_t space = name.rfind(' ');
  if (space == std::string_view::npos) {
    return std::nullopt;
  }
  const std::string_view number = name.substr(space + 1);
  double percent = 0.0;
  const auto [end, error] = std::from_chars(number.data(), number.data() + number.size(), percent);
  if (error != std::errc{} || end != number.data() + number.size()) {
    return std::nullopt;
  }
  return brine(name.substr(0, space), percent);
}

Result<StreamState> stream_state(const StreamFluid& fluid, double T_K) {
  if (!(std::isfinite(T_K) && T_K > 0.0)) {
    return Refusal{
        Reason{ReasonCode::implausible, "temperature", T_K}
    };
  }
  return std::visit([T_K](const auto& stream) { return state_of(stream, T_K); }, fluid);
}

}  // namespace lostwork
