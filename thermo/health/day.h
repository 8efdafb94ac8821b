// One day of one machine against its baseline: sums while it goes on, a record when it is closed.
//
// Pure. Days are UTC. Means are weighted by the energy that should have been used.
#pragma once

#include "thermo/health/baseline.h"
#include "thermo/health/features.h"

#include <array>
#include <cstdint>
#include <optional>

namespace lostwork {

struct DaySums {
  std::int64_t day = 0;  // since 1970
  std::uint32_t windows = 0;
  std::uint32_t excluded = 0;   // outside the baseline
  double expected_J = 0.0;      // of the windows compared
  double energy_J = 0.0;        // used in them
  double total_energy_J = 0.0;  // used in the whole day, steady or not; 0: not told
  std::array<double, feature_count> weight{};
  std::array<double, feature_count> weighted_residual{};
  std::array<double, feature_count> weighted_value{};
  std::array<double, input_count> input_weight{};
  std::array<double, input_count> weighted_input{};
  double weighted_cold_cp = 0.0;
  double weighted_hot_cp = 0.0;
};

struct DayRecord {
  std::int64_t day = 0;
  std::uint32_t windows = 0;
  std::uint32_t excluded = 0;
  double expected_J = 0.0;
  double energy_J = 0.0;
  double total_energy_J = 0.0;
  std::array<std::optional<double>, feature_count> residual{};
  std::array<std::optional<double>, feature_count> value{};

  [[nodiscard]] const std::optional<double>& operator[](Feature f) const {
    return residual.at(static_cast<std::size_t>(f));
  }
};

[[nodiscard]] std::int64_t day_number(Instant time);
[[nodiscard]] Instant beginning_of_day(std::int64_t day);

// Adds a window that is inside the baseline; weight: its length by the power expected.
void add_window(DaySums& sums, const Baseline& baseline, const Sample& sample,
                const Inputs& inputs);

[[nodiscard]] DayRecord closed(const DaySums& sums);
// Means over the day's windows; no value where there was none.
[[nodiscard]] Inputs mean_inputs(const DaySums& sums);

template <class Archive>
void archive(Archive& a, DaySums& s) {
  a(s.day, s.windows, s.excluded, s.expected_J, s.energy_J, s.total_energy_J, s.weight,
    s.weighted_residual, s.weighted_value, s.input_weight, s.weighted_input, s.weighted_cold_cp,
    s.weighted_hot_cp);
}
template <class Archive>
void archive(Archive& a, DayRecord& r) {
  a(r.day, r.windows, r.excluded, r.expected_J, r.energy_J, r.total_energy_J, r.residual, r.value);
}

}  // namespace lostwork
