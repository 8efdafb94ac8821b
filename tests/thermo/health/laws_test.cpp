// Windows whose figures are made by hand: whether a law is seen to be broken, and when it is said;
// and the ledger itself as second route to the sensors that a law rests on.
#include "thermo/health/laws.h"

#include "tests/thermo/cycle/test_machine.h"
#include "tests/thermo/health/played.h"
#include "thermo/cycle/ledger.h"

#include <algorithm>
#include <chrono>
#include <cmath>
#include <functional>
#include <optional>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::minutes;
using ::testing::ElementsAre;
using ::testing::IsEmpty;
using ::testing::SizeIs;
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

HealthModel with_points() {
  HealthModel model = testing::health_model();
  for (const Role role :
       {Role::power, Role::cold_in_temperature, Role::cold_out_temperature, Role::cold_flow,
        Role::hot_in_temperature, Role::hot_out_temperature, Role::suction_pressure,
        Role::suction_temperature, Role::discharge_pressure, Role::discharge_temperature,
        Role::liquid_temperature}) {
    ModelPoint point;
    point.role = role;
    model.machine.points.push_back(point);
  }
  return model;
}

LawCheck checked(const Window& window) {
  return check_laws(with_points().machine, window);
}

std::vector<Evidence> evidence(const LawCheck& check) {
  std::vector<Evidence> out;
  for (const auto& e : check.evidence) {
    if (e) {
      out.push_back(*e);
    }
  }
  return out;
}

TEST_P(CheckLaws, SeesTheBreach) {
  Window window = whole();
  set(window, GetParam().quantity, GetParam().broken);
  const LawCheck check = checked(window);
  EXPECT_NE(check.broken, 0U);
  ASSERT_EQ(evidence(check).size(), 1U);
  EXPECT_EQ(evidence(check).front().quantity, GetParam().quantity);
  EXPECT_EQ(evidence(check).front().after_SI, GetParam().broken.value);
}

