// What a steady window says about a machine: the conditions that it ran under, and the features
// that tell how well it did.
//
// Pure. One function makes the features from the measured inputs, for windows as they were and for
// what-if inputs alike, so that the trace of a biased sensor is computed and not tabulated.
// Conditions: basis B of the entropy form (supply and entering temperatures); cooling: product heat
// Q = cold heat, lift L = T_hot,in / T_cold,out - 1, reference T_hot,in; heating: Q = hot heat,
// L = 1 - T_cold,in / T_hot,out, reference T_cold,in. Reversible power Q L in both.
#pragma once

#include "thermo/cycle/machine_model.h"
#include "thermo/measure/window.h"
#include "thermo/quantity.h"
#include "thermo/reading.h"
#include "thermo/result.h"
#include "thermo/role.h"

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>
#include <string_view>

namespace lostwork {

// The measured inputs, SI, flows as mass flows. All means over one window.
enum class Input : std::uint8_t {
  power = 0,
  cold_in,
  cold_out,
  cold_flow,
  hot_in,
  hot_out,
  hot_flow,
  suction_pressure,
  suction_temperature,
  discharge_pressure,
  discharge_temperature,
  liquid_temperature,
  count
};
inline constexpr std::size_t input_count = static_cast<std::size_t>(Input::count);
[[nodiscard]] Role role_of(Input input);

struct Inputs {
  std::array<std::optional<double>, input_count> values{};
  // Heats by their meters per kg and K of the stream: heat = flow * cp * (difference).
  double cold_cp_JkgK = 0.0;
  double hot_cp_JkgK = 0.0;

  std::optional<double>& operator[](Input i) { return values.at(static_cast<std::size_t>(i)); }
  const std::optional<double>& operator[](Input i) const {
    return values.at(static_cast<std::size_t>(i));
  }
};

struct Conditions {
  double heat_W = 0.0;         // of the product, > 0
  double lift = 0.0;           // L, a ratio
  double reference_T_K = 0.0;  // T0 of the entropy form
  double product_T_K = 0.0;    // leaving, on the product's side
};

// Stored in states: the numbers are never changed, new ones go to the end.
enum class Feature : std::uint8_t {
  power = 0,           // W; residuals of it are ratios to the expected power
  hot_approach,        // K
  cold_approach,       // K
  superheat,           // K
  subcooling,          // K
  subcooling_share,    // of condensing temperature less hot stream entering
  efficiency,          // isentropic, ratio
  hot_range,           // K, hot stream leaving less entering; only without a meter for its flow
  hot_flow,            // kg/s; residuals are ratios
  cold_flow,           // kg/s; residuals are ratios
  energy_balance,      // (W + Q_L - Q_H) / (W + Q_L) by the meters
  compressor_balance,  // 1 - m (h2 - h1) / W with m from the product's heat meter
  lost_compressor,     // W; residuals of these are ratios to the expected power
  lost_condenser,
  lost_expansion,
  lost_evaporator,
  count
};
inline constexpr std::size_t feature_count = static_cast<std::size_t>(Feature::count);

using FeatureValues = std::array<std::optional<double>, feature_count>;

struct Sample {
  Instant begin{};
  Instant end{};
  Conditions conditions;
  FeatureValues features{};

  [[nodiscard]] const std::optional<double>& operator[](Feature f) const {
    return features.at(static_cast<std::size_t>(f));
  }
};

// How residuals of a feature are formed, and what counts as small.
struct FeatureInfo {
  std::string_view name;
  std::optional<Quantity> quantity;  // shown as evidence
  bool relative;     // residual = (value - expected) / expected; else value - expected
  bool of_power;     // residual = (value - expected) / expected power
  double natural;    // a change of this size is plain to see in service, residual's unit [E]
  double min_sigma;  // least scatter of a day believed, residual's unit [E]
};
[[nodiscard]] const FeatureInfo& info(Feature feature);

// Refuses with the first of power, the product's heat and the two temperatures that is missing:
// not_read; lift_too_small or load_too_small where the entropy form has no meaning.
[[nodiscard]] Result<Conditions> conditions_of(Duty duty, const QuantityValues& values);
[[nodiscard]] Result<Conditions> conditions_of(Duty duty, const Inputs& inputs);

[[nodiscard]] Inputs inputs_of(const MachineModel& machine, const Window& window);
// Everything but the lost-work lines.
[[nodiscard]] FeatureValues features_of(const MachineModel& machine, const Inputs& inputs);

// Refuses: as conditions_of.
[[nodiscard]] Result<Sample> sample_of(const MachineModel& machine, const Window& window,
                                       const Inputs& inputs);

template <class Archive>
void archive(Archive& a, Inputs& i) {
  a(i.values, i.cold_cp_JkgK, i.hot_cp_JkgK);
}
template <class Archive>
void archive(Archive& a, Conditions& c) {
  a(c.heat_W, c.lift, c.reference_T_K, c.product_T_K);
}
template <class Archive>
void archive(Archive& a, Sample& s) {
  a(s.begin, s.end, s.conditions, s.features);
}

}  // namespace lostwork
