#include "sensors/demo_plant/noise.h"

#include <cmath>

namespace lostwork {
namespace {

// Increment and multipliers of SplitMix64, as published.
std::uint64_t finalised(std::uint64_t z) {
  z += 0x9e3779b97f4a7c15U;
  z = (z ^ (z >> 30U)) * 0xbf58476d1ce4e5b9U;
  z = (z ^ (z >> 27U)) * 0x94d049bb133111ebU;
  return z ^ (z >> 31U);
}

std::int64_t sum_of_lanes(std::uint64_t bits) {
  constexpr std::uint64_t lane = 0xffffU;
  const std::uint64_t sum =
      (bits & lane) + ((bits >> 16U) & lane) + ((bits >> 32U) & lane) + (bits >> 48U);
  return static_cast<std::int64_t>(sum);
}

}  // namespace

std::uint64_t mixed(const NoiseStream& noise, std::int64_t index) {
  return finalised(finalised(finalised(noise.seed) ^ noise.stream) ^
                   static_cast<std::uint64_t>(index));
}

double even(const NoiseStream& noise, std::int64_t index) {
  const auto top = static_cast<std::int64_t>(mixed(noise, index) >> 11U);  // 53 bits: exact
  return static_cast<double>(top) / 4503599627370496.0 - 1.0;              // 2^52
}

double normal(const NoiseStream& noise, std::int64_t index) {
  const std::uint64_t first = mixed(noise, index);
  const std::uint64_t second = finalised(first);
  const std::uint64_t third = finalised(second);
  const std::int64_t sum = sum_of_lanes(first) + sum_of_lanes(second) + sum_of_lanes(third);
  // Twelve lanes, each even over 0..65535: mean 6 * 65535, variance 65536^2 - 1.
  return static_cast<double>(sum - std::int64_t{6} * 65535) / 65536.0;
}

double wander(const NoiseStream& noise, Instant time, Span spacing) {
  const std::int64_t at = time.time_since_epoch().count();
  std::int64_t knot = at / spacing.count();
  if (knot * spacing.count() > at) {
    --knot;  // before 1970: towards the past, not towards zero
  }
  const double part =
      static_cast<double>(at - knot * spacing.count()) / static_cast<double>(spacing.count());
  const double after = part * part * (3.0 - 2.0 * part);
  const double before = 1.0 - after;
  return (before * normal(noise, knot) + after * normal(noise, knot + 1)) /
         std::sqrt(before * before + after * after);
}

}  // namespace lostwork
