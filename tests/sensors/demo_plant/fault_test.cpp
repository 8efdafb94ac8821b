#include "sensors/demo_plant/fault.h"

#include "sensors/demo_plant/plant.h"

#include <string>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::days;
using std::chrono::hours;
using std::chrono::minutes;
using testing::AllOf;
using testing::HasSubstr;

const Instant first_of_march = std::chrono::sys_days{std::chrono::March / 1 / 2026};

PlantFault parsed(std::string_view text) {
  return parse_fault(text, plant_fault_targets());
}

std::string refusal(std::string_view text) {
  try {
    (void)parsed(text);
  } catch (const BadFault& bad) {
    return bad.what();
  }
  return {};
}

TEST(ParseFault, ReadsAFoulingWithItsRate) {
  const PlantFault fault = parsed("condenser_fouling:machine=chiller-1,from=2026-03-01,rate=0.5");
  EXPECT_EQ(fault.kind, FaultKind::condenser_fouling);
  EXPECT_EQ(fault.target, "chiller-1");
  EXPECT_EQ(fault.from, first_of_march);
  EXPECT_DOUBLE_EQ(fault.size, 0.005);
  EXPECT_FALSE(fault.to);
}

TEST(ParseFault, ReadsAFoulingByItsCost) {
  const PlantFault fault =
      parsed("condenser_fouling:machine=chiller-1,from=2026-03-01,power=5,days=60");
  ASSERT_TRUE(fault.goal);
  EXPECT_DOUBLE_EQ(fault.goal->extra_power, 0.05);
  EXPECT_EQ(fault.goal->after, days{60});
}

TEST(ParseFault, ReadsTimesOfDayAndBlanks) {
  const PlantFault fault = parsed(
      " device_silent : device = weather , from = 2026-03-01T06:30Z , to = 2026-03-02T00:00:15 ");
  EXPECT_EQ(fault.from, first_of_march + hours{6} + minutes{30});
  EXPECT_EQ(fault.to, first_of_march + days{1} + std::chrono::seconds{15});
}

TEST(ParseFault, ReadsADriftOfEitherSign) {
  EXPECT_DOUBLE_EQ(parsed("sensor_drift:sensor=ch1_cold_in,from=2026-03-01,rate=-0.02").size,
                   -0.02);
}

struct BadText {
  const char* name;
  const char* text;
  const char* found;
  const char* allowed;
};

class ParseFaultRefuses : public testing::TestWithParam<BadText> {};

TEST_P(ParseFaultRefuses, NamingWhatWasFoundAndWhatIsAllowed) {
  EXPECT_THAT(refusal(GetParam().text),
              AllOf(HasSubstr(GetParam().found), HasSubstr(GetParam().allowed)));
}

