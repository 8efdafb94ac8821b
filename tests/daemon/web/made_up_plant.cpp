#include "tests/daemon/web/made_up_plant.h"

#include <chrono>
#include <cmath>
#include <numbers>
#include <string>

namespace lostwork {
namespace {

using std::chrono::days;
using std::chrono::hours;

Measured kilowatts(double value_kW, double u_kW) {
  return {.value = value_kW * 1e3, .u = u_kW * 1e3};
}

Measured celsius(double value_degC, double u_K) {
  return {.value = value_degC + 273.15, .u = u_K};
}

// Fills what would be missing otherwise, and closes the ledger with what is unaccounted for.
void close_ledger(QuantityValues& values) {
  double rest_W = values[Quantity::power]->value;
  for (const Quantity part : {Quantity::reversible_power, Quantity::lost_compressor,
                              Quantity::lost_condenser, Quantity::lost_expansion,
                              Quantity::lost_evaporator, Quantity::lost_lines, Quantity::casing}) {
    if (values[part]) {
      rest_W -= values[part]->value;
    }
  }
  values[Quantity::unaccounted] = Measured{.value = rest_W, .u = 600.0};
}

Assessment chiller_assessment() {
  Assessment a{.time = made_up_noon(),
               .mode = Mode::running,
               .steady = true,
               .level = Level::L4,
               .values = {}};
  QuantityValues& v = a.values;
  v[Quantity::power] = kilowatts(59.4, 0.3);
  v[Quantity::cold_heat] = kilowatts(302.0, 4.1);
  v[Quantity::hot_heat] = kilowatts(360.2, 5.0);
  v[Quantity::reversible_power] = kilowatts(25.7, 0.45);
  v[Quantity::lost_compressor] = kilowatts(14.2, 0.5);
  v[Quantity::lost_condenser] = kilowatts(8.0, 0.35);
  v[Quantity::lost_expansion] = kilowatts(4.1, 0.12);
  v[Quantity::lost_evaporator] = kilowatts(6.6, 0.3);
  v[Quantity::lost_lines] = kilowatts(0.6, 0.1);
  v[Quantity::lost_total] = kilowatts(33.5, 0.7);
  v[Quantity::casing] = kilowatts(-0.03, 0.02);
  close_ledger(v);
  v[Quantity::second_law_efficiency] = Measured{.value = 25.7 / 59.4, .u = 0.008};
  v[Quantity::cop] = Measured{.value = 5.08, .u = 0.08};
  v[Quantity::cop_reversible] = Measured{.value = 11.75, .u = 0.1};
  v[Quantity::power_expected] = kilowatts(55.9, 0.6);
  v[Quantity::power_residual] = Measured{.value = 0.0626, .u = 0.011};
  v[Quantity::evaporating] = celsius(4.8, 0.2);
  v[Quantity::condensing] = celsius(38.1, 0.2);
  v[Quantity::superheat] = Measured{.value = 4.9, .u = 0.3};
  v[Quantity::subcooling] = Measured{.value = 3.8, .u = 0.3};
  v[Quantity::lift] = Measured{.value = 23.1, .u = 0.12};
  v[Quantity::isentropic_efficiency] = Measured{.value = 0.71, .u = 0.02};
  v[Quantity::energy_residual] = kilowatts(1.2, 6.5);
  return a;
}

PointView temperature_point(std::string id, Role role, double value_degC) {
  return {
      .id = std::move(id),
      .name = {                     },
      .role = role,
      .circuit = 1,
      .unit = "degC",
      .per_SI = 1.0,
      .offset = -273.15,
      .reading = { .value_SI = value_degC + 273.15,.u_SI = 0.09,
               .quality = Quality::good,
               .time = made_up_noon()}
  };
}

PointView power_point(std::string id, double value_kW) {
  return {
      .id = std::move(id),
      .name = "main meter",
      .role = Role::power,
      .circuit = 1,
      .unit = "kW",
      .per_SI = 1e-3,
      .offset = 0.0,
      .reading = {.value_SI = value_kW * 1e3,
                  .u_SI = 300.0,
                  .quality = Quality::good,
                  .time = made_up_noon()}
  };
}

Finding fouling() {
  Finding f;
  f.id = "chiller-1.efficiency_drift.20240418";
  f.machine = "chiller-1";
  f.kind = FindingKind::efficiency_drift;
  f.state = FindingState::active;
  f.size = {.value = 0.0612, .u = 0.0075};
  f.onset = {.best = made_up_noon() - days{15},
             .earliest = made_up_noon() - days{18},
             .latest = made_up_noon() - days{13}};
  f.first_seen = made_up_noon() - days{9};
  f.confirmed = made_up_noon() - days{6};
  f.updated = made_up_noon() - hours{12};
  f.extra_energy_J = {.value = 812.0 * 3.6e6, .u = 110.0 * 3.6e6};
  f.compared_share = 0.91;
  f.extra_cost = Measured{.value = 203.0, .u = 28.0};
  f.currency = "EUR";
  f.lost_change_W.at(static_cast<std::size_t>(Component::condenser)) = kilowatts(2.0, 0.2);
  f.lost_change_W.at(static_cast<std::size_t>(Component::compressor)) = kilowatts(0.9, 0.2);
  f.component = Component::condenser;
  f.component_share = {.value = 0.56, .u = 0.05};
  f.causes = {
      { .cause = Cause::condenser_fouled,
       .role = {},
       .probability = 0.86,
       .amount_SI = {.value = 2.1, .u = 0.3}},
      {.cause = Cause::overcharge_or_gas,
       .role = {},
       .probability = 0.09,
       .amount_SI = {.value = 4.0, .u = 2.0}}
  };
  f.cause_is_clear = true;
  f.evidence = {
      {.quantity = Quantity::hot_approach,   .before_SI = 1.9,   .after_SI = 4.0, .u_SI = 0.25},
      {  .quantity = Quantity::condensing, .before_SI = 309.2, .after_SI = 311.3,  .u_SI = 0.3}
  };
  f.baseline_id = "chiller-1.20240201";
  return f;
}

std::vector<SafetyRule> rules() {
  return {
      {       .kind = AlarmKind::high_pressure,
       .configured = true,
       .has_point = true,
       .setting = "18.00 bar (absolute)",
       .document = "rating plate, 2021",
       .jurisdiction = "EN 378",
       .text = "Watches how close the discharge pressure comes to the documented limit."},
      {.kind = AlarmKind::refrigerant_detector,
       .configured = false,
       .has_point = false,
       .setting = {},
       .document = {},
       .jurisdiction = {},
       .text = "Not configured: no set point of the refrigerant detector was entered."  }
  };
}

MachineView chiller() {
  MachineView m;
  m.id = "chiller-1";
  m.name = "Chiller 1";
  m.duty = Duty::cooling;
  m.refrigerant = "R134a";
  m.rated_power_W = 95e3;
  m.casing_surroundings_known = true;
  m.last_read = made_up_noon();
  m.latest = chiller_assessment();
  m.learning = {.learned = true, .text = "learned"};
  m.findings = {fouling()};
  m.points = {temperature_point("ch1_cold_in", Role::cold_in_temperature, 12.1),
              temperature_point("ch1_cold_out", Role::cold_out_temperature, 7.0),
              temperature_point("ch1_hot_in", Role::hot_in_temperature, 29.9),
              temperature_point("ch1_hot_out", Role::hot_out_temperature, 35.1),
              power_point("ch1_power", 59.4)};
  m.safety_rules = rules();
  m.run_time = hours{2412};
  m.starts = 188;
  return m;
}

MachineView heat_pump() {
  MachineView m;
  m.id = "heat-pump-1";
  m.name = "Heat pump <1> & \"co\"";  // as an owner may well call it
  m.duty = Duty::heating;
  m.refrigerant = "R134a";
  m.rated_power_W = 60e3;
  m.casing_surroundings_known = true;
  m.last_read = made_up_noon();
  m.latest = {.time = made_up_noon(),
              .mode = Mode::running,
              .steady = false,
              .level = Level::L1,
              .values = {}};
  QuantityValues& v = m.latest.values;
  v[Quantity::power] = kilowatts(40.0, 0.4);
  v[Quantity::reversible_power] = kilowatts(18.0, 0.5);
  v[Quantity::lost_total] = kilowatts(21.5, 0.6);
  v[Quantity::casing] = kilowatts(0.5, 0.3);
  v[Quantity::unaccounted] = kilowatts(0.0, 0.5);
  v[Quantity::second_law_efficiency] = Measured{.value = 0.45, .u = 0.012};
  for (const Quantity q : {Quantity::lost_compressor, Quantity::lost_condenser,
                           Quantity::lost_expansion, Quantity::lost_evaporator}) {
    v[q] = Refusal{
        {.code = ReasonCode::no_sensor, .blame = "suction.pressure"}
    };
  }
  m.learning = {.learned = true, .text = {}};
  m.points = {power_point("hp1_power", 40.0)};
  m.safety_rules = rules();
  return m;
}

}  // namespace

Instant made_up_noon() {
  using namespace std::chrono_literals;
  return Instant{std::chrono::sys_days{2024y / std::chrono::May / 3}} + 12h;
}

PlantView made_up_plant() {
  PlantView view;
  view.site = "Tern Quay Dairy";
  view.timezone = "Europe/London";
  view.version = "0.1.0";
  view.demonstration = true;
  view.time = made_up_noon();
  view.revision = 1;
  view.machines = {chiller(), heat_pump()};
  view.alarms = {
      {.machine = "chiller-1",
       .alarm = {.id = "chiller-1.drift",
       .kind = AlarmKind::drift,
       .priority = AlarmPriority::cost,
       .state = AlarmState::active_unacknowledged,
       .since = made_up_noon() - days{6},
       .returned = {},
       .acknowledged = {},
       .chattering = false,
       .text = "Chiller 1 needs 6.1 % more power than it should.",
       .evidence = {{.name = "power_residual_percent",
       .value = 6.1,
       .u = 0.75,
       .limit = 2.0,
       .document = {}}}}}
  };
  return view;
}

std::vector<Bucket> made_up_trend(const TrendRequest& request) {
  std::vector<Bucket> buckets;
  const Span width = (request.to - request.from) / static_cast<Span::rep>(request.max_points);
  for (std::size_t i = 0; i < request.max_points; ++i) {
    const double phase = static_cast<double>(i) / static_cast<double>(request.max_points);
    const Instant begin = request.from + width * static_cast<Span::rep>(i);
    Bucket bucket{.begin = begin, .end = begin + width, .mean = {}};
    const bool residual = request.quantity == Quantity::power_residual;
    if (phase > 0.45 && phase < 0.55) {
      bucket.mean = Refusal{
          {.code = ReasonCode::machine_off, .blame = {}}
      };
    } else if (residual && phase > 0.7 && phase < 0.8) {
      bucket.mean = Refusal{
          {.code = ReasonCode::outside_baseline, .blame = {}}
      };
    } else if (residual) {
      bucket.mean = Measured{.value = 0.12, .u = 0.0112};
      bucket.min_SI = 0.1;
      bucket.max_SI = 0.14;
      bucket.count = 6;
      bucket.covered = width;
    } else {
      const double wave = 1.0 + 0.08 * std::sin(2.0 * std::numbers::pi * phase);
      const bool ratio = request.quantity == Quantity::second_law_efficiency;
      const double base = ratio ? 0.43 : 56e3;
      bucket.mean = Measured{.value = base * wave, .u = base * 0.012};
      bucket.min_SI = base * wave * 0.97;
      bucket.max_SI = base * wave * 1.03;
      bucket.count = 6;
      bucket.covered = width;
    }
    buckets.push_back(bucket);
  }
  return buckets;
}

}  // namespace lostwork
