#include "config/plant_file.h"

#include "tests/config/problem_printer.h"

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
using ::testing::UnorderedElementsAre;

constexpr std::string_view smallest = R"([site]
name = "Tern Quay Dairy"
)";

std::string with(std::string_view more) {
  return std::string{smallest} + std::string{more};
}

Problems problems_of(const std::string& text) {
  Problems problems;
  static_cast<void>(read_plant_file(text, "plant.toml", problems));
  return problems;
}

auto problem(std::uint32_t line, std::string_view key, std::string_view allowed) {
  return AllOf(Field(&Problem::line, line), Field(&Problem::key, std::string{key}),
               Field(&Problem::allowed, HasSubstr(std::string{allowed})));
}

TEST(ReadPlantFile, ANamedSiteIsEnough) {
  Problems problems;
  const auto file = read_plant_file(smallest, "plant.toml", problems);
  ASSERT_TRUE(file);
  EXPECT_THAT(problems, IsEmpty());
  EXPECT_EQ(file->site.name, "Tern Quay Dairy");
  EXPECT_EQ(file->web.listen, "127.0.0.1:8470");
}

TEST(ReadPlantFile, TellsAllProblemsAtOnce) {
  const Problems found = problems_of(R"([site]
altitude_m = "high"
[web]
lisen = "127.0.0.1:1"
[[machine]]
id = "m"
name = "M"
refrigerant = "R134a"
rated_power_kW = -3
duty = "freezing"
)");
  EXPECT_THAT(found, UnorderedElementsAre(
                         problem(1, "site.name", "is required"),
                         problem(2, "site.altitude_m", "a number from -500 to 9000"),
                         problem(4, "web.lisen", "no such key; known here: listen"),
                         problem(9, "machine \"m\".rated_power_kW", "a number from 0.01 to 100000"),
                         problem(10, "machine \"m\".duty", "one of \"cooling\", \"heating\"")));
}

TEST(ReadPlantFile, ReadsAMistypedKeyAsTheOneThatIsMeant) {
  EXPECT_THAT(problems_of("[site]\nnmae = \"\"\n"),
              UnorderedElementsAre(problem(2, "site.nmae", "no such key; known here: name"),
                                   problem(2, "site.name", "not empty")));
}

TEST(ReadPlantFile, ReadsAMistypedTableAsTheOneThatIsMeant) {
  EXPECT_THAT(problems_of(with("[[machnie]]\nid = 5\nname = \"M\"\nrefrigerant = \"R134a\"\n"
                               "rated_power_kW = 5\n")),
              UnorderedElementsAre(problem(3, "machnie", "no such table"),
                                   problem(4, "machine[1].id", "a text")));
}

TEST(ReadPlantFile, CallsATableWithoutAnIdByItsNumber) {
  EXPECT_THAT(problems_of(with("[[bus]]\naddress = \"127.0.0.1\"\n")),
              ElementsAre(problem(3, "bus[1].id", "is required")));
}

TEST(ReadPlantFile, ShowsTheValueThatItFound) {
  const Problems found = problems_of(with("altitude_m = 12000\n"));
  ASSERT_EQ(found.size(), 1U);
  EXPECT_EQ(text("plant.toml", found[0]),
            "plant.toml:3: site.altitude_m = 12000: a number from -500 to 9000");
}

TEST(ReadPlantFile, RefusesWhatIsNoToml) {
  const Problems found = problems_of("[site\nname = 3");
  ASSERT_EQ(found.size(), 1U);
  EXPECT_EQ(found[0].line, 1U);
}

TEST(ReadPlantFile, RefusesNotANumber) {
  EXPECT_THAT(problems_of(with("altitude_m = nan\n")),
              Contains(problem(3, "site.altitude_m", "a number")));
}

TEST(ReadPlantFile, RefusesAnUnknownTable) {
  EXPECT_THAT(problems_of(with("[sight]\nname = \"x\"\n")),
              Contains(problem(3, "sight", "no such table")));
}

TEST(ReadPlantFile, RefusesASingleTableWhereThereAreMany) {
  EXPECT_THAT(problems_of(with("[bus]\nid = \"plc\"\n")), Contains(problem(3, "bus", "[[bus]]")));
}

