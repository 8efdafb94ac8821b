#include "thermo/health/weigh_days.h"

#include <algorithm>
#include <cmath>

namespace lostwork {
namespace {

constexpr std::size_t fortnight = 14;

// Of the least scatter of a day: what the baseline itself may be off by in the mean of many days
// [E].
constexpr double lasting_share = 0.5;

std::optional<double> mean_value(const std::vector<const DayRecord*>& days, Feature feature) {
  double sum = 0.0;
  double count = 0.0;
  for (const DayRecord* day : days) {
    if (const auto& value = day->value.at(static_cast<std::size_t>(feature))) {
      sum += *value;
      count += 1.0;
    }
  }
  return count > 0.0 ? std::optional{sum / count} : std::nullopt;
}

}  // namespace

double day_u(const Baseline& baseline, Feature feature) {
  const FeatureFit& fit = baseline[feature];
  const double r = fit.day_autocorrelation;
  const double widened = r > 0.2 ? std::sqrt((1.0 + r) / (1.0 - r)) : 1.0;
  return fit.day_sigma * widened;
}

std::vector<const DayRecord*> last_days(const HealthState& state, std::int64_t from_day) {
  std::vector<const DayRecord*> days;
  for (auto day = state.days.rbegin(); day != state.days.rend() && days.size() < fortnight; ++day) {
    if (day->day < from_day) {
      break;
    }
    if ((*day)[Feature::power]) {
      days.push_back(&*day);
    }
  }
  return days;
}

struct Total {
  double sum = 0.0;
  double count = 0.0;
};

Total total_of(const std::vector<const DayRecord*>& days, Feature feature) {
  Total out;
  for (const DayRecord* day : days) {
    if (const auto& residual = (*day)[feature]) {
      out.sum += *residual;
      out.count += 1.0;
    }
  }
  return out;
}

Shift shift_of(const Baseline& baseline, const std::vector<const DayRecord*>& days) {
  Shift shift{};
  for (std::size_t i = 0; i < feature_count; ++i) {
    const auto feature = static_cast<Feature>(i);
    const auto [sum, count] = total_of(days, feature);
    if (count > 0.0) {
      const double u = day_u(baseline, feature);
      const double least = i == 0 ? baseline[feature].day_sigma : info(feature).min_sigma;
      const double lasting = lasting_share * std::min(least, u);
      shift.at(i) =
          Measured{.value = sum / count, .u = std::sqrt(u * u / count + lasting * lasting)};
    }
  }
  return shift;
}

Result<OnsetEstimate> onset_of(const HealthState& state, Feature feature, double sign) {
  const Baseline& baseline = *state.baseline;
  const FeatureFit& fit = baseline[feature];
  std::vector<DayValue> days;
  double most = 1.0;
  for (const DayRecord& day : state.days) {
    most = std::max(most, static_cast<double>(day.windows));
  }
  for (const DayRecord& day : state.days) {
    if (day.day < state.history_from || !day[feature]) {
      continue;
    }
    // Days of few windows scatter more: half of the variance is the windows' own.
    const double fewer = most / std::max(1.0, static_cast<double>(day.windows));
    days.push_back({.day = day.day,
                    .residual = sign * *day[feature],
                    .u = fit.day_sigma * std::sqrt(0.5 + 0.5 * std::min(fewer, 4.0))});
  }
  return estimate_onset(days, {.offset_u = lasting_share * fit.day_sigma,
                               .scatter = fit.day_sigma,
                               .scatter_days = 10.0,
                               .autocorrelation = fit.day_autocorrelation});
}

Cost cost_since(const HealthState& state, std::int64_t from_day) {
  const double u = day_u(*state.baseline, Feature::power);
  const double lasting = lasting_share * (*state.baseline)[Feature::power].day_sigma;
  double extra_J = 0.0;
  double variance = 0.0;
  double compared_J = 0.0;
  double all_J = 0.0;
  for (const DayRecord& day : state.days) {
    if (day.day < from_day) {
      continue;
    }
    const double energy_J = day.total_energy_J > 0.0 ? day.total_energy_J : day.energy_J;
    all_J += energy_J;
    if (const auto& r = day[Feature::power]; r && *r > -0.9) {
      extra_J += energy_J * *r / (1.0 + *r);
      variance += energy_J * energy_J * u * u;
      compared_J += energy_J;
    }
  }
  const double lasting_J = lasting * compared_J;
  return {
      .energy_J = {.value = extra_J, .u = std::sqrt(variance + lasting_J * lasting_J)},
      .compared_share = all_J > 0.0 ? compared_J / all_J : 0.0
  };
}

double expected_power_W(const std::vector<const DayRecord*>& days, const Shift& shift) {
  const auto power = mean_value(days, Feature::power);
  const auto& residual = shift[0];
  return power && residual ? *power / (1.0 + residual->value) : 0.0;
}

std::vector<Evidence> evidence_of(const Baseline& baseline,
                                  const std::vector<const DayRecord*>& days, const Shift& shift) {
  std::vector<Evidence> out;
  const double power_W = expected_power_W(days, shift);
  for (std::size_t i = 0; i < feature_count; ++i) {
    const auto feature = static_cast<Feature>(i);
    const FeatureInfo& how = info(feature);
    const auto after = mean_value(days, feature);
    const auto& moved = shift.at(i);
    if (!how.quantity || !after || !moved || baseline[feature].x.empty()) {
      continue;
    }
    const double unit = how.of_power ? power_W : *after / (1.0 + moved->value);
    const double scale = how.relative || how.of_power ? unit : 1.0;
    out.push_back({.quantity = *how.quantity,
                   .before_SI = *after - moved->value * scale,
                   .after_SI = *after,
                   .u_SI = moved->u * std::abs(scale)});
  }
  return out;
}

}  // namespace lostwork
