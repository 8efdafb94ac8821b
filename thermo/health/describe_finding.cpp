#include "thermo/health/describe_finding.h"

#include "thermo/health/weigh_days.h"

#include <algorithm>
#include <array>
#include <chrono>
#include <cmath>
#include <utility>

namespace lostwork {
namespace {

Instant instant_of(double day) {
  return Instant{std::chrono::round<Span>(std::chrono::duration<double, std::ratio<86400>>{day})};
}

constexpr std::array<Feature, component_count> lost_features{
    Feature::lost_compressor, Feature::lost_condenser, Feature::lost_expansion,
    Feature::lost_evaporator};

// The feature that was moved most, in standard uncertainties, with its sign: it dates best.
std::pair<Feature, double> most_moved(const Shift& shift) {
  std::pair<Feature, double> best{Feature::power, 1.0};
  double most = shift[0] ? shift[0]->value / shift[0]->u : 0.0;
  for (std::size_t i = 0; i < feature_count; ++i) {
    const auto feature = static_cast<Feature>(i);
    if (shift.at(i) && compared(feature) && std::abs(shift.at(i)->value) > most * shift.at(i)->u) {
      most = std::abs(shift.at(i)->value) / shift.at(i)->u;
      best = {feature, shift.at(i)->value > 0.0 ? 1.0 : -1.0};
    }
  }
  return best;
}

}  // namespace

void describe_causes(Finding& finding, const Judgement& j) {
  finding.causes.clear();
  finding.suspect_sensors.clear();
  finding.cause_is_clear = j.diagnosis.clear;
  if (!j.diagnosis.explained) {
    return;
  }
  for (const RankedCause& cause : j.diagnosis.causes) {
    if (cause.probability < 0.02 || finding.causes.size() >= 5) {
      continue;
    }
    finding.causes.push_back(cause);
    if (cause.role) {
      finding.suspect_sensors.push_back(*cause.role);
    }
  }
}

void describe_components(Finding& finding, const Judgement& j) {
  const double power_W = expected_power_W(j.days, j.shift);
  const double extra_W = power_W * finding.size.value;
  std::array<Measured, component_count> change{};
  std::size_t there = 0;
  for (std::size_t i = 0; i < component_count; ++i) {
    const auto& moved = j.shift.at(static_cast<std::size_t>(lost_features.at(i)));
    finding.lost_change_W.at(i).reset();
    if (moved) {
      change.at(i) = {.value = moved->value * power_W, .u = moved->u * power_W};
      finding.lost_change_W.at(i) = change.at(i);
      ++there;
    }
  }
  finding.component.reset();
  if (there < component_count) {
    return;
  }
  std::array<std::size_t, component_count> order{0, 1, 2, 3};
  std::sort(order.begin(), order.end(),
            [&](std::size_t a, std::size_t b) { return change.at(a).value > change.at(b).value; });
  const Measured& first = change.at(order[0]);
  const Measured& second = change.at(order[1]);
  const double apart = first.value - second.value;
  if (apart > 2.0 * std::hypot(first.u, second.u) && first.value > 2.0 * first.u && extra_W > 0.0) {
    finding.component = static_cast<Component>(order[0]);
    const double share = first.value / extra_W;
    finding.component_share = {
        .value = share,
        .u = std::abs(share) *
             std::hypot(first.u / first.value, finding.size.u / finding.size.value)};
  }
}

void describe_cost(const HealthModel& model, const HealthState& state, Finding& finding) {
  const Cost cost = cost_since(state, day_number(finding.onset.best));
  finding.extra_energy_J = cost.energy_J;
  finding.compared_share = cost.compared_share;
  if (const auto& price = model.tariff.price_per_J) {
    finding.extra_cost =
        Measured{.value = cost.energy_J.value * *price, .u = cost.energy_J.u * *price};
  }
  if (const auto& factor = model.tariff.co2_kg_per_J) {
    finding.extra_co2_kg =
        Measured{.value = cost.energy_J.value * *factor, .u = cost.energy_J.u * *factor};
  }
}

void describe_onset(Finding& finding, const HealthState& state, const Judgement& j) {
  const auto [feature, sign] = most_moved(j.shift);
  if (const auto onset = onset_of(state, feature, sign)) {
    finding.onset = {.best = instant_of(onset->best),
                     .earliest = instant_of(onset->earliest),
                     .latest = instant_of(onset->latest)};
  }
}

}  // namespace lostwork
