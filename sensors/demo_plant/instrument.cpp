#include "sensors/demo_plant/instrument.h"

#include "sensors/demo_plant/devices.h"
#include "sensors/demo_plant/noise.h"

#include <algorithm>
#include <array>
#include <string_view>
#include <vector>

namespace lostwork {
namespace {

// Streams of randomness (noise.h); those of the site are below 1000.
constexpr std::uint64_t own_streams = 1000;
constexpr std::uint64_t pair_streams = 2000;
constexpr std::uint64_t noise_streams = 3000;
constexpr double share_of_limit = 0.85;

constexpr std::array<PlantDevice, 7> devices{
    {{.id = "chiller-panel", .unit = 1},
     {.id = "heatpump-panel", .unit = 2},
     {.id = "heat-meters", .unit = 3},
     {.id = "chiller-power", .unit = 4},
     {.id = "heatpump-power", .unit = 5},
     {.id = "gas-detector", .unit = 6},
     {.id = "weather", .unit = 7}}
};

// The constant error of a seed at this value, in the point's unit.
double constant_error(const Instrument& instrument, std::uint64_t seed, std::uint64_t number,
                      double value) {
  if (instrument.point.accuracies.empty()) {
    return 0.0;
  }
  const double own = share_of_limit * even({seed, own_streams + number}, 0);
  const Accuracy& accuracy = instrument.point.accuracies.front();
  if (const auto* reading = std::get_if<PercentOfReading>(&accuracy)) {
    return own * reading->percent / 100.0 * value;
  }
  if (const auto* span = std::get_if<PercentOfSpan>(&accuracy)) {
    return own * span->percent / 100.0 * (span->high - span->low);
  }
  const double limit = std::get<AccuracyLimit>(accuracy).limit;
  if (!instrument.pair) {
    return own * limit;
  }
  // Each of a pair may use half of the difference's limit for itself; the rest is common.
  const double half = 0.5 * instrument.pair->difference_limit;
  const double common = even({seed, pair_streams + instrument.pair->number}, 0);
  return own * half + share_of_limit * (limit - half) * common;
}

std::vector<std::string_view> ids_of(Dimension wanted) {
  std::vector<std::string_view> ids;
  for (const Instrument& instrument : instruments()) {
    if (dimension(instrument.point.role) == wanted) {
      ids.emplace_back(instrument.point.id);
    }
  }
  return ids;
}

}  // namespace

std::span<const PlantDevice> plant_devices() {
  return devices;
}

std::span<const std::string_view> plant_device_ids() {
  static const auto ids = [] {
    std::vector<std::string_view> names;
    names.reserve(devices.size());
    for (const PlantDevice& device : devices) {
      names.push_back(device.id);
    }
    return names;
  }();
  return ids;
}

std::span<const std::string_view> plant_temperature_sensors() {
  static const auto ids = ids_of(Dimension::temperature);
  return ids;
}

std::optional<double> shown(const Plant& plant, std::size_t number) {
  const Instrument& instrument = instruments()[number];
  const PointSpec& point = instrument.point;
  if (plant.broken(point.id)) {
    return std::nullopt;
  }
  const double truth_SI = instrument.truth_SI(plant.truth());
  // A drift is given in kelvin, and every temperature here is in degC: one step is as large.
  const double value = from_SI(point.unit, truth_SI, plant_altitude_m) + plant.drift_K(point.id);
  const double sd = instrument.noise * (instrument.noise_of_reading ? value : 1.0);
  const NoiseStream noise{.seed = plant.seed(), .stream = noise_streams + number};
  const std::int64_t moment = plant.time().time_since_epoch().count();
  const double with_errors =
      value + constant_error(instrument, plant.seed(), number, value) + sd * normal(noise, moment);
  return point.range ? std::clamp(with_errors, point.range->min, point.range->max) : with_errors;
}

}  // namespace lostwork
