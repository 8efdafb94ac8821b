// Conversion factors: NIST Special Publication 811 (2008), Appendix B.8 and B.9; the tolerance is
// the last digit printed there.
#include "sensors/unit.h"

#include <cmath>
#include <string>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

struct FactorCase {
  Unit unit;
  double printed_SI;
  double last_digit;
};

class UnitFactor : public testing::TestWithParam<FactorCase> {};

TEST_P(UnitFactor, IsThePublishedOne) {
  EXPECT_NEAR(scale_SI(GetParam().unit), GetParam().printed_SI, GetParam().last_digit);
}

INSTANTIATE_TEST_SUITE_P(
    Sp811, UnitFactor,
    testing::Values(FactorCase{Unit::psi_abs, 6.894757e3, 1e-3},
                    FactorCase{Unit::psi_gauge, 6.894757e3, 1e-3},
                    FactorCase{Unit::bar_abs, 1.0e5, 0.0}, FactorCase{Unit::bar_gauge, 1.0e5, 0.0},
                    FactorCase{Unit::kPa_abs, 1.0e3, 0.0}, FactorCase{Unit::kPa_gauge, 1.0e3, 0.0},
                    FactorCase{Unit::gpm, 6.309020e-5, 1e-11},
                    FactorCase{Unit::m3_h, 2.777778e-4, 1e-10}, FactorCase{Unit::l_s, 1.0e-3, 0.0},
                    FactorCase{Unit::kWh, 3.6e6, 0.0}, FactorCase{Unit::kW, 1.0e3, 0.0},
                    FactorCase{Unit::degF, 5.555556e-1, 1e-7}, FactorCase{Unit::degC, 1.0, 0.0},
                    FactorCase{Unit::percent, 1e-2, 0.0}, FactorCase{Unit::ppm, 1e-6, 0.0}),
    [](const auto& tested) { return "Unit" + std::to_string(tested.index); });

// SP 811, B.9: T/K = (t/degF + 459.67)/1.8 and T/K = t/degC + 273.15, exact; the tolerance is a few
// roundings of a double.
TEST(ToSI, TakesFahrenheitByThePublishedFormula) {
  EXPECT_NEAR(to_SI(Unit::degF, 50.0, 0.0), (50.0 + 459.67) / 1.8, 1e-12 * 283);
}

TEST(ToSI, FindsCelsiusAndFahrenheitEqualAtMinusForty) {
  EXPECT_NEAR(to_SI(Unit::degF, -40.0, 0.0), to_SI(Unit::degC, -40.0, 0.0), 1e-12 * 233);
}

TEST(ToSI, PutsTheIcePointWhereTheKelvinScaleHasIt) {
  EXPECT_EQ(to_SI(Unit::degC, 0.0, 0.0), 273.15);
}

// ISO 2533:1975, International Standard Atmosphere, geopotential altitude (from memory). The
// constants of the formula have six digits, which makes up to 1 Pa.
TEST(Atmosphere, IsThatOfTheStandardAtmosphereAt1000And2000Metres) {
  EXPECT_NEAR(atmosphere_Pa(0.0), 101325.0, 0.0);
  EXPECT_NEAR(atmosphere_Pa(1000.0), 89874.6, 1.0);
  EXPECT_NEAR(atmosphere_Pa(2000.0), 79495.2, 1.0);
}

TEST(ToSI, AddsTheAtmosphereOfTheSiteToAGaugePressure) {
  EXPECT_NEAR(to_SI(Unit::bar_gauge, 2.0, 1000.0), 2.0e5 + 89874.6, 1.0);
  EXPECT_NEAR(to_SI(Unit::kPa_gauge, 0.0, 0.0), 101325.0, 1e-9);
}

TEST(ToSI, LeavesAnAbsolutePressureAloneAtAnyAltitude) {
  EXPECT_EQ(to_SI(Unit::bar_abs, 2.0, 1500.0), 2.0e5);
}

class EveryUnit : public testing::TestWithParam<int> {};

TEST_P(EveryUnit, ComesBackFromSI) {
  const auto unit = static_cast<Unit>(GetParam());
  // Two roundings of a number of the size of the zero point in that unit.
  EXPECT_NEAR(from_SI(unit, to_SI(unit, 37.5, 250.0), 250.0), 37.5, 1e-12 * 460);
}

TEST_P(EveryUnit, IsFoundByItsName) {
  const auto unit = static_cast<Unit>(GetParam());
  EXPECT_EQ(unit_named(name(unit)), unit);
}

INSTANTIATE_TEST_SUITE_P(All, EveryUnit, testing::Range(0, static_cast<int>(Unit::count)));

TEST(UnitNamed, KnowsNoOtherNames) {
  EXPECT_EQ(unit_named("celsius"), std::nullopt);
  EXPECT_EQ(unit_named(""), std::nullopt);
}

TEST(AllowedUnit, MustFitTheRole) {
  EXPECT_TRUE(allowed(Unit::degF, Role::suction_temperature));
  EXPECT_FALSE(allowed(Unit::bar_abs, Role::suction_temperature));
  EXPECT_TRUE(allowed(Unit::psi_gauge, Role::suction_pressure));
  EXPECT_FALSE(allowed(Unit::degC, Role::suction_pressure));
  EXPECT_TRUE(allowed(Unit::kg_s, Role::cold_flow));
  EXPECT_TRUE(allowed(Unit::gpm, Role::cold_flow));
  EXPECT_TRUE(allowed(Unit::kW, Role::power));
  EXPECT_FALSE(allowed(Unit::kWh, Role::power));
  EXPECT_TRUE(allowed(Unit::percent, Role::ambient_humidity));
  EXPECT_TRUE(allowed(Unit::ppm, Role::leak_concentration));
  EXPECT_TRUE(allowed(Unit::percent, Role::oxygen));
  EXPECT_TRUE(allowed(Unit::one, Role::mode));
  EXPECT_FALSE(allowed(Unit::percent, Role::mode));
  EXPECT_TRUE(allowed(Unit::Hz, Role::speed));
}

}  // namespace
}  // namespace lostwork
