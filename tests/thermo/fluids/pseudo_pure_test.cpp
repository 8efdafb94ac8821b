#include "thermo/fluids/pseudo_pure.h"

#include "tests/thermo/fluids/reference.h"

#include <cmath>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

class PseudoPure : public testing::TestWithParam<std::string_view> {
 protected:
  [[nodiscard]] static const Fluid& fluid() { return *fluid_named(GetParam()); }
  [[nodiscard]] static std::vector<double> temperatures_K() {
    return {215.0, 233.15, 273.15, 300.0, 325.0, 0.98 * fluid().critical_T_K};
  }
};

TEST_P(PseudoPure, BoilsAtAHigherPressureThanItCondensesAt) {
  for (const double T_K : temperatures_K()) {
    const Saturation at = saturation_at_T(fluid(), T_K).value();
    EXPECT_GT(at.liquid.p_Pa, at.vapour.p_Pa) << T_K;
    EXPECT_GT(at.liquid.rho_kgm3, at.vapour.rho_kgm3) << T_K;
  }
}

TEST_P(PseudoPure, BothLinesLeadBackFromTheirPressures) {
  for (const double T_K : temperatures_K()) {
    const Saturation at = saturation_at_T(fluid(), T_K).value();
    EXPECT_NEAR(saturation_at_p(fluid(), at.liquid.p_Pa).value().liquid.T_K, T_K, 1e-11 * T_K);
    EXPECT_NEAR(saturation_at_p(fluid(), at.vapour.p_Pa).value().vapour.T_K, T_K, 1e-11 * T_K);
  }
}

TEST_P(PseudoPure, SlopesAreThoseOfTheLines) {
  // A central difference with a step of 1e-4: its error is about the square of the step.
  for (const double T_K : temperatures_K()) {
    const Saturation at = saturation_at_T(fluid(), T_K).value();
    const Saturation above = saturation_at_T(fluid(), T_K * 1.0001).value();
    const Saturation below = saturation_at_T(fluid(), T_K * 0.9999).value();
    const double step_K = 2e-4 * T_K;
    EXPECT_NEAR(at.bubble_dT_dp * (above.liquid.p_Pa - below.liquid.p_Pa), step_K, 1e-6 * step_K);
    EXPECT_NEAR(at.dew_dT_dp * (above.vapour.p_Pa - below.vapour.p_Pa), step_K, 1e-6 * step_K);
  }
}

TEST_P(PseudoPure, AMixtureIsFoundFromEveryPairOfItsFigures) {
  for (const double T_K : temperatures_K()) {
    const double p_Pa = saturation_at_T(fluid(), T_K)->liquid.p_Pa;
    const State mixture = state(fluid(), GivenPx{p_Pa, 0.3}).value();
    EXPECT_EQ(mixture.phase, Phase::two_phase);
    EXPECT_GE(mixture.T_K, T_K);
    for (const Result<State>& found :
         {state(fluid(), GivenTx{mixture.T_K, 0.3}), state(fluid(), GivenPh{p_Pa, mixture.h_Jkg}),
          state(fluid(), GivenPs{p_Pa, mixture.s_JkgK})}) {
      ASSERT_TRUE(found);
      EXPECT_NEAR(found->quality.value(), 0.3, 1e-8);
      EXPECT_NEAR(found->p_Pa, p_Pa, 1e-9 * p_Pa);
      EXPECT_NEAR(found->T_K, mixture.T_K, 1e-10 * T_K);
      EXPECT_NEAR(found->h_Jkg, mixture.h_Jkg, 1e-3);
    }
  }
}

TEST_P(PseudoPure, TemperatureAndPressureBetweenTheLinesAreAMixture) {
  const Saturation at = saturation_at_T(fluid(), 273.15).value();
  const double between_Pa = 0.5 * (at.liquid.p_Pa + at.vapour.p_Pa);
  const State found = state(fluid(), GivenTp{273.15, between_Pa}).value();
  EXPECT_EQ(found.phase, Phase::two_phase);
  EXPECT_NEAR(found.T_K, 273.15, 1e-8);
  EXPECT_NEAR(found.quality.value(), 0.5, 0.05);
}

TEST_P(PseudoPure, AHairOfPressureBesideALineDecidesThePhase) {
  const Saturation at = saturation_at_T(fluid(), 273.15).value();
  EXPECT_EQ(state(fluid(), GivenTp{273.15, at.liquid.p_Pa * (1.0 + 1e-9)})->phase, Phase::liquid);
  EXPECT_EQ(state(fluid(), GivenTp{273.15, at.vapour.p_Pa * (1.0 - 1e-9)})->phase, Phase::vapour);
}

TEST_P(PseudoPure, RefusesASaturationOutsideItsLimits) {
  for (const Result<Saturation>& found :
       {saturation_at_T(fluid(), fluid().critical_T_K),
        saturation_at_p(fluid(), fluid().critical_p_Pa), saturation_at_T(fluid(), 199.0),
        saturation_at_p(fluid(), 100.0)}) {
    ASSERT_FALSE(found);
    EXPECT_EQ(found.error().code, ReasonCode::outside_fluid);
  }
}

TEST_P(PseudoPure, HasAnAnswerOrAReasonBesideTheCriticalPoint) {
  // Up to 0.997 of the critical pressure there is an answer.
  for (const double share : {3e-2, 3e-3, 1e-3, 1e-4, 1e-6, 1e-9}) {
    const double p_Pa = fluid().critical_p_Pa * (1.0 - share);
    const Result<Saturation> found = saturation_at_p(fluid(), p_Pa);
    if (!found) {
      EXPECT_LT(share, 3e-3);
      EXPECT_EQ(found.error().code, ReasonCode::not_converged) << share;
    } else {
      EXPECT_NEAR(saturation_at_T(fluid(), found->liquid.T_K).value().liquid.p_Pa, p_Pa,
                  1e-10 * p_Pa);
      EXPECT_GT(found->liquid.rho_kgm3, found->vapour.rho_kgm3) << share;
    }
  }
}

INSTANTIATE_TEST_SUITE_P(Blends, PseudoPure, testing::Values("R410A", "R407C", "R404A", "R507A"),
                         [](const auto& tested) { return test_name(tested.param); });

}  // namespace
}  // namespace lostwork
