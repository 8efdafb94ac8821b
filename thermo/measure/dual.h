// Numbers that carry their derivatives (forward mode), so that no formula is differentiated by
// hand twice and no difference quotient is ever taken.
//
// Source: Griewank & Walther, Evaluating Derivatives, 2nd ed. (2008), ch. 3 (tangent mode).
#pragma once

#include <array>
#include <cstddef>

namespace lostwork {

// A value and its partial derivatives by `n` inputs.
template <std::size_t n>
struct Dual {
  double value = 0.0;
  std::array<double, n> by{};  // by[i] = d value / d input i

  Dual& operator+=(const Dual& other) {
    value += other.value;
    for (std::size_t i = 0; i < n; ++i) {
      by[i] += other.by[i];
    }
    return *this;
  }
  Dual& operator-=(const Dual& other) {
    value -= other.value;
    for (std::size_t i = 0; i < n; ++i) {
      by[i] -= other.by[i];
    }
    return *this;
  }
  Dual& operator*=(double factor) {
    value *= factor;
    for (double& derivative : by) {
      derivative *= factor;
    }
    return *this;
  }
};

// The input of that index itself.
template <std::size_t n>
[[nodiscard]] Dual<n> input(double value, std::size_t index) {
  Dual<n> x{.value = value, .by = {}};
  x.by.at(index) = 1.0;
  return x;
}

// f(x), and f(x, y), from the value of f and its partial derivatives there.
template <std::size_t n>
[[nodiscard]] Dual<n> chain(double f, double f_x, const Dual<n>& x) {
  Dual<n> result{.value = f, .by = x.by};
  for (double& derivative : result.by) {
    derivative *= f_x;
  }
  return result;
}
template <std::size_t n>
[[nodiscard]] Dual<n> chain(double f, double f_x, const Dual<n>& x, double f_y, const Dual<n>& y) {
  Dual<n> result{.value = f, .by = x.by};
  for (std::size_t i = 0; i < n; ++i) {
    result.by[i] = f_x * x.by[i] + f_y * y.by[i];
  }
  return result;
}

template <std::size_t n>
[[nodiscard]] Dual<n> operator-(const Dual<n>& a) {
  return chain(-a.value, -1.0, a);
}
template <std::size_t n>
[[nodiscard]] Dual<n> operator+(Dual<n> a, const Dual<n>& b) {
  return a += b;
}
template <std::size_t n>
[[nodiscard]] Dual<n> operator-(Dual<n> a, const Dual<n>& b) {
  return a -= b;
}
template <std::size_t n>
[[nodiscard]] Dual<n> operator*(const Dual<n>& a, const Dual<n>& b) {
  return chain(a.value * b.value, b.value, a, a.value, b);
}
template <std::size_t n>
[[nodiscard]] Dual<n> operator/(const Dual<n>& a, const Dual<n>& b) {
  const double ratio = a.value / b.value;
  return chain(ratio, 1.0 / b.value, a, -ratio / b.value, b);
}

template <std::size_t n>
[[nodiscard]] Dual<n> operator+(Dual<n> a, double b) {
  a.value += b;
  return a;
}
template <std::size_t n>
[[nodiscard]] Dual<n> operator+(double a, Dual<n> b) {
  return b + a;
}
template <std::size_t n>
[[nodiscard]] Dual<n> operator-(Dual<n> a, double b) {
  a.value -= b;
  return a;
}
template <std::size_t n>
[[nodiscard]] Dual<n> operator-(double a, const Dual<n>& b) {
  return chain(a - b.value, -1.0, b);
}
template <std::size_t n>
[[nodiscard]] Dual<n> operator*(Dual<n> a, double b) {
  return a *= b;
}
template <std::size_t n>
[[nodiscard]] Dual<n> operator*(double a, Dual<n> b) {
  return b *= a;
}

}  // namespace lostwork