TEST_P(CheckLaws, LetsPassWhatTheUncertaintyAllows) {
  Window window = whole();
  set(window, GetParam().quantity, GetParam().just_whole);
  EXPECT_EQ(checked(window).broken, 0U);
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
        Breach{"AColdStreamThatIsWarmed",
               Quantity::cold_out,
               {285.15 + 0.31, 0.1},
               {285.15 + 0.25, 0.1}},
        Breach{"AHotStreamThatIsCooled",
               Quantity::hot_out,
               {303.15 - 0.31, 0.1},
               {303.15 - 0.25, 0.1}},
        Breach{"ACompressorThatDestroysEntropy",
               Quantity::lost_compressor,
               {-1900.0, 900.0},
               {-1700.0, 900.0}},
        Breach{"ACondenserThatDestroysEntropy",
               Quantity::lost_condenser,
               {-900.0, 400.0},
               {-700.0, 400.0}},
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

// 1900 W below 0 with 900 W from the sensors, and 2000 W / sqrt(20) = 447 W from the scatter: u is
// 1005 W, and twice that is more.
TEST(CheckLaws, CountsTheScatterOfTheWindow) {
  Window window = whole();
  window.values.at(static_cast<std::size_t>(Quantity::lost_compressor)) =
      WindowMean{.mean_SI = -1900.0, .u_SI = 900.0, .sd_SI = 2000.0, .n_effective = 20.0};
  EXPECT_EQ(checked(window).broken, 0U);
}

TEST(CheckLaws, TestsNothingThatIsMissing) {
  EXPECT_EQ(checked(Window{}).tested, 0U);
}

TEST(CheckLaws, TestsNothingWithoutUncertainty) {
  Window window = whole();
  set(window, Quantity::lost_compressor, {.value = -1900.0, .u = 0.0});
  EXPECT_EQ(checked(window).broken, 0U);
}

// Heat meters that disagree by a few percent are common practice, no source: where nobody said how
// good they are, they accuse nobody.
TEST(CheckLaws, LeavesOutALawWithASensorOfUnknownAccuracy) {
  HealthModel model = with_points();
  model.machine.points.at(*model.machine.index_of(Role::cold_flow)).accuracy_known = false;
  Window window = whole();
  set(window, Quantity::energy_residual, {.value = 15000.0, .u = 100.0});
  const LawCheck check = check_laws(model.machine, window);
  EXPECT_EQ(check.broken, 0U);
  EXPECT_EQ(check.tested & 1U, 0U);
}

struct Shown {
  Law law;
  Quantity figure;
  bool per_kg;  // of refrigerant: its flow scales the figure and cannot turn its sign
};

class SensorsOfALaw : public ::testing::TestWithParam<Shown> {
 protected:
  static std::optional<double> figure(const test::TestMachine& machine) {
    const auto values = assess(machine.model, machine.scan, Mode::running).values;
    const auto& found = values[GetParam().figure];
    const auto& flow = values[Quantity::refrigerant_flow];
    if (!found || !flow) {
      return std::nullopt;
    }
    return GetParam().per_kg ? found->value / flow->value : found->value;
  }
  // By what share of its size the sensor's uncertainty moves the figure.
  static double moved(const test::TestMachine& machine, Role role, double size) {
    test::TestMachine off = machine;
    Reading& reading = off.reading(role);
    reading.value_SI += reading.u_SI;
    const auto after = figure(off);
    return after ? std::abs(*after - *figure(machine)) / size : 0.0;
  }
};

// Second route: the ledger, asked with one reading moved at a time.
TEST_P(SensorsOfALaw, AreThoseThatMoveItsFigure) {
  const test::TestMachine machine = test::make_machine({}, {.stream_T_K = 0.1,
                                                            .refrigerant_T_K = 0.5,
                                                            .pressure_Pa = 5000.0,
                                                            .flow_share = 0.02,
                                                            .power_share = 0.01});
  // A share of the power; per kg of refrigerant, of the entropy that the power would make.
  const double size = GetParam().per_kg ? machine.truth.power_W / machine.truth.hot_mean_T_K /
                                              test::Cycle{}.flow_kgs
                                        : machine.truth.power_W;
  const std::vector<Role> named = sensors_of(GetParam().law, machine.model);
  for (const ModelPoint& point : machine.model.points) {
    const double share = moved(machine, point.role, size);
    const bool is_named = std::find(named.begin(), named.end(), point.role) != named.end();
    // 1 %: plain to see. 1e-9: rounding.
    EXPECT_TRUE(share < 0.01 || is_named) << name(point.role) << " moves it by " << share;
    EXPECT_TRUE(share > 1e-9 || !is_named) << name(point.role) << " does not move it";
  }
}

INSTANTIATE_TEST_SUITE_P(
    Laws, SensorsOfALaw,
    ::testing::Values(Shown{Law::heats_close, Quantity::energy_residual, false},
                      Shown{Law::compressor_entropy, Quantity::lost_compressor, false},
                      Shown{Law::condenser_entropy, Quantity::entropy_condenser, true},
                      Shown{Law::evaporator_entropy, Quantity::entropy_evaporator, true}));

std::vector<Finding> take(const HealthModel& model, HealthState& state, const Window& window) {
  HealthUpdate update = take_window(model, std::move(state), window);
  state = std::move(update.next);
  return update.changed;
}

Window broken(int number) {
  Window window = whole(number);
  set(window, Quantity::condensing, {.value = 300.15, .u = 0.3});
  return window;
}

// What was said of the windows from `first` to before `end`, half an hour apart.
std::vector<Finding> take_all(const HealthModel& model, HealthState& state, int first, int end,
                              const std::function<Window(int)>& window) {
  std::vector<Finding> all;
  for (int i = first; i < end; ++i) {
    const auto said = take(model, state, window(i));
    all.insert(all.end(), said.begin(), said.end());
  }
  return all;
}

TEST(ABrokenLaw, IsSaidAfterADozenWindowsAndNotBefore) {
  const HealthModel model = with_points();
  HealthState state;
  EXPECT_THAT(take_all(model, state, 0, 11, broken), IsEmpty());
  const auto found = take(model, state, broken(11));
  ASSERT_EQ(found.size(), 1U);
  EXPECT_EQ(found.front().kind, FindingKind::law_broken);
  EXPECT_EQ(found.front().state, FindingState::active);
}

TEST(ABrokenLaw, NamesTheSensorsThatItRestsOn) {
  const HealthModel model = with_points();
  HealthState state;
  const auto found = take_all(model, state, 0, 12, broken);
  ASSERT_EQ(found.size(), 1U);
  EXPECT_THAT(found.front().suspect_sensors,
              UnorderedElementsAre(Role::discharge_pressure, Role::hot_in_temperature));
}

// The compressor's work and the lift over the sink share the discharge pressure and nothing else.
TEST(TwoBrokenLaws, NameTheSensorsThatTheyShare) {
  const HealthModel model = with_points();
  HealthState state;
  const auto found = take_all(model, state, 0, 12, [](int i) {
    Window window = broken(i);
    set(window, Quantity::lost_compressor, {.value = -9000.0, .u = 900.0});
    return window;
  });
  ASSERT_EQ(found.size(), 1U);
  EXPECT_THAT(found.front().suspect_sensors, ElementsAre(Role::discharge_pressure));
}

TEST(ABrokenLaw, IsNotSaidOfOneWindowInThree) {
  const HealthModel model = with_points();
  HealthState state;
  EXPECT_THAT(
      take_all(model, state, 0, 48, [](int i) { return i % 3 == 0 ? broken(i) : whole(i); }),
      IsEmpty());
}

TEST(ABrokenLaw, IsOpenedByAWindowThatBreaksIt) {
  const HealthModel model = with_points();
  HealthState state;
  const auto found =
      take_all(model, state, 0, 13, [](int i) { return i == 11 ? whole(i) : broken(i); });
  ASSERT_EQ(found.size(), 1U);
  EXPECT_EQ(found.front().confirmed, broken(12).end);
  EXPECT_THAT(found.front().evidence, SizeIs(1));
}

// Whole until window 19, broken from 20 on.
TEST(ABrokenLaw, IsDatedBetweenTheLastWholeWindowAndTheFirstBrokenOne) {
  const HealthModel model = with_points();
  HealthState state;
  const auto found =
      take_all(model, state, 0, 100, [](int i) { return i < 20 ? whole(i) : broken(i); });
  ASSERT_EQ(found.size(), 1U);
  EXPECT_EQ(found.front().onset.earliest, whole(19).end);
  EXPECT_EQ(found.front().onset.best, broken(20).end);
}

TEST(ABrokenLaw, EndsWhenTheReadingsFitAgain) {
  const HealthModel model = with_points();
  HealthState state;
  ASSERT_THAT(take_all(model, state, 0, 12, broken), SizeIs(1));
  const auto found = take_all(model, state, 12, 100, [](int i) { return whole(i); });
  ASSERT_EQ(found.size(), 1U);
  EXPECT_EQ(found.front().state, FindingState::over);
  EXPECT_THAT(open_findings(state), IsEmpty());
}

TEST(ABrokenLaw, DoesNotEndOnOneWindowAfterALongPause) {
  const HealthModel model = with_points();
  HealthState state;
  ASSERT_THAT(take_all(model, state, 0, 12, broken), SizeIs(1));
  EXPECT_THAT(take(model, state, whole(48 * 60)), IsEmpty());
  EXPECT_THAT(open_findings(state), SizeIs(1));
}

TEST(ABrokenLaw, DoesNotEndBecauseItsFigureIsGone) {
  const HealthModel model = with_points();
  HealthState state;
  ASSERT_THAT(take_all(model, state, 0, 12, broken), SizeIs(1));
  EXPECT_THAT(take_all(model, state, 12, 100,
                       [](int i) {
                         Window window = whole(i);
                         window.values.at(static_cast<std::size_t>(Quantity::condensing)).reset();
                         return window;
                       }),
              IsEmpty());
}

TEST(ABrokenLaw, IsNotLearnedFrom) {
  const HealthModel model = with_points();
  HealthState state;
  (void)take_all(model, state, 0, 5, broken);
  const LearningStatus status = learning_status(model, state);
  EXPECT_EQ(status.windows, 0U);
  EXPECT_THAT(status.missing, ::testing::Contains(LearningNeed::laws));
}

TEST(ABrokenLaw, OutlivesANewBaseline) {
  const HealthModel model = with_points();
  HealthState state;
  (void)take_all(model, state, 0, 12, broken);
  const HealthUpdate update = begin_learning(model, state, broken(12).end);
  EXPECT_THAT(update.changed, IsEmpty());
  EXPECT_THAT(open_findings(update.next), SizeIs(1));
}

TEST(ABrokenLaw, IsRememberedInAnArchive) {
  const HealthModel model = with_points();
  HealthState state;
  (void)take_all(model, state, 0, 6, broken);
  ArchiveWriter writer;
  archive(writer, state);
  ArchiveReader reader{writer.bytes()};
  HealthState again;
  archive(reader, again);
  EXPECT_THAT(take_all(model, again, 6, 12, broken), SizeIs(1));
}

// Steady windows are rare in a machine that cycles: its last dozen is judged.
TEST(ABrokenLaw, IsSaidOfAMachineWithThreeWindowsADay) {
  const HealthModel model = with_points();
  HealthState state;
  EXPECT_THAT(take_all(model, state, 0, 12, [](int i) { return broken(16 * i); }), SizeIs(1));
}

}  // namespace
}  // namespace lostwork
