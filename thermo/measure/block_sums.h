// Sums over a block of samples that can be joined with the next block's: no sample is kept, nothing
// is ever subtracted, and no origin grows old.
//
// Pure. Times in seconds from the block's begin; values less `origin`, the block's first value.
#pragma once

#include <cstdint>
#include <optional>

namespace lostwork {

// For a straight line by least squares.
struct LineSums {
  double origin = 0.0;
  double t = 0.0;
  double x = 0.0;
  double tt = 0.0;
  double tx = 0.0;
  double xx = 0.0;
  std::uint32_t n = 0;

  void add(double time_s, double value);
  // `later_s`: begin of `next` after the begin of this.
  void join(const LineSums& next, double later_s);
};

struct LineFit {
  double mean;
  double slope;    // per second
  double scatter;  // standard deviation about the line, n - 2 degrees of freedom
};
// None for fewer than three samples, or all at one time.
[[nodiscard]] std::optional<LineFit> fit(const LineSums& sums);

// For mean, scatter and lag-one autocorrelation of samples in order.
struct ScatterSums {
  double origin = 0.0;
  double first = 0.0;  // less origin
  double last = 0.0;   // less origin
  double x = 0.0;
  double xx = 0.0;
  double lag = 0.0;  // sum of each sample times the one before it
  double u = 0.0;    // sum of standard uncertainties
  std::uint32_t n = 0;

  void add(double value, double u_value);
  void join(const ScatterSums& next);
};

struct Scatter {
  double mean;
  double u;            // mean of the samples' uncertainties: they share their error
  double sd;           // n - 1 degrees of freedom; 0 for a single sample
  double n_effective;  // n (1 - r) / (1 + r), r >= 0; 1..n
};
// None for no samples.
[[nodiscard]] std::optional<Scatter> scatter(const ScatterSums& sums);

template <class Archive>
void archive(Archive& a, LineSums& s) {
  a(s.origin, s.t, s.x, s.tt, s.tx, s.xx, s.n);
}
template <class Archive>
void archive(Archive& a, ScatterSums& s) {
  a(s.origin, s.first, s.last, s.x, s.xx, s.lag, s.u, s.n);
}

}  // namespace lostwork
