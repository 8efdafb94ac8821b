// Normal random numbers that are the same in every library: SplitMix64 (Steele, Lea, Flood 2014,
// doi:10.1145/2660193.2660195) and the polar method (Marsaglia & Bray 1964).
#pragma once

#include <cmath>
#include <cstdint>

namespace lostwork {

class SeededNormal {
 public:
  explicit SeededNormal(std::uint64_t seed) : state_{seed} {}

  double operator()() {
    if (spare_there_) {
      spare_there_ = false;
      return spare_;
    }
    double u = 0.0;
    double v = 0.0;
    double square = 0.0;
    do {
      u = 2.0 * uniform() - 1.0;
      v = 2.0 * uniform() - 1.0;
      square = u * u + v * v;
    } while (square >= 1.0 || square == 0.0);
    const double factor = std::sqrt(-2.0 * std::log(square) / square);
    spare_ = v * factor;
    spare_there_ = true;
    return u * factor;
  }

  // 0 <= . < 1
  double uniform() { return static_cast<double>(bits() >> 11U) * 0x1.0p-53; }

 private:
  std::uint64_t bits() {
    state_ += 0x9e3779b97f4a7c15U;
    std::uint64_t z = state_;
    z = (z ^ (z >> 30U)) * 0xbf58476d1ce4e5b9U;
    z = (z ^ (z >> 27U)) * 0x94d049bb133111ebU;
    return z ^ (z >> 31U);
  }

  std::uint64_t state_;
  double spare_ = 0.0;
  bool spare_there_ = false;
};

}  // namespace lostwork
