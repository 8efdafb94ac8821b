#include "thermo/measure/block_sums.h"

#include <algorithm>
#include <cmath>

namespace lostwork {

void LineSums::add(double time_s, double value) {
  if (n == 0) {
    origin = value;
  }
  const double y = value - origin;
  t += time_s;
  x += y;
  tt += time_s * time_s;
  tx += time_s * y;
  xx += y * y;
  ++n;
}

void LineSums::join(const LineSums& next, double later_s) {
  if (next.n == 0) {
    return;
  }
  if (n == 0) {
    origin = next.origin;
  }
  const double a = later_s;
  const double b = next.origin - origin;
  const auto m = static_cast<double>(next.n);
  tt += next.tt + 2.0 * a * next.t + m * a * a;
  tx += next.tx + a * next.x + b * next.t + m * a * b;
  xx += next.xx + 2.0 * b * next.x + m * b * b;
  t += next.t + m * a;
  x += next.x + m * b;
  n += next.n;
}

std::optional<LineFit> fit(const LineSums& sums) {
  if (sums.n < 3) {
    return std::nullopt;
  }
  const auto n = static_cast<double>(sums.n);
  const double about_tt = sums.tt - sums.t * sums.t / n;
  if (!(about_tt > 0.0)) {
    return std::nullopt;
  }
  const double about_tx = sums.tx - sums.t * sums.x / n;
  const double about_xx = sums.xx - sums.x * sums.x / n;
  const double slope = about_tx / about_tt;
  const double rest = std::max(0.0, about_xx - slope * about_tx);  // below zero by rounding only
  return LineFit{
      .mean = sums.origin + sums.x / n, .slope = slope, .scatter = std::sqrt(rest / (n - 2.0))};
}

void ScatterSums::add(double value, double u_value) {
  if (n == 0) {
    origin = value;
  }
  const double y = value - origin;
  if (n > 0) {
    lag += y * last;
  }
  last = y;
  x += y;
  xx += y * y;
  u += u_value;
  ++n;
}

void ScatterSums::join(const ScatterSums& next) {
  if (next.n == 0) {
    return;
  }
  if (n == 0) {
    *this = next;
    return;
  }
  const double b = next.origin - origin;
  const auto m = static_cast<double>(next.n);
  lag += last * (next.first + b);
  lag += next.lag + b * (2.0 * next.x - next.first - next.last) + (m - 1.0) * b * b;
  xx += next.xx + 2.0 * b * next.x + m * b * b;
  x += next.x + m * b;
  u += next.u;
  last = next.last + b;
  n += next.n;
}

std::optional<Scatter> scatter(const ScatterSums& sums) {
  if (sums.n == 0) {
    return std::nullopt;
  }
  const auto n = static_cast<double>(sums.n);
  const double mean = sums.x / n;
  Scatter out{.mean = sums.origin + mean, .u = sums.u / n, .sd = 0.0, .n_effective = 1.0};
  const double about = sums.xx - n * mean * mean;
  if (sums.n < 2 || !(about > 0.0)) {
    return out;
  }
  out.sd = std::sqrt(about / (n - 1.0));
  const double lagged =
      sums.lag - mean * (2.0 * sums.x - sums.first - sums.last) + (n - 1.0) * mean * mean;
  const double r = std::clamp(lagged / about, 0.0, 1.0);
  out.n_effective = std::max(1.0, n * (1.0 - r) / (1.0 + r));
  return out;
}

}  // namespace lostwork
