#include "daemon/web/metrics.h"

#include "tests/daemon/web/made_up_plant.h"

#include <chrono>
#include <regex>
#include <set>
#include <sstream>
#include <string>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::EndsWith;
using testing::HasSubstr;
using testing::Not;

// The line forms of OpenMetrics 1.0.0, as far as they are used; labels without escapes are enough
// for all but the label values.
TEST(MetricsText, IsWellFormed) {
  const std::regex comment{R"(# (TYPE|UNIT|HELP) [a-zA-Z_][a-zA-Z0-9_]* .+)"};
  const std::regex sample{
      R"([a-zA-Z_][a-zA-Z0-9_]*\{([a-z_]+="([^"\\]|\\.)*",?)*\} -?[0-9][0-9.e+-]*)"};
  std::istringstream lines{metrics_text(made_up_plant())};
  std::string line;
  while (std::getline(lines, line)) {
    EXPECT_TRUE(line == "# EOF" || std::regex_match(line, comment) ||
                std::regex_match(line, sample))
        << line;
  }
}

TEST(MetricsText, EndsWithItsMark) {
  EXPECT_THAT(metrics_text(made_up_plant()), EndsWith("\n# EOF\n"));
}

TEST(MetricsText, NamesEveryFamilyOnce) {
  std::set<std::string> seen;
  std::istringstream lines{metrics_text(made_up_plant())};
  std::string line;
  while (std::getline(lines, line)) {
    if (line.starts_with("# TYPE ")) {
      EXPECT_TRUE(seen.insert(line).second) << line;
    }
  }
}

// "If a unit is specified it MUST be provided as a suffix of the metric name" (OpenMetrics 1.0.0).
TEST(MetricsText, HasUnitsThatEndTheirNames) {
  std::istringstream lines{metrics_text(made_up_plant())};
  std::string mark;
  std::string word;
  std::string name;
  std::string unit;
  std::string line;
  while (std::getline(lines, line)) {
    if (line.starts_with("# UNIT ")) {
      std::istringstream{line} >> mark >> word >> name >> unit;
      EXPECT_THAT(name, EndsWith("_" + unit));
    }
  }
}

TEST(MetricsText, GivesFiguresInTheUnitOfTheName) {
  EXPECT_THAT(metrics_text(made_up_plant()),
              HasSubstr("\nlostwork_power_kW{machine=\"chiller-1\"} 59.4\n"));
}

TEST(MetricsText, EscapesNames) {
  PlantView view = made_up_plant();
  view.machines.front().id = "a\"b\\c\nd";
  EXPECT_THAT(metrics_text(view), HasSubstr(R"(lostwork_power_kW{machine="a\"b\\c\nd"} 59.4)"));
}

TEST(MetricsText, HasTheReasonForWhatIsMissing) {
  EXPECT_THAT(metrics_text(made_up_plant()),
              HasSubstr("lostwork_missing{machine=\"heat-pump-1\",quantity=\"lost_condenser_kW\","
                        "reason=\"no_sensor\"} 1\n"));
}

TEST(MetricsText, HasNoOldFiguresOfAMachineThatIsNotRead) {
  PlantView view = made_up_plant();
  view.time += std::chrono::hours{1};
  EXPECT_THAT(metrics_text(view), Not(HasSubstr("lostwork_power_kW{")));
  EXPECT_THAT(metrics_text(view), HasSubstr("lostwork_machine_read{machine=\"chiller-1\"} 0\n"));
}

}  // namespace
}  // namespace lostwork
