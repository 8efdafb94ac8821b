#include "thermo/health/cusum.h"

#include "thermo/health/seeded_normal.h"

#include <algorithm>
#include <cmath>

namespace lostwork {
namespace {

// AR(1) with the variance of the figures themselves being 1.
class Noise {
 public:
  Noise(const ChartNoise& noise, std::uint64_t seed)
      : noise_{noise},
        innovation_{std::sqrt(1.0 - noise.autocorrelation * noise.autocorrelation)},
        normal_{seed} {
    begin();
  }
  void begin() { z_ = normal_(); }
  double operator()() {
    const double z = z_ + noise_.shift;
    z_ = noise_.autocorrelation * z_ + innovation_ * normal_();
    return z;
  }

 private:
  ChartNoise noise_;
  double innovation_;
  SeededNormal normal_;
  double z_ = 0.0;
};

// Samples until the alarm, at most `most`.
std::uint32_t one_run(const CusumDesign& design, Sides sides, Noise& noise, std::uint32_t most) {
  Cusum up;
  Cusum down;
  for (std::uint32_t i = 1;; ++i) {
    const double z = noise();
    up = after(up, z, design);
    if (sides == Sides::two) {
      down = after(down, -z, design);
    }
    if (alarmed(up, design) || alarmed(down, design) || i >= most) {
      return i;
    }
  }
}

// Whether runs last `wanted` samples in the mean. Stops as soon as the number of alarms tells it to
// four standard deviations (run lengths are all but exponential, so alarms are counts); 600 runs of
// the wanted length settle the rest to 4 %, that is 0.04 of a limit with reference 0.5.
bool runs_last(const CusumDesign& design, const ChartNoise& noise, double wanted) {
  Noise source{noise, 20240229};
  double sum = 0.0;
  double runs = 0.0;
  while (sum < 600.0 * wanted) {
    source.begin();
    sum += one_run(design, Sides::one, source, static_cast<std::uint32_t>(600.0 * wanted));
    runs += 1.0;
    const double due = sum / wanted;
    if (due > 16.0 && std::abs(runs - due) > 4.0 * std::sqrt(due)) {
      break;
    }
  }
  return sum >= runs * wanted;
}

}  // namespace

Cusum after(const Cusum& chart, double z, const CusumDesign& design) {
  const double sum = std::max(0.0, chart.sum + z - design.reference);
  return {.sum = sum, .rising = sum > 0.0 ? chart.rising + 1 : 0};
}

bool alarmed(const Cusum& chart, const CusumDesign& design) {
  return chart.sum > design.limit;
}

RunLength run_length(const CusumDesign& design, Sides sides, const ChartNoise& noise,
                     const Simulation& simulation) {
  Noise source{noise, simulation.seed};
  double runs = 0.0;
  double sum = 0.0;
  double squares = 0.0;
  while (sum < simulation.samples) {
    source.begin();
    const double length = one_run(design, sides, source, simulation.samples);
    runs += 1.0;
    sum += length;
    squares += length * length;
  }
  const double mean = sum / runs;
  const double variance = std::max(0.0, squares / runs - mean * mean);
  return {.mean = mean, .u = std::sqrt(variance / runs)};
}

double limit_for(double reference, double samples, double autocorrelation) {
  const double wanted = std::clamp(samples, 1.0, 1e5);
  double below = 0.0;
  double above = 60.0;
  while (above - below > 0.05) {
    const double middle = 0.5 * (below + above);
    const bool enough = runs_last({.reference = reference, .limit = middle},
                                  {.shift = 0.0, .autocorrelation = autocorrelation}, wanted);
    (enough ? above : below) = middle;
  }
  return above;
}

}  // namespace lostwork
