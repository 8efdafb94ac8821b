#include "config/plant_config.h"

#include "config/pairs.h"
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
using ::testing::ElementsAre;
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
  return read_plant(text, "plant.toml");
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

TEST(PlantFrom, GivesAStreamTheSolutionThatItNames) {
  const auto plant =
      plant_of(std::string{machine} + "hot_stream = { fluid = \"propylene glycol 30 %\" }\n");
  ASSERT_TRUE(plant);
  const MachineModel& model = plant->machines[0].model;
  EXPECT_TRUE(std::holds_alternative<WaterStream>(model.cold.fluid));
  EXPECT_TRUE(std::holds_alternative<Brine>(model.hot.fluid));
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
        Bad{"AStreamThatItDoesNotKnow", "hot_stream = { fluid = \"treacle 30 %\" }\n",
            "hot_stream.fluid", "propylene glycol up to 60 %"},
        Bad{"AStreamWithTwoHeatCapacities",
            "hot_stream = { fluid = \"water\", rho_cp_J_m3K = 4.2e6 }\n", "hot_stream.rho_cp_J_m3K",
            "not both"},
        Bad{"ASolutionBeyondItsFit", "hot_stream = { fluid = \"calcium chloride 31 %\" }\n",
            "hot_stream.fluid", "calcium chloride up to 30 %"},
        Bad{"AnUnknownDevice", point({.more = "device = \"pannel\"\nregister = 1"}), "device",
            "the id of a device"},
        Bad{"ADeviceWithoutRegister", point({.more = "device = \"panel\""}), "register",
            "is required"},
        Bad{"ARegisterWithoutDevice", point({.more = "register = 1"}), "register", "needs device"},
        Bad{"AValueAndARegister", point({.more = "value = 1\ndevice = \"panel\"\nregister = 1"}),
            "value", "not both"},
        Bad{"ADoubleId", point({}) + point({.role = "cold.out.temperature", .more = {}}),
            "point \"cold_in\".id", "only once"},
        Bad{"ADoubleRole", point({}) + point({.id = "other", .more = {}}), "point \"other\".role",
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
        Bad{"AnUnknownBus", "[[device]]\nid = \"d2\"\nbus = \"nowhere\"\n", "device \"d2\".bus",
            "one of plc"},
        Bad{"AHostName", "[[bus]]\nid = \"b2\"\naddress = \"plc.example:502\"\n",
            "bus \"b2\".address", "numeric"},
        Bad{"ASafetyLimitInAWrongUnit",
            "[[safety_limit]]\nmachine = \"chiller-1\"\nkind = \"freezing\"\nlimit = 1\nunit = "
            "\"kW\"\n"
            "document = \"d\"\njurisdiction = \"j\"\n",
            "safety_limit[1].unit", "freezing"},
        Bad{"AnUnknownClassOfADifference",
            pair_of("{ limit = 0.1 }") +
                "[[pair]]\nid = \"ch1_cold\"\ndifference = { class = \"Pt100 D\" }\n",
            "pair \"ch1_cold\".difference.class", "Pt100 AA"},
        Bad{"AKindOfBusThatIsNotSupported",
            "[[bus]]\nid = \"b2\"\nkind = \"rtu_over_tcp\"\naddress = \"192.0.2.7:502\"\n",
            "bus \"b2\".kind", "not supported yet"},
        Bad{"ABaudRateBetweenTheUsualOnes",
            "[[bus]]\nid = \"b2\"\nkind = \"rtu\"\naddress = \"/dev/ttyUSB0\"\nbaud = 9601\n",
            "bus \"b2\".baud", "9600"},
        Bad{"AScaleOfNought", point({.more = "device = \"panel\"\nregister = 1\nscale = 0"}),
            "point \"cold_in\".scale", "any finite number but 0"},
        Bad{"APageForOtherComputers", "[web]\nlisten = \"0.0.0.0:8470\"\n", "web.listen",
            "an address of this computer itself"}),
    [](const auto& param) { return std::string{param.param.name}; });

