#include "daemon/arguments.h"

#include <array>
#include <string_view>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using ::testing::ElementsAre;
using ::testing::HasSubstr;

constexpr std::array options{
    Option{"--config", "FILE",         "the plant file",  true},
    Option{ "--fault", "TEXT",                "a fault", false, true},
    Option{ "--probe",     "", "reads every point once"      },
};
constexpr CommandLine command{.usage = "lostwork x --config FILE",
                              .purpose = "Does x.",
                              .options = options,
                              .most_values = 2};

tl::expected<Arguments, std::string> parsed(const std::vector<std::string_view>& arguments) {
  return parse(command, arguments);
}

TEST(Parse, TakesOptionsWithAndWithoutValues) {
  const auto given = parsed({"--probe", "--config", "plant.toml"});
  ASSERT_TRUE(given);
  EXPECT_EQ(given->value("--config"), "plant.toml");
  EXPECT_TRUE(given->has("--probe"));
}

TEST(Parse, TakesANegativeNumberForAValue) {
  const auto given = parsed({"--config", "f", "-10", "-.5"});
  ASSERT_TRUE(given);
  EXPECT_THAT(given->values, ElementsAre("-10", "-.5"));
}

TEST(Parse, KeepsTheOrderOfAnOptionThatRepeats) {
  const auto given = parsed({"--config", "f", "--fault", "a", "--fault", "b"});
  ASSERT_TRUE(given);
  EXPECT_THAT(given->all("--fault"), ElementsAre("a", "b"));
}

TEST(Parse, AsksForNothingElseThanHelp) {
  const auto given = parsed({"--help", "--nonsense"});
  ASSERT_TRUE(given);
  EXPECT_TRUE(given->help);
}

struct Bad {
  const char* name;
  std::vector<std::string_view> arguments;
  const char* message;
};

class ParseRefuses : public ::testing::TestWithParam<Bad> {};

TEST_P(ParseRefuses, BadUsageWithASentenceThatNamesIt) {
  const auto given = parsed(GetParam().arguments);
  ASSERT_FALSE(given);
  EXPECT_THAT(given.error(), HasSubstr(GetParam().message));
}

INSTANTIATE_TEST_SUITE_P(
    Usage, ParseRefuses,
    ::testing::Values(
        Bad{
            "AnUnknownOption", {"--confg", "f"},
             "--confg: no such option"
},
        Bad{"AMissingValue", {"--config"}, "--config: needs a value, FILE"},
        Bad{"TheSameTwice", {"--config", "a", "--config", "b"}, "given twice"},
        Bad{"TooManyValues", {"--config", "a", "1", "2", "3"}, "3: not expected"},
        Bad{"AMissingOption", {}, "--config FILE: is required"}),
    [](const auto& param) { return std::string{param.param.name}; });

TEST(Number, RefusesWhatIsNotWhollyANumber) {
  EXPECT_FALSE(number("--speed", "60x", 1, 600));
  EXPECT_FALSE(number("--speed", "", 1, 600));
  EXPECT_FALSE(number("--speed", "nan", 1, 600));
}

TEST(Number, NamesTheLimits) {
  const auto value = number("--speed", "601", 1, 600);
  ASSERT_FALSE(value);
  EXPECT_EQ(value.error(), "--speed 601: allowed is a number from 1 to 600");
}

TEST(HelpText, ListsEveryOption) {
  EXPECT_THAT(help_text(command), HasSubstr("--config FILE"));
  EXPECT_THAT(help_text(command), HasSubstr("--probe"));
}

}  // namespace
}  // namespace lostwork
