#include "thermo/health/day.h"

#include <chrono>

namespace lostwork {

std::int64_t day_number(Instant time) {
  return std::chrono::floor<std::chrono::days>(time).time_since_epoch().count();
}

Instant beginning_of_day(std::int64_t day) {
  return Instant{std::chrono::days{day}};
}

void add_window(DaySums& sums, const Baseline& baseline, const Sample& sample,
                const Inputs& inputs) {
  const double power = *expected(baseline, Feature::power, sample.conditions);
  const double seconds = std::chrono::duration<double>(sample.end - sample.begin).count();
  const double weight = power * seconds;
  ++sums.windows;
  sums.expected_J += weight;
  sums.energy_J += *sample[Feature::power] * seconds;
  for (std::size_t i = 0; i < feature_count; ++i) {
    const auto feature = static_cast<Feature>(i);
    if (const auto found = residual(baseline, feature, sample)) {
      sums.weight.at(i) += weight;
      sums.weighted_residual.at(i) += weight * *found;
      sums.weighted_value.at(i) += weight * *sample[feature];
    }
  }
  for (std::size_t i = 0; i < input_count; ++i) {
    if (const auto& value = inputs.values.at(i)) {
      sums.input_weight.at(i) += weight;
      sums.weighted_input.at(i) += weight * *value;
    }
  }
  sums.weighted_cold_cp += weight * inputs.cold_cp_JkgK;
  sums.weighted_hot_cp += weight * inputs.hot_cp_JkgK;
}

DayRecord closed(const DaySums& sums) {
  DayRecord record{.day = sums.day,
                   .windows = sums.windows,
                   .excluded = sums.excluded,
                   .expected_J = sums.expected_J,
                   .energy_J = sums.energy_J,
                   .total_energy_J = sums.total_energy_J};
  for (std::size_t i = 0; i < feature_count; ++i) {
    if (const double weight = sums.weight.at(i); weight > 0.0) {
      record.residual.at(i) = sums.weighted_residual.at(i) / weight;
      record.value.at(i) = sums.weighted_value.at(i) / weight;
    }
  }
  return record;
}

Inputs mean_inputs(const DaySums& sums) {
  Inputs inputs;
  for (std::size_t i = 0; i < input_count; ++i) {
    if (const double weight = sums.input_weight.at(i); weight > 0.0) {
      inputs.values.at(i) = sums.weighted_input.at(i) / weight;
    }
  }
  if (sums.expected_J > 0.0) {
    inputs.cold_cp_JkgK = sums.weighted_cold_cp / sums.expected_J;
    inputs.hot_cp_JkgK = sums.weighted_hot_cp / sums.expected_J;
  }
  return inputs;
}

}  // namespace lostwork
