// The page in a real browser, against a server with a made-up plant.
#include "tests/browser/browser.h"
#include "tests/daemon/web/made_up_plant.h"
#include "tests/daemon/web/served_plant.h"

#include <chrono>
#include <cstdlib>
#include <fstream>
#include <memory>
#include <optional>
#include <string>
#include <vector>

#include <boost/json.hpp>
#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::HasSubstr;
using testing::IsEmpty;
using testing::Not;

WebLimits quick_events() {
  WebLimits limits;
  limits.event_period = std::chrono::milliseconds{20};
  return limits;
}

// One browser for all, a fresh server and a fresh page for each.
class Page : public testing::Test {
 protected:
  static void SetUpTestSuite() { browser = std::make_unique<Browser>(); }
  static void TearDownTestSuite() { browser.reset(); }

  void SetUp() override {
    browser->screen(1280, 900, false);
    browser->prefer_dark(false);
    plant.emplace(quick_events());
    (void)browser->complaints();  // of the page before
    browser->open("http://127.0.0.1:" + std::to_string(plant->port()) + "/");
    ASSERT_TRUE(
        browser->comes_true("document.querySelector('#live').dataset.live === 'yes' && "
                            "document.querySelectorAll('.machine').length === 2"));
  }

  void TearDown() override { browser->open("about:blank"); }

  static std::string text(const std::string& selector) {
    return std::string{
        browser->run("return document.querySelector(`" + selector + "`).innerText;").as_string()};
  }
  static double number(const std::string& script) {
    return browser->run("return " + script + ";").to_number<double>();
  }

  static std::unique_ptr<Browser> browser;
  std::optional<ServedPlant> plant;
};
std::unique_ptr<Browser> Page::browser;

TEST_F(Page, SaysOneSentenceOfEachMachine) {
  EXPECT_EQ(
      text("#glance-chiller-1 .said"),
      "Chiller 1 needs 6 % more power than it should, since 18 April; the condenser loses most "
      "of it.");
  EXPECT_EQ(text("#glance-heat-pump-1 .said"), "Heat pump <1> & \"co\" is well.");
}

TEST_F(Page, SaysThatThePlantIsSimulated) {
  EXPECT_EQ(text("#demonstration"), "A simulated plant, for demonstration");
}

// The exact values behind the rows.
TEST_F(Page, HasLedgerRowsThatAddUpToTheInput) {
  const double sum = number(
      "[...document.querySelectorAll('#machine-chiller-1 .ledger tbody td:nth-child(2) data')]"
      ".reduce((sum, d) => sum + Number(d.value), 0)");
  const double input =
      number("document.querySelector('#machine-chiller-1 .ledger tfoot data').value * 1");
  EXPECT_DOUBLE_EQ(input, 59.4);
  EXPECT_NEAR(sum, input, 1e-9 * input);
}

// The figures as they are read: each may be off by half of its last digit.
TEST_F(Page, HasLedgerRowsThatAddUpAsShown) {
  const std::string shown =
      "[...document.querySelectorAll('#machine-chiller-1 .ledger tbody td:nth-child(2) data')]"
      ".map((d) => d.firstChild.textContent.replace('\u2212', '-'))";
  const double sum = number(shown + ".reduce((sum, t) => sum + Number(t), 0)");
  const double rounding =
      number(shown + ".reduce((sum, t) => sum + 0.5 * 10 ** -(t.split('.')[1] ?? '').length, 0)");
  EXPECT_EQ(number(shown + ".length"), 8.0);
  EXPECT_NEAR(sum, 59.4, rounding);
}

TEST_F(Page, HasLedgerSharesThatAddUpToAHundredPerCent) {
  const double sum = number(
      "[...document.querySelectorAll('#machine-chiller-1 .ledger tbody td:nth-child(3) data')]"
      ".reduce((sum, d) => sum + Number(d.value), 0)");
  EXPECT_NEAR(sum, 100.0, 1e-7);
}

TEST_F(Page, ShowsAnExactZeroAsZero) {
  plant->change([](PlantView& view) {
    QuantityValues& values = view.machines.at(1).latest.values;
    values[Quantity::casing] = Measured{.value = 0.0, .u = 0.0};
    values[Quantity::unaccounted] = Measured{.value = 3e-12, .u = 1e-12};
  });
  for (const std::string quantity : {"casing_kW", "unaccounted_kW"}) {
    const std::string cell =
        "#machine-heat-pump-1 [data-quantity=" + quantity + "] td:nth-child(2) data";
    EXPECT_TRUE(
        browser->comes_true("document.querySelector('" + cell + "').innerText.trim() === '0'"))
        << text(cell);
  }
}

