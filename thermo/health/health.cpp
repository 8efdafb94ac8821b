#include "thermo/health/health.h"

#include "thermo/health/follow.h"
#include "thermo/health/laws.h"
#include "thermo/health/learning.h"
#include "thermo/health/open_finding.h"

#include <chrono>
#include <utility>

namespace lostwork {
namespace {

bool following(const HealthState& state) {
  return state.baseline && state.accepted;
}

DailyResidual daily_residual(const HealthState& state, const DayRecord& day) {
  const FeatureFit& power = (*state.baseline)[Feature::power];
  return {
      .day = beginning_of_day(day.day),
      .baseline_id = state.baseline->id,
      .residual = {.value = day[Feature::power].value_or(0.0), .u = power.day_sigma},
      .energy_J = day.energy_J,
      .windows = day.windows,
      .excluded = day.excluded,
      .chart = state.charts[0].up.sum,
      .chart_limit = state.baseline->chart_limit
  };
}

// Ends the day that is open.
void close_day(const HealthModel& model, HealthUpdate& update) {
  HealthState& state = update.next;
  const DaySums sums = *state.today;
  state.today.reset();
  if (!state.baseline) {
    learn(model, state);
    return;
  }
  if (!state.accepted) {
    return;
  }
  DayRecord day = closed(sums);
  if (sums.windows < model.options.min_day_windows) {
    day.residual = {};  // its energy counts, its residual does not
    keep_day(state, day);
  } else {
    keep_day(state, day);
    state.recent_inputs.push_back(mean_inputs(sums));
    chart_day(model.options, state, day);
    update.days_closed.push_back(daily_residual(state, day));
    auto changed = follow(model, state, beginning_of_day(sums.day + 1));
    update.changed.insert(update.changed.end(), std::make_move_iterator(changed.begin()),
                          std::make_move_iterator(changed.end()));
  }
  extend(model, state);
}

void close_days_before(const HealthModel& model, HealthUpdate& update, std::int64_t day) {
  if (update.next.today && update.next.today->day < day) {
    close_day(model, update);
  }
}

DaySums& day_of(HealthState& state, std::int64_t day) {
  if (!state.today) {
    state.today = DaySums{.day = day};
  }
  return *state.today;
}

// What cannot be is not learned from, nor what was seen beside it: it is followed alone.
void take_sample(HealthState& state, const Sample& sample, const Inputs& inputs, bool lawful) {
  const bool learned_from = lawful && !open_of(state, FindingKind::law_broken);
  if (!state.baseline && !learned_from) {
    return;
  }
  DaySums& sums = day_of(state, day_number(sample.end));
  if (!state.baseline) {
    gather(state, sample);
  } else if (inside(*state.baseline, sample.conditions)) {
    add_window(sums, *state.baseline, sample, inputs);
  } else {
    ++sums.excluded;
    if (learned_from) {
      gather_newcomer(state, sample);
    }
  }
}

}  // namespace

HealthUpdate take_window(const HealthModel& model, HealthState state, const Window& window) {
  HealthUpdate update{.next = std::move(state), .changed = {}, .days_closed = {}};
  if (update.next.last_window_end && window.end <= *update.next.last_window_end) {
    return update;
  }
  close_days_before(model, update, day_number(window.end));
  update.next.last_window_end = window.end;
  const LawCheck laws = check_laws(model.machine, window);
  if (auto finding = follow_laws(model, update.next, window.end, laws)) {
    update.changed.push_back(std::move(*finding));
  }
  const Inputs inputs = inputs_of(model.machine, window);
  if (const auto sample = sample_of(model.machine, window, inputs)) {
    take_sample(update.next, *sample, inputs, laws.broken == 0U);
  }
  return update;
}

HealthUpdate advance_time(const HealthModel& model, HealthState state, Instant now) {
  HealthUpdate update{.next = std::move(state), .changed = {}, .days_closed = {}};
  close_days_before(model, update, day_number(now));
  return update;
}

HealthState take_energy(HealthState state, Instant time, double energy_J) {
  if (following(state) && energy_J > 0.0) {
    const std::int64_t day = day_number(time);
    if (!state.today || state.today->day <= day) {
      day_of(state, day).total_energy_J += energy_J;
    }
  }
  return state;
}

Result<Expectation> expected_power(const HealthState& state, const QuantityValues& values) {
  if (!following(state)) {
    return Refusal{
        Reason{.code = ReasonCode::no_baseline, .blame = "baseline"}
    };
  }
  const auto& power = values[Quantity::power];
  if (!power) {
    return Refusal{power.error()};
  }
  const auto conditions = conditions_of(state.baseline->duty, values);
  if (!conditions) {
    return Refusal{conditions.error()};
  }
  if (!inside(*state.baseline, *conditions)) {
    return Refusal{
        Reason{.code = ReasonCode::outside_baseline,
               .blame = "load or lift",
               .value_SI = conditions->heat_W}
    };
  }
  const double should_W = *expected(*state.baseline, Feature::power, *conditions);
  if (!(should_W > 0.0)) {
    return Refusal{
        Reason{
               .code = ReasonCode::outside_baseline, .blame = "expected power", .value_SI = should_W}
    };
  }
  const double u = prediction_u(*state.baseline, Feature::power, *conditions);
  return Expectation{
      .power_W = {                     .value = should_W, .u = u * should_W},
      .half_width_W = coverage_factor(*state.baseline) * u * should_W,
      .residual = {.value = power->value / should_W - 1.0,            .u = u}
  };
}

HealthState accept_baseline(HealthState state) {
  if (state.baseline) {
    state.accepted = true;
    state.unattended = false;
  }
  return state;
}

HealthUpdate begin_learning(const HealthModel& /*model*/, HealthState state, Instant now) {
  HealthUpdate update;
  update.next.generation = state.generation + 1;
  update.next.last_window_end = state.last_window_end;
  // Laws need no baseline: what was seen of them stays.
  update.next.law_windows = std::move(state.law_windows);
  update.next.laws_said = state.laws_said;
  for (std::size_t i = 0; i < state.findings.size(); ++i) {
    Finding& finding = state.findings[i];
    if (finding.kind == FindingKind::law_broken) {
      update.next.findings.push_back(std::move(finding));
      update.next.progress.push_back(state.progress[i]);
      continue;
    }
    finding.state = FindingState::over;
    finding.ended = now;
    finding.updated = now;
    update.changed.push_back(std::move(finding));
  }
  return update;
}

std::vector<Finding> open_findings(const HealthState& state) {
  return state.findings;
}

}  // namespace lostwork
