// The simulated plant's seasons through advance(): what is found, when, and whose fault it is said
// to be. The plant's physics are not those of the baseline (sensors/demo_plant/plant.h). Goals E6
// and E7.
#include "daemon/advance.h"
#include "sensors/demo_plant/plant_scan.h"

#include <chrono>
#include <memory>
#include <optional>
#include <ostream>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using namespace std::chrono_literals;
using std::chrono::days;
using std::chrono::sys_days;
using ::testing::Contains;
using ::testing::Each;
using ::testing::Field;
using ::testing::Not;

constexpr Instant season_start = sys_days{std::chrono::March / 2 / 2026};
constexpr Instant fault_begins = sys_days{std::chrono::May / 4 / 2026};

PlantOptions plant_with(std::string_view fault) {
  PlantOptions options;
  options.start = season_start;
  if (!fault.empty()) {
    options.faults.push_back(parse_fault(fault, plant_fault_targets()));
  }
  return options;
}

// One machine's way through a season, a scan a minute.
class Season {
 public:
  Season(const PlantOptions& options, PlantMachine machine)
      : Season{options, machine, minutely(machine)} {}
  Season(const PlantOptions& options, PlantMachine machine, MachineModel model)
      : plant_{options}, machine_{machine}, model_{step_model(std::move(model), AlarmRules{})} {
    state_ = fitted(model_, MachineState{});
  }

  static MachineModel minutely(PlantMachine machine) {
    MachineModel model = plant_machine_model(machine);
    model.scan_period = 60s;
    return model;
  }

  void run_until(Instant end) {
    while (plant_.time() < end) {
      plant_.step(60s - plant_.time().time_since_epoch() % 60s);
      MachineStep step = advance(model_, std::move(state_), plant_scan(plant_, machine_));
      state_ = std::move(step.next);
      const auto& power = step.assessment.values[Quantity::power];
      if (power && plant_.time() > fault_begins) {
        energy_J_ += power->value * 60.0;
      }
      for (const Finding& finding : step.findings) {
        findings_.push_back(finding);
      }
      for (const AlarmEvent& event : step.alarms) {
        alarms_.push_back(event);
      }
    }
  }

  // Stored and taken up again, as at a restart.
  void restart() { state_ = load(model_, save(state_)).value(); }

  [[nodiscard]] std::vector<std::uint8_t> bytes() const { return save(state_); }
  // Since the fault begins, all hours.
  [[nodiscard]] double energy_J() const { return energy_J_; }
  [[nodiscard]] const std::vector<AlarmEvent>& alarms() const { return alarms_; }
  // Of that kind, as it was when it was first confirmed; none: never.
  [[nodiscard]] std::optional<Finding> confirmed(FindingKind kind) const {
    for (const Finding& finding : findings_) {
      if (finding.kind == kind && finding.state == FindingState::active) {
        return finding;
      }
    }
    return std::nullopt;
  }
  [[nodiscard]] const std::vector<Finding>& findings() const { return findings_; }

 private:
  Plant plant_;
  PlantMachine machine_;
  StepModel model_;
  MachineState state_;
  std::vector<Finding> findings_;
  std::vector<AlarmEvent> alarms_;
  double energy_J_ = 0.0;
};

auto of_kind(AlarmKind kind) {
  return Field(&AlarmEvent::kind, kind);
}

// Grows until 13 June, when it costs 5 % at the machine's rating point, and stays.
constexpr std::string_view fouling =
    "condenser_fouling:machine=chiller-1,from=2026-05-04,power=5,days=40";

class Fouling : public ::testing::Test {
 protected:
  static void SetUpTestSuite() {
    season = std::make_unique<Season>(plant_with(fouling), PlantMachine::chiller);
    season->run_until(fault_begins + days{40 + 14});
  }
  static void TearDownTestSuite() { season.reset(); }
  static std::unique_ptr<Season> season;
};
std::unique_ptr<Season> Fouling::season;

TEST_F(Fouling, IsFoundWithinFourteenDaysOfCostingFivePercent) {
  const auto found = season->confirmed(FindingKind::efficiency_drift);
  ASSERT_TRUE(found);
  EXPECT_GT(*found->confirmed, fault_begins);
  EXPECT_LE(*found->confirmed, fault_begins + days{40 + 14});
}

TEST_F(Fouling, IsNamedTheCondensers) {
  const auto found = season->confirmed(FindingKind::efficiency_drift);
  ASSERT_TRUE(found);
  EXPECT_EQ(found->component, Component::condenser);
  EXPECT_EQ(found->causes.at(0).cause, Cause::condenser_fouled);
}

TEST_F(Fouling, HasAnOnsetIntervalThatHoldsTheTruth) {
  ASSERT_FALSE(season->findings().empty());
  const Finding& last = season->findings().back();
  EXPECT_LE(last.onset.earliest, fault_begins);
  EXPECT_GE(last.onset.latest, fault_begins);
}

// Second route: the same plant, weather and loads without the fault.
TEST_F(Fouling, CostsWhatATwinWithoutItSaves) {
  Season twin{plant_with(""), PlantMachine::chiller};
  twin.run_until(fault_begins + days{40 + 14});
  const double extra_J = season->energy_J() - twin.energy_J();
  const Finding& last = season->findings().back();
  EXPECT_NEAR(last.extra_energy_J.value, extra_J, 2.0 * last.extra_energy_J.u);
  // An interval that holds everything would tell nothing.
  EXPECT_LT(last.extra_energy_J.u, 0.5 * extra_J);
}

