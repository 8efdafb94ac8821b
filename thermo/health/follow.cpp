#include "thermo/health/follow.h"

#include "thermo/health/weigh_days.h"

#include <algorithm>
#include <chrono>
#include <cmath>
#include <cstdio>
#include <string>
#include <utility>

namespace lostwork {
namespace {

constexpr std::size_t most_days = 250;
constexpr std::size_t most_inputs = 14;

// Days in a row that the diagnosis has to say "sensor" before it is active [E].
constexpr std::uint32_t sensor_days = 3;
// Days that a drift stays a watch while a sensor is as likely as the machine, or nothing places it
// [E].
constexpr std::uint32_t doubt_days = 14;
// Days in a row back at the baseline that end a finding [E].
constexpr std::uint32_t quiet_days = 5;

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

// Everything that one day's decision rests on.
struct Judgement {
  std::vector<const DayRecord*> days;
  Shift shift;
  Diagnosis diagnosis;
  bool power_alarm = false;
  bool feature_alarm = false;
  bool machine_seen = false;  // on its refrigerant side
  bool sensor_leads = false;
  bool sensor_called = false;
  bool sensor_possible = false;
};

const CusumDesign design(const HealthOptions& options, const Baseline& baseline) {
  return {.reference = options.reference_value, .limit = baseline.chart_limit};
}

std::optional<std::size_t> open_of(const HealthState& state, FindingKind kind) {
  for (std::size_t i = 0; i < state.findings.size(); ++i) {
    if (state.findings[i].kind == kind) {
      return i;
    }
  }
  return std::nullopt;
}

std::string date_text(Instant time) {
  const std::chrono::year_month_day date{std::chrono::floor<std::chrono::days>(time)};
  std::array<char, 16> text{};
  std::snprintf(text.data(), text.size(), "%04d%02u%02u", static_cast<int>(date.year()),
                static_cast<unsigned>(date.month()), static_cast<unsigned>(date.day()));
  return text.data();
}

bool any_feature_alarm(const HealthOptions& options, const HealthState& state) {
  const CusumDesign limits = design(options, *state.baseline);
  for (std::size_t i = 0; i < feature_count; ++i) {
    if (compared(static_cast<Feature>(i)) &&
        (alarmed(state.charts.at(i).up, limits) || alarmed(state.charts.at(i).down, limits))) {
      return true;
    }
  }
  return false;
}

// Where a fault of the machine shows itself besides the power (methods.md 6.3). Flows and balances
// are not among them: they tell of pumps and of sensors.
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

Inputs mean_of(const std::vector<Inputs>& all) {
  Inputs out;
  std::array<double, input_count> count{};
  for (const Inputs& inputs : all) {
    for (std::size_t i = 0; i < input_count; ++i) {
      if (const auto& value = inputs.values.at(i)) {
        count.at(i) += 1.0;
        const double before = out.values.at(i).value_or(0.0);
        out.values.at(i) = before + (*value - before) / count.at(i);
      }
    }
    out.cold_cp_JkgK += inputs.cold_cp_JkgK / static_cast<double>(all.size());
    out.hot_cp_JkgK += inputs.hot_cp_JkgK / static_cast<double>(all.size());
  }
  return out;
}

Judgement judge(const HealthModel& model, const HealthState& state, std::int64_t from_day) {
  Judgement j;
  j.power_alarm = alarmed(state.charts[0].up, design(model.options, *state.baseline));
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

Instant instant_of(double day) {
  return Instant{std::chrono::round<Span>(std::chrono::duration<double, std::ratio<86400>>{day})};
}

std::size_t opened(const HealthModel& model, HealthState& state, FindingKind kind, Instant now) {
  if (const auto at = open_of(state, kind)) {
    return *at;
  }
  const Instant day = now - Span{1};
  Finding finding;
  finding.id = model.machine.id + "." + std::string{name(kind)} + "." + date_text(day);
  finding.machine = model.machine.id;
  finding.kind = kind;
  finding.state = FindingState::watch;
  finding.first_seen = now;
  finding.currency = model.tariff.currency;
  state.findings.push_back(std::move(finding));
  state.progress.emplace_back();
  return state.findings.size() - 1;
}

void describe_causes(Finding& finding, const Judgement& j) {
  finding.causes.clear();
  finding.suspect_sensors.clear();
  finding.cause_is_clear = j.diagnosis.clear;
  if (!j.diagnosis.explained) {
    return;
  }
  for (const RankedCause& cause : j.diagnosis.causes) {
    if (cause.probability >= 0.02 && finding.causes.size() < 5) {
      finding.causes.push_back(cause);
      if (cause.role) {
        finding.suspect_sensors.push_back(*cause.role);
      }
    }
  }
}

constexpr std::array<Feature, component_count> lost_features{
    Feature::lost_compressor, Feature::lost_condenser, Feature::lost_expansion,
    Feature::lost_evaporator};

// The component whose lost work grew most, if it did so beyond doubt and beyond the next one's.
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

Finding ended(Finding finding, Instant now) {
  finding.state = FindingState::over;
  finding.ended = now;
  finding.updated = now;
  return finding;
}

// Ends the finding; the charts begin again, and its days are left out of later onsets.
Finding end_finding(HealthState& state, std::size_t at, Instant now, bool forget_days) {
  Finding over = ended(std::move(state.findings[at]), now);
  state.findings.erase(state.findings.begin() + static_cast<std::ptrdiff_t>(at));
  state.progress.erase(state.progress.begin() + static_cast<std::ptrdiff_t>(at));
  if (forget_days) {
    state.charts = {};
    state.history_from = day_number(now) - quiet_days;
  }
  return over;
}

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

void describe_onset(Finding& finding, const HealthState& state, const Judgement& j) {
  const auto [feature, sign] = most_moved(j.shift);
  if (const auto onset = onset_of(state, feature, sign)) {
    finding.onset = {.best = instant_of(onset->best),
                     .earliest = instant_of(onset->earliest),
                     .latest = instant_of(onset->latest)};
  }
}

std::optional<Finding> follow_sensor(const HealthModel& model, HealthState& state,
                                     const Judgement& j, Instant now) {
  const auto already = open_of(state, FindingKind::sensor_suspect);
  if (!already && !(j.sensor_called && (j.feature_alarm || j.power_alarm))) {
    return std::nullopt;
  }
  const std::size_t at = opened(model, state, FindingKind::sensor_suspect, now);
  FindingProgress& progress = state.progress[at];
  ++progress.days;
  progress.days_as_said = j.sensor_called ? progress.days_as_said + 1 : 0;
  progress.quiet_days = j.sensor_called ? 0 : progress.quiet_days + 1;
  if (progress.quiet_days >= quiet_days) {
    return end_finding(state, at, now, !j.diagnosis.explained);
  }
  Finding& finding = state.findings[at];
  if (!j.sensor_called) {
    return std::nullopt;
  }
  finding.updated = now;
  finding.baseline_id = state.baseline->id;
  finding.size = j.shift[0].value_or(Measured{});
  describe_onset(finding, state, j);
  describe_causes(finding, j);
  finding.evidence = evidence_of(*state.baseline, j.days, j.shift);
  if (progress.days_as_said >= sensor_days && finding.state == FindingState::watch) {
    finding.state = FindingState::active;
    finding.confirmed = now;
  }
  return finding;
}

// Confirmed by a feature, and not by one that a sensor explains as well; by the power alone where
// the refrigerant side is not seen, and where the doubt lasts: a drift that none of the sensors
// there are can place is one nevertheless.
bool confirmed(const Judgement& j, const FindingProgress& progress) {
  if (!j.power_alarm || j.sensor_leads) {
    return false;
  }
  const bool unplaced = j.machine_seen && (!j.feature_alarm || !j.diagnosis.explained);
  return !(unplaced || j.sensor_possible) || progress.days >= doubt_days;
}

bool machine_is_clear(const Diagnosis& diagnosis) {
  return diagnosis.clear && diagnosis.causes.front().cause != Cause::sensor;
}

bool back_at_baseline(const HealthOptions& options, const Judgement& j) {
  return !j.days.empty() &&
         j.days.front()->residual[0].value_or(1.0) < 0.5 * options.smallest_drift;
}

std::optional<Finding> follow_drift(const HealthModel& model, HealthState& state,
                                    const Judgement& j, Instant now) {
  const auto already = open_of(state, FindingKind::efficiency_drift);
  if (j.sensor_called) {  // not the machine
    return already ? std::optional{end_finding(state, *already, now, false)} : std::nullopt;
  }
  const bool sensor_open = open_of(state, FindingKind::sensor_suspect).has_value();
  if (!already && (!j.power_alarm || (sensor_open && !machine_is_clear(j.diagnosis)))) {
    return std::nullopt;
  }
  const auto onset = onset_of(state, Feature::power, 1.0);
  if (!onset && !already) {
    return std::nullopt;
  }
  if (!already && onset->size.value < std::max(2.0 * onset->size.u, model.options.smallest_drift)) {
    return std::nullopt;
  }
  const std::size_t at = opened(model, state, FindingKind::efficiency_drift, now);
  FindingProgress& progress = state.progress[at];
  ++progress.days;
  progress.quiet_days = back_at_baseline(model.options, j) ? progress.quiet_days + 1 : 0;
  if (progress.quiet_days >= quiet_days) {
    return end_finding(state, at, now, true);
  }
  Finding& finding = state.findings[at];
  finding.updated = now;
  finding.baseline_id = state.baseline->id;
  if (onset) {
    finding.size = onset->size;
  }
  describe_onset(finding, state, j);
  describe_causes(finding, j);
  describe_components(finding, j);
  describe_cost(model, state, finding);
  finding.evidence = evidence_of(*state.baseline, j.days, j.shift);
  if (finding.state == FindingState::watch && confirmed(j, progress)) {
    finding.state = FindingState::active;
    finding.confirmed = now;
  }
  return finding;
}

}  // namespace

void chart_day(const HealthOptions& options, HealthState& state, const DayRecord& day) {
  const CusumDesign limits = design(options, *state.baseline);
  for (std::size_t i = 0; i < feature_count; ++i) {
    if (const auto& r = day.residual.at(i)) {
      const double z = *r / day_u(*state.baseline, static_cast<Feature>(i));
      FeatureCharts& chart = state.charts.at(i);
      chart.up = after(chart.up, z, limits);
      chart.down = after(chart.down, -z, limits);
    }
  }
  while (state.recent_inputs.size() > most_inputs) {
    state.recent_inputs.erase(state.recent_inputs.begin());
  }
}

void keep_day(HealthState& state, const DayRecord& day) {
  state.days.push_back(day);
  while (state.days.size() > most_days) {
    state.days.erase(state.days.begin());
  }
}

std::vector<Finding> follow(const HealthModel& model, HealthState& state, Instant now) {
  std::vector<Finding> changed;
  const CusumDesign limits = design(model.options, *state.baseline);
  if (state.findings.empty() && !alarmed(state.charts[0].up, limits) &&
      !any_feature_alarm(model.options, state)) {
    return changed;
  }
  std::int64_t from_day = state.history_from;
  const auto drift = open_of(state, FindingKind::efficiency_drift);
  if (drift) {
    from_day = std::max(from_day, day_number(state.findings[*drift].onset.best));
  }
  const Judgement j = judge(model, state, from_day);
  if (auto finding = follow_sensor(model, state, j, now)) {
    changed.push_back(std::move(*finding));
  }
  if (auto finding = follow_drift(model, state, j, now)) {
    changed.push_back(std::move(*finding));
  }
  return changed;
}

}  // namespace lostwork
