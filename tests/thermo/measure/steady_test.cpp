#include "thermo/measure/steady.h"

#include "thermo/archive.h"

#include <cmath>
#include <functional>
#include <random>
#include <string>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::hours;
using std::chrono::minutes;
using std::chrono::seconds;

struct Signal {
  Role role;
  double value_SI;
  double noise_SI;  // well within the table's limits
};
const std::vector<Signal> signals{
    {  Role::cold_in_temperature, 285.0,   0.02},
    { Role::cold_out_temperature, 280.0,   0.02},
    {   Role::hot_in_temperature, 303.0,   0.02},
    {  Role::hot_out_temperature, 308.0,   0.02},
    {     Role::suction_pressure, 350e3,  300.0},
    {   Role::discharge_pressure, 935e3,  900.0},
    {Role::discharge_temperature, 324.0,    0.1},
    {                Role::power,  60e3,  200.0},
    {            Role::cold_flow, 0.015, 0.5e-4},
    {                Role::speed,  45.0,   0.05},
};
constexpr std::size_t leaving = 1;  // of signals

// A machine that runs from the first scan on; what a test changes it changes by `disturb`.
class Steady : public testing::Test {
 protected:
  explicit Steady(Span period = Span{10000}) {
    model.rated_power_W = 100e3;
    model.scan_period = period;
    for (const Signal& signal : signals) {
      model.points.emplace_back().role = signal.role;
    }
  }

  void play(Span length) {
    for (const Instant end = now + length; now < end; now += model.scan_period) {
      if (!lost(now)) {
        one();
      }
    }
  }
  void one() {
    Scan scan{.time = now, .readings = std::vector<Reading>(signals.size())};
    std::normal_distribution<double> noise;
    for (std::size_t i = 0; i < signals.size(); ++i) {
      const double plain = signals[i].value_SI + signals[i].noise_SI * noise(random);
      scan.readings[i] = {.value_SI = disturb(i, now - began, plain),
                          .u_SI = 0.0,
                          .quality = Quality::good,
                          .time = now};
      if (std::isnan(scan.readings[i].value_SI)) {
        scan.readings[i].quality = Quality::timeout;
      }
    }
    operation = after_scan(OperationOptions{}, model, operation, scan);
    QuantityValues values;
    values[Quantity::power] = Measured{scan.readings[7].value_SI, 300.0};
    values[Quantity::cold_out] = Measured{scan.readings[leaving].value_SI, 0.1};
    SteadyStep step = after_scan(options, model, std::move(state), {scan, operation, values});
    state = std::move(step.next);
    verdict = step.verdict;
    steady_scans += verdict.steady() ? 1 : 0;
    ++scans;
    if (step.window) {
      windows.push_back(*step.window);
    }
  }

  SteadyOptions options;
  MachineModel model;
  OperationState operation;
  SteadyState state;
  SteadyVerdict verdict;
  std::vector<Window> windows;
  int steady_scans = 0;
  int scans = 0;
  Instant began{hours{24 * 20000}};
  Instant now = began;
  std::mt19937_64 random{2024};
  // Not a number: not read.
  std::function<double(std::size_t, Span, double)> disturb = [](std::size_t, Span, double plain) {
    return plain;
  };
  std::function<bool(Instant)> lost = [](Instant) { return false; };
};

double seconds_of(Span span) {
  return std::chrono::duration<double>(span).count();
}

TEST_F(Steady, HoldsOffFifteenMinutesAfterItIsSeenOn) {
  play(minutes{15});
  EXPECT_EQ(steady_scans, 0);
  EXPECT_EQ(verdict.cause, UnsteadyCause::hold_off);
  one();
  EXPECT_TRUE(verdict.steady());
}

TEST_F(Steady, ClosesAWindowEveryTenMinutes) {
  play(hours{2});
  // (120 - 15) / 10, less the wait for the first full minute.
  EXPECT_GE(windows.size(), 10U);
  EXPECT_LE(windows.size(), 11U);
}

TEST_F(Steady, AWindowHasTheMeanOfItsScans) {
  disturb = [](std::size_t i, Span, double plain) { return i == leaving ? 280.25 : plain; };
  play(minutes{30});
  ASSERT_FALSE(windows.empty());
  EXPECT_DOUBLE_EQ(windows[0][Quantity::cold_out]->mean_SI, 280.25);
  EXPECT_DOUBLE_EQ(windows[0][Quantity::cold_out]->u_SI, 0.1);
  // 60 samples of 200 W: the mean within four standard errors.
  EXPECT_NEAR(windows[0][Quantity::power]->mean_SI, 60e3, 4.0 * 200.0 / std::sqrt(60.0));
  EXPECT_FALSE(windows[0][Quantity::cold_heat]);
}

