// The power-exponential terms of an equation of state, put at compile time into the order in which
// they are evaluated fastest. The rows stay as printed; nothing here depends on the fluid.
//
// Three things make it fast. Terms of the same d and l become one coefficient as soon as tau is
// known; terms of the same l share one exp(-delta^l); each different tau^t is made once, from two
// or three others where the exponents add up (tau^22 = tau^10 tau^10 tau^2) and by exp(t ln(tau))
// where they do not.
#pragma once

#include <algorithm>
#include <array>
#include <cstddef>
#include <span>
#include <stdexcept>

namespace lostwork {

// n tau^t delta^d exp(-delta^l) exp(-tau^m); for l = 0 or m = 0 that exponential is absent (it is
// not exp(-1)).
struct HelmholtzTerm {
  double n;
  double t;
  int d;
  int l;
  double m = 0.0;
};

class PowerTerms {
 public:
  static constexpr std::size_t capacity = 65;  // of rows; one more power than exponents

  struct TauPower {
    double t;
    bool by_exp;
    std::array<std::size_t, 3> factors;  // tau^t is the product of these earlier powers
  };
  struct Row {
    double n;
    double t;
    double m;
    std::size_t power;
  };
  struct Group {  // all terms of one delta^d exp(-delta^l): rows [begin, end)
    double d;
    std::size_t delta_power;  // d again
    std::size_t begin;
    std::size_t end;
  };
  struct Decay {  // all terms of one exp(-delta^l): groups [begin, end)
    double l;
    std::size_t delta_power;  // l again
    std::size_t begin;
    std::size_t end;
  };

  // Throws where a row does not fit (too many rows, a negative d, l or m): at compile time, an
  // error there.
  constexpr explicit PowerTerms(std::span<const HelmholtzTerm> terms) {
    if (terms.size() > capacity) {
      throw std::invalid_argument("too many rows in an equation of state");
    }
    std::array<HelmholtzTerm, capacity> sorted{};
    std::copy(terms.begin(), terms.end(), sorted.begin());
    std::sort(sorted.begin(), sorted.begin() + to_difference(terms.size()),
              [](const HelmholtzTerm& a, const HelmholtzTerm& b) {
                return a.l != b.l ? a.l < b.l : a.d < b.d;
              });
    set_powers(terms);
    for (const HelmholtzTerm& term : std::span{sorted}.first(terms.size())) {
      add(term);
    }
  }

  [[nodiscard]] constexpr std::span<const TauPower> powers() const {
    return std::span{powers_}.first(power_count_);
  }
  [[nodiscard]] constexpr std::span<const Row> rows() const {
    return std::span{rows_}.first(row_count_);
  }
  [[nodiscard]] constexpr std::span<const Group> groups() const {
    return std::span{groups_}.first(group_count_);
  }
  [[nodiscard]] constexpr std::span<const Decay> decays() const {
    return std::span{decays_}.first(decay_count_);
  }
  // The highest power of delta that any term needs.
  [[nodiscard]] constexpr std::size_t highest() const { return highest_; }

 private:
  static constexpr std::ptrdiff_t to_difference(std::size_t count) {
    return static_cast<std::ptrdiff_t>(count);
  }
  [[nodiscard]] constexpr std::size_t power_of(double t) const {
    std::size_t i = 0;
    while (i < power_count_ && powers_[i].t != t) {
      ++i;
    }
    return i;
  }
  constexpr void set_powers(std::span<const HelmholtzTerm> terms) {
    powers_[power_count_++] = {0.0, false, {}};  // the third factor of a product of two
    for (const HelmholtzTerm& term : terms) {
      if (power_of(term.t) == power_count_) {
        powers_[power_count_++] = {term.t, true, {}};
      }
    }
    std::sort(powers_.begin() + 1, powers_.begin() + to_difference(power_count_),
              [](const TauPower& a, const TauPower& b) { return a.t < b.t; });
    for (std::size_t i = 1; i < power_count_; ++i) {
      set_factors(i);
    }
  }
  // Makes a power from earlier ones, where three of them have its exponent for their sum.
  constexpr void set_factors(std::size_t i) {
    for (std::size_t first = 0; first < i * i; ++first) {
      const std::size_t left = first / i;
      const std::size_t middle = first % i;
      const std::size_t right = power_of(powers_[i].t - powers_[left].t - powers_[middle].t);
      if (right < i) {
        powers_[i].by_exp = false;
        powers_[i].factors = {left, middle, right};
        return;
      }
    }
  }
  constexpr void add(const HelmholtzTerm& term) {
    if (term.d < 0 || term.l < 0 || term.m < 0.0) {
      throw std::invalid_argument("a row of an equation of state");
    }
    const auto d = static_cast<std::size_t>(term.d);
    const auto l = static_cast<std::size_t>(term.l);
    const bool new_decay = decay_count_ == 0 || decays_[decay_count_ - 1].delta_power != l;
    if (new_decay) {
      decays_[decay_count_++] = {static_cast<double>(term.l), l, group_count_, group_count_};
    }
    if (new_decay || groups_[group_count_ - 1].delta_power != d) {
      groups_[group_count_++] = {static_cast<double>(term.d), d, row_count_, row_count_};
    }
    rows_[row_count_++] = {term.n, term.t, term.m, power_of(term.t)};
    groups_[group_count_ - 1].end = row_count_;
    decays_[decay_count_ - 1].end = group_count_;
    highest_ = std::max({highest_, d, l});
  }

  std::array<TauPower, capacity> powers_{};
  std::array<Row, capacity> rows_{};
  std::array<Group, capacity> groups_{};
  std::array<Decay, capacity> decays_{};
  std::size_t power_count_ = 0;
  std::size_t row_count_ = 0;
  std::size_t group_count_ = 0;
  std::size_t decay_count_ = 0;
  std::size_t highest_ = 0;
};

}  // namespace lostwork
