#include "config/plant_config.h"

#include "tests/config/problem_printer.h"

#include <cmath>
#include <ostream>
#include <string>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {

namespace {

using ::testing::AllOf;
using ::testing::Contains;
using ::testing::Field;
using ::testing::HasSubstr;
using ::testing::IsEmpty;

constexpr std::string_view machine = R"([site]
name = "Tern Quay Dairy"
altitude_m = 12
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
)";

struct PointText {
  std::string id = "cold_in";
  std::string role = "cold.in.temperature";
  std::string unit = "degC";
  std::string more;
};

std::string point(const PointText& p) {
  return "[[point]]\nid = \"" + p.id + "\"\nmachine = \"chiller-1\"\nrole = \"" + p.role +
         "\"\nunit = \"" + p.unit + "\"\n" + p.more + "\n";
}

tl::expected<PlantConfig, Problems> plant_of(const std::string& text) {
  return read_plant_file(text, "plant.toml").and_then(plant_from);
}

Problems problems_of(const std::string& more) {
  const auto plant = plant_of(std::string{machine} + more);
  return plant ? Problems{} : plant.error();
}

auto problem(std::string_view key, std::string_view allowed) {
  return AllOf(Field(&Problem::key, HasSubstr(std::string{key})),
               Field(&Problem::allowed, HasSubstr(std::string{allowed})));
}

TEST(PlantFrom, AMachineKnowsItsFluidAndItsRating) {
  const auto plant = plant_of(std::string{machine});
  ASSERT_TRUE(plant);
  ASSERT_EQ(plant->machines.size(), 1U);
  EXPECT_EQ(plant->machines[0].model.refrigerant, fluid_named("R134a"));
  EXPECT_EQ(plant->machines[0].model.rated_power_W, 95e3);
}

TEST(PlantFrom, ThePointsOfAMachineStandInTheSameOrderInModelAndWiring) {
  const auto plant =
      plant_of(std::string{machine} + point({.more = "device = \"panel\"\nregister = 100"}) +
               point({.id = "power", .role = "power", .unit = "kW", .more = "value = 3"}));
  ASSERT_TRUE(plant);
  const MachineModel& model = plant->machines[0].model;
  ASSERT_EQ(model.points.size(), 2U);
  EXPECT_EQ(plant->wiring.points[0].id, model.points[0].id);
  EXPECT_EQ(plant->wiring.points[1].id, model.points[1].id);
}

TEST(PlantFrom, AModiconNumberBecomesTheAddressOnTheWire) {
  std::string text{machine};
  text.replace(text.find("bus = \"plc\"\n"), 12, "bus = \"plc\"\naddresses = \"modicon\"\n");
  const auto plant = plant_of(text + point({.more = "device = \"panel\"\nregister = 40101"}));
  ASSERT_TRUE(plant);
  EXPECT_EQ(std::get<FromRegister>(plant->wiring.points[0].source).at.address, 100);
}

std::string pair_of(const std::string& accuracy) {
  const std::string more = "pair = \"ch1_cold\"\naccuracy = " + accuracy;
  return point({.id = "a", .more = more}) +
         point({.id = "b", .role = "cold.out.temperature", .more = more});
}

TEST(PlantFrom, TheSharedPartOfAPairLeavesTheStatedDifference) {
  const auto plant = plant_of(std::string{machine} + pair_of("{ limit = 0.2 }") +
                              "[[pair]]\nid = \"ch1_cold\"\ndifference = { limit = 0.1 }\n");
  ASSERT_TRUE(plant);
  const double share = plant->machines[0].model.points[0].shared_variance;
  // u(a - b)^2 = 2 u^2 (1 - share), by JCGM 100:2008 equation 16
  EXPECT_NEAR(std::sqrt(2.0 * (1.0 - share)) * 0.2, 0.1, 1e-12);
}

TEST(PlantFrom, APairWithoutAStatedDifferenceSharesHalfItsVariance) {
  const auto plant = plant_of(std::string{machine} + pair_of("{ limit = 0.2 }"));
  ASSERT_TRUE(plant);
  EXPECT_EQ(plant->machines[0].model.points[1].shared_variance, default_shared_variance);
  EXPECT_EQ(plant->machines[0].model.points[0].pair, plant->machines[0].model.points[1].pair);
}

