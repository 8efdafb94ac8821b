#include "thermo/health/judgement.h"

#include "thermo/health/weigh_days.h"

#include <algorithm>
#include <array>
#include <cmath>

namespace lostwork {
namespace {

// What a sensor has to be off by before it is called suspect, unless the power that is expected
// from it is off by the smallest drift [E].
double least_bias_SI(Role role, double value_SI) {
  switch (dimension(role)) {
    case Dimension::temperature: return 0.2;
    case Dimension::pressure:
    case Dimension::power:
    case Dimension::flow: return 0.02 * value_SI;
    default: return 0.0;
  }
}

// Where a fault of the machine shows itself besides the power (methods.md 6.3). Flows and balances
// are not among them: they show pumps and sensors, so that their silence says nothing.
constexpr std::array machine_features{Feature::hot_approach, Feature::cold_approach,
                                      Feature::superheat, Feature::subcooling_share,
                                      Feature::efficiency};

bool sees_the_machine(const Baseline& baseline) {
  return std::any_of(machine_features.begin(), machine_features.end(),
                     [&](Feature feature) { return !baseline[feature].x.empty(); });
}

// A sensor is called only when it is far likelier than every fault of the machine: to take a
// machine for a sensor costs more than to doubt.
constexpr double sensor_margin = 10.0;

bool sensor_leads(const Diagnosis& diagnosis) {
  const auto& causes = diagnosis.causes;
  if (!diagnosis.explained || causes.front().cause != Cause::sensor) {
    return false;
  }
  return std::all_of(causes.begin(), causes.end(), [&](const RankedCause& c) {
    return c.cause == Cause::sensor || c.probability * sensor_margin <= causes.front().probability;
  });
}

bool large_enough(const RankedCause& cause, const Inputs& inputs, bool power_moved) {
  for (std::size_t i = 0; i < input_count; ++i) {
    const auto input = static_cast<Input>(i);
    if (cause.role && role_of(input) == *cause.role && inputs[input]) {
      const double least = power_moved ? 0.0 : least_bias_SI(*cause.role, *inputs[input]);
      const double off = std::abs(cause.amount_SI.value);
      return off >= least && off >= 3.0 * cause.amount_SI.u;
    }
  }
  return false;
}

// A mean that grows by one value, where there is one.
void take_into(std::optional<double>& mean, double& count, const std::optional<double>& value) {
  if (value) {
    count += 1.0;
    const double before = mean.value_or(0.0);
    mean = before + (*value - before) / count;
  }
}

Inputs mean_of(const std::vector<Inputs>& all) {
  Inputs out;
  std::array<double, input_count> count{};
  for (const Inputs& inputs : all) {
    for (std::size_t i = 0; i < input_count; ++i) {
      take_into(out.values.at(i), count.at(i), inputs.values.at(i));
    }
    out.cold_cp_JkgK += inputs.cold_cp_JkgK / static_cast<double>(all.size());
    out.hot_cp_JkgK += inputs.hot_cp_JkgK / static_cast<double>(all.size());
  }
  return out;
}

}  // namespace

CusumDesign chart_design(const HealthOptions& options, const Baseline& baseline) {
  return {.reference = options.reference_value, .limit = baseline.chart_limit};
}

bool any_feature_alarm(const HealthOptions& options, const HealthState& state) {
  const CusumDesign limits = chart_design(options, *state.baseline);
  for (std::size_t i = 0; i < feature_count; ++i) {
    if (compared(static_cast<Feature>(i)) &&
        (alarmed(state.charts.at(i).up, limits) || alarmed(state.charts.at(i).down, limits))) {
      return true;
    }
  }
  return false;
}

Judgement judge(const HealthModel& model, const HealthState& state, std::int64_t from_day) {
  Judgement j;
  j.power_alarm = alarmed(state.charts[0].up, chart_design(model.options, *state.baseline));
  j.feature_alarm = any_feature_alarm(model.options, state);
  j.machine_seen = sees_the_machine(*state.baseline);
  j.days = last_days(state, from_day);
  j.shift = shift_of(*state.baseline, j.days);
  const Inputs inputs = mean_of(state.recent_inputs);
  j.diagnosis = diagnose(model.machine, *state.baseline, {.shift = j.shift, .inputs = inputs},
                         model.options.clear_margin);
  const auto& causes = j.diagnosis.causes;
  if (!causes.empty() && j.diagnosis.explained) {
    const bool power_moved =
        j.shift[0] && std::abs(j.shift[0]->value) >= model.options.smallest_drift;
    j.sensor_leads = sensor_leads(j.diagnosis);
    j.sensor_called = j.sensor_leads && large_enough(causes[0], inputs, power_moved);
    j.sensor_possible = std::any_of(causes.begin(), causes.end(), [&](const RankedCause& c) {
      return c.cause == Cause::sensor &&
             c.probability * model.options.clear_margin >= causes[0].probability;
    });
  }
  return j;
}

}  // namespace lostwork
