#include "daemon/view.h"

#include "config/plant_config.h"
#include "daemon/web/api_json.h"
#include "sensors/wiring.h"

#include <algorithm>
#include <chrono>
#include <string>
#include <variant>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using ::testing::HasSubstr;

constexpr Instant now = std::chrono::sys_days{std::chrono::May / 4 / 2026};

// The first-machine example: eleven points, one of them a constant.
PlantConfig first_machine() {
  return load_plant(std::string{LOSTWORK_SOURCE} + "/config/examples/first_machine.toml").value();
}

bool is_constant(const PointSpec& point) {
  return std::holds_alternative<Constant>(point.source);
}

// A scan in which the constants are good, and the sensors as said.
PlantView seen(const PlantConfig& plant, Quality sensors) {
  Pipeline pipeline{plant};
  PlantView view = plant_view(plant, pipeline);
  Scan scan{.time = now, .readings = {}};
  for (const PointSpec& point : plant.wiring.points) {
    scan.readings.push_back({.value_SI = 1.0,
                             .u_SI = 0.1,
                             .quality = is_constant(point) ? Quality::good : sensors,
                             .time = now});
  }
  pipeline.take(0, scan);
  refresh(view, 0, pipeline);
  view.time = now;
  return view;
}

TEST(ViewOfAMachine, TakesNoConstantForAReading) {
  const PlantConfig plant = first_machine();
  ASSERT_TRUE(std::any_of(plant.wiring.points.begin(), plant.wiring.points.end(), is_constant));
  EXPECT_FALSE(seen(plant, Quality::timeout).machines.front().last_read);
}

TEST(ViewOfAMachine, KnowsWhenASensorWasRead) {
  EXPECT_EQ(seen(first_machine(), Quality::good).machines.front().last_read, now);
}

TEST(HealthJson, SaysWhenAMachineIsNotRead) {
  EXPECT_THAT(health_json(seen(first_machine(), Quality::timeout)),
              HasSubstr(R"("status":"not_all_read")"));
  EXPECT_THAT(health_json(seen(first_machine(), Quality::good)), HasSubstr(R"("status":"ok")"));
}

}  // namespace
}  // namespace lostwork