TEST_F(Page, SaysWhatIsLearnedInOnePiece) {
  EXPECT_THAT(text("#machine-chiller-1 .compare + .note + .note"), testing::StrEq("Learned."));
}

// The made-up trend: 56.0 kW and 12 % more than expected, u 1.2 % and 1.12 %; so 56 / 1.12 = 50.0
// was expected, with 2 * 50 * 0.0112 / 1.12 = 1.0 as half width.
TEST_F(Page, ComparesThePowerOfTheSameHours) {
  const std::string box = "#machine-chiller-1 .chart-box:has([aria-label^=\"measured\"])";
  browser->run("document.querySelector('" + box + "').scrollIntoView();");
  EXPECT_TRUE(browser->comes_true("document.querySelector('" + box + " canvas') !== null"));
  browser->run("document.querySelector('" + box + " details').open = true;");
  EXPECT_TRUE(browser->comes_true("document.querySelectorAll('" + box + " tbody tr').length > 40"));
  EXPECT_THAT(text(box + " tbody tr td:nth-child(2)"), testing::StrEq("56.0 \u00b1 1.3 kW"));
  EXPECT_THAT(text(box + " tbody tr td:nth-child(3)"), testing::StrEq("50.0 \u00b1 1.0 kW"));
}

TEST_F(Page, LeavesAGapWhereNothingCanBeCompared) {
  const std::string box = "#machine-chiller-1 .chart-box:has([aria-label^=\"measured\"])";
  browser->run("document.querySelector('" + box + "').scrollIntoView();");
  EXPECT_TRUE(browser->comes_true("document.querySelector('" + box + " canvas') !== null"));
  browser->run("document.querySelector('" + box + " details').open = true;");
  EXPECT_TRUE(browser->comes_true("[...document.querySelectorAll('" + box +
                                  " tbody tr')].some((row) => row.cells[1].innerText !== 'none' "
                                  "&& row.cells[2].innerText === 'none')"));
}

TEST_F(Page, TellsWhyTheLossIsNotSplit) {
  EXPECT_THAT(text("#machine-heat-pump-1 .ledger + .note"),
              HasSubstr("it takes pressures and temperatures of the refrigerant"));
}

TEST_F(Page, GivesTheReasonForAMissingFigure) {
  browser->run("document.querySelector('#figures-heat-pump-1').open = true;");
  EXPECT_THAT(text("#figures-heat-pump-1"), HasSubstr("a sensor is missing: suction pressure"));
}

TEST_F(Page, ShowsARuleWithoutSetPointAsNotConfigured) {
  browser->run("document.querySelector('#rules-chiller-1').open = true;");
  EXPECT_THAT(text("#rules-chiller-1 [data-rule=refrigerant-detector]"),
              HasSubstr("not configured"));
  EXPECT_THAT(text("#rules-chiller-1 [data-rule=high-pressure]"),
              HasSubstr("18.00 bar (absolute), from rating plate, 2021 (EN 378)"));
}

TEST_F(Page, CautionsThatItIsNoSafetyDevice) {
  EXPECT_THAT(text("footer"), HasSubstr("not a safety device"));
  EXPECT_THAT(text("footer"), HasSubstr("local code"));
  EXPECT_THAT(text("footer"), HasSubstr("licensed or certified person"));
}

TEST_F(Page, AcknowledgesAnAlarmByKeyboard) {
  browser->run(
      "document.getElementById('ack-chiller-1.drift-comment').focus({ preventScroll: true });");
  browser->type("seen");
  browser->press(tab_key);
  EXPECT_EQ(std::string{browser->run("return document.activeElement.id;").as_string()},
            "ack-chiller-1.drift");
  browser->press(enter_key);
  EXPECT_TRUE(browser->comes_true(
      "document.querySelector('[data-alarm=\"chiller-1.drift\"] .state').textContent === "
      "'active, acknowledged'"));
  EXPECT_THAT(plant->acknowledged(), testing::ElementsAre("chiller-1.drift: seen"));
  EXPECT_THAT(text("[data-alarm=\"chiller-1.drift\"]"), HasSubstr("by local: \u201cseen\u201d"));
}

