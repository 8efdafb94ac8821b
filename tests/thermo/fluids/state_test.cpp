#include "thermo/fluids/state.h"

#include "thermo/fluids/fluids.h"

#include <algorithm>
#include <cmath>
#include <limits>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

const double nan = std::nan("");
constexpr double infinity = std::numeric_limits<double>::infinity();

void expect_refused(const Result<State>& found, ReasonCode code, std::string_view blame) {
  ASSERT_FALSE(found);
  EXPECT_EQ(name(found.error().code), name(code));
  EXPECT_EQ(found.error().blame, blame);
}

TEST(StateByTemperatureAndPressure, RefusesWhatIsNotAPositiveNumber) {
  expect_refused(state(r134a, GivenTp{nan, 1e5}), ReasonCode::implausible, "temperature");
  expect_refused(state(r134a, GivenTp{infinity, 1e5}), ReasonCode::implausible, "temperature");
  expect_refused(state(r134a, GivenTp{0.0, 1e5}), ReasonCode::implausible, "temperature");
  expect_refused(state(r134a, GivenTp{-300.0, 1e5}), ReasonCode::implausible, "temperature");
  expect_refused(state(r134a, GivenTp{300.0, nan}), ReasonCode::implausible, "pressure");
  expect_refused(state(r134a, GivenTp{300.0, -1e5}), ReasonCode::implausible, "pressure");
  expect_refused(state(r134a, GivenTp{300.0, 0.0}), ReasonCode::implausible, "pressure");
}

TEST(StateByTemperatureAndPressure, RefusesWhatIsOutsideThePublishedLimits) {
  expect_refused(state(r134a, GivenTp{169.0, 1e5}), ReasonCode::outside_fluid, "temperature");
  expect_refused(state(r134a, GivenTp{456.0, 1e5}), ReasonCode::outside_fluid, "temperature");
  expect_refused(state(r134a, GivenTp{300.0, 71e6}), ReasonCode::outside_fluid, "pressure");
  expect_refused(state(r718, GivenTp{1274.0, 1e5}), ReasonCode::outside_fluid, "temperature");
}

TEST(StateByTemperatureAndPressure, AcceptsThePublishedLimitsThemselves) {
  EXPECT_TRUE(state(r134a, GivenTp{169.85, 70e6}));
  EXPECT_TRUE(state(r134a, GivenTp{455.0, 70e6}));
  EXPECT_TRUE(state(r718, GivenTp{273.16, 500e6}));
  EXPECT_TRUE(state(r718, GivenTp{1273.0, 1000e6}));
}

TEST(StateByTemperatureAndPressure, KeepsTheGivenFigures) {
  const State found = state(r134a, GivenTp{300.0, 1e5}).value();
  EXPECT_EQ(found.T_K, 300.0);
  EXPECT_EQ(found.p_Pa, 1e5);
}

TEST(StateByTemperatureAndPressure, NamesEveryPhase) {
  EXPECT_EQ(state(r134a, GivenTp{300.0, 1e6})->phase, Phase::liquid);
  EXPECT_EQ(state(r134a, GivenTp{300.0, 5e5})->phase, Phase::vapour);
  EXPECT_EQ(state(r134a, GivenTp{300.0, 10e6})->phase, Phase::liquid);
  EXPECT_EQ(state(r134a, GivenTp{400.0, 1e6})->phase, Phase::vapour);
  EXPECT_EQ(state(r134a, GivenTp{400.0, 10e6})->phase, Phase::supercritical);
}

TEST(StateByTemperatureAndPressure, ApproachesTheIdealGas) {
  // At 1 Pa the second virial coefficient leaves 2e-7 of p v / (R T): B is about -5e-3 m3/kg.
  const State thin = state(r134a, GivenTp{300.0, 1.0}).value();
  EXPECT_NEAR(thin.p_Pa / (thin.rho_kgm3 * r134a.gas_constant_JkgK * 300.0), 1.0, 1e-6);
}

TEST(StateByQuality, RefusesWhatIsNoQuality) {
  expect_refused(state(r134a, GivenTx{300.0, -0.01}), ReasonCode::implausible, "quality");
  expect_refused(state(r134a, GivenTx{300.0, 1.01}), ReasonCode::implausible, "quality");
  expect_refused(state(r134a, GivenTx{300.0, nan}), ReasonCode::implausible, "quality");
  expect_refused(state(r134a, GivenPx{5e5, nan}), ReasonCode::implausible, "quality");
}

TEST(StateByQuality, RefusesASaturationAboveTheCriticalPoint) {
  expect_refused(state(r134a, GivenTx{380.0, 0.5}), ReasonCode::outside_fluid, "temperature");
  expect_refused(state(r134a, GivenPx{5e6, 0.5}), ReasonCode::outside_fluid, "pressure");
}

TEST(StateByQuality, GivesTheSinglePhaseFiguresOnTheLineOnly) {
  EXPECT_TRUE(state(r134a, GivenTx{300.0, 0.0})->single);
  EXPECT_TRUE(state(r134a, GivenTx{300.0, 1.0})->single);
  EXPECT_FALSE(state(r134a, GivenTx{300.0, 0.5})->single);
}

TEST(StateByQuality, NamesThePhase) {
  EXPECT_EQ(state(r134a, GivenTx{300.0, 0.0})->phase, Phase::liquid);
  EXPECT_EQ(state(r134a, GivenTx{300.0, 1.0})->phase, Phase::vapour);
  EXPECT_EQ(state(r134a, GivenTx{300.0, 0.5})->phase, Phase::two_phase);
}

