// Values printed in the papers; the tolerance is their last digit.
//
// Source: the publications that tests/reference/README.md lists, with page and table in each row.
// The transcription may be off by one in the last digit, which the tolerance contains.
#include "tests/thermo/fluids/reference.h"
#include "thermo/fluids/density.h"
#include "thermo/fluids/saturation.h"
#include "thermo/fluids/state.h"

#include <algorithm>
#include <cmath>
#include <map>
#include <set>
#include <string>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

struct PublishedValue {
  std::string fluid;
  std::string locator;
  std::optional<double> T_K;
  std::string given;  // sat, bubble, dew, sat_p, rho_kg_m3, rho_molar_mol_m3 or p_Pa
  double given_value;
  std::string phase;
  std::string property;
  std::string unit;
  double printed;
  int decimals;
  double offset;  // of the paper's reference state
  bool near;
};

std::vector<PublishedValue> published_values() {
  const ReferenceTable table{"published_values.csv"};
  std::vector<PublishedValue> all;
  for (std::size_t row = 0; row < table.size(); ++row) {
    all.push_back({.fluid = table.text(row, "fluid"),
                   .locator = table.text(row, "publication") + ", " + table.text(row, "locator"),
                   .T_K = table.number(row, "T_K"),
                   .given = table.text(row, "input2"),
                   .given_value = table.number(row, "value2").value_or(0.0),
                   .phase = table.text(row, "phase"),
                   .property = table.text(row, "property"),
                   .unit = table.text(row, "unit"),
                   .printed = table.number(row, "printed").value(),
                   .decimals = static_cast<int>(table.number(row, "decimals").value()),
                   .offset = table.number(row, "offset").value_or(0.0),
                   .near = table.text(row, "agreement") == "near"});
  }
  return all;
}

struct Point {
  double T_K;
  double rho_kgm3;
};

// Straight from the equation, for the papers print some values beyond the limits that they state
// (R134a at 460 K).
std::optional<Point> single_phase_point(const Fluid& fluid, const PublishedValue& value) {
  const double T_K = value.T_K.value();
  if (value.given == "rho_kg_m3") {
    return Point{T_K, value.given_value};
  }
  if (value.given == "rho_molar_mol_m3") {
    return Point{T_K, value.given_value * fluid.molar_mass_kgmol};
  }
  const Isotherm isotherm{fluid, T_K};
  Branch branch = Branch::fluid;
  if (T_K < fluid.critical_T_K) {
    branch = two_phases(isotherm)->p_Pa < value.given_value ? Branch::liquid : Branch::vapour;
  }
  const double first = guessed_rho_kgm3(isotherm, branch, value.given_value);
  const auto rho = density_kgm3(isotherm, branch, value.given_value, first);
  return rho ? std::optional{Point{T_K, *rho}} : std::nullopt;
}

std::optional<Point> point_on_line(const Fluid& fluid, const PublishedValue& value) {
  const auto at = saturation_at_T(fluid, value.T_K.value());
  if (!at) {
    return std::nullopt;
  }
  return Point{*value.T_K, value.given == "bubble" ? at->liquid.rho_kgm3 : at->vapour.rho_kgm3};
}

std::optional<Point> point(const Fluid& fluid, const PublishedValue& value) {
  if (value.given == "bubble" || value.given == "dew") {
    return point_on_line(fluid, value);
  }
  if (value.given != "sat" && value.given != "sat_p") {
    return single_phase_point(fluid, value);
  }
  const auto at = value.given == "sat" ? two_phases(Isotherm{fluid, value.T_K.value()})
                                       : two_phases_at_p(fluid, value.given_value);
  if (!at) {
    return std::nullopt;
  }
  // The pressure is read from the vapour: in the liquid it is a small difference of large terms.
  return Point{at->T_K, value.phase == "liquid" ? at->liquid_kgm3 : at->vapour_kgm3};
}

