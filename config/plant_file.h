// The plant file as it is written: one option struct for each of its tables, in the file's own
// units.
//
// Keys, limits and meanings: plant_keys.h. What the rest of the program works with: plant.h.
#pragma once

#include "config/problem.h"
#include "config/tariff.h"
#include "thermo/result.h"

#include <array>
#include <chrono>
#include <cstdint>
#include <optional>
#include <string>
#include <variant>
#include <vector>

namespace lostwork {

struct SiteOptions {
  std::string name;
  double altitude_m = 0.0;
  std::string timezone = "UTC";
};

struct StorageOptions {
  std::string file = "plant.db";
  double commit_s = 60.0;
};

struct WebOptions {
  std::string listen = "127.0.0.1:8470";
};

struct BusOptions {
  std::uint32_t line = 0;
  std::string id;
  std::string kind = "tcp";
  std::string address;
  std::int64_t baud = 19200;
  std::string parity = "even";
  std::int64_t stop_bits = 1;
  double response_timeout_ms = 1000.0;
};

struct DeviceOptions {
  std::uint32_t line = 0;
  std::string id;
  std::string bus;
  std::int64_t unit = 1;
  std::string addresses = "zero_based";
  std::int64_t largest_gap = 10;
};

// A liquid as the file names it, or its constant volumetric heat capacity.
struct StreamOptions {
  std::string fluid = "water";
  std::optional<double> rho_cp_J_m3K;
};

struct CasingLossOptions {
  double fraction = 0.05;
  double limit = 0.05;
};

struct MachineOptions {
  std::uint32_t line = 0;
  std::string id;
  std::string name;
  std::string duty = "cooling";
  std::string kind = "single_stage";
  std::string evaporator = "dry";
  std::string refrigerant;
  double scan_s = 10.0;
  double rated_power_kW = 0.0;
  std::optional<double> casing_surroundings_degC;
  std::optional<std::string> accept;
  CasingLossOptions casing_loss;
  StreamOptions cold_stream;
  StreamOptions hot_stream;
};

// One component of an accuracy statement, in the point's unit.
struct AccuracyOptions {
  std::optional<std::string> sensor_class;
  std::optional<double> limit;
  std::optional<double> percent_of_reading;
  std::optional<double> percent_of_span;
  std::optional<std::array<double, 2>> span;
  std::optional<double> u;
};

struct PairOptions {
  std::uint32_t line = 0;
  std::string id;
  std::vector<AccuracyOptions> difference;
};

struct CorrectionOptions {
  std::chrono::sys_seconds from{};
  double add = 0.0;
};

struct PointOptions {
  std::uint32_t line = 0;
  std::string id;
  std::string machine;
  std::int64_t circuit = 1;
  std::string role;
  std::string unit;
  std::vector<AccuracyOptions> accuracy;
  std::optional<std::string> pair;
  std::optional<std::string> device;
  std::optional<std::int64_t> register_number;
  std::string table = "holding";
  std::string type = "u16";
  std::string order = "ABCD";
  double scale = 1.0;
  double offset = 0.0;
  std::vector<std::int64_t> sentinels;
  std::optional<std::array<double, 2>> range;
  std::optional<double> value;
  std::string at = "in";
  std::vector<CorrectionOptions> corrections;
};

struct SafetyLimitOptions {
  std::uint32_t line = 0;
  std::string machine;
  std::string kind;
  double limit = 0.0;
  std::string unit;
  std::string document;
  std::string jurisdiction;
  std::optional<std::string> entered_by;
};

struct PlantFile {
  SiteOptions site;
  StorageOptions storage;
  WebOptions web;
  Tariff tariff;
  std::vector<BusOptions> buses;
  std::vector<DeviceOptions> devices;
  std::vector<MachineOptions> machines;
  std::vector<PairOptions> pairs;
  std::vector<PointOptions> points;
  std::vector<SafetyLimitOptions> safety_limits;
};

// `name` stands in messages only. All problems of the text at once; a text that is no TOML has one.
[[nodiscard]] tl::expected<PlantFile, Problems> read_plant_file(std::string_view text,
                                                                std::string_view name);

}  // namespace lostwork