TEST_F(Page, LinksTheAlarmOfAFindingToTheFinding) {
  plant->change([](PlantView& view) {
    view.alarms.front().alarm.id = view.machines.at(0).findings.front().id;
  });
  EXPECT_TRUE(browser->comes_true(
      "document.querySelector(document.querySelector('[data-alarm] a').getAttribute('href')"
      ".replaceAll('.', '\\\\.')).dataset.finding !== undefined"));
  EXPECT_THAT(text("[data-alarm]"), Not(HasSubstr("Figures behind it")));
}

TEST_F(Page, NamesTheFiguresOfALimitInPlainWords) {
  plant->change([](PlantView& view) {
    Alarm& alarm = view.alarms.front().alarm;
    alarm.id = "chiller-1.high-pressure";
    alarm.kind = AlarmKind::high_pressure;
    alarm.evidence = {
        {.name = "discharge_pressure_bar",
         .value = 16.5,
         .u = 0.05,
         .limit = 18.0,
         .document = "rating plate, 2021"}
    };
  });
  EXPECT_TRUE(browser->comes_true(
      "document.querySelector('[data-alarm=\"chiller-1.high-pressure\"] details') !== null"));
  browser->run("document.querySelector('[data-alarm] details').open = true;");
  EXPECT_THAT(text("[data-alarm] details li"),
              testing::StrEq("discharge pressure: 16.50 bar (absolute) \u00b1 0.10 bar (absolute) "
                             "(95 %), limit 18.00 bar (absolute) from rating plate, 2021"));
}

TEST_F(Page, ChangesBySelfWhenThePlantDoes) {
  plant->change([](PlantView& view) { view.machines.at(1).latest.mode = Mode::off; });
  EXPECT_TRUE(browser->comes_true(
      "document.querySelector('#glance-heat-pump-1 .said').textContent.includes('is off')"));
}

TEST_F(Page, KeepsWhatIsBeingTyped) {
  browser->run("document.getElementById('ack-chiller-1.drift-comment').focus();");
  browser->type("half");
  plant->change([](PlantView& view) {
    view.alarms.front().alarm.text = "Chiller 1 needs 6.2 % more power than it should.";
  });
  EXPECT_TRUE(browser->comes_true(
      "document.querySelector('[data-alarm] .strong').textContent.includes('6.2 %')"));
  EXPECT_EQ(std::string{browser->run("return document.activeElement.value;").as_string()}, "half");
}

TEST_F(Page, NeverSaysWellWithoutALine) {
  plant.reset();
  EXPECT_TRUE(browser->comes_true("document.querySelector('#live').dataset.live === 'no'"));
  EXPECT_THAT(text("#live"), HasSubstr("Not live since 3 May, 13:00:00"));
  EXPECT_THAT(text("#glance-heat-pump-1 .said"), testing::StartsWith("Last known: "));
  EXPECT_THAT(browser->complaints(), Not(IsEmpty()));  // that the server is gone
}

TEST_F(Page, IsWalkedByTabInItsOrder) {
  std::vector<std::string> walked;
  for (int i = 0; i < 4; ++i) {
    browser->press(tab_key);
    walked.emplace_back(
        browser->run("const a = document.activeElement; return a.id || a.className || a.tagName;")
            .as_string());
  }
  EXPECT_THAT(walked,
              testing::ElementsAre("skip", "glance-chiller-1", "glance-heat-pump-1", "SUMMARY"));
}

TEST_F(Page, ReachesEveryControlByTab) {
  const double controls = number(
      "[...document.querySelectorAll('a, button, input, summary')].filter((e) => "
      "e.getClientRects().length > 0 || e.className === 'skip').length");
  browser->run("window.walked = new Set();");
  for (int i = 0; i < static_cast<int>(controls); ++i) {
    browser->press(tab_key);
    browser->run("window.walked.add(document.activeElement);");
  }
  EXPECT_EQ(number("window.walked.size"), controls);
}

TEST_F(Page, ShowsWhereTheFocusIs) {
  browser->press(tab_key);
  EXPECT_GE(number("parseFloat(getComputedStyle(document.activeElement).outlineWidth)"), 2.0);
  EXPECT_GE(number("document.activeElement.getBoundingClientRect().top"), 0.0);
}

