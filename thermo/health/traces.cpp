#include "thermo/health/traces.h"

#include <algorithm>
#include <cmath>
#include <initializer_list>

namespace lostwork {
namespace {

using enum Feature;

// Share of its own largest effect by which a cause may move any feature, in natural units [E].
constexpr double machine_tolerance = 0.07;
constexpr double sensor_tolerance = 0.03;

struct Effect {
  Feature feature;
  double mean;
  double tolerance;
};

Trace machine_trace(Cause cause, double unit_SI, std::initializer_list<Effect> effects) {
  Trace trace{.cause = cause, .role = std::nullopt, .unit_SI = unit_SI};
  trace.tolerance.fill(machine_tolerance);
  for (const Effect& effect : effects) {
    trace.mean.at(static_cast<std::size_t>(effect.feature)) = effect.mean;
    trace.tolerance.at(static_cast<std::size_t>(effect.feature)) = effect.tolerance;
  }
  return trace;
}

std::array<std::optional<double>, feature_count> residuals(const MachineModel& machine,
                                                           const Baseline& baseline,
                                                           const Inputs& inputs) {
  std::array<std::optional<double>, feature_count> out{};
  const auto conditions = conditions_of(machine.duty, inputs);
  if (!conditions) {
    return out;
  }
  const Sample sample{.conditions = *conditions, .features = features_of(machine, inputs)};
  for (std::size_t i = 0; i < feature_count; ++i) {
    out.at(i) = residual(baseline, static_cast<Feature>(i), sample);
  }
  return out;
}

}  // namespace

std::vector<Trace> machine_traces() {
  return {
      machine_trace(Cause::condenser_fouled, 1.0,
                    {
                                                   {hot_approach, 1.0, 0.0},
                                                   {subcooling_share, 0.0, 0.3},
                                                   {efficiency, 0.0, 0.2},                               }
                     ),
      machine_trace(Cause::hot_flow_low, 0.05,
                    {
                                                   {hot_flow, -1.0, 0.0},
                                                   {hot_range, 0.5, 0.1},
                                                   {hot_approach, 0.0, 0.2},                                                                                                       {subcooling_share, 0.0, 0.2},
                                                   }
                     ),
      machine_trace(Cause::evaporator_fouled, 1.0,
                    {
                                                   {cold_approach, 1.0, 0.0},
                                                   {superheat, 0.0, 0.4},
                                                   {subcooling_share, 0.0, 0.2},{efficiency, 0.0, 0.2},
                                                   }
                     ),
      machine_trace(Cause::cold_flow_low, 0.05,
                    {
                                                   {cold_flow, -1.0, 0.0},
                                                   {cold_approach, 0.0, 0.2},
                                                   {superheat, 0.0, 0.2},                       }
                     ),
 // While the receiver or the condenser still holds liquid, the subcooling alone ...
      machine_trace(Cause::refrigerant_low, 0.1,
                    {
                                                   {subcooling_share, -1.0, 0.0},
                                                   {hot_approach, -0.05, 0.1},
                                                   }
                     ),
 // ... and later the evaporator starves.
      machine_trace(Cause::refrigerant_low, 0.1,
                    {
                                                   {subcooling_share, -1.0, 0.0},
                                                   {cold_approach, 0.2, 0.4},
                                                   {superheat, 0.2, 0.5},                       {hot_approach, -0.1, 0.3},
                                                   {efficiency, 0.0, 0.2},
                                                   }
                     ),
      machine_trace(Cause::overcharge_or_gas, 0.1,
                    {
                                                   {subcooling_share, 1.0, 0.0},
                                                   {hot_approach, 0.6, 0.4},
                                                   {efficiency, 0.0, 0.2},                            }
                     ),
      machine_trace(Cause::compressor_worn, 0.02,
                    {
                                                   {efficiency, -1.0, 0.0},
                                                   {compressor_balance, 0.0, 0.15},
                                                   {hot_approach, 0.0, 0.15},                             {cold_approach, 0.0, 0.15},
                                                   }
                     ),
  };
}

double first_bias_SI(Input input, double value_SI) {
  switch (dimension(role_of(input))) {
    case Dimension::temperature: return 0.5;
    case Dimension::pressure: return 0.02 * value_SI;
    default: return 0.03 * value_SI;
  }
}

std::optional<Trace> sensor_trace(const MachineModel& machine, const Baseline& baseline,
                                  const Inputs& inputs, Input input, double bias_SI) {
  if (!inputs[input]) {
    return std::nullopt;
  }
  Inputs without = inputs;
  without[input] = *inputs[input] - bias_SI;
  const auto biased = residuals(machine, baseline, inputs);
  const auto right = residuals(machine, baseline, without);
  Trace trace{.cause = Cause::sensor, .role = role_of(input), .unit_SI = bias_SI};
  double largest = 0.0;
  for (std::size_t f = 0; f < feature_count; ++f) {
    if (biased.at(f) && !right.at(f)) {
      return std::nullopt;
    }
    if (biased.at(f)) {
      trace.mean.at(f) = (*biased.at(f) - *right.at(f)) / info(static_cast<Feature>(f)).natural;
      largest = std::max(largest, std::abs(trace.mean.at(f)));
    }
  }
  trace.tolerance.fill(sensor_tolerance * largest);
  return largest > 0.0 ? std::optional{trace} : std::nullopt;
}

}  // namespace lostwork
