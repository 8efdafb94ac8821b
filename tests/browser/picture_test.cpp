// Pictures of the page. Of a running program, at LOSTWORK_PAGE, when that is set (the one in the
// readme is made so); of the made-up plant otherwise. They go to LOSTWORK_PICTURES, or to a
// directory that is removed.
#include "tests/browser/browser.h"
#include "tests/browser/driver_process.h"
#include "tests/daemon/web/served_plant.h"

#include <cstdlib>
#include <fstream>
#include <string>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

std::string setting(const char* name, const std::string& otherwise) {
  const char* value = std::getenv(name);  // NOLINT(concurrency-mt-unsafe): nothing sets it here
  return value != nullptr ? value : otherwise;
}

TEST(Picture, IsTakenOfEveryKindOfScreen) {
  const ServedPlant plant;
  const TemporaryDirectory thrown_away;
  const std::string directory = setting("LOSTWORK_PICTURES", thrown_away.path());
  const std::string address =
      setting("LOSTWORK_PAGE", "http://127.0.0.1:" + std::to_string(plant.port()) + "/");
  Browser browser;
  const auto take = [&browser, &directory](const std::string& name, int most_height) {
    browser.run("document.querySelectorAll('.chart').forEach((c) => c.scrollIntoView());");
    EXPECT_TRUE(browser.comes_true("document.querySelectorAll('.chart canvas').length > 0"));
    browser.run("window.scrollTo({ top: 0, behavior: 'instant' });");
    const std::string picture = browser.picture(most_height);
    EXPECT_TRUE(picture.starts_with("\x89PNG"));
    std::ofstream{directory + '/' + name, std::ios::binary} << picture;
  };
  browser.screen(1280, 900, false);
  browser.open(address);
  ASSERT_TRUE(browser.comes_true("document.querySelectorAll('.ledger').length > 0"));
  take("screenshot.png", 1500);
  take("whole.png", 12000);
  browser.prefer_dark(true);
  take("dark.png", 3000);
  browser.prefer_dark(false);
  browser.screen(360, 780, true);
  take("phone.png", 9000);
}

}  // namespace
}  // namespace lostwork
