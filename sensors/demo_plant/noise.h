// Random numbers as pure functions of where they are used.
//
// No generator has a state: a value depends on (seed, stream, index) alone, so that the weather of
// a day does not depend on the steps in which the plant got there. std::normal_distribution is not
// used because the standard leaves its algorithm open: two libraries give two plants for one seed.
// Here all is integer arithmetic and +, -, *, /, sqrt, which IEEE 754 rounds alike everywhere.
#pragma once

#include "thermo/reading.h"

#include <cstdint>

namespace lostwork {

// One independent source of randomness of one plant.
struct NoiseStream {
  std::uint64_t seed;
  std::uint64_t stream;
};

// 64 well mixed bits: the finaliser of SplitMix64 (Steele, Lea, Flood 2014,
// doi:10.1145/2660193.2660195), once for each input.
[[nodiscard]] std::uint64_t mixed(const NoiseStream& noise, std::int64_t index);

// Even over [-1, 1).
[[nodiscard]] double even(const NoiseStream& noise, std::int64_t index);

// Mean 0, variance 1, the sum of twelve even values: normal in the middle, never beyond 6 (its
// fourth moment is 2.9 instead of 3).
[[nodiscard]] double normal(const NoiseStream& noise, std::int64_t index);

// Smooth in time, mean 0, variance 1 at every moment: normal values at knots `spacing` apart,
// joined by a smooth step. Values more than two spacings apart are independent.
[[nodiscard]] double wander(const NoiseStream& noise, Instant time, Span spacing);

}  // namespace lostwork
