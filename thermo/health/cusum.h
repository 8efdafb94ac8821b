// Cumulative-sum charts, and the limits that keep a false-alarm budget.
//
// Pure; random numbers come from a fixed seed, so that a limit is a function of its arguments.
// Source: Page 1954; Montgomery, Introduction to Statistical Quality Control (run lengths: the
// tests hold the simulator to his tables). Autocorrelated residuals: simulated, not tabulated.
#pragma once

#include <cstdint>

namespace lostwork {

struct CusumDesign {
  double reference = 0.5;  // k, in standard deviations
  double limit = 5.0;      // h
};

// One side of a chart: for rises of z; feed -z for falls.
struct Cusum {
  double sum = 0.0;
  std::uint32_t rising = 0;  // samples since the sum was 0
};
[[nodiscard]] Cusum after(const Cusum& chart, double z, const CusumDesign& design);
[[nodiscard]] bool alarmed(const Cusum& chart, const CusumDesign& design);

enum class Sides : std::uint8_t { one, two };

// What the charted figures are like: normal, mean `shift`, variance 1, lag-one autocorrelation.
struct ChartNoise {
  double shift = 0.0;
  double autocorrelation = 0.0;  // -0.9..0.9
};

struct RunLength {
  double mean = 0.0;
  double u = 0.0;  // standard uncertainty of the mean
};

struct Simulation {
  std::uint64_t seed = 20240229;
  std::uint32_t samples = 1000000;  // in all
};

// Mean number of samples until the alarm, the one that alarms included; each run begins at 0 with a
// figure drawn from the noise's own distribution.
[[nodiscard]] RunLength run_length(const CusumDesign& design, Sides sides, const ChartNoise& noise,
                                   const Simulation& simulation = {});

// The smallest limit, to 0.05, whose one-sided mean run length without a shift is at least
// `samples` (1..100000).
[[nodiscard]] double limit_for(double reference, double samples, double autocorrelation);

}  // namespace lostwork