constexpr std::string_view point = R"([[point]]
id = "ch1_cold_in"
machine = "chiller-1"
role = "cold.in.temperature"
unit = "degC"
)";

PointEntry point_with(std::string_view more) {
  Problems problems;
  const auto file =
      read_plant_file(with(std::string{point} + std::string{more}), "plant.toml", problems);
  return problems.empty() && file && file->points.size() == 1 ? file->points[0] : PointEntry{};
}

TEST(ReadPlantFile, TakesOneAccuracy) {
  const PointEntry read = point_with("accuracy = { limit = 0.15 }\n");
  ASSERT_EQ(read.accuracy.size(), 1U);
  EXPECT_EQ(read.accuracy[0].limit, 0.15);
}

TEST(ReadPlantFile, TakesSeveralAccuracies) {
  const PointEntry read = point_with(
      "accuracy = [{ class = \"Pt100 A\" }, { percent_of_span = 0.5, span = [0, 25] }]\n");
  ASSERT_EQ(read.accuracy.size(), 2U);
  EXPECT_EQ(read.accuracy[0].sensor_class, "Pt100 A");
  EXPECT_EQ(read.accuracy[1].span, (std::array{0.0, 25.0}));
}

TEST(ReadPlantFile, TakesSentinelsAndRange) {
  const PointEntry read = point_with("sentinels = [0x8000]\nrange = [-40, 150]\n");
  EXPECT_THAT(read.sentinels,
              ElementsAre(std::variant<std::int64_t, double>{std::int64_t{0x8000}}));
  EXPECT_EQ(read.range, (std::array{-40.0, 150.0}));
}

TEST(ReadPlantFile, TakesCorrectionsWithTheirDates) {
  const PointEntry read = point_with("corrections = [{ from = 2026-03-01, add = 0.12 }]\n");
  ASSERT_EQ(read.corrections.size(), 1U);
  EXPECT_EQ(read.corrections[0].from, std::chrono::sys_days{std::chrono::March / 1 / 2026});
}

struct BadPoint {
  const char* name;
  const char* line;
  const char* key;
  const char* allowed;
};
void PrintTo(const BadPoint& bad, std::ostream* out) {
  *out << bad.line;
}

class ReadPlantFileRefuses : public ::testing::TestWithParam<BadPoint> {};

TEST_P(ReadPlantFileRefuses, ABadPoint) {
  const std::string text = with(std::string{point} + GetParam().line + "\n");
  EXPECT_THAT(problems_of(text),
              ElementsAre(problem(8, std::string{"point \"ch1_cold_in\"."} + GetParam().key,
                                  GetParam().allowed)));
}

INSTANTIATE_TEST_SUITE_P(
    Keys, ReadPlantFileRefuses,
    ::testing::Values(
        BadPoint{"AccuracyWithoutSpan", "accuracy = { percent_of_span = 1 }", "accuracy",
                 "span = [a, b]"},
        BadPoint{"NegativeAccuracy", "accuracy = { limit = -1 }", "accuracy", "X >= 0"},
        BadPoint{"EmptyAccuracy", "accuracy = {}", "accuracy", "one or several"},
        BadPoint{"RangeUpsideDown", "range = [5, 2]", "range", "[lowest, highest]"},
        BadPoint{"RegisterTooLarge", "register = 465536", "register", "from 0 to 465535"},
        BadPoint{"RegisterNotWhole", "register = 1.5", "register", "a whole number"},
        BadPoint{"UnknownType", "type = \"u48\"", "type", "one of \"u16\""},
        BadPoint{"SentinelNoNumber", "sentinels = [\"none\"]", "sentinels", "raw numbers"},
        BadPoint{"CorrectionsOutOfOrder",
                 "corrections = [{ from = 2026-03-01, add = 1 }, { from = 2026-02-01, add = 1 }]",
                 "corrections", "in the order of their dates"},
        BadPoint{"SecondCircuit", "circuit = 2", "circuit", "from 1 to 1"}),
    [](const auto& param) { return std::string{param.param.name}; });

}  // namespace
}  // namespace lostwork
