#include "sensors/demo_plant/instrument.h"

#include <string>
#include <utility>

namespace lostwork {
namespace {

const MachineTruth& ch(const Truth& t) {
  return t[PlantMachine::chiller];
}
const MachineTruth& hp(const Truth& t) {
  return t[PlantMachine::heat_pump];
}

double volume_flow_m3s(double flow_kgs, double T_K) {
  return flow_kgs / plant_water().rho_kgm3(T_K);
}

double mode_of(const MachineTruth& machine) {
  // As in Mode: 0 off, 1 starting, 2 running.
  if (!machine.running) {
    return 0.0;
  }
  return machine.starting ? 1.0 : 2.0;
}

// Where a value stands in a device, and how.
FromRegister at(std::string_view device, Table table, std::uint16_t address, RawType type) {
  FromRegister from;
  from.device = device;
  from.at.table = table;
  from.at.address = address;
  from.at.type = type;
  return from;
}

FromRegister scaled(FromRegister from, double scale) {
  from.at.scale = scale;
  if (from.at.type == RawType::s16) {
    from.at.sentinels = {0x8000U};
  } else if (from.at.type == RawType::u16) {
    from.at.sentinels = {0xffffU};
  }
  return from;
}

FromRegister ordered(FromRegister from, ByteOrder order) {
  from.at.order = order;
  return from;
}

struct Noise {
  double sd;
  bool of_reading = false;
};

Instrument made(PointSpec point, const Noise& noise, double (*truth_SI)(const Truth&)) {
  return {.point = std::move(point),
          .noise = noise.sd,
          .noise_of_reading = noise.of_reading,
          .pair = std::nullopt,
          .truth_SI = truth_SI};
}

PointSpec point(std::string id, PlantMachine machine, Role role, Unit unit) {
  PointSpec p;
  p.id = std::move(id);
  p.machine = lostwork::id(machine);
  p.role = role;
  p.unit = unit;
  return p;
}

PointSpec with(PointSpec p, const Accuracy& accuracy, const PointRange& range, FromRegister from) {
  p.accuracies = {accuracy};
  p.range = range;
  p.source = std::move(from);
  return p;
}

// A heat meter: two temperatures of one pair, and the flow at the inlet. Its registers, input
// table: flow u32 l/h CDAB, in and out s16 0.01 degC, energy u32 kWh CDAB, heat f32 kW CDAB.
struct HeatMeter {
  std::string prefix;  // "ch1_cold"
  PlantMachine machine;
  Role in_role;
  Role out_role;
  Role flow;
  std::uint16_t address;
  std::uint64_t number;
  double (*in_T_K)(const Truth&);
  double (*out_T_K)(const Truth&);
  double (*flow_m3s)(const Truth&);
};

void add_heat_meter(std::vector<Instrument>& all, const HeatMeter& meter) {
  constexpr double temperature_limit_K = 0.15;
  constexpr double pair_limit_K = 0.05;
  constexpr Noise temperature_noise{.sd = 0.012};
  constexpr PointRange water_range{.min = 0.0, .max = 110.0};
  const auto temperature = [&](const char* suffix, Role role, std::uint16_t offset,
                               double (*truth_T_K)(const Truth&)) {
    PointSpec p = with(point(meter.prefix + suffix, meter.machine, role, Unit::degC),
                       AccuracyLimit{.limit = temperature_limit_K}, water_range,
                       scaled(at("heat-meters", Table::input,
                                 static_cast<std::uint16_t>(meter.address + offset), RawType::s16),
                              0.01));
    p.pair = meter.prefix;
    all.push_back(made(std::move(p), temperature_noise, truth_T_K));
    all.back().pair = PairError{.number = meter.number, .difference_limit = pair_limit_K};
  };
  temperature("_in", meter.in_role, 2, meter.in_T_K);
  temperature("_out", meter.out_role, 3, meter.out_T_K);
  all.push_back(
      made(with(point(meter.prefix + "_flow", meter.machine, meter.flow, Unit::m3_h),
                PercentOfReading{.percent = 1.0}, {.min = 0.0, .max = 150.0},
                ordered(scaled(at("heat-meters", Table::input, meter.address, RawType::u32), 0.001),
                        ByteOrder::cdab)),
           {.sd = 0.003, .of_reading = true}, meter.flow_m3s));
}

void add_heat_meters(std::vector<Instrument>& all) {
  constexpr PlantMachine chiller = PlantMachine::chiller;
  constexpr PlantMachine heat_pump = PlantMachine::heat_pump;
  using T = const Truth&;
  add_heat_meter(all, {.prefix = "ch1_cold",
                       .machine = chiller,
                       .in_role = Role::cold_in_temperature,
                       .out_role = Role::cold_out_temperature,
                       .flow = Role::cold_flow,
                       .address = 0,
                       .number = 0,
                       .in_T_K = [](T t) { return ch(t).inlet.cold_in_T_K; },
                       .out_T_K = [](T t) { return ch(t).cold_out_T_K; },
                       .flow_m3s =
                           [](T t) {
                             return volume_flow_m3s(ch(t).inlet.cold_kgs, ch(t).inlet.cold_in_T_K);
                           }});
  add_heat_meter(
      all, {.prefix = "ch1_hot",
            .machine = chiller,
            .in_role = Role::hot_in_temperature,
            .out_role = Role::hot_out_temperature,
            .flow = Role::hot_flow,
            .address = 10,
            .number = 1,
            .in_T_K = [](T t) { return ch(t).inlet.hot_in_T_K; },
            .out_T_K = [](T t) { return ch(t).hot_out_T_K; },
            .flow_m3s =
                [](T t) { return volume_flow_m3s(ch(t).inlet.hot_kgs, ch(t).inlet.hot_in_T_K); }});
  add_heat_meter(all, {.prefix = "hp1_cold",
                       .machine = heat_pump,
                       .in_role = Role::cold_in_temperature,
                       .out_role = Role::cold_out_temperature,
                       .flow = Role::cold_flow,
                       .address = 20,
                       .number = 2,
                       .in_T_K = [](T t) { return hp(t).inlet.cold_in_T_K; },
                       .out_T_K = [](T t) { return hp(t).cold_out_T_K; },
                       .flow_m3s =
                           [](T t) {
                             return volume_flow_m3s(hp(t).inlet.cold_kgs, hp(t).inlet.cold_in_T_K);
                           }});
  add_heat_meter(
      all, {.prefix = "hp1_hot",
            .machine = heat_pump,
            .in_role = Role::hot_in_temperature,
            .out_role = Role::hot_out_temperature,
            .flow = Role::hot_flow,
            .address = 30,
            .number = 3,
            .in_T_K = [](T t) { return hp(t).inlet.hot_in_T_K; },
            .out_T_K = [](T t) { return hp(t).hot_out_T_K; },
            .flow_m3s =
                [](T t) { return volume_flow_m3s(hp(t).inlet.hot_kgs, hp(t).inlet.hot_in_T_K); }});
}

constexpr Noise panel_temperature{.sd = 0.08};
constexpr Noise panel_pressure{.sd = 0.004};
constexpr AccuracyLimit strapped_on{.limit = 0.5};
constexpr PointRange refrigerant_range{.min = -40.0, .max = 150.0};
constexpr PointRange speed_range{.min = 0.0, .max = 70.0};
constexpr double full_speed_Hz = 60.0;

// chiller-panel: input registers, 16 bits, pressures in bar gauge.
void add_chiller_panel(std::vector<Instrument>& all) {
  constexpr PlantMachine m = PlantMachine::chiller;
  using T = const Truth&;
  const auto input = [](std::uint16_t address, RawType type, double scale) {
    return scaled(at("chiller-panel", Table::input, address, type), scale);
  };
  all.push_back(made(with(point("ch1_suction_p", m, Role::suction_pressure, Unit::bar_gauge),
                          PercentOfSpan{.percent = 0.25, .low = -1.0, .high = 15.0},
                          {.min = -1.0, .max = 15.0}, input(2, RawType::s16, 0.01)),
                     panel_pressure, [](T t) { return ch(t).suction.p_Pa; }));
  all.push_back(made(with(point("ch1_suction_t", m, Role::suction_temperature, Unit::degC),
                          strapped_on, refrigerant_range, input(4, RawType::s16, 0.1)),
                     panel_temperature, [](T t) { return ch(t).suction.T_K; }));
  all.push_back(made(with(point("ch1_discharge_p", m, Role::discharge_pressure, Unit::bar_gauge),
                          PercentOfSpan{.percent = 0.25, .low = 0.0, .high = 25.0},
                          {.min = -1.0, .max = 25.0}, input(3, RawType::s16, 0.01)),
                     panel_pressure, [](T t) { return ch(t).discharge.p_Pa; }));
  all.push_back(made(with(point("ch1_discharge_t", m, Role::discharge_temperature, Unit::degC),
                          strapped_on, refrigerant_range, input(5, RawType::s16, 0.1)),
                     panel_temperature, [](T t) { return ch(t).discharge.T_K; }));
  all.push_back(made(with(point("ch1_liquid_t", m, Role::liquid_temperature, Unit::degC),
                          strapped_on, refrigerant_range, input(6, RawType::s16, 0.1)),
                     panel_temperature, [](T t) { return ch(t).liquid.T_K; }));
  all.push_back(made(with(point("ch1_speed", m, Role::speed, Unit::Hz), AccuracyLimit{.limit = 0.1},
                          speed_range, input(8, RawType::u16, 0.1)),
                     {.sd = 0.0}, [](T t) { return full_speed_Hz * ch(t).capacity; }));
  PointSpec mode = point("ch1_mode", m, Role::mode, Unit::one);
  mode.source = input(1, RawType::u16, 1.0);
  all.push_back(made(std::move(mode), {.sd = 0.0}, [](T t) { return mode_of(ch(t)); }));
}

// heatpump-panel: holding registers, 32-bit floats with the low word first, pressures absolute.
void add_heat_pump_panel(std::vector<Instrument>& all) {
  constexpr PlantMachine m = PlantMachine::heat_pump;
  using T = const Truth&;
  const auto holding = [](std::uint16_t address) {
    return ordered(at("heatpump-panel", Table::holding, address, RawType::f32), ByteOrder::cdab);
  };
  all.push_back(made(with(point("hp1_suction_p", m, Role::suction_pressure, Unit::bar_abs),
                          PercentOfSpan{.percent = 0.25, .low = 0.0, .high = 16.0},
                          {.min = 0.0, .max = 16.0}, holding(100)),
                     panel_pressure, [](T t) { return hp(t).suction.p_Pa; }));
  all.push_back(made(with(point("hp1_suction_t", m, Role::suction_temperature, Unit::degC),
                          strapped_on, refrigerant_range, holding(104)),
                     panel_temperature, [](T t) { return hp(t).suction.T_K; }));
  all.push_back(made(with(point("hp1_discharge_p", m, Role::discharge_pressure, Unit::bar_abs),
                          PercentOfSpan{.percent = 0.25, .low = 0.0, .high = 40.0},
                          {.min = 0.0, .max = 40.0}, holding(102)),
                     panel_pressure, [](T t) { return hp(t).discharge.p_Pa; }));
  all.push_back(made(with(point("hp1_discharge_t", m, Role::discharge_temperature, Unit::degC),
                          strapped_on, refrigerant_range, holding(106)),
                     panel_temperature, [](T t) { return hp(t).discharge.T_K; }));
  all.push_back(made(with(point("hp1_liquid_t", m, Role::liquid_temperature, Unit::degC),
                          strapped_on, refrigerant_range, holding(108)),
                     panel_temperature, [](T t) { return hp(t).liquid.T_K; }));
  all.push_back(made(with(point("hp1_speed", m, Role::speed, Unit::Hz), AccuracyLimit{.limit = 0.1},
                          speed_range, holding(110)),
                     {.sd = 0.0}, [](T t) { return full_speed_Hz * hp(t).capacity; }));
  PointSpec mode = point("hp1_mode", m, Role::mode, Unit::one);
  mode.source = at("heatpump-panel", Table::holding, 113, RawType::u16);
  all.push_back(made(std::move(mode), {.sd = 0.0}, [](T t) { return mode_of(hp(t)); }));
}

// The power meters (one in kW as a float, one in W as a counter-sized integer), the detector in the
// plant room and the weather station.
void add_the_rest(std::vector<Instrument>& all) {
  using T = const Truth&;
  constexpr Noise power_noise{.sd = 0.002, .of_reading = true};
  all.push_back(made(with(point("ch1_power", PlantMachine::chiller, Role::power, Unit::kW),
                          PercentOfReading{.percent = 0.5}, {.min = -5.0, .max = 200.0},
                          at("chiller-power", Table::holding, 0, RawType::f32)),
                     power_noise, [](T t) { return ch(t).power_W; }));
  all.push_back(
      made(with(point("hp1_power", PlantMachine::heat_pump, Role::power, Unit::W),
                PercentOfReading{.percent = 0.5}, {.min = -5000.0, .max = 150e3},
                ordered(at("heatpump-power", Table::holding, 40, RawType::s32), ByteOrder::abcd)),
           power_noise, [](T t) { return hp(t).power_W; }));
  all.push_back(
      made(with(point("ch1_leak", PlantMachine::chiller, Role::leak_concentration, Unit::ppm),
                AccuracyLimit{.limit = 20.0}, {.min = 0.0, .max = 10e3},
                scaled(at("gas-detector", Table::input, 0, RawType::u16), 1.0)),
           {.sd = 1.5}, [](T t) { return t.site.refrigerant_in_air; }));
  all.push_back(
      made(with(point("site_air_t", PlantMachine::chiller, Role::ambient_temperature, Unit::degC),
                AccuracyLimit{.limit = 0.5}, {.min = -40.0, .max = 60.0},
                scaled(at("weather", Table::input, 0, RawType::s16), 0.1)),
           {.sd = 0.05}, [](T t) { return t.site.air_T_K; }));
  all.push_back(
      made(with(point("site_air_rh", PlantMachine::chiller, Role::ambient_humidity, Unit::percent),
                AccuracyLimit{.limit = 3.0}, {.min = 0.0, .max = 100.0},
                scaled(at("weather", Table::input, 1, RawType::u16), 0.1)),
           {.sd = 0.3}, [](T t) { return t.site.air_humidity; }));
}

}  // namespace

std::span<const Instrument> instruments() {
  static const std::vector<Instrument> all = [] {
    std::vector<Instrument> made_once;
    add_heat_meters(made_once);
    add_chiller_panel(made_once);
    add_heat_pump_panel(made_once);
    add_the_rest(made_once);
    return made_once;
  }();
  return all;
}

}  // namespace lostwork
