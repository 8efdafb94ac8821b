#include "sensors/demo_plant/refrigerant.h"

#include <algorithm>
#include <stdexcept>
#include <string>

namespace lostwork {
namespace {

constexpr TableAxis saturation_axis{.first = Refrigerant::min_T_K, .step = 1.0, .count = 111};
constexpr TableAxis excess_h_axis{.first = 0.0, .step = 2e3, .count = 41};
constexpr TableAxis superheat_axis{.first = 0.0, .step = 1.0, .count = 31};
constexpr TableAxis excess_s_axis{.first = 0.0, .step = 5.0, .count = 41};
constexpr TableAxis subcooling_axis{.first = 0.0, .step = 1.0, .count = 31};

double coordinate(const TableAxis& axis, std::size_t i) {
  return axis.first + axis.step * static_cast<double>(i);
}

// Where a value lies on an axis: the first of four nodes, and Lagrange's weights of these.
struct Place {
  std::size_t first;
  std::array<double, 4> weight;
};

Place place(const TableAxis& axis, double x) {
  const auto last = static_cast<double>(axis.count - 1);
  const double at = std::clamp((x - axis.first) / axis.step, 0.0, last);
  const auto cell = static_cast<std::size_t>(at);
  const std::size_t first = std::min(cell == 0 ? 0 : cell - 1, axis.count - 4);
  const double t = at - static_cast<double>(first);
  const double a = t;
  const double b = t - 1.0;
  const double c = t - 2.0;
  const double d = t - 3.0;
  return {
      .first = first,
      .weight = {-b * c * d / 6.0, a * c * d / 2.0, -a * b * d / 2.0, a * b * c / 6.0}
  };
}

template <std::size_t n>
std::array<double, n> along(const std::vector<std::array<double, n>>& rows, std::size_t first,
                            const std::array<double, 4>& weight) {
  std::array<double, n> sum{};
  for (std::size_t k = 0; k < 4; ++k) {
    const auto& row = rows[first + k];
    for (std::size_t i = 0; i < n; ++i) {
      sum[i] += weight[k] * row[i];
    }
  }
  return sum;
}

// Rows run along the second axis; one block of them per node of the saturation axis.
template <std::size_t n>
std::array<double, n> across(const std::vector<std::array<double, n>>& rows, const Place& outer,
                             const Place& inner, std::size_t inner_count) {
  std::array<double, n> sum{};
  for (std::size_t k = 0; k < 4; ++k) {
    const auto line = along(rows, (outer.first + k) * inner_count + inner.first, inner.weight);
    for (std::size_t i = 0; i < n; ++i) {
      sum[i] += outer.weight[k] * line[i];
    }
  }
  return sum;
}

template <class T>
const T& known(const Result<T>& result, const char* what) {
  if (!result) {
    throw std::runtime_error{std::string{"simulated plant: no R134a property for "} + what + ": " +
                             std::string{text(result.error().code)}};
  }
  return *result;
}

// On the line itself the answer is the saturated state: the equation of state would have to choose.
State vapour_state(const Fluid& fluid, const Saturation& line, double excess_h_Jkg) {
  if (excess_h_Jkg <= 0.0) {
    return line.vapour;
  }
  return known(
      state(fluid, GivenPh{.p_Pa = line.vapour.p_Pa, .h_Jkg = line.vapour.h_Jkg + excess_h_Jkg}),
      "superheated vapour");
}

}  // namespace

Refrigerant::Refrigerant(const Fluid& fluid) {
  for (std::size_t i = 0; i < saturation_axis.count; ++i) {
    const Saturation line =
        known(saturation_at_T(fluid, coordinate(saturation_axis, i)), "saturation");
    const State& liquid = line.liquid;
    const State& vapour = line.vapour;
    saturation_.push_back({vapour.p_Pa, liquid.h_Jkg, vapour.h_Jkg, liquid.s_JkgK, vapour.s_JkgK,
                           1.0 / liquid.rho_kgm3, 1.0 / vapour.rho_kgm3});
    for (std::size_t j = 0; j < excess_h_axis.count; ++j) {
      const State at = vapour_state(fluid, line, coordinate(excess_h_axis, j));
      vapour_.push_back({at.T_K - vapour.T_K, at.s_JkgK - vapour.s_JkgK, at.rho_kgm3});
    }
    by_superheat_.push_back({0.0});
    for (std::size_t j = 1; j < superheat_axis.count; ++j) {
      const GivenTp given{.T_K = vapour.T_K + coordinate(superheat_axis, j), .p_Pa = vapour.p_Pa};
      by_superheat_.push_back({known(state(fluid, given), "vapour").h_Jkg - vapour.h_Jkg});
    }
    by_entropy_.push_back({0.0});
    for (std::size_t j = 1; j < excess_s_axis.count; ++j) {
      const GivenPs given{.p_Pa = vapour.p_Pa,
                          .s_JkgK = vapour.s_JkgK + coordinate(excess_s_axis, j)};
      by_entropy_.push_back({known(state(fluid, given), "vapour").h_Jkg - vapour.h_Jkg});
    }
    liquid_.push_back({0.0, 0.0});
    for (std::size_t j = 1; j < subcooling_axis.count; ++j) {
      const GivenTp given{.T_K = vapour.T_K - coordinate(subcooling_axis, j), .p_Pa = vapour.p_Pa};
      const State at = known(state(fluid, given), "subcooled liquid");
      liquid_.push_back({liquid.h_Jkg - at.h_Jkg, liquid.s_JkgK - at.s_JkgK});
    }
  }
}

SaturationRow Refrigerant::saturation(double T_K) const {
  const Place at = place(saturation_axis, T_K);
  const auto row = along(saturation_, at.first, at.weight);
  return {.p_Pa = row[0],
          .liquid_h_Jkg = row[1],
          .vapour_h_Jkg = row[2],
          .liquid_s_JkgK = row[3],
          .vapour_s_JkgK = row[4],
          .liquid_v = row[5],
          .vapour_v = row[6]};
}

VapourRow Refrigerant::vapour(double saturation_T_K, double excess_h_Jkg) const {
  const auto row = across(vapour_, place(saturation_axis, saturation_T_K),
                          place(excess_h_axis, excess_h_Jkg), excess_h_axis.count);
  return {.superheat_K = row[0], .excess_s_JkgK = row[1], .rho_kgm3 = row[2]};
}

double Refrigerant::excess_h_of_superheat(double saturation_T_K, double superheat_K) const {
  return across(by_superheat_, place(saturation_axis, saturation_T_K),
                place(superheat_axis, superheat_K), superheat_axis.count)[0];
}

double Refrigerant::excess_h_of_entropy(double saturation_T_K, double excess_s_JkgK) const {
  return across(by_entropy_, place(saturation_axis, saturation_T_K),
                place(excess_s_axis, excess_s_JkgK), excess_s_axis.count)[0];
}

LiquidRow Refrigerant::liquid(double saturation_T_K, double subcooling_K) const {
  const auto row = across(liquid_, place(saturation_axis, saturation_T_K),
                          place(subcooling_axis, subcooling_K), subcooling_axis.count);
  return {.missing_h_Jkg = row[0], .missing_s_JkgK = row[1]};
}

const Refrigerant& plant_r134a() {
  static const Refrigerant tables = [] {
    const Fluid* fluid = fluid_named("R134a");
    if (fluid == nullptr) {
      throw std::runtime_error{"simulated plant: this build has no R134a"};
    }
    return Refrigerant{*fluid};
  }();
  return tables;
}

}  // namespace lostwork
