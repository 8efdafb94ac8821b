#include "sensors/demo_plant/noise.h"

#include <cmath>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::hours;
using std::chrono::seconds;

constexpr NoiseStream noise{.seed = 7, .stream = 3};
const Instant monday = std::chrono::sys_days{std::chrono::April / 6 / 2026};

TEST(Noise, MixedIsThePublishedGenerator) {
  // The first output of SplitMix64 seeded with 0 is 0xe220a8397b1dcdaf (Vigna's reference
  // implementation, public domain; the value is from memory). mixed() chains three rounds: here
  // stream and index cancel what the rounds before them gave, so that each starts from 0 again.
  constexpr std::uint64_t first = 0xe220a8397b1dcdafU;
  EXPECT_EQ(mixed({.seed = 0, .stream = first}, static_cast<std::int64_t>(first)), first);
}

TEST(Noise, NormalHasMeanZeroAndVarianceOne) {
  constexpr int n = 200000;
  double sum = 0.0;
  double squares = 0.0;
  for (int i = 0; i < n; ++i) {
    const double z = normal(noise, i);
    sum += z;
    squares += z * z;
  }
  // Five standard errors: 5 / sqrt(n) of the mean, 5 sqrt(2 / n) of the variance.
  EXPECT_NEAR(sum / n, 0.0, 5.0 / std::sqrt(n));
  EXPECT_NEAR(squares / n, 1.0, 5.0 * std::sqrt(2.0 / n));
}

TEST(Noise, EvenStaysWithinItsRange) {
  for (int i = 0; i < 10000; ++i) {
    const double x = even(noise, i);
    ASSERT_GE(x, -1.0);
    ASSERT_LT(x, 1.0);
  }
}

TEST(Noise, WanderHasNoJumps) {
  double before = wander(noise, monday, hours{2});
  for (int i = 1; i < 5000; ++i) {
    const double now = wander(noise, monday + seconds{10} * i, hours{2});
    // The smooth step is steepest in its middle: 1.5 per spacing of at most 12 sd between knots,
    // up to sqrt(2) steeper by the normalisation; 10 s of 2 h.
    ASSERT_NEAR(now, before, 12.0 * 1.5 * 1.5 * 10.0 / 7200.0);
    before = now;
  }
}

TEST(Noise, WanderDoesNotDependOnHowOneGetsThere) {
  const double there = wander(noise, monday + hours{100}, hours{2});
  (void)wander(noise, monday, hours{2});
  EXPECT_EQ(there, wander(noise, monday + hours{100}, hours{2}));
}

TEST(Noise, WanderIsDefinedBefore1970) {
  const Instant early = std::chrono::sys_days{std::chrono::January / 1 / 1969};
  EXPECT_NEAR(wander(noise, early - seconds{1}, hours{2}), wander(noise, early, hours{2}), 0.01);
}

}  // namespace
}  // namespace lostwork
