#include "daemon/web/metrics.h"

#include "tests/daemon/web/made_up_plant.h"

#include <algorithm>
#include <charconv>
#include <chrono>
#include <cmath>
#include <set>
#include <sstream>
#include <string>
#include <string_view>
#include <system_error>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::EndsWith;
using testing::HasSubstr;
using testing::Not;

// Takes a line apart from its front: each takes what it is named for, and is false where that does
// not stand there.
class Line {
 public:
  explicit Line(std::string_view text) : rest_{text} {}

  bool literal(std::string_view text) {
    const bool there = rest_.starts_with(text);
    rest_.remove_prefix(there ? text.size() : 0);
    return there;
  }
  bool name() {
    const std::size_t length = std::min(rest_.find_first_not_of(name_characters), rest_.size());
    const bool there = length > 0 && (rest_.front() < '0' || rest_.front() > '9');
    rest_.remove_prefix(length);
    return there;
  }
  bool quoted() {
    if (!literal("\"")) {
      return false;
    }
    while (!rest_.empty() && !rest_.starts_with('"')) {
      const bool plain = !rest_.starts_with('\\');
      if (!plain && !literal("\\n") && !literal("\\\"") && !literal("\\\\")) {
        return false;
      }
      rest_.remove_prefix(plain ? 1 : 0);
    }
    return literal("\"");
  }
  bool number() {
    double value = 0.0;
    const auto [end, error] = std::from_chars(rest_.data(), rest_.data() + rest_.size(), value);
    rest_.remove_prefix(static_cast<std::size_t>(end - rest_.data()));
    return error == std::errc{} && std::isfinite(value);
  }
  [[nodiscard]] bool at_end() const { return rest_.empty(); }

 private:
  static constexpr std::string_view name_characters =
      "abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ0123456789_";
  std::string_view rest_;
};

bool is_comment(std::string_view text) {
  Line line{text};
  const bool marked = line.literal("# TYPE ") || line.literal("# UNIT ") || line.literal("# HELP ");
  return marked && line.name() && line.literal(" ") && !line.at_end();
}

bool is_sample(std::string_view text) {
  Line line{text};
  if (!line.name() || !line.literal("{")) {
    return false;
  }
  do {
    if (!line.name() || !line.literal("=") || !line.quoted()) {
      return false;
    }
  } while (line.literal(","));
  return line.literal("} ") && line.number() && line.at_end();
}

// The line forms of OpenMetrics 1.0.0, as far as they are used: every sample has a label and no
// time, and its number is finite.
TEST(MetricsText, IsWellFormed) {
  std::istringstream lines{metrics_text(made_up_plant())};
  std::string line;
  while (std::getline(lines, line)) {
    EXPECT_TRUE(line == "# EOF" || is_comment(line) || is_sample(line)) << line;
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
