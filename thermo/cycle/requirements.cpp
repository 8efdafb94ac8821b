#include "thermo/cycle/requirements.h"

#include "thermo/cycle/inputs.h"
#include "thermo/cycle/ledger.h"
#include "thermo/cycle/typical_point.h"

#include <algorithm>
#include <array>
#include <initializer_list>
#include <limits>
#include <numbers>
#include <span>
#include <string>
#include <utility>

namespace lostwork {
namespace {

using enum Role;

// Sensors that a careful buyer gets: common practice, no source. Limits, rectangular (GUM 4.3.7).
constexpr double pair_difference_K = 0.05;
constexpr double stream_K = 0.1;
constexpr double refrigerant_K = 0.3;
constexpr double pressure_Pa = 5e3;
constexpr double flow_share = 0.01;
constexpr double power_share = 0.005;

struct Candidate {
  std::array<Role, 2> roles;
  std::size_t count;

  [[nodiscard]] std::span<const Role> all() const { return std::span{roles}.first(count); }
};
constexpr std::array candidates{
    Candidate{{cold_in_temperature, cold_out_temperature}, 2},
    Candidate{  {hot_in_temperature, hot_out_temperature}, 2},
    Candidate{                                {cold_flow}, 1},
    Candidate{                                 {hot_flow}, 1},
    Candidate{                                    {power}, 1},
    Candidate{                         {suction_pressure}, 1},
    Candidate{                       {discharge_pressure}, 1},
    Candidate{                      {suction_temperature}, 1},
    Candidate{                    {discharge_temperature}, 1},
    Candidate{                       {liquid_temperature}, 1},
};

std::size_t slot(Role role) {
  return static_cast<std::size_t>(role);
}

double limit_SI(Role role, double value_SI) {
  switch (dimension(role)) {
    case Dimension::pressure: return pressure_Pa;
    case Dimension::flow: return flow_share * value_SI;
    case Dimension::power: return power_share * value_SI;
    default: return role < suction_pressure ? stream_K : refrigerant_K;
  }
}

// A machine with its readings at the typical point.
struct Equipped {
  MachineModel model;
  Scan scan;
};

Scan scan_at(const MachineModel& model, const TypicalValues& values,
             const PointUncertainty& uncertainty) {
  Scan scan;
  for (std::size_t i = 0; i < model.points.size(); ++i) {
    const std::size_t input = slot(model.points[i].role);
    Reading reading;
    if (input < measured_inputs) {
      reading.value_SI = values.at(input);
      reading.u_SI = uncertainty(i, reading.value_SI);
      reading.quality = Quality::good;
    }
    scan.readings.push_back(reading);
  }
  return scan;
}

std::optional<Measured> efficiency(const Equipped& machine) {
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  const Result<Measured>& found = a.values[Quantity::second_law_efficiency];
  return found ? std::optional{*found} : std::nullopt;
}

// Puts the sensor in, or in the place of the one that is there.
void install(Equipped& machine, Role role, double value_SI, bool in_pair) {
  auto index = machine.model.index_of(role);
  if (!index) {
    index = machine.model.points.size();
    machine.model.points.push_back(
        {.id = std::string{name(role)}, .role = role, .pair = std::nullopt});
    machine.scan.readings.emplace_back();
  }
  ModelPoint& point = machine.model.points[*index];
  // No pair of the plant file has this number.
  point.pair = in_pair ? std::optional{std::numeric_limits<std::size_t>::max()} : std::nullopt;
  // u^2 of the difference is 2 u^2 (1 - shared).
  const double ratio = pair_difference_K / stream_K;
  point.shared_variance = in_pair ? 1.0 - 0.5 * ratio * ratio : 0.0;
  machine.scan.readings[*index] = {.value_SI = value_SI,
                                   .u_SI = limit_SI(role, value_SI) / std::numbers::sqrt3,
                                   .quality = Quality::good,
                                   .time = {}};
}

std::optional<SensorWorth> worth_of(const Candidate& candidate, const Equipped& machine,
                                    const TypicalValues& values,
                                    const std::optional<Measured>& before) {
  Equipped changed = machine;
  SensorWorth worth{
      .change = SensorChange::better,
      .roles = {candidate.all().begin(), candidate.all().end()},
      .limit_SI = 0.0,
      .before = before,
      .after = {                       }
  };
  for (const Role role : candidate.all()) {
    if (!machine.model.index_of(role)) {
      worth.change = SensorChange::added;
    }
    install(changed, role, values.at(slot(role)), candidate.count == 2);
    worth.limit_SI = limit_SI(role, values.at(slot(role)));
  }
  if (candidate.count == 2) {
    worth.limit_SI = pair_difference_K;
  }
  const auto after = efficiency(changed);
  constexpr double nothing = 1e-3;  // of the uncertainty: not worth a line
  if (!after || (before && !(after->u < (1.0 - nothing) * before->u))) {
    return std::nullopt;
  }
  worth.after = *after;
  return worth;
}

std::vector<SensorWorth> sensors_worth_having(const Equipped& machine,
                                              const TypicalValues& values) {
  const auto before = efficiency(machine);
  std::vector<SensorWorth> sensors;
  for (const Candidate& candidate : candidates) {
    if (auto worth = worth_of(candidate, machine, values, before)) {
      sensors.push_back(std::move(*worth));
    }
  }
  std::stable_sort(sensors.begin(), sensors.end(), [](const auto& a, const auto& b) {
    return a.after.u / a.after.value < b.after.u / b.after.value;
  });
  return sensors;
}

// What each level adds; the flow of the product comes first.
std::vector<Role> needs(Level level, Duty duty) {
  std::vector<Role> roles{cold_in_temperature, cold_out_temperature, hot_in_temperature,
                          hot_out_temperature};
  const auto add = [&roles](std::initializer_list<Role> more) { roles.insert(roles.end(), more); };
  switch (level) {
    case Level::L1: add({power, duty == Duty::cooling ? cold_flow : hot_flow}); break;
    case Level::L2: add({power, cold_flow, hot_flow}); break;
    case Level::L3: add({suction_pressure, discharge_pressure}); break;
    case Level::L4:
      add({power, suction_pressure, discharge_pressure, suction_temperature, discharge_temperature,
           liquid_temperature});
      break;
    default: break;
  }
  return roles;
}

std::optional<LevelGap> next_level(const MachineModel& model, Level level) {
  if (level >= Level::L4) {
    return std::nullopt;
  }
  LevelGap gap{.level = static_cast<Level>(static_cast<int>(level) + 1), .missing = {}};
  for (const Role role : needs(gap.level, model.duty)) {
    if (!model.index_of(role)) {
      gap.missing.push_back(role);
    }
  }
  return gap;
}

void sort_quantities(Requirements& answer, const Assessment& assessment) {
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const auto quantity = static_cast<Quantity>(i);
    const bool against_baseline =
        quantity == Quantity::power_expected || quantity == Quantity::power_residual;
    const Result<Measured>& found = assessment.values[against_baseline ? Quantity::cop : quantity];
    if (found) {
      answer.available.push_back(quantity);
    } else {
      answer.missing.push_back({.quantity = quantity, .reason = found.error()});
    }
  }
}

}  // namespace

Result<Scan> typical_scan(const MachineModel& model, const PointUncertainty& uncertainty) {
  return typical_values(model).map(
      [&](const TypicalValues& values) { return scan_at(model, values, uncertainty); });
}

Result<Requirements> requirements(const MachineModel& model, const PointUncertainty& uncertainty) {
  return typical_values(model).map([&](const TypicalValues& values) {
    const Equipped machine{.model = model, .scan = scan_at(model, values, uncertainty)};
    const Assessment assessment = assess(model, machine.scan, Mode::running);
    Requirements answer;
    answer.level = assessment.level;
    sort_quantities(answer, assessment);
    answer.next = next_level(model, answer.level);
    answer.sensors = sensors_worth_having(machine, values);
    return answer;
  });
}

}  // namespace lostwork
