// The example's plant file against the simulated plant whose registers it maps.
#include "config/plant_config.h"
#include "sensors/demo_plant/image_bus.h"
#include "sensors/demo_plant/plant_scan.h"
#include "sensors/poller.h"

#include <algorithm>
#include <string>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

const Instant monday = std::chrono::sys_days{std::chrono::June / 1 / 2026};

PlantConfig example() {
  auto config = load_plant(LOSTWORK_SOURCE "/config/examples/tern_quay_dairy.toml");
  if (!config) {
    throw std::runtime_error{text("tern_quay_dairy.toml", config.error().front())};
  }
  return std::move(*config);
}

const Instrument& instrument_of(std::string_view id) {
  return *std::find_if(instruments().begin(), instruments().end(),
                       [id](const Instrument& i) { return i.point.id == id; });
}

TEST(TernQuayDairy, MapsEveryInstrumentAsItIs) {
  const PlantConfig config = example();
  ASSERT_EQ(config.wiring.points.size(), instruments().size());
  for (const PointSpec& point : config.wiring.points) {
    const PointSpec& instrument = instrument_of(point.id).point;
    const auto& at = std::get<FromRegister>(point.source);
    const auto& is_at = std::get<FromRegister>(instrument.source);
    EXPECT_EQ(point.machine, instrument.machine) << point.id;
    EXPECT_EQ(point.role, instrument.role) << point.id;
    EXPECT_EQ(point.unit, instrument.unit) << point.id;
    EXPECT_EQ(point.pair, instrument.pair) << point.id;
    EXPECT_EQ(at.device, is_at.device) << point.id;
    EXPECT_EQ(at.at.table, is_at.at.table) << point.id;
    EXPECT_EQ(at.at.address, is_at.at.address) << point.id;
    EXPECT_EQ(at.at.type, is_at.at.type) << point.id;
    EXPECT_EQ(at.at.order, is_at.at.order) << point.id;
    EXPECT_EQ(at.at.scale, is_at.at.scale) << point.id;
    EXPECT_EQ(at.at.sentinels, is_at.at.sentinels) << point.id;
  }
}

TEST(TernQuayDairy, DeclaresTheAccuracyThatEachInstrumentHas) {
  const PlantConfig config = example();
  for (const PointSpec& point : config.wiring.points) {
    const PointSpec& instrument = instrument_of(point.id).point;
    // Equal at two values: the same kind of statement, and the same figure.
    for (const double value : {3.0, 40.0}) {
      EXPECT_EQ(standard_u_SI(point.accuracies, point.unit, value, 0.0),
                standard_u_SI(instrument.accuracies, instrument.unit, value, 0.0))
          << point.id;
    }
  }
}

TEST(TernQuayDairy, MakesTheModelThatThePlantHandsOutItself) {
  const PlantConfig config = example();
  ASSERT_EQ(config.machines.size(), plant_machine_count);
  for (std::size_t k = 0; k < plant_machine_count; ++k) {
    const MachineModel& model = config.machines[k].model;
    const MachineModel own = plant_machine_model(static_cast<PlantMachine>(k));
    EXPECT_EQ(model.id, own.id);
    EXPECT_EQ(model.duty, own.duty);
    EXPECT_EQ(model.refrigerant, own.refrigerant);
    EXPECT_DOUBLE_EQ(model.rated_power_W, own.rated_power_W);
    EXPECT_NEAR(model.casing_loss.value, own.casing_loss.value, 1e-12);
    EXPECT_NEAR(model.casing_loss.u, own.casing_loss.u, 1e-12);
    ASSERT_EQ(model.points.size(), own.points.size());
    for (std::size_t i = 0; i < own.points.size(); ++i) {
      EXPECT_EQ(model.points[i].id, own.points[i].id);
      EXPECT_EQ(model.points[i].role, own.points[i].role);
      // The file's share counts the register's step of 0.01 K as the point's own.
      EXPECT_NEAR(model.points[i].shared_variance, own.points[i].shared_variance, 1e-3)
          << own.points[i].id;
    }
  }
}

TEST(TernQuayDairy, EveryPointIsGoodWhenItIsReadThroughTheRegisters) {
  const PlantConfig config = example();
  Plant plant{
      PlantOptions{.seed = 1, .start = monday, .faults = {}}
  };
  plant.step(std::chrono::hours{10});
  ImageBus bus{plant};
  Poller poller{config.wiring, "plant", bus};
  const auto readings = poller.poll(plant.time());
  ASSERT_EQ(readings.size(), config.wiring.points.size());
  for (const PointReading& reading : readings) {
    EXPECT_EQ(reading.reading.quality, Quality::good) << config.wiring.points[reading.point].id;
  }
}

}  // namespace
}  // namespace lostwork
