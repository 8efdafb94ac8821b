#include "tests/thermo/health/synthetic_machine.h"

#include "thermo/fluids/state.h"

#include <chrono>
#include <cmath>
#include <numbers>
#include <stdexcept>

namespace lostwork::testing {
namespace {

constexpr double cp = 4190.0;
constexpr double cold_kgs = 14.0;
constexpr double hot_kgs = 17.0;
constexpr double evaporator_WK = 75000.0;
constexpr double condenser_WK = 80000.0;
constexpr double cold_out_T_K = 280.15;
constexpr double full_load_W = 300000.0;
constexpr double casing_share = 0.03;

double must(const std::optional<double>& value) {
  return value.value();
}

State must(const Result<State>& state) {
  if (!state) {
    throw std::runtime_error{"the synthetic machine left its fluid"};
  }
  return *state;
}

// Half of the clean resistance is on the water's side and goes with flow^-0.8.
double conductance_WK(double clean_WK, double added_share, double flow_share) {
  return clean_WK / (0.5 + 0.5 * std::pow(flow_share, -0.8) + added_share);
}

double effectiveness(double ua_WK, double c_WK) {
  return 1.0 - std::exp(-ua_WK / c_WK);
}

struct Point {
  double power_W;
  double cold_in_T_K;
  double hot_out_T_K;
  double cold_flow_kgs;
  double hot_flow_kgs;
  double evaporating_T_K;
  double condensing_T_K;
  State suction;
  State discharge;
  State liquid;
  State after_valve;
  double refrigerant_kgs;
};

Point solve(const Weather& weather, const Ills& ills) {
  const Fluid& fluid = *fluid_named("R134a");
  Point p{};
  p.cold_flow_kgs = cold_kgs * (1.0 - ills.cold_flow_missing);
  p.hot_flow_kgs = hot_kgs * (1.0 - ills.hot_flow_missing);
  const double cold_c = p.cold_flow_kgs * cp;
  const double hot_c = p.hot_flow_kgs * cp;
  const double starving = 0.3 * std::max(0.0, ills.charge_missing - 0.5);
  const double ua_e = conductance_WK(evaporator_WK, ills.evaporator_resistance + starving,
                                     1.0 - ills.cold_flow_missing);
  const double ua_c =
      conductance_WK(condenser_WK, ills.condenser_resistance, 1.0 - ills.hot_flow_missing);
  p.cold_in_T_K = cold_out_T_K + weather.load_W / cold_c;
  p.evaporating_T_K = p.cold_in_T_K - weather.load_W / (effectiveness(ua_e, cold_c) * cold_c);
  const State low = must(state(fluid, GivenTx{.T_K = p.evaporating_T_K, .quality = 1.0}));
  const double superheat_K = 5.0 + 4.0 * std::max(0.0, ills.charge_missing - 0.3);
  p.suction = must(state(fluid, GivenTp{.T_K = p.evaporating_T_K + superheat_K, .p_Pa = low.p_Pa}));
  double hot_heat_W = 1.2 * weather.load_W;
  const double load = weather.load_W / full_load_W;
  for (int i = 0; i < 12; ++i) {
    const double drive_K = hot_heat_W / (effectiveness(ua_c, hot_c) * hot_c);
    p.condensing_T_K = weather.hot_in_T_K + drive_K;
    const State bubble = must(state(fluid, GivenTx{.T_K = p.condensing_T_K, .quality = 0.0}));
    const double subcooling_K = 0.55 * drive_K * (1.0 - ills.charge_missing);
    p.liquid = must(state(fluid, GivenTp{.T_K = p.condensing_T_K - std::max(subcooling_K, 0.05),
                                         .p_Pa = bubble.p_Pa}));
    const double ratio = bubble.p_Pa / low.p_Pa;
    const double efficiency =
        (0.74 - 0.012 * std::pow(ratio - 2.6, 2) - 0.06 * std::pow(1.0 - load, 2)) *
        (1.0 - ills.wear);
    const State ideal =
        must(state(fluid, GivenPs{.p_Pa = bubble.p_Pa, .s_JkgK = p.suction.s_JkgK}));
    const double rise_Jkg = (ideal.h_Jkg - p.suction.h_Jkg) / efficiency;
    p.discharge =
        must(state(fluid, GivenPh{.p_Pa = bubble.p_Pa, .h_Jkg = p.suction.h_Jkg + rise_Jkg}));
    p.refrigerant_kgs = weather.load_W / (p.suction.h_Jkg - p.liquid.h_Jkg);
    p.power_W = p.refrigerant_kgs * rise_Jkg / (1.0 - casing_share);
    const double next_W = p.refrigerant_kgs * (p.discharge.h_Jkg - p.liquid.h_Jkg);
    const bool settled = std::abs(next_W - hot_heat_W) < 1e-4 * hot_heat_W;
    hot_heat_W = next_W;
    if (settled) {
      break;
    }
  }
  p.hot_out_T_K = weather.hot_in_T_K + hot_heat_W / hot_c;
  return p;
}

// What the instruments say: truth, bias of the day, noise of the window's mean.
Inputs read(const SyntheticOptions& options, const Weather& weather, const Point& p,
            const Ills& ills, SeededNormal& noise) {
  Inputs in;
  in[Input::power] = p.power_W;
  in[Input::cold_in] = p.cold_in_T_K;
  in[Input::cold_out] = cold_out_T_K;
  in[Input::cold_flow] = p.cold_flow_kgs;
  in[Input::hot_in] = weather.hot_in_T_K;
  in[Input::hot_out] = p.hot_out_T_K;
  in[Input::hot_flow] = p.hot_flow_kgs;
  in[Input::suction_pressure] = p.suction.p_Pa;
  in[Input::suction_temperature] = p.suction.T_K;
  in[Input::discharge_pressure] = p.discharge.p_Pa;
  in[Input::discharge_temperature] = p.discharge.T_K;
  in[Input::liquid_temperature] = p.liquid.T_K;
  for (std::size_t i = 0; i < input_count; ++i) {
    double& value = *in.values.at(i);
    const Dimension kind = dimension(role_of(static_cast<Input>(i)));
    const double random = noise();
    if (kind == Dimension::temperature) {
      value += ills.bias.at(i) + 0.03 * options.noise * random;
    } else {
      value *= 1.0 + ills.bias.at(i) + 0.002 * options.noise * random;
    }
  }
  in.cold_cp_JkgK = cp;
  in.hot_cp_JkgK = cp;
  return in;
}

void set(Window& window, Quantity quantity, double value) {
  window.values.at(static_cast<std::size_t>(quantity)) =
      WindowMean{.mean_SI = value, .u_SI = 0.0, .sd_SI = 0.0, .n_effective = 10.0};
}

double entropic_mean_K(double a, double b) {
  return std::abs(a - b) < 1e-6 ? a : (a - b) / std::log(a / b);
}

// Lost work of the four components from what the instruments say.
void set_lost(Window& window, const Inputs& in, double cold_heat_W) {
  const Fluid& fluid = *fluid_named("R134a");
  const double p_low = must(in[Input::suction_pressure]);
  const double p_high = must(in[Input::discharge_pressure]);
  const State s1 =
      must(state(fluid, GivenTp{.T_K = must(in[Input::suction_temperature]), .p_Pa = p_low}));
  const State s2 =
      must(state(fluid, GivenTp{.T_K = must(in[Input::discharge_temperature]), .p_Pa = p_high}));
  const State bubble = must(state(fluid, GivenPx{.p_Pa = p_high, .quality = 0.0}));
  const double T_liquid = must(in[Input::liquid_temperature]);
  const State s3 =
      T_liquid < bubble.T_K ? must(state(fluid, GivenTp{.T_K = T_liquid, .p_Pa = p_high})) : bubble;
  const State s4 = must(state(fluid, GivenPh{.p_Pa = p_low, .h_Jkg = s3.h_Jkg}));
  const double m = cold_heat_W / (s1.h_Jkg - s3.h_Jkg);
  const double T_hot = entropic_mean_K(must(in[Input::hot_out]), must(in[Input::hot_in]));
  const double T_cold = entropic_mean_K(must(in[Input::cold_in]), must(in[Input::cold_out]));
  const double casing_W = must(in[Input::power]) - m * (s2.h_Jkg - s1.h_Jkg);
  set(window, Quantity::lost_compressor, T_hot * m * (s2.s_JkgK - s1.s_JkgK) + casing_W);
  set(window, Quantity::lost_condenser,
      T_hot * (m * (s3.s_JkgK - s2.s_JkgK) + m * (s2.h_Jkg - s3.h_Jkg) / T_hot));
  set(window, Quantity::lost_expansion, T_hot * m * (s4.s_JkgK - s3.s_JkgK));
  set(window, Quantity::lost_evaporator,
      T_hot * (m * (s1.s_JkgK - s4.s_JkgK) - cold_heat_W / T_cold));
}

void set_refrigerant_side(Window& window, const Inputs& in, double cold_heat_W) {
  const Fluid& fluid = *fluid_named("R134a");
  const State dew_low =
      must(state(fluid, GivenPx{.p_Pa = must(in[Input::suction_pressure]), .quality = 1.0}));
  const State dew_high =
      must(state(fluid, GivenPx{.p_Pa = must(in[Input::discharge_pressure]), .quality = 1.0}));
  const State bubble =
      must(state(fluid, GivenPx{.p_Pa = must(in[Input::discharge_pressure]), .quality = 0.0}));
  set(window, Quantity::evaporating, dew_low.T_K);
  set(window, Quantity::condensing, dew_high.T_K);
  set(window, Quantity::superheat, must(in[Input::suction_temperature]) - dew_low.T_K);
  set(window, Quantity::subcooling, bubble.T_K - must(in[Input::liquid_temperature]));
  set(window, Quantity::discharge, must(in[Input::discharge_temperature]));
  set_lost(window, in, cold_heat_W);
}

// Load by hour and day, water by season and by a weather that wanders over days.
std::vector<Weather> weather_of(const SyntheticOptions& options, SeededNormal& noise) {
  std::vector<Weather> all;
  double front = noise();
  double trade = noise();
  const auto count =
      static_cast<std::size_t>(options.days * static_cast<double>(options.windows_a_day));
  const double step = 1.0 / static_cast<double>(options.windows_a_day);
  const double keep = std::exp(-step / 3.0);
  for (std::size_t i = 0; i < count; ++i) {
    const double day = static_cast<double>(i) * step;
    front = keep * front + std::sqrt(1.0 - keep * keep) * noise();
    trade = keep * trade + std::sqrt(1.0 - keep * keep) * noise();
    const double turn = 2.0 * std::numbers::pi;
    const double year = options.first_day_of_year + options.season * day;
    const double summer = -std::cos(turn * (year - 20.0) / 365.0);
    const double noon = -std::cos(turn * (day - std::floor(day)));
    const double hot_in_degC = 19.0 + 6.0 * summer + 2.0 * noon + 1.8 * front;
    const double load = 0.55 + 0.10 * summer + 0.15 * noon + 0.08 * trade + 0.03 * noise();
    all.push_back({.load_W = full_load_W * std::clamp(load, 0.25, 1.0),
                   .hot_in_T_K = 273.15 + std::max(hot_in_degC, 12.0)});
  }
  return all;
}

}  // namespace

MachineModel synthetic_model() {
  MachineModel model;
  model.id = "chiller-1";
  model.name = "Chiller 1";
  model.duty = Duty::cooling;
  model.refrigerant = fluid_named("R134a");
  model.rated_power_W = 70000.0;
  return model;
}

Instant synthetic_start() {
  return std::chrono::sys_days{std::chrono::March / 1 / 2025};
}

double true_power_W(const Weather& weather, const Ills& ills) {
  return solve(weather, ills).power_W;
}

Window synthetic_window(const SyntheticOptions& options, const Weather& weather, double day,
                        SeededNormal& noise) {
  const Ills ills = options.ills(day);
  const Inputs in = read(options, weather, solve(weather, ills), ills, noise);
  Window window;
  window.begin = synthetic_start() +
                 std::chrono::round<Span>(std::chrono::duration<double, std::ratio<86400>>{day});
  window.end = window.begin + std::chrono::minutes{10};
  window.scans = 60;
  const double cold_heat_W =
      must(in[Input::cold_flow]) * cp * (must(in[Input::cold_in]) - must(in[Input::cold_out]));
  set(window, Quantity::power, must(in[Input::power]));
  set(window, Quantity::cold_heat, cold_heat_W);
  set(window, Quantity::cold_in, must(in[Input::cold_in]));
  set(window, Quantity::cold_out, must(in[Input::cold_out]));
  set(window, Quantity::cold_flow, must(in[Input::cold_flow]));
  set(window, Quantity::hot_in, must(in[Input::hot_in]));
  set(window, Quantity::hot_out, must(in[Input::hot_out]));
  if (options.hot_meter) {
    set(window, Quantity::hot_flow, must(in[Input::hot_flow]));
    set(window, Quantity::hot_heat,
        must(in[Input::hot_flow]) * cp * (must(in[Input::hot_out]) - must(in[Input::hot_in])));
  }
  if (options.refrigerant_side) {
    set_refrigerant_side(window, in, cold_heat_W);
  }
  return window;
}

QuantityValues values_of(const Window& window) {
  QuantityValues values;
  for (std::size_t i = 0; i < quantity_count; ++i) {
    if (const auto& mean = window.values.at(i)) {
      values[static_cast<Quantity>(i)] = Measured{.value = mean->mean_SI, .u = mean->u_SI};
    }
  }
  return values;
}

std::vector<Window> synthetic_history(const SyntheticOptions& options) {
  SeededNormal noise{options.seed};
  const std::vector<Weather> weather = weather_of(options, noise);
  std::vector<Window> windows;
  windows.reserve(weather.size());
  for (std::size_t i = 0; i < weather.size(); ++i) {
    const double day = static_cast<double>(i) / static_cast<double>(options.windows_a_day);
    windows.push_back(synthetic_window(options, weather[i], day, noise));
  }
  return windows;
}

}  // namespace lostwork::testing
