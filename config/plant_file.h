// The plant file as it is written: one option struct for each of its tables, in the file's own
// units.
//
// Keys, limits and meanings: plant_keys.h. What the rest of the program works with: plant_config.h.
#pragma once

#include "config/entry_place.h"
#include "config/problem.h"
#include "config/tariff.h"
#include "thermo/result.h"

#include <algorithm>
#include <array>
#include <chrono>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

namespace lostwork {

struct SiteEntry {
  EntryPlace place;
  std::string name;
  double altitude_m = 0.0;
  std::string timezone = "UTC";
};

struct StorageEntry {
  std::string file = "plant.db";
  double commit_s = 60.0;
};

struct WebEntry {
  EntryPlace place;
  std::string listen = "127.0.0.1:8470";
};

struct BusEntry {
  EntryPlace place;
  std::string id;
  std::string kind = "tcp";
  std::string address;
  std::int64_t baud = 19200;
  std::string parity = "even";
  std::int64_t stop_bits = 1;
  double response_timeout_ms = 1000.0;
  double pause_ms = 100.0;
};

struct DeviceEntry {
  EntryPlace place;
  std::string id;
  std::string bus;
  std::int64_t unit = 1;
  std::string addresses = "zero_based";
  std::int64_t largest_gap = 10;
};

// A liquid as the file names it, or its constant volumetric heat capacity.
struct StreamEntry {
  EntryPlace place;
  std::optional<std::string> fluid;  // neither: water
  std::optional<double> rho_cp_J_m3K;
};

struct CasingLossEntry {
  double fraction = 0.05;
  double limit = 0.05;
};

struct MachineEntry {
  EntryPlace place;
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
  CasingLossEntry casing_loss;
  StreamEntry cold_stream;
  StreamEntry hot_stream;
};

// One component of an accuracy statement, in the point's unit.
struct AccuracyEntry {
  std::optional<std::string> sensor_class;
  std::optional<double> limit;
  std::optional<double> percent_of_reading;
  std::optional<double> percent_of_span;
  std::optional<std::array<double, 2>> span;
  std::optional<double> u;
};

struct PairEntry {
  EntryPlace place;
  std::string id;
  std::vector<AccuracyEntry> difference;
};

struct CorrectionEntry {
  std::chrono::sys_seconds from{};
  double add = 0.0;
};

struct PointEntry {
  EntryPlace place;
  std::string id;
  std::string machine;
  std::int64_t circuit = 1;
  std::string role;
  std::string unit;
  std::vector<AccuracyEntry> accuracy;
  std::optional<std::string> pair;
  std::optional<std::string> device;
  std::optional<std::int64_t> register_number;
  std::string table = "holding";
  std::string type = "u16";
  std::string order = "ABCD";
  double scale = 1.0;
  double offset = 0.0;
  std::vector<std::variant<std::int64_t, double>> sentinels;
  std::optional<std::array<double, 2>> range;
  std::optional<double> value;
  std::string at = "in";
  std::vector<CorrectionEntry> corrections;
};

struct SafetyLimitEntry {
  EntryPlace place;
  std::string machine;
  std::string kind;
  double limit = 0.0;
  std::string unit;
  std::string document;
  std::string jurisdiction;
  std::optional<std::string> entered_by;
};

struct PlantFile {
  EntryPlace place;  // its keys are the tables
  SiteEntry site;
  StorageEntry storage;
  WebEntry web;
  Tariff tariff;
  std::vector<BusEntry> buses;
  std::vector<DeviceEntry> devices;
  std::vector<MachineEntry> machines;
  std::vector<PairEntry> pairs;
  std::vector<PointEntry> points;
  std::vector<SafetyLimitEntry> safety_limits;
};

// Whether an id that none of the entries has may still be that of one whose own id was refused:
// then nothing can be said about it.
template <class Entries>
[[nodiscard]] bool may_mean(const PlantFile& file, std::string_view table, const Entries& entries) {
  return !file.place.sound(table) ||
         std::any_of(entries.begin(), entries.end(),
                     [](const auto& entry) { return !entry.place.sound("id"); });
}

// `name` stands in messages only. Notes every problem of the text; what is refused keeps its
// default and is marked in its entry's place. Empty: the text is no TOML, which is one problem.
[[nodiscard]] std::optional<PlantFile> read_plant_file(std::string_view text, std::string_view name,
                                                       Problems& problems);

}  // namespace lostwork