TEST(PlantFrom, TakesASafetyLimitInItsUnit) {
  const auto plant = plant_of(std::string{machine} + R"([[safety_limit]]
machine = "chiller-1"
kind = "high_pressure"
limit = 18.0
unit = "bar_abs"
document = "name plate"
jurisdiction = "EN 378"
)");
  ASSERT_TRUE(plant);
  ASSERT_EQ(plant->machines[0].limits.size(), 1U);
  EXPECT_DOUBLE_EQ(plant->machines[0].limits[0].limit_SI, 18e5);
}

TEST(PlantFrom, NoSafetyLimitIsBuiltIn) {
  const auto plant = plant_of(std::string{machine});
  ASSERT_TRUE(plant);
  EXPECT_THAT(plant->machines[0].limits, IsEmpty());
}

struct Bad {
  const char* name;
  std::string text;
  const char* key;
  const char* allowed;
};
void PrintTo(const Bad& bad, std::ostream* out) {
  *out << bad.name;
}

class PlantFromRefuses : public ::testing::TestWithParam<Bad> {};

TEST_P(PlantFromRefuses, WhatDoesNotFitTogether) {
  EXPECT_THAT(problems_of(GetParam().text), Contains(problem(GetParam().key, GetParam().allowed)));
}

INSTANTIATE_TEST_SUITE_P(
    Plant, PlantFromRefuses,
    ::testing::Values(
        Bad{"AnUnknownRole", point({.role = "cold.inlet", .more = {}}), "role",
            "cold.in.temperature"},
        Bad{"AUnitThatDoesNotFitTheRole", point({.unit = "kW", .more = {}}), "unit", "degC degF K"},
        Bad{"AnUnknownDevice", point({.more = "device = \"pannel\"\nregister = 1"}), "device",
            "the id of a device"},
        Bad{"ADeviceWithoutRegister", point({.more = "device = \"panel\""}), "register",
            "is required"},
        Bad{"ARegisterWithoutDevice", point({.more = "register = 1"}), "register", "needs device"},
        Bad{"AValueAndARegister", point({.more = "value = 1\ndevice = \"panel\"\nregister = 1"}),
            "value", "not both"},
        Bad{"ADoubleId", point({}) + point({.role = "cold.out.temperature", .more = {}}),
            "point.id", "only once"},
        Bad{"ADoubleRole", point({}) + point({.id = "other", .more = {}}), "point.role",
            "only once"},
        Bad{"APairOfOne", point({.more = "pair = \"alone\""}), "pair", "exactly two points"},
        Bad{"ADifferenceWorseThanTheSensors",
            pair_of("{ limit = 0.1 }") +
                "[[pair]]\nid = \"ch1_cold\"\ndifference = { limit = 0.2 }\n",
            "pair", "at least as accurate"},
        Bad{"AnUnknownClass", point({.more = "accuracy = { class = \"Pt100 D\" }"}),
            "accuracy.class", "Pt100 AA"},
        Bad{"ASentinelTooLarge",
            point({.more = "device = \"panel\"\nregister = 1\nsentinels = [0x12345]"}), "sentinels",
            "fit the type"},
        Bad{"AnUnknownFluid",
            "[[machine]]\nid = \"m2\"\nname = \"M\"\nrefrigerant = \"R999\"\nrated_power_kW = 5\n",
            "refrigerant", "R134a"},
        Bad{"AnUnknownBus", "[[device]]\nid = \"d2\"\nbus = \"nowhere\"\n", "device.bus",
            "one of plc"},
        Bad{"AHostName", "[[bus]]\nid = \"b2\"\naddress = \"plc.example:502\"\n", "bus.address",
            "numeric"},
        Bad{"ASafetyLimitInAWrongUnit",
            "[[safety_limit]]\nmachine = \"chiller-1\"\nkind = \"freezing\"\nlimit = 1\nunit = "
            "\"kW\"\n"
            "document = \"d\"\njurisdiction = \"j\"\n",
            "safety_limit.unit", "freezing"}),
    [](const auto& param) { return std::string{param.param.name}; });

TEST(PlantFrom, RefusesAnUnknownTimeZone) {
  const auto plant = plant_of("[site]\nname = \"x\"\ntimezone = \"Europe/Atlantis\"\n");
  ASSERT_FALSE(plant);
  EXPECT_THAT(plant.error(), Contains(problem("site.timezone", "IANA")));
}

TEST(LoadPlant, SaysWhyAFileCannotBeRead) {
  const auto plant = load_plant("no/such/plant.toml");
  ASSERT_FALSE(plant);
  EXPECT_THAT(plant.error()[0].allowed, HasSubstr("No such file"));
}

}  // namespace
}  // namespace lostwork
