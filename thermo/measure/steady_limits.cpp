#include "thermo/measure/steady_limits.h"

#include <algorithm>
#include <cmath>

namespace lostwork {
namespace {

constexpr double first_bin = 0.01;
constexpr double bin_ratio = 1.25;
// Halving the counts then lets a machine's later years count.
constexpr std::uint32_t many_windows = 4000;
// A change below this share of the value is the rounding of a unit's conversion, not a step.
constexpr double rounding = 1e-9;
// The slope of a line through one step in the middle of a window changes by 1.5 steps over it.
constexpr double slope_of_a_step = 1.5;

double scale(const SteadyLimit& limit, Role role, const SteadySignal& signal, double mean) {
  if (!limit.relative) {
    return 1.0;
  }
  return role == Role::speed ? signal.largest_SI : std::abs(mean);
}

double quietest_decile(const SteadySignal& signal) {
  const auto tenth = (signal.windows + 9) / 10;
  std::uint32_t below = 0;
  double edge = first_bin;
  for (const std::uint32_t count : signal.scatters) {
    below += count;
    edge *= bin_ratio;
    if (below >= tenth) {
      break;
    }
  }
  return edge;  // the bin's upper one
}

}  // namespace

const SteadyLimit* limit_of(const SteadyLimits& limits, Role role) {
  switch (role) {
    case Role::cold_out_temperature:
    case Role::hot_out_temperature: return &limits.leaving_K;
    case Role::cold_in_temperature:
    case Role::hot_in_temperature: return &limits.entering_K;
    case Role::suction_pressure:
    case Role::discharge_pressure: return &limits.pressure;
    case Role::discharge_temperature: return &limits.discharge_K;
    case Role::power: return &limits.power;
    case Role::cold_flow:
    case Role::hot_flow: return &limits.flow;
    case Role::speed: return &limits.speed;
    default: return nullptr;
  }
}

void see(SteadySignal& signal, double value_SI, Instant time, Span longest_gap) {
  if (signal.last_good) {
    if (time - *signal.last_good > longest_gap) {
      signal.gap_ended = time;
    }
    const double change = std::abs(value_SI - signal.last_SI);
    if (change > rounding * std::abs(value_SI) &&
        (signal.step_SI == 0.0 || change < signal.step_SI)) {
      signal.step_SI = change;
    }
  }
  signal.last_good = time;
  signal.last_SI = value_SI;
  signal.largest_SI = std::max(signal.largest_SI, std::abs(value_SI));
}

Unrest unrest(const SteadyLimits& limits, Role role, const SteadySignal& signal,
              const LineSums& sums, Span window) {
  const SteadyLimit* limit = limit_of(limits, role);
  const auto line = fit(sums);
  if (limit == nullptr || !line) {
    return {.change = 0.0, .scatter = 0.0};
  }
  const double size = scale(*limit, role, signal, line->mean);
  const bool believed = signal.windows >= limits.floor_windows;
  const double floor =
      believed ? std::min(limits.floor_factor * signal.quietest, limits.floor_most) : 0.0;
  const double own_scatter = floor * limit->scatter * size;  // floor_factor standard deviations
  const double most_scatter =
      std::max({limit->scatter * size, limits.floor_factor * signal.step_SI, own_scatter});
  // Standard error of the change by a slope over evenly spread samples: sd sqrt(12 / n).
  const double own_change = own_scatter * std::sqrt(12.0 / static_cast<double>(sums.n));
  const double most_change =
      std::max({limit->change * size, slope_of_a_step * signal.step_SI, own_change});
  const double change = std::abs(line->slope) * std::chrono::duration<double>(window).count();
  return {.change = change / most_change, .scatter = line->scatter / most_scatter};
}

void learn(const SteadyLimits& limits, Role role, SteadySignal& signal, const LineSums& sums) {
  const SteadyLimit* limit = limit_of(limits, role);
  const auto line = fit(sums);
  if (limit == nullptr || !line) {
    return;
  }
  const double most = limit->scatter * scale(*limit, role, signal, line->mean);
  if (!(most > 0.0)) {
    return;
  }
  if (signal.windows >= many_windows) {
    signal.windows = 0;
    for (std::uint32_t& count : signal.scatters) {
      count /= 2;
      signal.windows += count;
    }
  }
  std::size_t bin = 0;
  double edge = first_bin * bin_ratio;
  while (bin + 1 < SteadySignal::bins && line->scatter / most > edge) {
    edge *= bin_ratio;
    ++bin;
  }
  ++signal.scatters.at(bin);
  ++signal.windows;
  signal.quietest = quietest_decile(signal);
}

}  // namespace lostwork
