#include "daemon/alarm_text.h"

#include <string>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::AllOf;
using testing::HasSubstr;
using testing::Not;
using namespace std::chrono_literals;

const Instant then{std::chrono::sys_days{std::chrono::year{2026} / 5 / 3} + 14h + 20min};

struct Case {
  AlarmKind kind;
  SafetyLimit limit;
  std::optional<double> value_SI;
  std::string wording;  // methods.md 7.7: what it must say
  std::string figures;
};

SafetyLimit limit_of(SafetyKind kind, double limit_SI) {
  return {.kind = kind,
          .machine = "chiller-1",
          .limit_SI = limit_SI,
          .entered = {},
          .document = "Operating manual of 2019, p. 12",
          .jurisdiction = "EN 378",
          .entered_by = "plant manager"};
}

std::vector<Case> cases() {
  return {
      {       AlarmKind::high_pressure,        limit_of(SafetyKind::high_pressure,   18e5),       16.5e5,
       "Approaching the machine's own high-pressure limit", "16.50 bar (absolute), limit 18.00 bar"},
      {            AlarmKind::freezing,             limit_of(SafetyKind::freezing, 275.15),        274.0,
       "Possible freezing of the evaporator",              "0.9 degC, limit 2.0 degC"              },
      {AlarmKind::refrigerant_detector, limit_of(SafetyKind::refrigerant_detector, 500e-6),       620e-6,
       "Refrigerant detector at or above its set point",                "620 ppm, limit 500 ppm"   },
      {              AlarmKind::oxygen,               limit_of(SafetyKind::oxygen,  0.195),        0.191,
       "Oxygen at or below its set point",          "19.1 % vol, limit 19.5 % vol"                 },
      {       AlarmKind::detector_lost, limit_of(SafetyKind::refrigerant_detector, 500e-6), std::nullopt,
       "not seen",               "no value, limit 500 ppm"                                         },
  };
}

class SafetyText : public testing::TestWithParam<std::size_t> {
 protected:
  [[nodiscard]] static SafetyMatter matter(const Case& c) {
    return {.kind = c.kind,
            .machine = "Chiller 1",
            .limit = c.limit,
            .value_SI = c.value_SI,
            .point = "gas-1",
            .since = then};
  }
};

constexpr std::string_view no_function =
    "This is information from a monitor, not a safety function.";
constexpr std::string_view procedures =
    "Follow the site's emergency and refrigerant procedures and the local code (EN 378)";
constexpr std::string_view licensed =
    "work on the refrigerant circuit only by a licensed/certified person.";
constexpr std::string_view in_service =
    "The machine's safety devices must stay in service whatever this message says.";

TEST_P(SafetyText, HasEveryClauseOfTheTemplate) {
  const Case c = cases().at(GetParam());
  EXPECT_THAT(safety_text(matter(c)),
              AllOf(HasSubstr("Chiller 1"), HasSubstr(c.wording), HasSubstr(c.figures),
                    HasSubstr("from Operating manual of 2019, p. 12"),
                    HasSubstr("since 2026-05-03 14:20 UTC"), HasSubstr(no_function),
                    HasSubstr(procedures), HasSubstr(licensed), HasSubstr(in_service)));
}

TEST_P(SafetyText, HasTheClausesWhenItReturnsToo) {
  const Case c = cases().at(GetParam());
  EXPECT_THAT(safety_return_text(matter(c)), AllOf(HasSubstr(no_function), HasSubstr(procedures),
                                                   HasSubstr(licensed), HasSubstr(in_service)));
}

TEST_P(SafetyText, NeverSaysThatItIsSafe) {
  const Case c = cases().at(GetParam());
  for (const std::string& text : {safety_text(matter(c)), safety_return_text(matter(c))}) {
    EXPECT_THAT(text, AllOf(Not(HasSubstr("is safe")), Not(HasSubstr("no leak")),
                            Not(HasSubstr("No leak")), Not(HasSubstr(" 0 ppm"))));
  }
}

INSTANTIATE_TEST_SUITE_P(Kinds, SafetyText, testing::Range<std::size_t>(0, 5));

TEST(SafetyText, OfHighPressureNamesTheDeviceThatProtects) {
  const Case c = cases().at(0);
  const SafetyMatter matter{.kind = c.kind,
                            .machine = "Chiller 1",
                            .limit = c.limit,
                            .value_SI = c.value_SI,
                            .point = {},
                            .since = then};
  EXPECT_THAT(safety_text(matter), HasSubstr("the safety pressure device remains the protection"));
}

// 6 % of extra power since 3 May, 1240 kWh and 310 EUR, made up by hand.
Finding drift() {
  Finding f;
  f.id = "chiller-1.efficiency_drift.20260503";
  f.machine = "chiller-1";
  f.kind = FindingKind::efficiency_drift;
  f.state = FindingState::active;
  f.size = {.value = 0.062, .u = 0.0105};
  f.onset = {.best = then, .earliest = then - 5 * 24h, .latest = then + 5 * 24h};
  f.extra_energy_J = {.value = 1240.0 * 3.6e6, .u = 90.0 * 3.6e6};
  f.extra_cost = Measured{.value = 310.0, .u = 22.0};
  f.currency = "EUR";
  f.component = Component::condenser;
  f.component_share = {.value = 0.58, .u = 0.06};
  f.lost_change_W.at(static_cast<std::size_t>(Component::condenser)) =
      Measured{.value = 2100.0, .u = 300.0};
  f.causes = {
      RankedCause{.cause = Cause::condenser_fouled,
                  .role = std::nullopt,
                  .probability = 0.9,
                  .amount_SI = {}}
  };
  f.cause_is_clear = true;
  return f;
}