TEST(StateByQuality, MixesVolumeEnthalpyAndEntropyByMass) {
  const Saturation line = saturation_at_T(r134a, 300.0).value();
  const State mixture = state(r134a, GivenTx{300.0, 0.25}).value();
  EXPECT_DOUBLE_EQ(mixture.h_Jkg, 0.75 * line.liquid.h_Jkg + 0.25 * line.vapour.h_Jkg);
  EXPECT_DOUBLE_EQ(mixture.s_JkgK, 0.75 * line.liquid.s_JkgK + 0.25 * line.vapour.s_JkgK);
  EXPECT_DOUBLE_EQ(1.0 / mixture.rho_kgm3,
                   0.75 / line.liquid.rho_kgm3 + 0.25 / line.vapour.rho_kgm3);
}

TEST(StateByEnthalpy, RefusesWhatIsNotANumber) {
  expect_refused(state(r134a, GivenPh{1e5, nan}), ReasonCode::implausible, "enthalpy");
  expect_refused(state(r134a, GivenPh{1e5, infinity}), ReasonCode::implausible, "enthalpy");
  expect_refused(state(r134a, GivenPh{-1e5, 3e5}), ReasonCode::implausible, "pressure");
}

TEST(StateByEnthalpy, RefusesATemperatureBeyondTheLimits) {
  expect_refused(state(r134a, GivenPh{1e5, 900e3}), ReasonCode::outside_fluid, "enthalpy");
  expect_refused(state(r134a, GivenPh{1e5, 10e3}), ReasonCode::outside_fluid, "enthalpy");
  expect_refused(state(r134a, GivenPh{10e6, 900e3}), ReasonCode::outside_fluid, "enthalpy");
  expect_refused(state(r134a, GivenPh{100.0, 200e3}), ReasonCode::outside_fluid, "enthalpy");
}

TEST(StateByEntropy, RefusesWhatIsNotANumber) {
  expect_refused(state(r134a, GivenPs{1e5, nan}), ReasonCode::implausible, "entropy");
}

TEST(StateByEntropy, RefusesATemperatureBeyondTheLimits) {
  expect_refused(state(r134a, GivenPs{1e5, 4e3}), ReasonCode::outside_fluid, "entropy");
  expect_refused(state(r134a, GivenPs{1e5, 100.0}), ReasonCode::outside_fluid, "entropy");
}

TEST(StateByEntropy, FindsTheSameWhereTheSaturationIsKnown) {
  // Both stop at 1e-11 of T, that is 1e-5 J/kg.
  const Saturation line = saturation_at_p(r134a, 900e3).value();
  for (const double s_JkgK : {1000.0, 1500.0, 1750.0}) {
    const GivenPs given{900e3, s_JkgK};
    EXPECT_NEAR(state(r134a, given, line).value().h_Jkg, state(r134a, given).value().h_Jkg, 1e-5);
  }
}

TEST(StateByEntropy, RefusesWhatIsNotANumberWhereTheSaturationIsKnown) {
  const Saturation line = saturation_at_p(r134a, 900e3).value();
  expect_refused(state(r134a, GivenPs{900e3, std::nan("")}, line), ReasonCode::implausible,
                 "entropy");
}

TEST(StateByEnthalpy, FindsVapourBelowThePressureOfTheTriplePoint) {
  const State thin = state(r134a, GivenTp{250.0, 100.0}).value();
  const State found = state(r134a, GivenPh{100.0, thin.h_Jkg}).value();
  EXPECT_EQ(found.phase, Phase::vapour);
  EXPECT_NEAR(found.T_K, 250.0, 1e-8);
}

TEST(StateByEnthalpy, HasAnAnswerOrAReasonBesideTheCriticalPoint) {
  // There the two phases differ by less than double precision can tell: a refusal says so, an
  // answer has what was asked for.
  for (const double share : {1e-6, 1e-7, 3e-8, 1e-8, 1e-9, 1e-10}) {
    const auto found = state(r134a, GivenPh{r134a.critical_p_Pa * (1.0 - share), 390e3});
    if (found) {
      EXPECT_NEAR(found->h_Jkg, 390e3, 1e-3) << share;
    } else {
      EXPECT_EQ(found.error().code, ReasonCode::not_converged) << share;
    }
  }
}

TEST(FluidNamed, KnowsWaterByBothNames) {
  EXPECT_EQ(fluid_named("R718"), &r718);
  EXPECT_EQ(fluid_named("water"), &r718);
}

TEST(FluidNamed, ForgivesHowANameIsWritten) {
  EXPECT_EQ(fluid_named("r-134a"), &r134a);
  EXPECT_EQ(fluid_named("R1234ze(E)"), &r1234ze_e);
  EXPECT_EQ(fluid_named("R-1234ze (E)"), &r1234ze_e);
  EXPECT_EQ(fluid_named("r1234ze"), &r1234ze_e);
  EXPECT_EQ(fluid_named("Propane"), &r290);
  EXPECT_EQ(fluid_named("carbon dioxide"), &r744);
}

TEST(FluidNamed, IsNullForAnUnknownName) {
  EXPECT_EQ(fluid_named("-()"), nullptr);
  EXPECT_EQ(fluid_named("R999"), nullptr);
  EXPECT_EQ(fluid_named(""), nullptr);
}

TEST(Fluids, AreEachFoundByTheirName) {
  EXPECT_TRUE(std::all_of(fluids().begin(), fluids().end(),
                          [](const Fluid* fluid) { return fluid_named(fluid->name) == fluid; }));
}

}  // namespace
}  // namespace lostwork
