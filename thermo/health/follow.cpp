#include "thermo/health/follow.h"

#include "thermo/health/describe_finding.h"
#include "thermo/health/judgement.h"
#include "thermo/health/open_finding.h"
#include "thermo/health/weigh_days.h"

#include <algorithm>
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

// Ends the finding; the charts begin again, and its days are left out of later onsets.
Finding end_finding(HealthState& state, std::size_t at, Instant now, bool forget_days) {
  if (forget_days) {
    state.charts = {};
    state.history_from = day_number(now) - quiet_days;
  }
  return closed(state, at, now);
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
  const bool law_open = open_of(state, FindingKind::law_broken).has_value();
  const bool sensor_open = law_open || open_of(state, FindingKind::sensor_suspect);
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
  const bool readable = !law_open || machine_is_clear(j.diagnosis);
  if (finding.state == FindingState::watch && readable && confirmed(j, progress)) {
    finding.state = FindingState::active;
    finding.confirmed = now;
  }
  return finding;
}

}  // namespace

void chart_day(const HealthOptions& options, HealthState& state, const DayRecord& day) {
  const CusumDesign limits = chart_design(options, *state.baseline);
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
  const CusumDesign limits = chart_design(model.options, *state.baseline);
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