double property_SI(const Fluid& fluid, const PublishedValue& value, const Point& at) {
  const Properties properties = Isotherm{fluid, at.T_K}.properties(at.rho_kgm3);
  const std::map<std::string_view, double> all{
      {        "p",                                  properties.p_Pa},
      {        "T",                                           at.T_K},
      {      "rho",                                      at.rho_kgm3},
      {"rho_molar",                                      at.rho_kgm3},
      {        "v",                                1.0 / at.rho_kgm3},
      {        "h",                                 properties.h_Jkg},
      {        "u", properties.h_Jkg - properties.p_Pa / at.rho_kgm3},
      {        "s",                                properties.s_JkgK},
      {       "cv",                               properties.cv_JkgK},
      {       "cp",                               properties.cp_JkgK},
      {        "w",                         properties.sound_speed_w},
  };
  return all.at(value.property);
}

double per_SI(const Fluid& fluid, const std::string& unit) {
  const std::map<std::string_view, double> all{
      {        "K",                           1.0},
      {      "MPa",                          1e-6},
      {      "kPa",                          1e-3},
      {    "kg/m3",                           1.0},
      {    "m3/kg",                           1.0},
      {  "mol/dm3", 1e-3 / fluid.molar_mass_kgmol},
      {    "kJ/kg",                          1e-3},
      {"kJ/(kg K)",                          1e-3},
      {"J/(mol K)",        fluid.molar_mass_kgmol},
      {      "m/s",                           1.0},
  };
  return all.at(unit);
}

std::optional<double> computed_SI(const Fluid& fluid, const PublishedValue& value) {
  if (value.property == "h_evap") {
    const auto at =
        value.T_K ? saturation_at_T(fluid, *value.T_K) : saturation_at_p(fluid, value.given_value);
    return at ? std::optional{at->vapour.h_Jkg - at->liquid.h_Jkg} : std::nullopt;
  }
  const auto at = point(fluid, value);
  return at ? std::optional{property_SI(fluid, value, *at)} : std::nullopt;
}

// The last digit, as one transcription may have it; where a paper's own figures leave its equation
// by more, the share that tests/reference/README.md explains.
double tolerance(const PublishedValue& value) {
  const double digit = std::pow(10.0, -value.decimals) * 1.01;
  if (!value.near) {
    return digit;
  }
  const std::map<std::string_view, double> shares{
      {  "R125", 6e-7},
      {  "R290", 2e-7},
      {"R245fa", 5e-5},
      {  "R123", 9e-6},
      {  "R718", 1e-8}
  };
  return std::max(digit, shares.at(value.fluid) * std::abs(value.printed));
}

class Published : public testing::TestWithParam<std::string> {};

TEST_P(Published, ValuesAreMetToTheLastDigit) {
  const Fluid& fluid = *fluid_named(GetParam());
  for (const PublishedValue& value : published_values()) {
    if (value.fluid != GetParam()) {
      continue;
    }
    SCOPED_TRACE(value.locator + ": " + value.property + " " + value.phase + " at " +
                 std::to_string(value.T_K.value_or(0.0)) + " K, " + value.given + " " +
                 std::to_string(value.given_value));
    const auto computed = computed_SI(fluid, value);
    ASSERT_TRUE(computed);
    EXPECT_NEAR(*computed * per_SI(fluid, value.unit), value.printed - value.offset,
                tolerance(value));
  }
}

std::set<std::string> published_fluids() {
  std::set<std::string> all;
  for (const PublishedValue& value : published_values()) {
    all.insert(value.fluid);
  }
  return all;
}

INSTANTIATE_TEST_SUITE_P(AllPapers, Published, testing::ValuesIn(published_fluids()),
                         [](const auto& tested) { return test_name(tested.param); });

// IAPWS R6-95(2018), table 6: the residual part at 500 K and 838.025 kg/m3, nine digits.
TEST(Isotherm, HasTheDerivativesPrintedForWater) {
  const Fluid& water = *fluid_named("water");
  const double tau = 647.096 / 500.0;
  const double delta = 838.025 / 322.0;
  const Reduced part = Isotherm{water, 500.0}.residual(delta);
  EXPECT_NEAR(part.a, -3.42693206, 1e-8);
  EXPECT_NEAR(part.d / delta, -0.364366650, 1e-9);
  EXPECT_NEAR(part.dd / (delta * delta), 0.856063701, 1e-9);
  EXPECT_NEAR(part.t / tau, -5.81403435, 1e-8);
  EXPECT_NEAR(part.tt / (tau * tau), -2.23440737, 1e-8);
  EXPECT_NEAR(part.dt / (delta * tau), -1.12176915, 1e-8);
}

}  // namespace
}  // namespace lostwork
