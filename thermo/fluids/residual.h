// The power-exponential terms of an equation of state, put at compile time into the order in which
// they are evaluated fastest. The rows stay as printed; nothing here depends on the fluid.
//
// Three things make it fast. Terms of the same d and l become one coefficient as soon as tau is
// known; terms of the same l share one exp(-delta^l); each different tau^t is made once, from two
// others where the exponents add up (tau^6 = tau^3 tau^3) and by exp(t ln(tau)) where they do not.
#pragma once

#include <algorithm>
#include <array>
#include <cstddef>
#include <span>
#include <stdexcept>

namespace lostwork {

// n tau^t delta^d exp(-delta^l); for l = 0 the exponential is absent (it is not exp(-1)).
struct HelmholtzTerm {
  double n;
  double t;
  int d;
  int l;
};

class PowerTerms {
 public:
  static constexpr std::size_t capacity = 64;

  struct TauPower {
    double t;
    int left;  // tau^t = power[left] power[right]; left < 0: by exp
    int right;
  };
  struct Group {  // all terms of one delta^d exp(-delta^l); sorted by l, then d
    int d;
    int l;
  };
  struct Row {
    double n;
    double t;
    std::size_t power;
    std::size_t group;
  };

  // Throws where a row does not fit (too many rows, d < 1, l < 0): at compile time, an error there.
  constexpr explicit PowerTerms(std::span<const HelmholtzTerm> terms) {
    for (const HelmholtzTerm& term : terms) {
      if (row_count_ == capacity || term.d < 1 || term.l < 0) {
        throw std::invalid_argument("a row of an equation of state");
      }
      add_group(term);
      add_power(term.t);
      ++row_count_;
      highest_ = std::max({highest_, term.d, term.l});
    }
    std::sort(groups_.begin(), groups_.begin() + to_difference(group_count_),
              [](const Group& a, const Group& b) { return a.l != b.l ? a.l < b.l : a.d < b.d; });
    std::sort(powers_.begin(), powers_.begin() + to_difference(power_count_),
              [](const TauPower& a, const TauPower& b) { return a.t < b.t; });
    chain_powers();
    for (std::size_t i = 0; i < row_count_; ++i) {
      rows_[i] = {terms[i].n, terms[i].t, power_of(terms[i].t), group_of(terms[i])};
    }
  }

  [[nodiscard]] constexpr std::span<const TauPower> powers() const {
    return std::span{powers_}.first(power_count_);
  }
  [[nodiscard]] constexpr std::span<const Group> groups() const {
    return std::span{groups_}.first(group_count_);
  }
  [[nodiscard]] constexpr std::span<const Row> rows() const {
    return std::span{rows_}.first(row_count_);
  }
  // The highest power of delta that any group needs.
  [[nodiscard]] constexpr int highest() const { return highest_; }

 private:
  static constexpr std::ptrdiff_t to_difference(std::size_t count) {
    return static_cast<std::ptrdiff_t>(count);
  }
  [[nodiscard]] constexpr std::size_t group_of(const HelmholtzTerm& term) const {
    std::size_t i = 0;
    while (i < group_count_ && (groups_[i].d != term.d || groups_[i].l != term.l)) {
      ++i;
    }
    return i;
  }
  [[nodiscard]] constexpr std::size_t power_of(double t) const {
    std::size_t i = 0;
    while (i < power_count_ && powers_[i].t != t) {
      ++i;
    }
    return i;
  }
  constexpr void add_group(const HelmholtzTerm& term) {
    if (group_of(term) == group_count_) {
      groups_[group_count_++] = {term.d, term.l};
    }
  }
  constexpr void add_power(double t) {
    if (power_of(t) == power_count_) {
      powers_[power_count_++] = {t, -1, -1};
    }
  }
  constexpr void chain_powers() {
    for (std::size_t i = 0; i < power_count_; ++i) {
      for (std::size_t left = 0; left < i; ++left) {
        const std::size_t right = power_of(powers_[i].t - powers_[left].t);
        if (right < i) {
          powers_[i].left = static_cast<int>(left);
          powers_[i].right = static_cast<int>(right);
        }
      }
    }
  }

  std::array<TauPower, capacity> powers_{};
  std::array<Group, capacity> groups_{};
  std::array<Row, capacity> rows_{};
  std::size_t power_count_ = 0;
  std::size_t group_count_ = 0;
  std::size_t row_count_ = 0;
  int highest_ = 0;
};

}  // namespace lostwork