TEST_F(Page, FitsAPhoneWithoutScrollingSideways) {
  browser->screen(360, 780, true);
  plant->change([](PlantView& view) {
    PointView point = view.machines.at(0).points.front();
    point.id = "ch1_evaporator_outlet_temperature";
    point.unit = "kPa_abs";
    point.name = "refrigerant leaving the evaporator";
    view.machines.at(0).points.push_back(point);
    point.reading.quality = Quality::out_of_range;
    view.machines.at(0).points.push_back(point);
  });
  EXPECT_TRUE(
      browser->comes_true("document.querySelectorAll('#sensors-chiller-1 tbody tr').length === 7"));
  browser->run("document.querySelectorAll('details').forEach((d) => { d.open = true; });");
  EXPECT_TRUE(browser->comes_true("document.querySelectorAll('canvas').length > 0"));
  EXPECT_LE(number("document.documentElement.scrollWidth"), 360.0);
  EXPECT_LE(number("Math.max(...[...document.querySelectorAll('table')]"
                   ".filter((t) => !t.closest('.scroll'))"
                   ".map((t) => t.getBoundingClientRect().right))"),
            360.0);
}

// Success criterion 1.4.3 of WCAG 2.1: 4.5 to 1, 3 to 1 for large text; over every text shown.
constexpr const char* poor_contrasts = R"(
  const canvas = document.createElement('canvas').getContext('2d', { willReadFrequently: true });
  const rgba = (color) => {
    canvas.clearRect(0, 0, 1, 1);
    canvas.fillStyle = color;
    canvas.fillRect(0, 0, 1, 1);
    return [...canvas.getImageData(0, 0, 1, 1).data];
  };
  const luminance = (color) => color.slice(0, 3).map((c) => c / 255)
    .map((c) => (c <= 0.03928 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4))
    .reduce((sum, c, i) => sum + c * [0.2126, 0.7152, 0.0722][i], 0);
  const ground = (node) => {
    for (let at = node; at; at = at.parentElement) {
      const color = rgba(getComputedStyle(at).backgroundColor);
      if (color[3] === 255) { return color; }
    }
    return [255, 255, 255, 255];
  };
  const poor = new Set();
  const walker = document.createTreeWalker(document.body, NodeFilter.SHOW_TEXT);
  while (walker.nextNode()) {
    const node = walker.currentNode.parentElement;
    if (!walker.currentNode.textContent.trim() || node.getClientRects().length === 0) { continue; }
    const style = getComputedStyle(node);
    const [a, b] = [luminance(rgba(style.color)), luminance(ground(node))].sort((x, y) => y - x);
    const ratio = (a + 0.05) / (b + 0.05);
    const large = parseFloat(style.fontSize) >= 24;
    if (ratio < (large ? 3 : 4.5)) {
      poor.add(`${ratio.toFixed(2)} ${node.tagName}.${node.className}: ${node.textContent}`);
    }
  }
  return [...poor];
)";

TEST_F(Page, HasContrastByDay) {
  EXPECT_THAT(browser->run(poor_contrasts).as_array(), IsEmpty());
}

TEST_F(Page, HasContrastByNight) {
  browser->prefer_dark(true);
  EXPECT_THAT(browser->run(poor_contrasts).as_array(), IsEmpty());
}

TEST_F(Page, LoadsNothingFromElsewhere) {
  EXPECT_EQ(number("performance.getEntriesByType('resource').filter((e) => "
                   "!e.name.startsWith(location.origin)).length"),
            0.0);
}

TEST_F(Page, DrawsItsCharts) {
  browser->run("document.querySelectorAll('.chart').forEach((c) => c.scrollIntoView());");
  EXPECT_TRUE(browser->comes_true("document.querySelectorAll('.chart canvas').length >= 4"));
  EXPECT_TRUE(browser->comes_true(
      "document.querySelector('.chart').getAttribute('aria-label').includes('Last: ')"));
}

TEST_F(Page, HasNothingToComplainOf) {
  browser->run(
      "document.querySelectorAll('details').forEach((d) => { d.open = true; });"
      "document.querySelectorAll('.chart').forEach((c) => c.scrollIntoView());");
  EXPECT_TRUE(browser->comes_true("document.querySelectorAll('.chart canvas').length >= 4"));
  browser->prefer_dark(true);
  plant->change([](PlantView& view) { view.alarms.clear(); });
  EXPECT_TRUE(browser->comes_true("document.querySelectorAll('[data-alarm]').length === 0"));
  EXPECT_THAT(browser->complaints(), IsEmpty());
}

}  // namespace
}  // namespace lostwork
