// Windows whose figures are made by hand: whether a law is seen to be broken, and when it is said.
#include "thermo/health/laws.h"

#include "tests/thermo/health/played.h"

#include <chrono>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::minutes;
using ::testing::ElementsAre;
using ::testing::IsEmpty;
using ::testing::UnorderedElementsAre;

void set(Window& window, Quantity quantity, const Measured& value) {
  window.values.at(static_cast<std::size_t>(quantity)) =
      WindowMean{.mean_SI = value.value, .u_SI = value.u, .sd_SI = 0.0, .n_effective = 20.0};
}

// The plant of methods.md 1.8, whose balance is closed.
Window whole(int number = 0) {
  Window window;
  window.begin = testing::synthetic_start() + minutes{30 * number};
  window.end = window.begin + minutes{10};
  window.scans = 60;
  set(window, Quantity::energy_residual, {.value = 0.0, .u = 4000.0});
  set(window, Quantity::cold_in, {.value = 285.15, .u = 0.1});
  set(window, Quantity::cold_out, {.value = 280.15, .u = 0.1});
  set(window, Quantity::hot_in, {.value = 303.15, .u = 0.1});
  set(window, Quantity::hot_out, {.value = 308.08, .u = 0.1});
  set(window, Quantity::evaporating, {.value = 278.15, .u = 0.3});
  set(window, Quantity::condensing, {.value = 310.06, .u = 0.3});
  set(window, Quantity::lost_compressor, {.value = 14000.0, .u = 900.0});
  set(window, Quantity::lost_condenser, {.value = 6000.0, .u = 400.0});
  set(window, Quantity::lost_expansion, {.value = 5000.0, .u = 200.0});
  set(window, Quantity::lost_evaporator, {.value = 5000.0, .u = 300.0});
  return window;
}

struct Breach {
  std::string name;
  Quantity quantity;
  Measured broken;
  Measured just_whole;
};

std::ostream& operator<<(std::ostream& out, const Breach& b) {
  return out << b.name;
}

class CheckLaws : public ::testing::TestWithParam<Breach> {};

TEST_P(CheckLaws, SeesTheBreach) {
  Window window = whole();
  set(window, GetParam().quantity, GetParam().broken);
  const LawCheck check = check_laws(window);
  EXPECT_NE(check.broken, 0U);
  ASSERT_EQ(check.evidence.size(), 1U);
  EXPECT_EQ(check.evidence.front().quantity, GetParam().quantity);
  EXPECT_EQ(check.evidence.front().after_SI, GetParam().broken.value);
}

TEST_P(CheckLaws, LetsPassWhatTheUncertaintyAllows) {
  Window window = whole();
  set(window, GetParam().quantity, GetParam().just_whole);
  EXPECT_EQ(check_laws(window).broken, 0U);
}

// Figures that stand alone: the bound is 0. Pairs: u of the difference is hypot(0.1, 0.1) = 0.141 K
// for the waters, hypot(0.3, 0.1) = 0.316 K for a saturation temperature and a water.
INSTANTIATE_TEST_SUITE_P(
    Laws, CheckLaws,
    ::testing::Values(
        Breach{
            "HeatThatIsMissing", Quantity::energy_residual, {13000.0, 4000.0},
              {11000.0, 4000.0}
},
        Breach{
            "HeatFromNowhere", Quantity::energy_residual, {-13000.0, 4000.0}, {-11000.0, 4000.0}},
        Breach{"ACompressorThatDestroysEntropy",
               Quantity::lost_compressor,
               {-1900.0, 900.0},
               {-1700.0, 900.0}},
        Breach{"ACondenserThatDestroysEntropy",
               Quantity::lost_condenser,
               {-900.0, 400.0},
               {-700.0, 400.0}},
        Breach{"AValveThatDestroysEntropy",
               Quantity::lost_expansion,
               {-500.0, 200.0},
               {-300.0, 200.0}},
        Breach{"AnEvaporatorThatDestroysEntropy",
               Quantity::lost_evaporator,
               {-700.0, 300.0},
               {-500.0, 300.0}},
        Breach{"EvaporationAboveTheSource",
               Quantity::evaporating,
               {285.15 + 0.70, 0.3},
               {285.15 + 0.55, 0.3}},
        Breach{"CondensationBelowTheSink",
               Quantity::condensing,
               {303.15 - 0.70, 0.3},
               {303.15 - 0.55, 0.3}}),
    [](const auto& given) { return given.param.name; });

