// The whole program in a real browser: `lostwork demo` with a device that falls silent.
#include "tests/browser/browser.h"
#include "tests/daemon/child_program.h"

#include <csignal>
#include <string>

#include <boost/json.hpp>
#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::IsEmpty;

constexpr const char* silent =
    "device_silent:device=heatpump-power,from=2026-03-02T12:00,to=2026-03-05";

TEST(Demo, OpensInABrowserAddsUpAndTakesAnAcknowledgement) {
  ChildProgram program{
      {"demo", "--days", "1", "--listen", "127.0.0.1:0", "--fault", silent}
  };
  const std::string line = program.wait_for_line("http://", std::chrono::seconds{300});
  const auto from = line.find("http://");
  Browser browser;
  browser.screen(1280, 900, false);
  browser.open(line.substr(from, line.find(' ', from) - from));
  ASSERT_TRUE(browser.comes_true(
      "document.querySelectorAll('#machine-chiller-1 .ledger tfoot data').length > 0"));
  // The exact values behind the rows: they close to rounding.
  EXPECT_TRUE(browser.comes_true(
      "Math.abs([...document.querySelectorAll('#machine-chiller-1 .ledger tbody td:nth-child(2) "
      "data')]"
      ".reduce((sum, d) => sum + Number(d.value), 0)"
      " / document.querySelector('#machine-chiller-1 .ledger tfoot data').value - 1) < 1e-9"));
  browser.run("document.querySelector('#machine-heatpump-1 [data-alarm] button').click();");
  EXPECT_TRUE(
      browser.comes_true("document.querySelector('#machine-heatpump-1 [data-alarm] "
                         ".state').textContent === 'active, acknowledged'"));
  EXPECT_THAT(browser.complaints(), IsEmpty());
  program.signal(SIGTERM);
  EXPECT_EQ(program.wait(), 0);
}

}  // namespace
}  // namespace lostwork
