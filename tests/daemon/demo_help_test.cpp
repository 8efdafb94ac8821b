#include "daemon/demo.h"
#include "sensors/demo_plant/fault.h"

#include <array>
#include <sstream>
#include <string>
#include <string_view>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::HasSubstr;

// The keys that the parser itself names when it refuses one: "machine, from, to, rate, limit".
std::string keys_of(FaultKind kind) {
  try {
    (void)parse_fault(std::string{name(kind)} + ":nonsense=1", {});
  } catch (const BadFault& refused) {
    const std::string said = refused.what();
    constexpr std::string_view before = "allowed: ";
    return said.substr(said.find(before) + before.size());
  }
  return {};
}

std::string help() {
  constexpr std::array<std::string_view, 1> arguments{"--help"};
  std::ostringstream out;
  std::ostringstream err;
  EXPECT_EQ(demo_command(arguments, out, err), 0);
  return out.str();
}

class HelpOfTheDemo : public testing::TestWithParam<int> {};

TEST_P(HelpOfTheDemo, NamesTheKindWithEveryKey) {
  const auto kind = static_cast<FaultKind>(GetParam());
  const std::string text = help();
  const auto at = text.find("\n  " + std::string{name(kind)} + "  ");
  ASSERT_NE(at, std::string::npos) << name(kind);
  const std::string line = text.substr(at + 1, text.find('\n', at + 1) - at - 1);
  std::istringstream keys{keys_of(kind)};
  int count = 0;
  for (std::string key; std::getline(keys, key, ',');) {
    key = key.substr(key.find_first_not_of(' '));
    if (key != "from" && key != "to") {  // said once for all kinds
      EXPECT_THAT(line, HasSubstr(" " + key + "="));
      ++count;
    }
  }
  EXPECT_GT(count, 0);
}

INSTANTIATE_TEST_SUITE_P(Kinds, HelpOfTheDemo,
                         testing::Range(0, static_cast<int>(FaultKind::count)));

}  // namespace
}  // namespace lostwork
