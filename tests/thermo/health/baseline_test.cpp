#include "thermo/health/baseline.h"

#include "tests/thermo/health/played.h"

#include <cmath>
#include <cstdint>
#include <limits>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::health_model;
using testing::synthetic_history;
using testing::values_of;

// A machine that obeys the entropy form to the last bit, so that the fit has a right answer.
double power_by_the_form_W(const Conditions& c) {
  const double entropy_WK = 12.0 + 90.0 * c.lift + 1.1e-4 * c.heat_W + 9.0e-4 * c.heat_W * c.lift;
  return c.heat_W * c.lift + c.reference_T_K * entropy_WK;
}

std::vector<Sample> samples_by_the_form(int count) {
  SeededNormal random{7};
  std::vector<Sample> samples;
  for (int i = 0; i < count; ++i) {
    const double reference_T_K = 288.15 + 17.0 * random.uniform();
    Sample sample;
    sample.begin = testing::synthetic_start() + std::chrono::hours{6 * i};
    sample.end = sample.begin + std::chrono::minutes{10};
    sample.conditions = {.heat_W = 90e3 + 210e3 * random.uniform(),
                         .lift = reference_T_K / 280.15 - 1.0,
                         .reference_T_K = reference_T_K,
                         .product_T_K = 280.15};
    sample.features[0] = power_by_the_form_W(sample.conditions);
    samples.push_back(sample);
  }
  return samples;
}

TEST(FitBaseline, FindsAMachineThatObeysTheForm) {
  const auto baseline = fit_baseline(Duty::cooling, samples_by_the_form(200), {});
  ASSERT_TRUE(baseline.has_value());
  const Conditions c{.heat_W = 180e3,
                     .lift = 296.15 / 280.15 - 1.0,
                     .reference_T_K = 296.15,
                     .product_T_K = 280.15};
  // 1e-6: the normal equations of a scaled system keep half of the digits and more.
  EXPECT_NEAR(*expected(*baseline, Feature::power, c) / power_by_the_form_W(c), 1.0, 1e-6);
}

TEST(FitBaseline, GivesAResidualAsAShareOfThePowerExpected) {
  const auto baseline = fit_baseline(Duty::cooling, samples_by_the_form(200), {});
  ASSERT_TRUE(baseline.has_value());
  Sample sample = samples_by_the_form(1).front();
  sample.features[0] = 1.05 * power_by_the_form_W(sample.conditions);
  EXPECT_NEAR(*residual(*baseline, Feature::power, sample), 0.05, 1e-6);
}

TEST(FitBaseline, RefusesTooFewWindows) {
  const auto baseline = fit_baseline(Duty::cooling, samples_by_the_form(8), {});
  ASSERT_FALSE(baseline.has_value());
  EXPECT_EQ(baseline.error().code, ReasonCode::load_too_small);
}

TEST(FitBaseline, RefusesAFigureThatIsNone) {
  auto samples = samples_by_the_form(60);
  samples[20].features[0] = std::numeric_limits<double>::quiet_NaN();
  EXPECT_FALSE(fit_baseline(Duty::cooling, samples, {}).has_value());
}

TEST(FitBaseline, LeavesOutAFeatureThatIsMostlyMissing) {
  auto samples = samples_by_the_form(60);
  for (std::size_t i = 0; i < 30; ++i) {
    samples[i].features.at(static_cast<std::size_t>(Feature::superheat)) = 5.0;
  }
  const auto baseline = fit_baseline(Duty::cooling, samples, {});
  ASSERT_TRUE(baseline.has_value());
  EXPECT_FALSE(expected(*baseline, Feature::superheat, samples[0].conditions));
}

class Guard : public ::testing::Test {
 protected:
  const Baseline baseline_ = fit_baseline(Duty::cooling, samples_by_the_form(200), {}).value();
  const Conditions middle_{.heat_W = 0.5 * (baseline_.heat_W.min + baseline_.heat_W.max),
                           .lift = 0.5 * (baseline_.lift.min + baseline_.lift.max),
                           .reference_T_K = 296.15,
                           .product_T_K = 280.15};
};

TEST_F(Guard, LetsTheMiddleIn) {
  EXPECT_TRUE(inside(baseline_, middle_));
}

TEST_F(Guard, KeepsLoadsBeyondATenthOfTheRangeOut) {
  Conditions c = middle_;
  c.heat_W = baseline_.heat_W.max + 0.11 * (baseline_.heat_W.max - baseline_.heat_W.min);
  EXPECT_FALSE(inside(baseline_, c));
}

TEST_F(Guard, KeepsAnotherSupplyTemperatureOut) {
  Conditions c = middle_;
  c.product_T_K += 2.5;
  EXPECT_FALSE(inside(baseline_, c));
}

TEST_F(Guard, KeepsANumberThatIsNoneOut) {
  Conditions c = middle_;
  c.lift = std::numeric_limits<double>::quiet_NaN();
  EXPECT_FALSE(inside(baseline_, c));
}

// Student's t, 0.975: 2.2281 with 10 degrees of freedom, 2.0003 with 60 (Abramowitz & Stegun 1964,
// table 26.10). The first term left out is (3 z^7 + 19 z^5 + 17 z^3 - 15 z) / (384 n^3), 0.0026
// at 10.
TEST(CoverageFactor, IsStudents) {
  Baseline baseline;
  baseline.independent_windows = 16.0;
  EXPECT_NEAR(coverage_factor(baseline), 2.2281, 3e-3);
  baseline.independent_windows = 66.0;
  EXPECT_NEAR(coverage_factor(baseline), 2.0003, 1e-4);
}

// The 95 % prediction interval on windows that the baseline has not seen. One baseline in ten may
// hold fewer than it promises, for its own scatter is an estimate: 0.90 allows for that.
class Prediction : public ::testing::TestWithParam<std::uint64_t> {};

TEST_P(Prediction, HoldsTheWindowsToCome) {
  const auto windows = synthetic_history({.seed = GetParam(), .days = 200.0});
  const HealthModel model = health_model();
  HealthState state;
  double inside_guard = 0.0;
  double held = 0.0;
  for (const Window& window : windows) {
    if (state.baseline) {
      if (const auto should = expected_power(state, values_of(window))) {
        inside_guard += 1.0;
        const double off_W = window[Quantity::power]->mean_SI - should->power_W.value;
        held += std::abs(off_W) <= should->half_width_W ? 1.0 : 0.0;
      }
    }
    state = take_window(model, std::move(state), window).next;
  }
  ASSERT_GT(inside_guard, 500.0);
  EXPECT_GT(held / inside_guard, 0.90);
}

INSTANTIATE_TEST_SUITE_P(Seeds, Prediction, ::testing::Range<std::uint64_t>(1, 9));

}  // namespace
}  // namespace lostwork
