// Counts how often each fault of the synthetic machine is found and named rightly, and each biased
// sensor is called a sensor: `named_causes [SEEDS]` (20). Goals E6 and E7.
#include "tests/thermo/health/played.h"

#include <algorithm>
#include <array>
#include <chrono>
#include <cstdint>
#include <cstdio>
#include <functional>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork::testing {
namespace {

constexpr double fault_day = 90.0;
constexpr double watched_days = 60.0;

struct Trial {
  std::string_view name;
  Cause cause;
  std::optional<Role> role;
  std::function<void(Ills&, double)> put;  // share 0..1 of the fault
  double growth_days;
};

struct Count {
  int found = 0;
  int first = 0;
  int second = 0;
  int wrongly_clear = 0;
  int wrong_kind = 0;
  int onset_held = 0;
  double days = 0.0;
};

double days_since_fault(Instant time) {
  return std::chrono::duration<double, std::ratio<86400>>(time - synthetic_start()).count() -
         fault_day;
}

bool is(const RankedCause& named, const Trial& trial) {
  return named.cause == trial.cause && named.role == trial.role;
}

void judge(const Trial& trial, const Played& played, Count& count) {
  const bool sensor = trial.cause == Cause::sensor;
  const FindingKind right = sensor ? FindingKind::sensor_suspect : FindingKind::efficiency_drift;
  const FindingKind wrong = sensor ? FindingKind::efficiency_drift : FindingKind::sensor_suspect;
  count.wrong_kind += played.confirmed(wrong) ? 1 : 0;
  const auto found = played.confirmed(right);
  if (!found) {
    return;
  }
  const Finding last = *played.last(right);
  ++count.found;
  count.days += days_since_fault(*found->confirmed);
  const auto& causes = last.causes;
  const bool first = !causes.empty() && is(causes[0], trial);
  count.first += first ? 1 : 0;
  count.second += first || (causes.size() > 1 && is(causes[1], trial)) ? 1 : 0;
  count.wrongly_clear += last.cause_is_clear && !first ? 1 : 0;
  count.onset_held +=
      days_since_fault(last.onset.earliest) <= 0.0 && days_since_fault(last.onset.latest) >= 0.0
          ? 1
          : 0;
}

void run(const Trial& trial, std::uint64_t seeds) {
  Count count;
  for (std::uint64_t seed = 1; seed <= seeds; ++seed) {
    SyntheticOptions options;
    options.seed = seed;
    options.days = fault_day + watched_days;
    options.ills = [&trial](double day) {
      Ills ills;
      const double since = day - fault_day;
      if (since >= 0.0) {
        trial.put(ills, trial.growth_days > 0.0 ? std::min(since / trial.growth_days, 1.0) : 1.0);
      }
      return ills;
    };
    judge(trial, played(synthetic_history(options)), count);
  }
  std::printf(
      "%-24s %s found %3d of %3d after %4.1f days; right first %3d, in two %3d, "
      "wrong and clear %d, other kind %d, onset held %3d\n",
      trial.name.data(), trial.growth_days > 0.0 ? "growing" : "sudden ", count.found,
      static_cast<int>(seeds), count.found > 0 ? count.days / count.found : 0.0, count.first,
      count.second, count.wrongly_clear, count.wrong_kind, count.onset_held);
  std::fflush(stdout);
}

Trial biased(std::string_view name, Input input, double bias) {
  return {name, Cause::sensor, role_of(input),
          [input, bias](Ills& ills, double share) {
            ills.bias.at(static_cast<std::size_t>(input)) = bias * share;
          },
          30.0};
}

Trial fault(std::string_view name, Cause cause, double Ills::*ill, double size) {
  return {name, cause, std::nullopt,
          [ill, size](Ills& ills, double share) { ills.*ill = size * share; }, 30.0};
}

Trial sudden(Trial trial) {
  trial.growth_days = 0.0;
  return trial;
}

// Sizes that cost 5 % of the power, or move the feature of the fault by three of its uncertainties.
std::vector<Trial> trials() {
  const Trial fouled =
      fault("condenser fouled", Cause::condenser_fouled, &Ills::condenser_resistance, 0.6);
  const Trial worn = fault("compressor worn", Cause::compressor_worn, &Ills::wear, 0.05);
  return {
      fouled,
      sudden(fouled),
      fault("evaporator fouled", Cause::evaporator_fouled, &Ills::evaporator_resistance, 0.5),
      sudden(fault("condenser flow low", Cause::hot_flow_low, &Ills::hot_flow_missing, 0.3)),
      fault("refrigerant lost", Cause::refrigerant_low, &Ills::charge_missing, 0.9),
      worn,
      sudden(worn),
      biased("cold out + 0.5 K", Input::cold_out, 0.5),
      biased("cold in - 0.5 K", Input::cold_in, -0.5),
      biased("hot in + 0.6 K", Input::hot_in, 0.6),
      biased("hot out - 0.6 K", Input::hot_out, -0.6),
      biased("cold flow + 6 %", Input::cold_flow, 0.06),
      biased("hot flow - 6 %", Input::hot_flow, -0.06),
      biased("power + 5 %", Input::power, 0.05),
      biased("discharge pressure + 3 %", Input::discharge_pressure, 0.03),
      biased("suction pressure - 3 %", Input::suction_pressure, -0.03),
      biased("discharge + 3 K", Input::discharge_temperature, 3.0),
      biased("liquid - 1.5 K", Input::liquid_temperature, -1.5),
  };
}

}  // namespace
}  // namespace lostwork::testing

int main(int count, char** values) {
  const std::uint64_t seeds = count > 1 ? std::stoull(values[1]) : 20;
  for (const auto& trial : lostwork::testing::trials()) {
    lostwork::testing::run(trial, seeds);
  }
}