TEST_F(Steady, ASlowRampIsSteady) {
  disturb = [](std::size_t i, Span t, double plain) {
    return plain + (i == leaving ? 0.2 / 600.0 * seconds_of(t) : 0.0);
  };
  play(hours{1});
  EXPECT_TRUE(verdict.steady());
  EXPECT_GE(windows.size(), 4U);
}

TEST_F(Steady, ASteepRampIsNot) {
  disturb = [](std::size_t i, Span t, double plain) {
    return plain + (i == leaving ? 0.4 / 600.0 * seconds_of(t) : 0.0);
  };
  play(hours{1});
  EXPECT_EQ(steady_scans, 0);
  EXPECT_EQ(verdict.cause, UnsteadyCause::trend);
  EXPECT_EQ(verdict.point, leaving);
}

TEST_F(Steady, AStepIsUnsteadyUntilTheWindowHasPassedIt) {
  disturb = [](std::size_t i, Span t, double plain) {
    return plain + (i == leaving && t >= minutes{40} ? 1.0 : 0.0);
  };
  play(minutes{42});
  EXPECT_FALSE(verdict.steady());
  play(minutes{6});
  EXPECT_FALSE(verdict.steady());
  play(minutes{5});
  EXPECT_TRUE(verdict.steady());
  for (const Window& w : windows) {
    EXPECT_FALSE(w.begin < began + minutes{39} && w.end > began + minutes{41});
  }
}

// The scatter of a sine of amplitude a is a / sqrt(2): 0.071 K and 0.141 K, the limit is 0.10 K.
TEST_F(Steady, ASmallOscillationIsSteady) {
  disturb = [](std::size_t i, Span t, double plain) {
    return plain + (i == leaving ? 0.1 * std::sin(seconds_of(t) * 2.0 * M_PI / 120.0) : 0.0);
  };
  play(hours{1});
  EXPECT_TRUE(verdict.steady());
}

TEST_F(Steady, ALargeOscillationIsNot) {
  disturb = [](std::size_t i, Span t, double plain) {
    return plain + (i == leaving ? 0.2 * std::sin(seconds_of(t) * 2.0 * M_PI / 120.0) : 0.0);
  };
  play(hours{1});
  EXPECT_EQ(steady_scans, 0);
  EXPECT_EQ(verdict.cause, UnsteadyCause::scatter);
  EXPECT_EQ(verdict.point, leaving);
}

TEST_F(Steady, AMachineThatAlwaysHuntsIsNeverCalledSteadyForIt) {
  disturb = [](std::size_t i, Span t, double plain) {
    return plain + (i == leaving ? 0.8 * std::sin(seconds_of(t) * 2.0 * M_PI / 120.0) : 0.0);
  };
  play(hours{48});
  EXPECT_EQ(steady_scans, 0);
  const SteadyShare share = steady_share(state.days);
  EXPECT_EQ(share.share(), 0.0);
  EXPECT_EQ(share.main_cause, UnsteadyCause::scatter);
  EXPECT_EQ(share.point, leaving);
}

TEST_F(Steady, LearnsTheNoiseOfItsOwnSensor) {
  std::normal_distribution<double> noise{0.0, 0.18};
  disturb = [&noise, this](std::size_t i, Span, double plain) {
    return i == leaving ? 280.0 + noise(random) : plain;
  };
  play(hours{3});
  EXPECT_EQ(steady_scans, 0);
  play(hours{3});
  EXPECT_TRUE(verdict.steady());
}

TEST_F(Steady, ACoarseRegisterDoesNotBlock) {
  // Half a kelvin a step: the value flips between two of them, 0.25 K of scatter.
  disturb = [](std::size_t i, Span t, double plain) {
    return i == leaving ? 280.0 + (static_cast<int>(seconds_of(t) / 10.0) % 2) * 0.5 : plain;
  };
  play(hours{1});
  EXPECT_TRUE(verdict.steady());
}

TEST_F(Steady, AFlipOfACoarseRegisterIsNoTrend) {
  disturb = [](std::size_t i, Span t, double plain) {
    return i == leaving ? 280.0 + (t >= minutes{30} ? 0.5 : 0.0) : plain;
  };
  play(minutes{36});
  EXPECT_TRUE(verdict.steady());
}

TEST_F(Steady, NoWindowHoldsAGap) {
  lost = [this](Instant t) { return t >= began + minutes{40} && t < began + minutes{43}; };
  play(minutes{44});
  EXPECT_FALSE(verdict.steady());
  play(hours{1});
  EXPECT_TRUE(verdict.steady());
  for (const Window& w : windows) {
    EXPECT_FALSE(w.begin < began + minutes{40} && w.end > began + minutes{43});
  }
}