TEST(FindingText, SaysWhatADriftCostsSinceWhenAndWhere) {
  EXPECT_THAT(finding_text("Chiller 1", drift()),
              AllOf(HasSubstr("Chiller 1 needs 6.2 % (4.1 to 8.3 %, 95 %) more power than it did "
                              "under the same conditions"),
                    HasSubstr("since 3 May 2026 (between 28 April 2026 and 8 May 2026)"),
                    HasSubstr("So far 1240 kWh (1060 to 1420 kWh, 95 %) more"),
                    HasSubstr("which cost 310 EUR (266 to 354 EUR, 95 %)"),
                    HasSubstr("The lost work of the condenser grew most: 58 %")));
}

TEST(FindingText, LeavesOutTheIntervalOfASingleDay) {
  Finding f = drift();
  f.onset = {.best = then, .earliest = then - 1h, .latest = then + 1h};
  EXPECT_THAT(finding_text("Chiller 1", f),
              AllOf(HasSubstr("since 3 May 2026."), Not(HasSubstr("between"))));
}

TEST(FindingText, SaysHowFarOffASensorReads) {
  Finding f = drift();
  f.causes = {
      RankedCause{.cause = Cause::sensor,
                  .role = Role::cold_out_temperature,
                  .probability = 0.9,
                  .amount_SI = {.value = -0.48, .u = 0.025}}
  };
  EXPECT_THAT(
      finding_text("Chiller 1", f),
      HasSubstr("the sensor 'cold water leaving' reads 0.48 K \u00b1 0.05 K (95 %) too low"));
}

TEST(FindingText, NamesNoMoneyWithoutAPrice) {
  Finding f = drift();
  f.extra_cost.reset();
  EXPECT_THAT(finding_text("Chiller 1", f), Not(HasSubstr("EUR")));
}

TEST(FindingText, SaysThatTheComponentCannotBeTold) {
  Finding f = drift();
  f.component.reset();
  EXPECT_THAT(finding_text("Chiller 1", f), HasSubstr("cannot be told"));
}

TEST(FindingText, CallsASensorASensor) {
  Finding f = drift();
  f.kind = FindingKind::sensor_suspect;
  f.suspect_sensors = {Role::hot_out_temperature};
  EXPECT_THAT(finding_text("Chiller 1", f),
              AllOf(HasSubstr("a sensor no longer fits the others"),
                    HasSubstr("Most likely 'hot water leaving'."), Not(HasSubstr("more power"))));
}

TEST(FindingFigures, CarryTheirUncertainty) {
  const std::vector<Figure> figures = finding_figures(drift());
  ASSERT_FALSE(figures.empty());
  EXPECT_EQ(figures[0].name, "power_residual_percent");
  EXPECT_DOUBLE_EQ(figures[0].value, 6.2);
  EXPECT_DOUBLE_EQ(*figures[0].u, 1.05);
  EXPECT_EQ(figures.back().name, "lost_condenser_change_kW");
  EXPECT_DOUBLE_EQ(figures.back().value, 2.1);
}

TEST(WordsOfAFigure, ArePlain) {
  EXPECT_EQ(words_of("discharge_pressure_bar").text, "discharge pressure");
  EXPECT_EQ(words_of("discharge_pressure_bar").unit, "bar (absolute)");
  EXPECT_EQ(words_of("speaks_at_evaporating_degC").text, "the alarm comes at");
  EXPECT_EQ(words_of("speaks_at_evaporating_degC").unit, "degC");
  EXPECT_EQ(words_of("missed_scans").text, "scans missed in a row");
  EXPECT_EQ(words_of("extra_cost_EUR").unit, "EUR");
}

TEST(WordsOfAFigure, AreKnownForEveryFigureOfAFinding) {
  for (const Figure& figure : finding_figures(drift())) {
    EXPECT_NE(words_of(figure.name).text, figure.name);
    EXPECT_NE(words_of(figure.name).unit, "");
  }
}

TEST(LossText, SaysWhichRuleIsBlindMeanwhile) {
  const Loss loss{.machine = "Chiller 1",
                  .subject = "ch1_p_high",
                  .since = then,
                  .blind = {SafetyKind::high_pressure}};
  EXPECT_THAT(point_lost_text(loss, Role::discharge_pressure, Quality::sentinel),
              AllOf(HasSubstr("ch1_p_high"), HasSubstr("(discharge pressure)"),
                    HasSubstr("the device reports that it has no value"),
                    HasSubstr("high-pressure limit cannot see"),
                    HasSubstr("safety devices remain the protection")));
}

TEST(DateText, CountsDaysOfTheCalendar) {
  EXPECT_EQ(date_text(Instant{}), "1 January 1970");
  EXPECT_EQ(date_text(then), "3 May 2026");
  EXPECT_EQ(time_text(then), "2026-05-03 14:20 UTC");
}

}  // namespace
}  // namespace lostwork
