#include "daemon/check.h"

#include "tests/daemon/temporary_folder.h"

#include <sstream>
#include <string>
#include <string_view>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using ::testing::HasSubstr;
using ::testing::Not;

constexpr std::string_view plant = R"([site]
name = "Tern Quay Dairy"
[[bus]]
id = "plc"
address = "127.0.0.1:1502"
[[device]]
id = "panel"
bus = "plc"
[[machine]]
id = "chiller-1"
name = "Chiller 1"
refrigerant = "R134a"
rated_power_kW = 95
[[point]]
id = "power"
machine = "chiller-1"
role = "power"
unit = "kW"
device = "panel"
register = 100
type = "u32"
accuracy = { percent_of_reading = 5, limit = 3 }
)";

struct Outcome {
  int code;
  std::string out;
  std::string err;
};

Outcome checked(const std::string& more) {
  const TestFolder folder;
  const std::string file = folder.file("plant.toml", std::string{plant} + more);
  const std::vector<std::string_view> arguments{"--config", file};
  std::ostringstream out;
  std::ostringstream err;
  const int code = check_command(arguments, out, err);
  return {.code = code, .out = out.str(), .err = err.str()};
}

std::string cold_in_at(int number) {
  return "[[point]]\nid = \"cold_in\"\nmachine = \"chiller-1\"\nrole = \"cold.in.temperature\"\n"
         "unit = \"degC\"\naccuracy = { limit = 0.2 }\ndevice = \"panel\"\nregister = " +
         std::to_string(number) + "\n";
}

TEST(Check, CountsOneMachineAndOnePointAsOne) {
  EXPECT_THAT(checked("").out, HasSubstr("1 machine, 1 point\n"));
}

TEST(Check, SaysWhatSeveralPartsOfAnAccuracyMean) {
  EXPECT_THAT(checked("").out, HasSubstr("point power has an accuracy of 2 parts: they count as "
                                         "independent errors"));
}

TEST(Check, TellsOfTwoPointsOnOneRegister) {
  EXPECT_THAT(checked(cold_in_at(101)).out,
              HasSubstr("points power and cold_in read the same register of device panel"));
}

TEST(Check, SaysNothingOfPointsOnNeighbouringRegisters) {
  EXPECT_THAT(checked(cold_in_at(102)).out, Not(HasSubstr("same register")));
}

TEST(Check, RefusesAPageForOtherComputersAsRunDoes) {
  const Outcome outcome = checked("[web]\nlisten = \"0.0.0.0:8470\"\n");
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr("web.listen"));
}

}  // namespace
}  // namespace lostwork
