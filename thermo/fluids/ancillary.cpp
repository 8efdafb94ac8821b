#include "thermo/fluids/ancillary.h"

#include <algorithm>
#include <cmath>

namespace lostwork {
namespace {

std::span<const Power> pressure_rows(const Fluid& fluid, Line line) {
  return line == Line::dew && !fluid.dew_pressure.empty() ? fluid.dew_pressure
                                                          : fluid.saturation_pressure;
}

double sum_at(std::span<const Power> rows, double theta) {
  const double log_theta = std::log(theta);
  double sum = 0.0;
  for (const Power& row : rows) {
    sum += row.n * std::exp(row.t * log_theta);
  }
  return sum;
}

double theta_at(const Fluid& fluid, double T_K) {
  return 1.0 - T_K / fluid.critical_T_K;
}

struct LogPressure {
  double value;       // ln(p / pc)
  double by_inverse;  // its derivative by 1/T, K
};
LogPressure log_pressure(const Fluid& fluid, Line line, double T_K) {
  const double theta = theta_at(fluid, T_K);
  const double log_theta = std::log(theta);
  double sum = 0.0;
  double slope = 0.0;  // of the sum by theta
  for (const Power& row : pressure_rows(fluid, line)) {
    const double value = row.n * std::exp(row.t * log_theta);
    sum += value;
    slope += row.t * value / theta;
  }
  return {fluid.critical_T_K / T_K * sum, fluid.critical_T_K * sum + T_K * slope};
}

}  // namespace

double line_p_Pa(const Fluid& fluid, Line line, double T_K) {
  const double sum = sum_at(pressure_rows(fluid, line), theta_at(fluid, T_K));
  return fluid.critical_p_Pa * std::exp(fluid.critical_T_K / T_K * sum);
}

double line_dT_dp(const Fluid& fluid, Line line, double T_K) {
  return -T_K * T_K / (line_p_Pa(fluid, line, T_K) * log_pressure(fluid, line, T_K).by_inverse);
}

double line_liquid_kgm3(const Fluid& fluid, double T_K) {
  return fluid.critical_rho_kgm3 * (1.0 + sum_at(fluid.saturated_liquid_rho, theta_at(fluid, T_K)));
}

double line_vapour_kgm3(const Fluid& fluid, double T_K) {
  const double sum = sum_at(fluid.saturated_vapour_rho, theta_at(fluid, T_K));
  return fluid.critical_rho_kgm3 * std::exp(fluid.critical_T_K / T_K * sum);
}

double boiling_T_K(const Fluid& fluid, Line line, double p_Pa, int steps) {
  // ln(p) against 1/T is nearly a straight line, and its slope nearly that of all fluids: 7.6 in
  // reduced units.
  const double wanted = std::log(p_Pa / fluid.critical_p_Pa);
  const double least = (1.0 + 1e-9) / fluid.critical_T_K;
  double inverse = std::max((1.0 - wanted / 7.6) / fluid.critical_T_K, least);
  for (int step = 0; step < steps; ++step) {
    const LogPressure here = log_pressure(fluid, line, 1.0 / inverse);
    inverse = std::max(inverse + (wanted - here.value) / here.by_inverse, least);
  }
  return 1.0 / inverse;
}

}  // namespace lostwork
