// What the charts, the shifts of the last fortnight and the diagnosis say together on one day.
//
// Pure, part of health.h. Needs a baseline.
#pragma once

#include "thermo/health/diagnosis.h"
#include "thermo/health/health.h"

#include <cstdint>
#include <vector>

namespace lostwork {

// Everything that one day's decision rests on. Points into the state that it was made of.
struct Judgement {
  std::vector<const DayRecord*> days;
  Shift shift;
  Diagnosis diagnosis;
  bool power_alarm = false;
  bool feature_alarm = false;
  bool machine_seen = false;     // on its refrigerant side
  bool sensor_leads = false;     // far likelier than every fault of the machine
  bool sensor_called = false;    // and off by enough to matter
  bool sensor_possible = false;  // not much less likely than the first cause
};

// Of every chart.
[[nodiscard]] CusumDesign chart_design(const HealthOptions& options, const Baseline& baseline);

[[nodiscard]] bool any_feature_alarm(const HealthOptions& options, const HealthState& state);

// Days before `from_day` are left out.
[[nodiscard]] Judgement judge(const HealthModel& model, const HealthState& state,
                              std::int64_t from_day);

}  // namespace lostwork
