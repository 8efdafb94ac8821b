#include "thermo/fluids/saturation.h"

#include "tests/thermo/fluids/grid.h"
#include "tests/thermo/fluids/reference.h"
#include "thermo/fluids/ancillary.h"
#include "thermo/fluids/fluids.h"

#include <algorithm>
#include <cmath>
#include <iterator>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

class OnTheLine : public testing::TestWithParam<SaturationPlace> {
 protected:
  [[nodiscard]] const Fluid& fluid() const { return *fluid_named(GetParam().fluid); }
  [[nodiscard]] double T_K() const { return temperature_K(GetParam()); }
  [[nodiscard]] Saturation here() const { return saturation_at_T(fluid(), T_K()).value(); }
};

double gibbs_Jkg(const State& state) {
  return state.h_Jkg - state.T_K * state.s_JkgK;
}

TEST_P(OnTheLine, BothPhasesHaveTheSameGibbsEnergy) {
  // To the rounding of h and T s, about 1e-15 of 1e6 J/kg each, with some room.
  EXPECT_NEAR(gibbs_Jkg(here().liquid), gibbs_Jkg(here().vapour), 1e-8);
}

TEST_P(OnTheLine, BothDensitiesHaveTheSamePressure) {
  const Isotherm isotherm{fluid(), T_K()};
  const double liquid_Pa = isotherm.slope(here().liquid.rho_kgm3).p_Pa;
  const double vapour_Pa = isotherm.slope(here().vapour.rho_kgm3).p_Pa;
  // In the liquid the pressure is what is left of terms of about 30 rho R T, of 50 in the equation
  // of R123: 1e-14 of that.
  const double terms = fluid().name == "R123" ? 50.0 : 30.0;
  const double rounding_Pa = 1e-14 * here().liquid.rho_kgm3 * fluid().gas_constant_JkgK * T_K();
  EXPECT_NEAR(liquid_Pa, vapour_Pa, 1e-10 * vapour_Pa + terms * rounding_Pa);
}

TEST_P(OnTheLine, PressureLeadsBackToTheTemperature) {
  const Saturation back = saturation_at_p(fluid(), here().liquid.p_Pa).value();
  EXPECT_NEAR(back.liquid.T_K, T_K(), 1e-11 * T_K());
}

TEST_P(OnTheLine, TemperatureMovesWithPressureAsClapeyronSays) {
  const double step_K = 0.01 * std::min(1e-3 * T_K(), fluid().critical_T_K - T_K());
  const double above_Pa = saturation_at_T(fluid(), T_K() + step_K)->liquid.p_Pa;
  const double below_Pa = saturation_at_T(fluid(), T_K() - step_K)->liquid.p_Pa;
  // The difference's own error, (step T)^2 p'''/6, is below 1e-6 of the slope.
  EXPECT_NEAR(here().dew_dT_dp * (above_Pa - below_Pa) / (2.0 * step_K), 1.0, 1e-6);
}

TEST_P(OnTheLine, AHairOfTemperatureDecidesThePhase) {
  for (const double step_K : {0.01, 1e-3, 1e-6}) {
    EXPECT_EQ(state(fluid(), GivenTp{T_K() - step_K, here().liquid.p_Pa})->phase, Phase::liquid);
    EXPECT_EQ(state(fluid(), GivenTp{T_K() + step_K, here().liquid.p_Pa})->phase, Phase::vapour);
  }
}

TEST_P(OnTheLine, TheFirstGuessesAreAsGoodAsTheSearchExpects) {
  // As Fluid states them.
  const double p_Pa = here().liquid.p_Pa;
  EXPECT_NEAR(line_p_Pa(fluid(), Line::bubble, T_K()), p_Pa, 5e-4 * p_Pa);
  const double liquid = here().liquid.rho_kgm3;
  const double vapour = here().vapour.rho_kgm3;
  const double share = GetParam().of_critical_T > 0.98 ? 0.05 : 0.002;
  EXPECT_NEAR(line_liquid_kgm3(fluid(), T_K()), liquid, share * liquid);
  EXPECT_NEAR(line_vapour_kgm3(fluid(), T_K()), vapour, share * vapour);
}

