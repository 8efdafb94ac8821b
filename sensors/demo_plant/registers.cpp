#include "sensors/demo_plant/registers.h"

#include <algorithm>
#include <bit>
#include <cmath>
#include <limits>

namespace lostwork {
namespace {

using T = const Truth&;

// A register that no point of the plant file reads.
struct Register {
  std::string_view device;
  RegisterSpec spec;
  double (*value)(const Truth& truth);
};

struct Place {
  std::string_view device;
  Table table;
  std::uint16_t address;
};

Register shows(const Place& place, RawType type, double scale, double (*value)(const Truth&)) {
  RegisterSpec spec;
  spec.table = place.table;
  spec.address = place.address;
  spec.type = type;
  spec.scale = scale;
  return {.device = place.device, .spec = spec, .value = value};
}

Register low_word_first(Register r) {
  r.spec.order = ByteOrder::cdab;
  return r;
}

const MachineTruth& machine(const Truth& truth, bool chiller) {
  return truth[chiller ? PlantMachine::chiller : PlantMachine::heat_pump];
}

const PlantCounters& counters(const Truth& truth, bool chiller) {
  return truth.counters[chiller ? 0 : 1];
}

double kilowatt_hours(double energy_J) {
  return from_SI(Unit::kWh, energy_J, plant_altitude_m);
}
double kilowatts(double power_W) {
  return from_SI(Unit::kW, power_W, plant_altitude_m);
}

constexpr double detector_stage_ppm = 500.0;  // of the invented detector

// Bit 0 ready, 1 running, 2 starting, 3 valve at its end.
template <bool chiller>
double status_word(const Truth& truth) {
  const MachineTruth& m = machine(truth, chiller);
  return 1.0 + (m.running ? 2.0 : 0.0) + (m.starting ? 4.0 : 0.0) +
         (m.valve_opening > 1.0 ? 8.0 : 0.0);
}

template <bool chiller>
double running_hours(const Truth& truth) {
  using Hours = std::chrono::duration<double, std::chrono::hours::period>;
  return Hours{counters(truth, chiller).running}.count();
}

template <bool chiller>
double starts(const Truth& truth) {
  return counters(truth, chiller).starts;
}

template <bool chiller>
double energy_meter(const Truth& truth) {
  return kilowatt_hours(counters(truth, chiller).energy_J);
}

void add_heat_counter(std::vector<Register>& all, std::uint16_t address,
                      double (*energy)(const Truth&), double (*heat)(const Truth&)) {
  const auto after = [address](int offset) {
    return Place{"heat-meters", Table::input, static_cast<std::uint16_t>(address + offset)};
  };
  all.push_back(low_word_first(shows(after(4), RawType::u32, 1.0, energy)));
  all.push_back(low_word_first(shows(after(6), RawType::f32, 1.0, heat)));
}

void add_heat_counters(std::vector<Register>& all) {
  add_heat_counter(
      all, 0, [](T t) { return kilowatt_hours(t.counters[0].cold_heat_J); },
      [](T t) { return kilowatts(t.machines[0].cold_heat_W); });
  add_heat_counter(
      all, 10, [](T t) { return kilowatt_hours(t.counters[0].hot_heat_J); },
      [](T t) { return kilowatts(t.machines[0].hot_heat_W); });
  add_heat_counter(
      all, 20, [](T t) { return kilowatt_hours(t.counters[1].cold_heat_J); },
      [](T t) { return kilowatts(t.machines[1].cold_heat_W); });
  add_heat_counter(
      all, 30, [](T t) { return kilowatt_hours(t.counters[1].hot_heat_J); },
      [](T t) { return kilowatts(t.machines[1].hot_heat_W); });
}

std::vector<Register> unmapped_registers() {
  std::vector<Register> all;
  const auto panel = [](std::uint16_t address) {
    return Place{"chiller-panel", Table::input, address};
  };
  all.push_back(shows(panel(0), RawType::u16, 1.0, status_word<true>));
  all.push_back(
      shows(panel(7), RawType::u16, 0.1, [](T t) { return 100.0 * machine(t, true).capacity; }));
  all.push_back(shows(panel(9), RawType::u16, 0.1,
                      [](T t) { return 100.0 * std::min(machine(t, true).valve_opening, 1.0); }));
  all.push_back(shows(panel(10), RawType::u32, 0.1, running_hours<true>));
  all.push_back(shows(panel(12), RawType::u32, 1.0, starts<true>));
  all.push_back(shows({"chiller-panel", Table::discrete, 0}, RawType::bit, 1.0,
                      [](T t) { return machine(t, true).running ? 1.0 : 0.0; }));
  const auto holding = [](std::uint16_t address) {
    return Place{"heatpump-panel", Table::holding, address};
  };
  all.push_back(shows(holding(112), RawType::u16, 1.0, status_word<false>));
  all.push_back(low_word_first(shows(holding(114), RawType::f32, 1.0, running_hours<false>)));
  all.push_back(low_word_first(shows(holding(116), RawType::u32, 1.0, starts<false>)));
  all.push_back(shows({"chiller-power", Table::holding, 2}, RawType::u32, 0.1, energy_meter<true>));
  all.push_back(
      shows({"heatpump-power", Table::holding, 42}, RawType::u32, 1.0, energy_meter<false>));
  all.push_back(shows({"gas-detector", Table::input, 1}, RawType::u16, 1.0, [](T t) {
    return from_SI(Unit::ppm, t.site.refrigerant_in_air, plant_altitude_m) >= detector_stage_ppm
               ? 1.0
               : 0.0;
  }));
  add_heat_counters(all);
  return all;
}

const std::vector<Register>& unmapped() {
  static const std::vector<Register> all = unmapped_registers();
  return all;
}

std::vector<std::uint16_t>& words_of(DeviceImage& device, const RegisterSpec& spec) {
  return device.tables.at(static_cast<std::size_t>(spec.table));
}

DeviceImage& device_of(RegisterImage& image, std::string_view id) {
  return *std::find_if(image.devices.begin(), image.devices.end(),
                       [id](const DeviceImage& device) { return device.id == id; });
}

void put(RegisterImage& image, std::string_view device, const RegisterSpec& spec,
         std::optional<double> value) {
  std::vector<std::uint16_t>& words = words_of(device_of(image, device), spec);
  const EncodedWords encoded = encode(spec, value);
  const std::size_t end = std::size_t{spec.address} + encoded.count;
  if (words.size() < end) {
    words.resize(end, 0);
  }
  std::copy_n(encoded.word.begin(), encoded.count, words.begin() + spec.address);
}

struct Limits {
  double min;
  double max;
};

Limits limits(RawType type) {
  switch (type) {
    case RawType::bit: return {0.0, 1.0};
    case RawType::u16: return {0.0, 65535.0};
    case RawType::s16: return {-32768.0, 32767.0};
    case RawType::u32: return {0.0, 4294967295.0};
    case RawType::s32: return {-2147483648.0, 2147483647.0};
    default: return {-std::numeric_limits<double>::max(), std::numeric_limits<double>::max()};
  }
}

std::uint32_t pattern_of_none(const RegisterSpec& spec) {
  if (!spec.sentinels.empty()) {
    return spec.sentinels.front();
  }
  return spec.type == RawType::f32 ? 0x7fc00000U : 0U;  // a quiet NaN
}

std::uint32_t pattern(const RegisterSpec& spec, std::optional<double> value) {
  if (!value) {
    return pattern_of_none(spec);
  }
  const double raw = (*value - spec.offset) / spec.scale;
  if (spec.type == RawType::f32) {
    return std::bit_cast<std::uint32_t>(static_cast<float>(raw));
  }
  const Limits range = limits(spec.type);
  const double whole = std::round(raw);
  if (!(whole >= range.min && whole <= range.max)) {
    return pattern_of_none(spec);
  }
  return static_cast<std::uint32_t>(static_cast<std::int64_t>(whole));
}

std::uint16_t bytes_swapped(std::uint16_t word) {
  return static_cast<std::uint16_t>((word << 8U) | (word >> 8U));
}

const DeviceImage* device_at(const RegisterImage& image, std::uint8_t unit) {
  const auto found =
      std::find_if(image.devices.begin(), image.devices.end(),
                   [unit](const DeviceImage& device) { return device.unit == unit; });
  return found == image.devices.end() ? nullptr : &*found;
}

BlockAnswer failed(Instant time, BusFailure failure, std::uint8_t code) {
  return {.words = {}, .failure = failure, .exception_code = code, .time = time};
}

}  // namespace

EncodedWords encode(const RegisterSpec& spec, std::optional<double> value) {
  const std::uint32_t bits = pattern(spec, value);
  const auto high = static_cast<std::uint16_t>(bits >> 16U);
  const auto low = static_cast<std::uint16_t>(bits & 0xffffU);
  const bool swapped = spec.order == ByteOrder::badc || spec.order == ByteOrder::dcba;
  const bool low_first = spec.order == ByteOrder::cdab || spec.order == ByteOrder::dcba;
  EncodedWords encoded{
      .word = {low, 0},
        .count = word_count(spec.type)
  };
  if (encoded.count == 2) {
    encoded.word = low_first ? std::array{low, high} : std::array{high, low};
  }
  if (swapped && spec.type != RawType::bit) {
    encoded.word = {bytes_swapped(encoded.word[0]), bytes_swapped(encoded.word[1])};
  }
  return encoded;
}

RegisterImage register_image(const Plant& plant) {
  RegisterImage image;
  for (const PlantDevice& device : plant_devices()) {
    image.devices.push_back({.id = device.id, .unit = device.unit, .answers = true, .tables = {}});
  }
  refresh(image, plant);
  return image;
}

void refresh(RegisterImage& image, const Plant& plant) {
  image.time = plant.time();
  for (DeviceImage& device : image.devices) {
    device.answers = plant.answers(device.id);
  }
  for (std::size_t i = 0; i < instruments().size(); ++i) {
    const auto& from = std::get<FromRegister>(instruments()[i].point.source);
    put(image, from.device, from.at, shown(plant, i));
  }
  for (const Register& r : unmapped()) {
    put(image, r.device, r.spec, r.value(plant.truth()));
  }
}

BlockAnswer answer(const RegisterImage& image, const BlockRequest& request) {
  constexpr std::uint8_t bad_address = 2;
  constexpr std::uint8_t bad_value = 3;
  const DeviceImage* device = device_at(image, request.unit);
  if (device == nullptr || !device->answers) {
    return failed(image.time, BusFailure::timeout, 0);
  }
  const unsigned most = holds_bits(request.table) ? 2000U : 125U;
  if (request.count == 0 || request.count > most) {
    return failed(image.time, BusFailure::exception, bad_value);
  }
  const auto& words = device->tables.at(static_cast<std::size_t>(request.table));
  if (std::size_t{request.address} + request.count > words.size()) {
    return failed(image.time, BusFailure::exception, bad_address);
  }
  const auto first = words.begin() + request.address;
  return {
      .words = {first, first + request.count},
      .failure = std::nullopt,
      .exception_code = 0,
      .time = image.time
  };
}

}  // namespace lostwork
