#include "sensors/demo_plant/site.h"

#include "sensors/demo_plant/noise.h"
#include "sensors/unit.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <numbers>
#include <optional>

namespace lostwork {
namespace {

using Hours = std::chrono::duration<double, std::chrono::hours::period>;
using std::chrono::hours;
using std::chrono::minutes;

// Streams of randomness of the site; those of the sensors begin at 1000 (instrument.cpp).
enum Stream : std::uint64_t {
  weather_of_days = 1,
  weather_of_hours,
  humidity_of_hours,
  chilled_day,
  chilled_hours,
  hot_day,
  hot_hours,
  chilled_flow,
  condenser_flow,
  source_flow,
  hot_flow
};

double celsius(double value) {
  return to_SI(Unit::degC, value, 0.0);
}

double gone(Seconds dt, Seconds lag) {
  return -std::expm1(-dt / lag);
}

struct DayTime {
  std::int64_t day;
  double hour;
  bool saturday;
  bool sunday;
};

DayTime day_time(Instant time) {
  const auto day = std::chrono::floor<std::chrono::days>(time);
  const std::chrono::weekday weekday{day};
  return {.day = day.time_since_epoch().count(),
          .hour = Hours{time - day}.count(),
          .saturday = weekday == std::chrono::Saturday,
          .sunday = weekday == std::chrono::Sunday};
}

// A shift plan: a level from each hour on, reached within half an hour.
struct Level {
  double from_hour;
  double level;
};

template <std::size_t n>
double planned(const std::array<Level, n>& plan, double hour) {
  constexpr double ramp_hours = 0.5;
  double level = plan.back().level;
  for (const Level& next : plan) {
    const double part = std::clamp((hour - next.from_hour) / ramp_hours, 0.0, 1.0);
    level += part * (next.level - level);
  }
  return level;
}

// Shares of the largest process load.
constexpr std::array<Level, 6> chilled_weekday{
    {{0.0, 0.42}, {4.5, 0.95}, {9.0, 0.72}, {13.0, 1.0}, {17.5, 0.6}, {21.5, 0.42}}
};
constexpr std::array<Level, 4> chilled_saturday{
    {{0.0, 0.42}, {5.0, 0.75}, {12.0, 0.55}, {16.0, 0.4}}
};
constexpr std::array<Level, 3> chilled_sunday{
    {{0.0, 0.40}, {7.0, 0.46}, {14.0, 0.32}}
};
constexpr std::array<Level, 6> hot_weekday{
    {{0.0, 0.38}, {5.0, 0.85}, {10.0, 0.7}, {14.0, 1.0}, {19.0, 0.75}, {22.5, 0.38}}
};
constexpr std::array<Level, 4> hot_weekend{
    {{0.0, 0.36}, {6.0, 0.7}, {13.0, 0.5}, {18.0, 0.36}}
};

constexpr double tank_kg = 9000.0;
constexpr double warm_tank_kg = 7000.0;
constexpr double cool_tank_kg = 4000.0;
constexpr double hot_tank_kg = 5000.0;
constexpr double mean_cp_JkgK = 4187.0;  // of the tanks; machines and meters use the real one
constexpr double chilled_pipe_WK = 120.0;
constexpr double hot_pipe_WK = 35.0;
constexpr double most_cooling = 0.66;  // effectiveness of the dry cooler with all fans on

double cooler_share(double warm_T_K, double air_T_K) {
  // The cooler's control follows the weather, but never below what the machines may be given.
  const double wanted_T_K = std::max(celsius(17.0), air_T_K + 7.0);
  const double reach_K = warm_T_K - air_T_K;
  return reach_K <= 0.1 ? 0.0 : std::clamp((warm_T_K - wanted_T_K) / reach_K, 0.0, most_cooling);
}

double flow_kgs(const NoiseStream& noise, Instant time, double rated_kgs) {
  return rated_kgs * (1.0 + 0.003 * wander(noise, time, minutes{40}));
}

}  // namespace

double air_T_K(std::uint64_t seed, Instant time) {
  const DayTime at = day_time(time);
  constexpr double year_days = 365.2425;
  constexpr double coldest_day = 20.0;  // 20 January
  // 1970-01-01 is day 0 of time.
  const double season =
      -std::cos(2.0 * std::numbers::pi *
                (static_cast<double>(at.day) + at.hour / 24.0 - coldest_day) / year_days);
  const double swing_K = 3.8 + 1.4 * season;  // clear summer days swing more
  const double of_day = -std::cos(2.0 * std::numbers::pi * (at.hour - 3.5) / 24.0);
  return celsius(10.5) + 6.5 * season + swing_K * of_day +
         2.8 * wander({seed, weather_of_days}, time, hours{54}) +
         0.5 * wander({seed, weather_of_hours}, time, hours{3});
}

double air_humidity(std::uint64_t seed, Instant time) {
  const double of_day = std::cos(2.0 * std::numbers::pi * (day_time(time).hour - 4.0) / 24.0);
  return std::clamp(
      0.76 + 0.12 * of_day + 0.07 * wander({seed, humidity_of_hours}, time, hours{18}), 0.25, 1.0);
}

double chilled_load_W(std::uint64_t seed, Instant time, double air_T_K) {
  constexpr double largest_W = 235e3;
  const DayTime at = day_time(time);
  double share = planned(chilled_weekday, at.hour);
  if (at.saturday || at.sunday) {
    share = at.sunday ? planned(chilled_sunday, at.hour) : planned(chilled_saturday, at.hour);
  }
  const double by_day = 1.0 + 0.06 * normal({seed, chilled_day}, at.day);
  const double by_air = 1.0 + 0.010 * (air_T_K - celsius(10.5));
  const double by_hour = 1.0 + 0.03 * wander({seed, chilled_hours}, time, minutes{95});
  return std::max(0.0, largest_W * share * by_day * by_air * by_hour);
}

double hot_load_W(std::uint64_t seed, Instant time, double air_T_K) {
  constexpr double largest_W = 140e3;
  const DayTime at = day_time(time);
  const double share =
      at.saturday || at.sunday ? planned(hot_weekend, at.hour) : planned(hot_weekday, at.hour);
  const double by_day = 1.0 + 0.05 * normal({seed, hot_day}, at.day);
  const double by_air = 1.0 - 0.006 * (air_T_K - celsius(10.5));
  const double by_hour = 1.0 + 0.03 * wander({seed, hot_hours}, time, minutes{110});
  return std::max(0.0, largest_W * share * by_day * by_air * by_hour);
}

MachineInlet Site::chiller_inlet(Instant time, double flow_loss) const {
  return {.cold_in_T_K = truth_.chilled_tank_T_K,
          .cold_kgs = flow_kgs({seed_, chilled_flow}, time, 13.6),
          .hot_in_T_K = truth_.cool_tank_T_K,
          .hot_kgs = flow_kgs({seed_, condenser_flow}, time, 16.8) * (1.0 - flow_loss),
          .room_T_K = truth_.room_T_K};
}

MachineInlet Site::heat_pump_inlet(Instant time, double flow_loss) const {
  return {.cold_in_T_K = truth_.warm_tank_T_K,
          .cold_kgs = flow_kgs({seed_, source_flow}, time, 6.0),
          .hot_in_T_K = truth_.hot_tank_T_K,
          .hot_kgs = flow_kgs({seed_, hot_flow}, time, 3.8) * (1.0 - flow_loss),
          .room_T_K = truth_.room_T_K};
}

double Site::heat_pump_limit() const {
  return std::clamp((truth_.warm_tank_T_K - celsius(10.0)) / 4.0, 0.0, 1.0);
}

void Site::set_weather(Instant time) {
  truth_.air_T_K = lostwork::air_T_K(seed_, time);
  truth_.air_humidity = lostwork::air_humidity(seed_, time);
  truth_.room_T_K = celsius(20.0) + 0.35 * (truth_.air_T_K - celsius(12.0));
}

void Site::advance(Instant time, Seconds dt, const MachineTruth& chiller,
                   const MachineTruth& heat_pump) {
  advance_chilled(time, dt, chiller);
  advance_condenser_loop(dt, chiller, heat_pump);
  advance_hot(time, dt, heat_pump);
}

void Site::advance_chilled(Instant time, Seconds dt, const MachineTruth& chiller) {
  const double flow_WK = chiller.inlet.cold_kgs * mean_cp_JkgK;
  // A consumer's exchanger gives less to water that comes too warm.
  const double too_warm_K = chiller.cold_out_T_K - celsius(7.0);
  truth_.chilled_load_W = lostwork::chilled_load_W(seed_, time, truth_.air_T_K) *
                          std::clamp(1.0 - 0.08 * too_warm_K, 0.2, 1.0);
  truth_.chilled_gain_W = chilled_pipe_WK * (truth_.room_T_K - truth_.chilled_tank_T_K);
  const double back_T_K =
      chiller.cold_out_T_K + (truth_.chilled_load_W + truth_.chilled_gain_W) / flow_WK;
  const Seconds turnover{tank_kg / chiller.inlet.cold_kgs};
  truth_.chilled_tank_T_K += gone(dt, turnover) * (back_T_K - truth_.chilled_tank_T_K);
}

void Site::advance_condenser_loop(Seconds dt, const MachineTruth& chiller,
                                  const MachineTruth& heat_pump) {
  const double flow_kgs = chiller.inlet.hot_kgs;
  const double share = cooler_share(truth_.warm_tank_T_K, truth_.air_T_K);
  const double cooled_T_K = truth_.warm_tank_T_K - share * (truth_.warm_tank_T_K - truth_.air_T_K);
  truth_.cooler_heat_W = flow_kgs * mean_cp_JkgK * (truth_.warm_tank_T_K - cooled_T_K);
  const double both_kgs = flow_kgs + heat_pump.inlet.cold_kgs;
  const double mixed_T_K =
      (flow_kgs * chiller.hot_out_T_K + heat_pump.inlet.cold_kgs * heat_pump.cold_out_T_K) /
      both_kgs;
  truth_.warm_tank_T_K +=
      gone(dt, Seconds{warm_tank_kg / both_kgs}) * (mixed_T_K - truth_.warm_tank_T_K);
  truth_.cool_tank_T_K +=
      gone(dt, Seconds{cool_tank_kg / flow_kgs}) * (cooled_T_K - truth_.cool_tank_T_K);
}

void Site::advance_hot(Instant time, Seconds dt, const MachineTruth& heat_pump) {
  const double flow_WK = heat_pump.inlet.hot_kgs * mean_cp_JkgK;
  // A consumer takes less from water that comes too cold.
  const double too_cold_K = celsius(64.0) - heat_pump.hot_out_T_K;
  truth_.hot_load_W = lostwork::hot_load_W(seed_, time, truth_.air_T_K) *
                      std::clamp(1.0 - 0.06 * too_cold_K, 0.0, 1.0);
  truth_.hot_pipe_loss_W = hot_pipe_WK * (truth_.hot_tank_T_K - truth_.room_T_K);
  const double back_T_K =
      heat_pump.hot_out_T_K - (truth_.hot_load_W + truth_.hot_pipe_loss_W) / flow_WK;
  const Seconds turnover{hot_tank_kg / heat_pump.inlet.hot_kgs};
  truth_.hot_tank_T_K += gone(dt, turnover) * (back_T_K - truth_.hot_tank_T_K);
}

}  // namespace lostwork