INSTANTIATE_TEST_SUITE_P(
    BadTexts, ParseFaultRefuses,
    testing::Values(
        BadText{"Empty", "", "the kind is \"\"", "condenser_fouling, low_condenser_flow"},
        BadText{"UnknownKind", "fire:machine=chiller-1", "\"fire\"", "compressor_wear"},
        BadText{"UnknownMachine", "condenser_fouling:machine=chiller-9,from=2026-03-01,rate=1",
                "\"chiller-9\"", "chiller-1, heatpump-1"},
        BadText{"UnknownSensor", "sensor_drift:sensor=x,from=2026-03-01,rate=1", "\"x\"",
                "ch1_cold_in"},
        BadText{"UnknownDevice", "device_silent:device=x,from=2026-03-01,to=2026-03-02", "\"x\"",
                "heat-meters"},
        BadText{"NoDate", "condenser_fouling:machine=chiller-1,rate=1",
                "without from=", "machine, from, to, rate, limit, power, days"},
        BadText{"BadDate", "condenser_fouling:machine=chiller-1,from=2026-02-30,rate=1",
                "2026-02-30", "2026-03-01"},
        BadText{"BadHour", "condenser_fouling:machine=chiller-1,from=2026-02-20T24:00,rate=1",
                "T24:00", "T06:30"},
        BadText{"BadNumber", "condenser_fouling:machine=chiller-1,from=2026-03-01,rate=fast",
                "\"fast\"", "a number from"},
        BadText{"NotANumber", "condenser_fouling:machine=chiller-1,from=2026-03-01,rate=nan",
                "\"nan\"", "a number from"},
        BadText{"OutOfRange", "low_condenser_flow:machine=chiller-1,from=2026-03-01,loss=95",
                "\"95\"", "from 0.1 to 90"},
        BadText{"RateAndGoal",
                "compressor_wear:machine=chiller-1,from=2026-03-01,rate=1,power=5,days=9",
                "together with rate=", "one pair or the other"},
        BadText{"GoalWithoutDays", "compressor_wear:machine=chiller-1,from=2026-03-01,power=5",
                "without days=", "days= is needed"},
        BadText{"UnknownKey", "refrigerant_leak:machine=chiller-1,from=2026-03-01,rate=1,power=5",
                "\"power\"", "machine, from, to, rate, limit"},
        BadText{"TwiceTheSameKey", "condenser_fouling:machine=chiller-1,machine=heatpump-1",
                "\"machine\"", "each key once"},
        BadText{"NoEquals", "condenser_fouling:machine", "\"machine\"", "KEY=VALUE"},
        BadText{"RepairedBeforeItBegins",
                "refrigerant_leak:machine=chiller-1,from=2026-03-01,to=2026-03-01,rate=1",
                "\"2026-03-01\"", "after from="},
        BadText{"SilentForEver", "device_silent:device=weather,from=2026-03-01",
                "without to=", "to= is needed"}),
    [](const auto& row) { return std::string{row.param.name}; });

TEST(ParseFaultScript, SkipsCommentsAndBlankLines) {
  const auto faults = parse_fault_script(
      "# a year\n\nsensor_broken:sensor=ch1_liquid_t,from=2026-03-01 # since the storm\r\n"
      "refrigerant_leak:machine=heatpump-1,from=2026-03-01,rate=0.1\n",
      plant_fault_targets(), "year.txt");
  ASSERT_EQ(faults.size(), 2U);
  EXPECT_EQ(faults[0].kind, FaultKind::sensor_broken);
  EXPECT_EQ(faults[1].kind, FaultKind::refrigerant_leak);
}

TEST(ParseFaultScript, NamesFileAndLine) {
  try {
    (void)parse_fault_script("# one\n\nfire:\n", plant_fault_targets(), "year.txt");
    FAIL() << "accepted";
  } catch (const BadFault& bad) {
    EXPECT_THAT(bad.what(), HasSubstr("year.txt:3: "));
  }
}

TEST(PlantFault, GrowsFromItsDateToItsLimitUntilTheRepair) {
  PlantFault fault;
  fault.kind = FaultKind::condenser_fouling;
  fault.from = first_of_march;
  fault.to = first_of_march + days{100};
  fault.size = 0.01;
  fault.limit = 0.3;
  EXPECT_EQ(fault.extent(first_of_march - days{1}), 0.0);
  EXPECT_DOUBLE_EQ(fault.extent(first_of_march + days{10}), 0.1);
  EXPECT_DOUBLE_EQ(fault.extent(first_of_march + days{60}), 0.3);
  EXPECT_EQ(fault.extent(first_of_march + days{100}), 0.0);
}

TEST(PlantFault, LowFlowIsAStep) {
  const PlantFault fault = parsed("low_condenser_flow:machine=chiller-1,from=2026-03-01,loss=30");
  EXPECT_DOUBLE_EQ(fault.extent(first_of_march), 0.3);
  EXPECT_DOUBLE_EQ(fault.extent(first_of_march + days{300}), 0.3);
}

}  // namespace
}  // namespace lostwork
