// The law of propagation of uncertainty, first order, with correlated inputs.
//
// Source: JCGM 100:2008 (GUM), 5.1 and 5.2, F.1.2.3 for a share of the error in common.
#pragma once

#include "thermo/measure/dual.h"
#include "thermo/measured.h"

#include <array>
#include <cmath>
#include <cstddef>
#include <vector>

namespace lostwork {

// The standard uncertainties of `n` inputs and their correlations.
template <std::size_t n>
class InputErrors {
 public:
  void set_u(std::size_t input, double u) { u_.at(input) = u; }
  [[nodiscard]] double u(std::size_t input) const { return u_.at(input); }
  // r = -1..1; after both uncertainties were set, and once for each pair of inputs.
  void correlate(std::size_t a, std::size_t b, double r) {
    correlated_.push_back({.a = a, .b = b, .covariance = r * u(a) * u(b)});
  }

  // The covariance of two results (GUM F.1.2.3, H.2.3).
  [[nodiscard]] double covariance(const Dual<n>& x, const Dual<n>& y) const {
    double sum = 0.0;
    for (std::size_t i = 0; i < n; ++i) {
      sum += x.by[i] * u_[i] * (y.by[i] * u_[i]);
    }
    for (const Correlated& pair : correlated_) {
      sum += pair.covariance * (x.by[pair.a] * y.by[pair.b] + x.by[pair.b] * y.by[pair.a]);
    }
    return sum;
  }
  [[nodiscard]] double u(const Dual<n>& x) const {
    const double variance = covariance(x, x);
    return variance > 0.0 ? std::sqrt(variance) : 0.0;  // below 0 by rounding alone, where all
                                                        // the errors cancel
  }
  [[nodiscard]] Measured measured(const Dual<n>& x) const { return {.value = x.value, .u = u(x)}; }

 private:
  struct Correlated {
    std::size_t a;
    std::size_t b;
    double covariance;
  };
  std::array<double, n> u_{};
  std::vector<Correlated> correlated_;
};

}  // namespace lostwork
