#include "tests/daemon/step_run.h"

#include "tests/thermo/cycle/test_machine.h"

#include <utility>

#include <gtest/gtest.h>

namespace lostwork::test {
namespace {

constexpr Accuracy usual{.stream_T_K = 0.05,
                         .refrigerant_T_K = 0.2,
                         .pressure_Pa = 2e3,
                         .flow_share = 0.01,
                         .power_share = 0.005};

AlarmRules rules_of(const TestMachine& machine) {
  AlarmRules rules;
  rules.limits = {
      {.kind = SafetyKind::high_pressure,
       .machine = machine.model.id,
       .limit_SI = machine.values.at(Role::discharge_pressure) / 0.9 * 1.002,
       .entered = {},
       .document = "name plate",
       .jurisdiction = "EN 378",
       .entered_by = {}}
  };
  rules.device_of_point.assign(machine.model.points.size(), "panel");
  return rules;
}

bool same(const std::optional<WindowMean>& a, const std::optional<WindowMean>& b) {
  if (!a || !b) {
    return a.has_value() == b.has_value();
  }
  return a->mean_SI == b->mean_SI && a->u_SI == b->u_SI && a->sd_SI == b->sd_SI &&
         a->n_effective == b->n_effective;
}

}  // namespace

StepRun::StepRun(std::uint64_t seed) : random_{seed} {
  TestMachine machine = make_machine({}, usual);
  perfect_ = machine.scan;
  AlarmRules rules = rules_of(machine);
  model_ = step_model(std::move(machine.model), std::move(rules));
}

Scan StepRun::next() {
  Scan scan = perfect_;
  scan.time += count_ * model_.machine.scan_period;
  const int minute = count_ / 6;
  ++count_;
  const bool off = !calm && minute % 97 >= 80;
  const bool silent = !calm && minute % 53 == 40;
  std::normal_distribution<double> noise;
  for (std::size_t i = 0; i < scan.readings.size(); ++i) {
    Reading& reading = scan.readings[i];
    reading.time = scan.time;
    reading.value_SI += 0.3 * reading.u_SI * noise(random_);
    if (off && model_.machine.points[i].role == Role::power) {
      reading.value_SI = 0.0;
    }
    const bool fails = !calm && std::uniform_int_distribution{0, 199}(random_) == 0;
    if (fails || silent) {
      reading.quality = Quality::timeout;
    }
  }
  return scan;
}

std::vector<Scan> StepRun::scans(int n) {
  std::vector<Scan> out;
  for (int i = 0; i < n; ++i) {
    out.push_back(next());
  }
  return out;
}

void play(const StepModel& model, const std::vector<Scan>& scans, Outcome& outcome) {
  for (const Scan& scan : scans) {
    MachineStep step = advance(model, std::move(outcome.state), scan);
    outcome.state = std::move(step.next);
    outcome.assessments.push_back(step.assessment);
    outcome.windows.insert(outcome.windows.end(), step.windows.begin(), step.windows.end());
    outcome.alarms.insert(outcome.alarms.end(), step.alarms.begin(), step.alarms.end());
  }
}

bool same(const Assessment& a, const Assessment& b) {
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const auto q = static_cast<Quantity>(i);
    const bool both = a.values[q].has_value() && b.values[q].has_value();
    if (a.values[q].has_value() != b.values[q].has_value() ||
        (both && *a.values[q] != *b.values[q]) ||
        (!both && a.values[q].error().code != b.values[q].error().code)) {
      return false;
    }
  }
  return a.time == b.time && a.mode == b.mode && a.steady == b.steady && a.level == b.level;
}

bool same(const Window& a, const Window& b) {
  for (std::size_t i = 0; i < quantity_count; ++i) {
    if (!same(a.values.at(i), b.values.at(i))) {
      return false;
    }
  }
  return a.begin == b.begin && a.end == b.end && a.scans == b.scans;
}

void expect_same(const Outcome& a, const Outcome& b) {
  ASSERT_EQ(a.assessments.size(), b.assessments.size());
  for (std::size_t i = 0; i < a.assessments.size(); ++i) {
    ASSERT_TRUE(same(a.assessments[i], b.assessments[i])) << "scan " << i;
  }
  ASSERT_EQ(a.windows.size(), b.windows.size());
  for (std::size_t i = 0; i < a.windows.size(); ++i) {
    EXPECT_TRUE(same(a.windows[i], b.windows[i])) << "window " << i;
  }
  EXPECT_EQ(a.alarms, b.alarms);
  EXPECT_EQ(save(a.state), save(b.state));
}

}  // namespace lostwork::test