TEST(CheckLaws, SeesAStreamThatGoesTheWrongWay) {
  Window window = whole();
  set(window, Quantity::cold_out, {.value = 286.0, .u = 0.1});
  set(window, Quantity::evaporating, {.value = 278.15, .u = 0.3});
  EXPECT_NE(check_laws(window).broken, 0U);
}

TEST(CheckLaws, TestsNothingThatIsMissing) {
  EXPECT_EQ(check_laws(Window{}).tested, 0U);
}

HealthModel with_points() {
  HealthModel model = testing::health_model();
  for (const Role role : {Role::power, Role::cold_in_temperature, Role::cold_out_temperature,
                          Role::cold_flow, Role::suction_pressure, Role::suction_temperature,
                          Role::discharge_pressure, Role::liquid_temperature}) {
    ModelPoint point;
    point.role = role;
    model.machine.points.push_back(point);
  }
  return model;
}

std::vector<Finding> take(const HealthModel& model, HealthState& state, const Window& window) {
  HealthUpdate update = take_window(model, std::move(state), window);
  state = std::move(update.next);
  return update.changed;
}

Window broken(int number) {
  Window window = whole(number);
  set(window, Quantity::lost_expansion, {.value = -900.0, .u = 200.0});
  return window;
}

TEST(ABrokenLaw, IsSaidAfterADozenWindowsAndNotBefore) {
  const HealthModel model = with_points();
  HealthState state;
  for (int i = 0; i < 11; ++i) {
    EXPECT_THAT(take(model, state, broken(i)), IsEmpty());
  }
  const auto found = take(model, state, broken(11));
  ASSERT_EQ(found.size(), 1U);
  EXPECT_EQ(found.front().kind, FindingKind::law_broken);
  EXPECT_EQ(found.front().state, FindingState::active);
}

TEST(ABrokenLaw, NamesTheSensorsThatItRestsOn) {
  const HealthModel model = with_points();
  HealthState state;
  std::vector<Finding> found;
  for (int i = 0; i < 12; ++i) {
    found = take(model, state, broken(i));
  }
  ASSERT_EQ(found.size(), 1U);
  EXPECT_THAT(found.front().suspect_sensors,
              UnorderedElementsAre(Role::discharge_pressure, Role::liquid_temperature,
                                   Role::suction_pressure));
}

// Valve and evaporator share the suction pressure and nothing else.
TEST(TwoBrokenLaws, NameTheSensorsThatTheyShare) {
  const HealthModel model = with_points();
  HealthState state;
  std::vector<Finding> found;
  for (int i = 0; i < 12; ++i) {
    Window window = broken(i);
    set(window, Quantity::lost_evaporator, {.value = -900.0, .u = 300.0});
    found = take(model, state, window);
  }
  ASSERT_EQ(found.size(), 1U);
  EXPECT_THAT(found.front().suspect_sensors, ElementsAre(Role::suction_pressure));
}

TEST(ABrokenLaw, IsNotSaidOfOneWindowInThree) {
  const HealthModel model = with_points();
  HealthState state;
  for (int i = 0; i < 48; ++i) {
    EXPECT_THAT(take(model, state, i % 3 == 0 ? broken(i) : whole(i)), IsEmpty());
  }
}

TEST(ABrokenLaw, EndsWhenTheReadingsFitAgain) {
  const HealthModel model = with_points();
  HealthState state;
  for (int i = 0; i < 12; ++i) {
    (void)take(model, state, broken(i));
  }
  std::vector<Finding> found;
  int number = 12;
  while (found.empty() && number < 100) {
    found = take(model, state, whole(number));
    ++number;
  }
  ASSERT_EQ(found.size(), 1U);
  EXPECT_EQ(found.front().state, FindingState::over);
  EXPECT_THAT(open_findings(state), IsEmpty());
}

TEST(ABrokenLaw, IsNotLearnedFrom) {
  const HealthModel model = with_points();
  HealthState state;
  for (int i = 0; i < 12; ++i) {
    (void)take(model, state, broken(i));
  }
  const LearningStatus status = learning_status(model, state);
  EXPECT_EQ(status.windows, 0U);
  EXPECT_THAT(status.missing, ::testing::Contains(LearningNeed::laws));
}

// Steady windows are rare in a machine that cycles: its last dozen is judged, up to a week back.
TEST(ABrokenLaw, IsSaidOfAMachineWithThreeWindowsADay) {
  const HealthModel model = with_points();
  HealthState state;
  std::vector<Finding> found;
  for (int i = 0; i < 12; ++i) {
    found = take(model, state, broken(16 * i));
  }
  EXPECT_EQ(found.size(), 1U);
}

}  // namespace
}  // namespace lostwork