auto problem_at(std::uint32_t line, std::string_view key, std::string_view found,
                std::string_view allowed) {
  return AllOf(Field(&Problem::line, line), Field(&Problem::key, std::string{key}),
               Field(&Problem::found, HasSubstr(std::string{found})),
               Field(&Problem::allowed, HasSubstr(std::string{allowed})));
}

constexpr std::string_view many_problems = R"([site]
name = "Tern Quay Dairy"
altitude_m = "twelve"
timezone = "Europe/Atlantis"
[web]
listen = "0.0.0.0:8470"
[[bus]]
id = "plc"
address = "127.0.0.1:1502"
[[device]]
id = "panel"
bus = "plk"
[[machine]]
id = "chiller-1"
name = "Chiller 1"
duty = "freezing"
refrigerant = "R999"
rated_power_kW = 95
[[pair]]
id = "ch1_cold"
difference = { limit = 0.1 }
[[point]]
id = "power"
machine = "chiller-1"
role = "power"
unit = "degC"
device = "panel"
regsiter = 100
type = "u16"
[[point]]
id = "cold_in"
machine = "chiller-1"
role = "cold.in.temperature"
unit = "degC"
pair = "ch1_cold"
accuracy = { limit = 0.2 }
device = "panel"
register = 101
[[point]]
id = "cold_out"
machine = "chiller-1"
role = "cold.out.temperature"
unit = "degC"
pair = "ch1_clod"
accuracy = { limit = 0.2 }
device = "pannel"
register = 102
range = [50, -10]
[[point]]
id = "hot_in"
machine = "chiller-2"
role = "hot.in.temperature"
unit = "kW"
[[safety_limit]]
machine = "chiller-3"
kind = "freezing"
limit = 1
unit = "kW"
document = "name plate"
jurisdiction = "EN 378"
)";

TEST(ReadPlant, TellsEveryProblemOnceInTheOrderOfTheFile) {
  const auto plant = plant_of(std::string{many_problems});
  ASSERT_FALSE(plant);
  EXPECT_THAT(
      plant.error(),
      ElementsAre(
          problem_at(3, "site.altitude_m", "twelve", "a number from -500 to 9000"),
          problem_at(4, "site.timezone", "Europe/Atlantis", "IANA"),
          problem_at(6, "web.listen", "0.0.0.0:8470", "this computer itself"),
          problem_at(12, "device \"panel\".bus", "plk", "one of plc"),
          problem_at(16, "machine \"chiller-1\".duty", "freezing", "\"cooling\", \"heating\""),
          problem_at(17, "machine \"chiller-1\".refrigerant", "R999", "R134a"),
          problem_at(26, "point \"power\".unit", "degC", "for power one of kW W"),
          problem_at(28, "point \"power\".regsiter", "100", "no such key"),
          problem_at(44, "point \"cold_out\".pair", "ch1_clod", "exactly two points"),
          problem_at(46, "point \"cold_out\".device", "pannel", "the id of a device"),
          problem_at(48, "point \"cold_out\".range", "50", "[lowest, highest]"),
          problem_at(51, "point \"hot_in\".machine", "chiller-2", "one of chiller-1"),
          problem_at(53, "point \"hot_in\".unit", "kW", "degC degF K"),
          problem_at(55, "safety_limit[1].machine", "chiller-3", "one of chiller-1"),
          problem_at(58, "safety_limit[1].unit", "kW", "freezing")));
}

// A mistake, and the one key that is to be told of: what follows from it is not.
struct Cause {
  const char* name;
  std::string text;
  const char* key;
};
void PrintTo(const Cause& cause, std::ostream* out) {
  *out << cause.name;
}

std::string changed(std::string text, std::string_view what, std::string_view with) {
  return text.replace(text.find(what), what.size(), with);
}

class ReadPlantTellsOnlyTheCause : public ::testing::TestWithParam<Cause> {};

