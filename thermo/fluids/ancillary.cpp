#include "thermo/fluids/ancillary.h"

#include <algorithm>
#include <cmath>

namespace lostwork {

double ancillary_value(const Ancillary& ancillary, double T_K) {
  const double log_theta = std::log(1.0 - T_K / ancillary.scale_T_K);
  double sum = 0.0;
  for (const IdealPower& row : ancillary.rows) {
    sum += row.n * std::exp(row.t * log_theta);
  }
  switch (ancillary.form) {
    case Ancillary::Form::exp_tau_sum:
      return ancillary.y_scale_SI * std::exp(ancillary.scale_T_K / T_K * sum);
    case Ancillary::Form::exp_sum: return ancillary.y_scale_SI * std::exp(sum);
    case Ancillary::Form::one_plus_sum: break;
  }
  return ancillary.y_scale_SI * (1.0 + sum);
}

LogAncillary log_ancillary(const Ancillary& ancillary, double T_K) {
  const double theta = 1.0 - T_K / ancillary.scale_T_K;
  const double log_theta = std::log(theta);
  double sum = 0.0;
  double slope = 0.0;  // of the sum by theta
  for (const IdealPower& row : ancillary.rows) {
    const double value = row.n * std::exp(row.t * log_theta);
    sum += value;
    slope += row.t * value;
  }
  slope /= theta;
  const double sum_by_inverse_T =
      slope * T_K * T_K / ancillary.scale_T_K;  // NOLINT(readability-identifier-naming): of 1/T
  switch (ancillary.form) {
    case Ancillary::Form::exp_tau_sum:
      return {ancillary.scale_T_K / T_K * sum, ancillary.scale_T_K * sum + T_K * slope};
    case Ancillary::Form::exp_sum: return {sum, sum_by_inverse_T};
    case Ancillary::Form::one_plus_sum: break;
  }
  return {std::log1p(sum), sum_by_inverse_T / (1.0 + sum)};
}

double boiling_T_K(const Ancillary& pressure, double p_Pa, int steps) {
  // ln(p) against 1/T is nearly a straight line, and its slope nearly that of all fluids: 7.6 in
  // reduced units.
  const double wanted = std::log(p_Pa / pressure.y_scale_SI);
  const double least = (1.0 + 1e-9) / pressure.scale_T_K;
  double inverse = std::max((1.0 - wanted / 7.6) / pressure.scale_T_K, least);
  for (int step = 0; step < steps; ++step) {
    const LogAncillary here = log_ancillary(pressure, 1.0 / inverse);
    inverse = std::max(inverse + (wanted - here.log_value) / here.by_inverse_T, least);
  }
  return 1.0 / inverse;
}

}  // namespace lostwork