INSTANTIATE_TEST_SUITE_P(AllFluids, OnTheLine, testing::ValuesIn(saturation_grid()),
                         [](const auto& tested) { return name_of(tested.param); });

class ReferenceStateOfFluid : public testing::TestWithParam<const Fluid*> {};

TEST_P(ReferenceStateOfFluid, IsThatOfTheRefrigerationInstitute) {
  // To what double precision leaves of h.
  const Saturation ice_point = saturation_at_T(*GetParam(), 273.15).value();
  EXPECT_NEAR(ice_point.liquid.h_Jkg, 200e3, 1e-3);
  EXPECT_NEAR(ice_point.liquid.s_JkgK, 1e3, 1e-5);
}

std::vector<const Fluid*> refrigerants() {
  std::vector<const Fluid*> all;
  std::copy_if(fluids().begin(), fluids().end(), std::back_inserter(all),
               [](const Fluid* fluid) { return fluid->reference_state == "IIR"; });
  return all;
}

INSTANTIATE_TEST_SUITE_P(Refrigerants, ReferenceStateOfFluid, testing::ValuesIn(refrigerants()),
                         [](const auto& tested) { return test_name(tested.param->name); });

TEST(SaturationOfWater, HasNoEnergyAndNoEntropyAtTheTriplePoint) {
  // IAPWS R6-95(2018), section 6: the release's own rounding leaves 1e-6 J/kg and 1e-8 J/(kg K).
  const State liquid = saturation_at_T(r718, 273.16)->liquid;
  EXPECT_NEAR(liquid.h_Jkg - liquid.p_Pa / liquid.rho_kgm3, 0.0, 1e-5);
  EXPECT_NEAR(liquid.s_JkgK, 0.0, 1e-7);
}

TEST(Saturation, RefusesTheCriticalTemperature) {
  const auto found = saturation_at_T(r134a, r134a.critical_T_K);
  ASSERT_FALSE(found);
  EXPECT_EQ(found.error().code, ReasonCode::outside_fluid);
  EXPECT_EQ(found.error().blame, "temperature");
}

TEST(Saturation, RefusesTheCriticalPressure) {
  const auto found = saturation_at_p(r134a, r134a.critical_p_Pa);
  ASSERT_FALSE(found);
  EXPECT_EQ(found.error().code, ReasonCode::outside_fluid);
  EXPECT_EQ(found.error().blame, "pressure");
}

TEST(Saturation, RefusesAPressureBelowTheTriplePoint) {
  const auto found = saturation_at_p(r718, 600.0);
  ASSERT_FALSE(found);
  EXPECT_EQ(found.error().code, ReasonCode::outside_fluid);
}

TEST(Saturation, RefusesATemperatureBelowTheTriplePoint) {
  const auto found = saturation_at_T(r718, 273.15);
  ASSERT_FALSE(found);
  EXPECT_EQ(found.error().code, ReasonCode::outside_fluid);
}

TEST(Saturation, RefusesWhatIsNotANumber) {
  const double nan = std::nan("");
  EXPECT_EQ(saturation_at_T(r134a, nan).error().code, ReasonCode::implausible);
  EXPECT_EQ(saturation_at_p(r134a, nan).error().code, ReasonCode::implausible);
}

TEST(Saturation, NamesNoGuessWhereTheTwoPhasesCannotBeToldApart) {
  // 1e-8 below the critical temperature the densities differ by less than the search can resolve:
  // either it converged, or it says so.
  const auto found = saturation_at_T(r134a, r134a.critical_T_K * (1.0 - 1e-8));
  if (!found) {
    EXPECT_EQ(found.error().code, ReasonCode::not_converged);
  } else {
    EXPECT_GT(found->liquid.rho_kgm3, found->vapour.rho_kgm3);
  }
}

}  // namespace
}  // namespace lostwork