TEST_P(ReadPlantTellsOnlyTheCause, OfOneMistake) {
  const auto plant = plant_of(GetParam().text);
  ASSERT_FALSE(plant);
  EXPECT_THAT(plant.error(), ElementsAre(Field(&Problem::key, GetParam().key)));
}

const std::string one_point =
    std::string{machine} + point({.more = "device = \"panel\"\nregister = 1"});

INSTANTIATE_TEST_SUITE_P(
    Mistakes, ReadPlantTellsOnlyTheCause,
    ::testing::Values(
        Cause{"AMachineWithoutAGoodId", changed(one_point, "id = \"chiller-1\"", "id = 1"),
              "machine[1].id"},
        Cause{"AMachineWithABadFluid", changed(one_point, "R134a", "R999"),
              "machine \"chiller-1\".refrigerant"},
        Cause{"AMistypedTableOfMachines", changed(one_point, "[[machine]]", "[[machnie]]"),
              "machnie"},
        Cause{"OneTableWhereThereAreMany", changed(one_point, "[[device]]", "[device]"), "device"},
        Cause{"ADeviceWithoutAGoodId", changed(one_point, "id = \"panel\"", "id = \"\""),
              "device[1].id"},
        Cause{"ABusWithoutAGoodId", changed(one_point, "id = \"plc\"", "id = 3"), "bus[1].id"},
        Cause{"ABusOfABadKind",
              changed(one_point, "address = \"127.0.0.1:1502\"",
                      "kind = \"serial\"\naddress = \"/dev/ttyUSB0\""),
              "bus \"plc\".kind"},
        Cause{"ARegisterThatIsNoNumber", changed(one_point, "register = 1", "register = \"one\""),
              "point \"cold_in\".register"},
        Cause{"ABadType", one_point + "type = \"x32\"\nsentinels = [-1, 0x12345678]\n",
              "point \"cold_in\".type"},
        Cause{"ARoleThatIsNoText", changed(one_point, "role = \"cold.in.temperature\"", "role = 7"),
              "point \"cold_in\".role"},
        Cause{"APointOfABadPair",
              std::string{machine} +
                  changed(pair_of("{ limit = 0.2 }"), "pair = \"ch1_cold\"", "pair = 1"),
              "point \"a\".pair"},
        Cause{"AMistypedPairThatIsDeclared",
              std::string{machine} +
                  changed(pair_of("{ limit = 0.2 }"), "\"ch1_cold\"", "\"ch1_clod\"") +
                  "[[pair]]\nid = \"ch1_cold\"\ndifference = { limit = 0.1 }\n",
              "point \"a\".pair"},
        Cause{"AMistypedPairThatIsNotDeclared",
              std::string{machine} +
                  changed(pair_of("{ limit = 0.2 }"), "\"ch1_cold\"", "\"ch1_clod\""),
              "point \"b\".pair"},
        Cause{"APairWithABadUnit",
              std::string{machine} + changed(pair_of("{ limit = 0.2 }"), "degC", "kW"),
              "point \"a\".unit"},
        Cause{"ADifferenceOfABadAccuracy",
              std::string{machine} +
                  changed(pair_of("{ limit = 0.2 }"), "{ limit = 0.2 }", "{ limit = -1 }") +
                  "[[pair]]\nid = \"ch1_cold\"\ndifference = { limit = 0.1 }\n",
              "point \"a\".accuracy"}),
    [](const auto& param) { return std::string{param.param.name}; });

TEST(PlantFrom, RefusesAnUnknownTimeZone) {
  const auto plant = plant_of("[site]\nname = \"x\"\ntimezone = \"Europe/Atlantis\"\n");
  ASSERT_FALSE(plant);
  EXPECT_THAT(plant.error(), Contains(problem_at(3, "site.timezone", "Europe/Atlantis", "IANA")));
}

TEST(LoadPlant, SaysWhyAFileCannotBeRead) {
  const auto plant = load_plant("no/such/plant.toml");
  ASSERT_FALSE(plant);
  EXPECT_THAT(plant.error()[0].allowed, HasSubstr("No such file"));
}

}  // namespace
}  // namespace lostwork
