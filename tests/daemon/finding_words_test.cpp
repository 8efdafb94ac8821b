#include "daemon/finding_words.h"

#include "tests/daemon/web/made_up_plant.h"

#include <chrono>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::Contains;
using testing::HasSubstr;

WallClock utc_clock() {
  return {.now = made_up_noon(), .offset = [](Instant /*time*/) { return std::chrono::hours{0}; }};
}

MachineView chiller() {
  return made_up_plant().machines.front();
}

TEST(HeadlineOfADrift, HasSizeIntervalAndOnset) {
  const MachineView machine = chiller();
  EXPECT_EQ(headline(machine.findings.front(), machine, utc_clock()),
            "Needs 6.1 % \u00b1 1.5 % (95 %) more power than it should, like for like, since 18 "
            "April (15 April to 20 April, 95 %).");
}

TEST(HeadlineOfASensor, NamesIt) {
  const MachineView machine = chiller();
  Finding finding = machine.findings.front();
  finding.kind = FindingKind::sensor_suspect;
  finding.suspect_sensors = {Role::cold_out_temperature};
  EXPECT_THAT(headline(finding, machine, utc_clock()),
              HasSubstr("The sensor 'cold water leaving' does not fit the others"));
}

TEST(HeadlineOfABrokenLaw, NamesTheSensorsThatCouldBeWrong) {
  const MachineView machine = chiller();
  Finding finding = machine.findings.front();
  finding.kind = FindingKind::law_broken;
  finding.suspect_sensors = {Role::cold_in_temperature, Role::cold_out_temperature};
  const std::string line = headline(finding, machine, utc_clock());
  EXPECT_THAT(line, HasSubstr("The readings cannot all be true"));
  EXPECT_THAT(line, HasSubstr("At least one of these is most likely wrong: 'cold water entering', "
                              "'cold water leaving'."));
}

TEST(ConsequencesOfADrift, SayWhereItGoes) {
  EXPECT_THAT(
      consequences(chiller().findings.front()),
      Contains(HasSubstr("The condenser loses 2.0 kW \u00b1 0.4 kW (95 %) more, 56 % \u00b1 "
                         "10 % (95 %) of the extra power.")));
}

TEST(ConsequencesOfADrift, SayWhatItCost) {
  EXPECT_THAT(consequences(chiller().findings.front()),
              Contains("So far it took 812 kWh \u00b1 220 kWh (95 %) more, which cost 203 EUR "
                       "\u00b1 56 EUR (95 %)."));
}

TEST(ConsequencesOfADrift, SayHowMuchCouldBeCompared) {
  EXPECT_THAT(consequences(chiller().findings.front()), Contains(HasSubstr("Only 91 %")));
}

TEST(TextOfEvidence, GivesADifferenceOfTemperaturesInKelvin) {
  const Evidence evidence{
      .quantity = Quantity::condensing, .before_SI = 309.15, .after_SI = 311.35, .u_SI = 0.3};
  EXPECT_THAT(
      text(FindingKind::efficiency_drift, evidence),
      HasSubstr("38.2 \u00b0C where 36.0 \u00b0C was expected (difference 2.2 K \u00b1 0.6 K (95 "
                "%))"));
}

// A window's condensing temperature that lies 1.5 K below the sink.
TEST(TextOfEvidence, GivesTheBoundOfALaw) {
  const Evidence evidence{
      .quantity = Quantity::condensing, .before_SI = 303.15, .after_SI = 301.65, .u_SI = 0.3};
  EXPECT_THAT(
      text(FindingKind::law_broken, evidence),
      HasSubstr("28.5 \u00b0C where the law allows at least 30.0 \u00b0C (beyond it by 1.5 K "
                "\u00b1 0.6 K (95 %))"));
}

struct OffCase {
  Role role;
  Measured off_SI;
  std::string said;
};
class SensorThatReadsWrong : public testing::TestWithParam<OffCase> {};

TEST_P(SensorThatReadsWrong, IsSaidToBeOffBySoMuch) {
  MachineView machine = chiller();
  machine.latest.values[Quantity::cold_flow] = Measured{.value = 14.0, .u = 0.1};
  const RankedCause cause{.cause = Cause::sensor,
                          .role = GetParam().role,
                          .probability = 0.9,
                          .amount_SI = GetParam().off_SI};
  EXPECT_THAT(text(cause, machine), testing::EndsWith(GetParam().said));
}

INSTANTIATE_TEST_SUITE_P(Kinds, SensorThatReadsWrong,
                         testing::Values(
                             OffCase{
                                 Role::cold_out_temperature,
                                 {.value = 0.48, .u = 0.025},
                                 "'cold water leaving' reads 0.48 K \u00b1 0.05 K (95 %) too high"
},
                             OffCase{Role::discharge_pressure,
                                     {.value = -21e3, .u = 1.5e3},
                                     "reads 21 kPa \u00b1 3 kPa (95 %) too low"},
                             OffCase{Role::power,
                                     {.value = 900.0, .u = 200.0},
                                     "reads 0.9 kW \u00b1 0.4 kW (95 %) too high"},
                             // 0.7 of 14 kg/s
                             OffCase{Role::cold_flow,
                                     {.value = 0.7, .u = 0.14},
                                     "reads 5.0 % \u00b1 2.0 % (95 %) too high"},
                             OffCase{Role::hot_flow,
                                     {.value = -0.7, .u = 0.2},
                                     "reads 0.7 kg/s \u00b1 0.4 kg/s (95 %) too low"},
                             OffCase{Role::power, {}, "'electrical power' is wrong"}));

TEST(CautionsOfADrift, DeferToLicensedWorkAndLocalCode) {
  EXPECT_THAT(cautions(chiller().findings.front()),
              Contains(HasSubstr("licensed or certified person, and under the local code")));
}

TEST(CautionsOfAWatchedFinding, SayThatItIsNotConfirmed) {
  Finding finding = chiller().findings.front();
  finding.state = FindingState::watch;
  EXPECT_THAT(cautions(finding), Contains(HasSubstr("Not confirmed yet")));
}

}  // namespace
}  // namespace lostwork
