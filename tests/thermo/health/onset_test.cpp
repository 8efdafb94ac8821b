#include "thermo/health/onset.h"

#include "thermo/health/seeded_normal.h"

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <limits>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

constexpr double scatter = 0.01;

// Days of a residual that begins to rise at `onset`, over `length` days to `size`.
std::vector<DayValue> days_of(std::uint64_t seed, double onset, double length, double size,
                              std::int64_t count) {
  SeededNormal noise{seed};
  std::vector<DayValue> days;
  for (std::int64_t day = 0; day < count; ++day) {
    const double since = static_cast<double>(day) + 0.5 - onset;
    const double step = since > 0.0 ? 1.0 : 0.0;
    const double share = length > 0.0 ? std::clamp(since / length, 0.0, 1.0) : step;
    days.push_back({.day = day, .residual = size * share + scatter * noise(), .u = scatter});
  }
  return days;
}

TEST(EstimateOnset, DatesAStepToTheDay) {
  const auto onset = estimate_onset(days_of(3, 60.0, 0.0, 0.06, 80), {});
  ASSERT_TRUE(onset.has_value());
  // A step of six standard deviations shows on its first day.
  EXPECT_NEAR(onset->best, 60.0, 1.0);
  EXPECT_NEAR(onset->size.value, 0.06, 3.0 * onset->size.u);
}

TEST(EstimateOnset, KeepsItsOrder) {
  const auto onset = estimate_onset(days_of(4, 60.0, 30.0, 0.05, 100), {});
  ASSERT_TRUE(onset.has_value());
  EXPECT_LE(onset->earliest, onset->best);
  EXPECT_LE(onset->best, onset->latest);
}

struct Rise {
  double length;
  double size;
};

class OnsetInterval95 : public ::testing::TestWithParam<Rise> {};

// Binomial with 200 trials at 0.95: below 0.90 in about one of 900 sets.
TEST_P(OnsetInterval95, HoldsTheTruthInNineOfTen) {
  int held = 0;
  for (std::uint64_t seed = 1; seed <= 200; ++seed) {
    const double truth = 50.0 + 0.1 * static_cast<double>(seed % 10);
    const auto onset =
        estimate_onset(days_of(seed, truth, GetParam().length, GetParam().size, 100), {});
    ASSERT_TRUE(onset.has_value()) << "seed " << seed;
    held += onset->earliest <= truth && truth <= onset->latest ? 1 : 0;
  }
  EXPECT_GE(held, 180);
}

INSTANTIATE_TEST_SUITE_P(Rises, OnsetInterval95,
                         ::testing::Values(Rise{0.0, 0.05}, Rise{11.0, 0.06}, Rise{26.0, 0.05},
                                           Rise{40.0, 0.06}, Rise{62.0, 0.06}, Rise{105.0, 0.06}));

TEST(EstimateOnset, RefusesFewDays) {
  EXPECT_EQ(estimate_onset(days_of(1, 2.0, 0.0, 0.06, 4), {}).error().code,
            ReasonCode::load_too_small);
}

TEST(EstimateOnset, RefusesAFigureThatIsNone) {
  auto days = days_of(1, 20.0, 0.0, 0.06, 40);
  days[7].residual = std::numeric_limits<double>::quiet_NaN();
  EXPECT_EQ(estimate_onset(days, {}).error().code, ReasonCode::implausible);
}

TEST(EstimateOnset, RefusesDaysOutOfOrder) {
  auto days = days_of(1, 20.0, 0.0, 0.06, 40);
  std::swap(days[3], days[4]);
  EXPECT_EQ(estimate_onset(days, {}).error().code, ReasonCode::implausible);
}

TEST(EstimateOnset, RefusesAFall) {
  EXPECT_EQ(estimate_onset(days_of(1, 20.0, 0.0, -0.06, 40), {}).error().code,
            ReasonCode::contradicts);
}

}  // namespace
}  // namespace lostwork
