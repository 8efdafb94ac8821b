#include "daemon/advance.h"

#include "thermo/cycle/ledger.h"

#include <chrono>
#include <iterator>
#include <utility>

namespace lostwork {
namespace {

constexpr double J_per_kWh = 3.6e6;

ScanFate fate_of(const StepModel& model, const MachineState& state, const Scan& scan) {
  if (scan.readings.size() != model.machine.points.size()) {
    return ScanFate::wrong_shape;
  }
  if (state.last_scan && scan.time <= *state.last_scan) {
    return scan.time == *state.last_scan ? ScanFate::doubled : ScanFate::going_back;
  }
  return ScanFate::taken;
}

bool fits(const StepModel& model, const MachineState& state) {
  return state.points.size() == model.machine.points.size() &&
         state.alarms.watches.size() == state.points.size();
}

void compare_with_expected(const HealthState& health, QuantityValues& values) {
  const auto expected = expected_power(health, values);
  if (expected) {
    values[Quantity::power_expected] = expected->power_W;
    values[Quantity::power_residual] = expected->residual;
  } else {
    values[Quantity::power_expected] = Refusal{expected.error()};
    values[Quantity::power_residual] = Refusal{expected.error()};
  }
}

template <class T>
void append(std::vector<T>& to, std::vector<T>&& from) {
  to.insert(to.end(), std::make_move_iterator(from.begin()), std::make_move_iterator(from.end()));
}

void take_up(HealthUpdate&& update, MachineState& state, MachineStep& out) {
  state.health = std::move(update.next);
  append(out.findings, std::move(update.changed));
  append(out.days, std::move(update.days_closed));
}

bool is_a_new_day(const std::optional<Instant>& before, Instant now) {
  using std::chrono::days;
  return before && std::chrono::floor<days>(*before) != std::chrono::floor<days>(now);
}

// Of the time since the scan before, where none was lost in between.
double energy_used_J(const StepModel& model, const MachineState& state, Instant now,
                     const QuantityValues& values) {
  const auto& power = values[Quantity::power];
  if (!power || !state.last_scan || now - *state.last_scan > 3 * model.machine.scan_period) {
    return 0.0;
  }
  return power->value * std::chrono::duration<double>(now - *state.last_scan).count();
}

void follow_health(const StepModel& model, MachineState& state, Instant now, MachineStep& out) {
  for (const Window& window : out.windows) {
    take_up(take_window(model.health, std::move(state.health), window), state, out);
  }
  if (is_a_new_day(state.last_scan, now)) {
    take_up(advance_time(model.health, std::move(state.health), now), state, out);
  }
  state.health = take_energy(std::move(state.health), now,
                             energy_used_J(model, state, now, out.assessment.values));
}

void follow_steadiness(const StepModel& model, MachineState& state, const Scan& scan,
                       MachineStep& out) {
  SteadyStep step =
      after_scan(model.steady, model.machine, std::move(state.steady),
                 {.scan = scan, .operation = state.operation, .values = out.assessment.values});
  state.steady = std::move(step.next);
  out.assessment.steady = step.verdict.steady();
  if (step.window) {
    out.windows.push_back(*step.window);
  }
}

}  // namespace

StepModel step_model(MachineModel machine, AlarmRules rules) {
  StepModel out;
  out.health.machine = machine;
  out.health.tariff.currency = rules.tariff.currency;
  if (rules.tariff.price_per_kWh && *rules.tariff.price_per_kWh > 0.0) {
    out.health.tariff.price_per_J = *rules.tariff.price_per_kWh / J_per_kWh;
  }
  if (rules.tariff.co2_kg_per_kWh) {
    out.health.tariff.co2_kg_per_J = *rules.tariff.co2_kg_per_kWh / J_per_kWh;
  }
  out.machine = std::move(machine);
  out.alarms = std::move(rules);
  return out;
}

std::string_view name(ScanFate fate) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(ScanFate::count)> names{
      "taken", "doubled", "going_back", "wrong_shape"};
  return names.at(static_cast<std::size_t>(fate));
}

MachineStep advance(const StepModel& model, MachineState state, const Scan& scan) {
  MachineStep out;
  out.fate = fate_of(model, state, scan);
  ++state.scans.at(static_cast<std::size_t>(out.fate));
  if (out.fate != ScanFate::taken) {
    out.assessment.time = scan.time;
    out.assessment.mode = state.operation.mode;
    out.next = std::move(state);
    return out;
  }
  if (!fits(model, state)) {
    state = fitted(model, std::move(state));
  }
  state.operation = after_scan(model.operation, model.machine, state.operation, scan);
  out.assessment = assess(model.machine, scan, state.operation.mode);
  compare_with_expected(state.health, out.assessment.values);
  follow_steadiness(model, state, scan, out);
  follow_health(model, state, scan.time, out);
  AlarmUpdate alarms =
      after_scan(model.machine, model.alarms, std::move(state.alarms),
                 {.scan = scan, .assessment = out.assessment, .findings = out.findings});
  state.alarms = std::move(alarms.next);
  out.alarms = std::move(alarms.events);
  state.last_scan = scan.time;
  out.next = std::move(state);
  return out;
}

}  // namespace lostwork