TEST_F(Steady, AGapOfOneSignalBlocks) {
  disturb = [](std::size_t i, Span t, double plain) {
    return i == leaving && t >= minutes{30} && t < minutes{32} ? std::nan("") : plain;
  };
  play(minutes{36});
  EXPECT_EQ(verdict.cause, UnsteadyCause::gap);
  EXPECT_EQ(verdict.point, leaving);
  play(minutes{10});
  EXPECT_TRUE(verdict.steady());
}

TEST_F(Steady, ASensorThatIsDeadDoesNotBlockTheOthers) {
  disturb = [](std::size_t i, Span, double plain) { return i == 6 ? std::nan("") : plain; };
  play(hours{1});
  EXPECT_TRUE(verdict.steady());
}

TEST_F(Steady, ASingleLostScanDoesNotBlock) {
  lost = [this](Instant t) { return t == began + minutes{30}; };
  play(minutes{36});
  EXPECT_TRUE(verdict.steady());
}

TEST_F(Steady, IsNotSteadyWhenItStops) {
  play(hours{1});
  disturb = [](std::size_t i, Span, double plain) { return i == 7 ? 0.0 : plain; };
  one();
  EXPECT_EQ(verdict.cause, UnsteadyCause::not_running);
}

TEST_F(Steady, GivesTheSameAfterAnArchive) {
  play(minutes{57});
  ArchiveWriter writer;
  writer(state);
  const auto random_then = random;
  const auto operation_then = operation;
  const Instant then = now;
  const std::size_t closed = windows.size();
  play(hours{2});
  const std::vector<Window> first = windows;

  windows.resize(closed);
  random = random_then;
  operation = operation_then;
  now = then;
  state = {};
  ArchiveReader reader{writer.bytes()};
  reader(state);
  ASSERT_TRUE(reader.at_end());
  play(hours{2});
  ASSERT_EQ(windows.size(), first.size());
  for (std::size_t i = 0; i < first.size(); ++i) {
    EXPECT_EQ(windows[i].end, first[i].end);
    EXPECT_EQ(windows[i][Quantity::power]->mean_SI, first[i][Quantity::power]->mean_SI);
    EXPECT_EQ(windows[i][Quantity::power]->n_effective, first[i][Quantity::power]->n_effective);
  }
}

class SteadyAtEveryPeriod : public Steady, public testing::WithParamInterface<int> {
 protected:
  SteadyAtEveryPeriod() : Steady(Span{1000 * GetParam()}) {}
};

TEST_P(SteadyAtEveryPeriod, IsSteadyFromTheHoldOffOn) {
  play(hours{3});
  // All scans of the 165 minutes after the hold-off, less one block that may still be filling.
  EXPECT_GE(steady_scans * GetParam(), 165 * 60 - 150);
}

TEST_P(SteadyAtEveryPeriod, ClosesWindowsOfTenToTwelveMinutesThatDoNotOverlap) {
  play(hours{3});
  EXPECT_GE(windows.size(), 165U / 12U);
  for (std::size_t i = 0; i < windows.size(); ++i) {
    const double length = seconds_of(windows[i].end - windows[i].begin) + GetParam();
    EXPECT_GE(length, 600.0 - 0.5 * GetParam());
    EXPECT_LE(length, 720.0);
    EXPECT_GE(windows[i].scans, 8U);
    EXPECT_TRUE(i == 0 || windows[i].begin > windows[i - 1].end);
  }
}

TEST_P(SteadyAtEveryPeriod, SeesASteepRamp) {
  disturb = [](std::size_t i, Span t, double plain) {
    return plain + (i == leaving ? 0.5 / 600.0 * seconds_of(t) : 0.0);
  };
  play(hours{1});
  EXPECT_EQ(steady_scans, 0);
}

TEST_P(SteadyAtEveryPeriod, SurvivesJitterOfTheScans) {
  std::uniform_int_distribution<int> jitter{-GetParam() * 20, GetParam() * 20};  // 2 %
  for (int i = 0; i < 3 * 3600 / GetParam(); ++i) {
    now = began + Span{1000 * GetParam() * i + jitter(random)};
    one();
  }
  EXPECT_GE(windows.size(), 165U / 12U);
}

INSTANTIATE_TEST_SUITE_P(Seconds, SteadyAtEveryPeriod,
                         testing::Values(1, 2, 5, 7, 10, 15, 25, 30, 31, 40, 45, 50, 60, 75),
                         [](const auto& period) { return std::to_string(period.param) + "s"; });

TEST_F(Steady, OneLostScanInTheSlowestPeriodOnlyStretchesTheWindow) {
  model.scan_period = seconds{75};
  lost = [this](Instant t) { return t == began + seconds{75} * 30; };
  play(hours{2});
  EXPECT_TRUE(verdict.steady());
  EXPECT_GE(windows.size(), 8U);
}

}  // namespace
}  // namespace lostwork
