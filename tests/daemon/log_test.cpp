#include "daemon/log.h"

#include <sstream>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::seconds;
constexpr std::chrono::steady_clock::time_point start{};

TEST(Log, TellsALastingFaultOnceAMinute) {
  std::ostringstream out;
  Log log{out, false};
  for (int s = 0; s < 120; ++s) {
    log.fault("bus", "bus: no answer", start + seconds{s});
  }
  EXPECT_EQ(out.str(), "bus: no answer\nbus: no answer (and 59 times since the last line)\n");
}

TEST(Log, TellsTwoFaultsApart) {
  std::ostringstream out;
  Log log{out, false};
  log.fault("a", "first", start);
  log.fault("b", "second", start);
  EXPECT_EQ(out.str(), "first\nsecond\n");
}

TEST(Log, BeginsALineWithItsLevelForTheJournal) {
  std::ostringstream out;
  Log log{out, true};
  log.line(Severity::warning, "careful");
  EXPECT_EQ(out.str(), "<4>careful\n");
}

TEST(Log, KeepsOneLineOneLine) {
  std::ostringstream out;
  Log log{out, false};
  log.line(Severity::info, "a\nb\x1b[2J");
  EXPECT_EQ(out.str(), "a b [2J\n");
}

}  // namespace
}  // namespace lostwork