TEST_F(Fouling, IsNotCalledASensor) {
  EXPECT_THAT(season->alarms(), Not(Contains(of_kind(AlarmKind::sensor_suspect))));
}

struct PlantFaultCase {
  std::string_view name;
  std::string_view fault;
  PlantMachine machine;
  Cause cause;
};

std::ostream& operator<<(std::ostream& out, const PlantFaultCase& c) {
  return out << c.name;
}

class FaultOfThePlant : public ::testing::TestWithParam<PlantFaultCase> {};

TEST_P(FaultOfThePlant, IsFoundAndItsCauseNamedFirst) {
  Season season{plant_with(GetParam().fault), GetParam().machine};
  season.run_until(fault_begins + days{54});
  const auto found = season.confirmed(FindingKind::efficiency_drift);
  ASSERT_TRUE(found);
  EXPECT_GT(*found->confirmed, fault_begins);
  EXPECT_EQ(season.findings().back().causes.at(0).cause, GetParam().cause)
      << text(season.findings().back().causes.at(0).cause);
  EXPECT_THAT(season.alarms(), Not(Contains(of_kind(AlarmKind::sensor_suspect))));
}

INSTANTIATE_TEST_SUITE_P(
    Faults, FaultOfThePlant,
    ::testing::Values(
        PlantFaultCase{"RefrigerantLost",
                       "refrigerant_leak:machine=chiller-1,from=2026-05-04,rate=1,limit=30",
                       PlantMachine::chiller, Cause::refrigerant_low},
        PlantFaultCase{"CondenserFlowLow",
                       "low_condenser_flow:machine=chiller-1,from=2026-05-04,loss=35",
                       PlantMachine::chiller, Cause::hot_flow_low},
        PlantFaultCase{"CompressorWorn",
                       "compressor_wear:machine=chiller-1,from=2026-05-04,power=5,days=40",
                       PlantMachine::chiller, Cause::compressor_worn},
        PlantFaultCase{"CompressorOfTheHeatPumpWorn",
                       "compressor_wear:machine=heatpump-1,from=2026-05-04,power=5,days=40",
                       PlantMachine::heat_pump, Cause::compressor_worn}),
    [](const auto& given) { return std::string{given.param.name}; });

TEST(HealthyYear, OfTheChillerRaisesNoAlarm) {
  Season year{plant_with(""), PlantMachine::chiller};
  year.run_until(season_start + days{365});
  EXPECT_TRUE(year.alarms().empty());
}

TEST(HealthyYear, OfTheHeatPumpRaisesNoAlarm) {
  Season year{plant_with(""), PlantMachine::heat_pump};
  year.run_until(season_start + days{365});
  EXPECT_TRUE(year.alarms().empty());
}

TEST(ADriftingSensor, IsCalledASensorAndNoFaultOfTheMachine) {
  Season season{plant_with("sensor_drift:sensor=ch1_cold_out,from=2026-05-04,rate=0.02"),
                PlantMachine::chiller};
  season.run_until(fault_begins + days{30});
  const auto found = season.confirmed(FindingKind::sensor_suspect);
  ASSERT_TRUE(found);
  EXPECT_EQ(found->suspect_sensors.at(0), Role::cold_out_temperature);
  EXPECT_THAT(season.alarms(), Each(Not(of_kind(AlarmKind::drift))));
}

// One degree a day from the first day: no baseline is needed to see that the heats do not close.
TEST(ASensorThatIsWrongFromTheStart, IsCaughtByTheLawsBeforeAnythingIsLearned) {
  Season season{plant_with("sensor_drift:sensor=ch1_hot_out,from=2026-03-02,rate=1.0"),
                PlantMachine::chiller};
  season.run_until(season_start + days{7});
  const auto found = season.confirmed(FindingKind::law_broken);
  ASSERT_TRUE(found);
  EXPECT_THAT(found->suspect_sensors, Contains(Role::hot_out_temperature));
  EXPECT_THAT(season.alarms(), Contains(of_kind(AlarmKind::sensor_suspect)));
}

TEST(TwoSwappedSensors, AreCaughtByTheLaws) {
  MachineModel model = Season::minutely(PlantMachine::chiller);
  std::swap(model.points.at(*model.index_of(Role::cold_in_temperature)).role,
            model.points.at(*model.index_of(Role::cold_out_temperature)).role);
  Season season{plant_with(""), PlantMachine::chiller, model};
  season.run_until(season_start + days{5});
  const auto found = season.confirmed(FindingKind::law_broken);
  ASSERT_TRUE(found);
  EXPECT_THAT(found->suspect_sensors, ::testing::UnorderedElementsAre(Role::cold_in_temperature,
                                                                      Role::cold_out_temperature));
}

TEST(ARestart, InTheMiddleChangesNoLaterResult) {
  Season straight{plant_with(fouling), PlantMachine::chiller};
  Season restarted{plant_with(fouling), PlantMachine::chiller};
  const Instant middle = fault_begins + days{20} + 7h + 23min;
  straight.run_until(fault_begins + days{40});
  restarted.run_until(middle);
  restarted.restart();
  restarted.run_until(fault_begins + days{40});
  EXPECT_EQ(straight.bytes(), restarted.bytes());
  EXPECT_EQ(straight.alarms(), restarted.alarms());
}

}  // namespace
}  // namespace lostwork
