// The plant as the program works with it, made from the plant file.
#pragma once

#include "config/plant_file.h"
#include "config/problem.h"
#include "config/safety_limit.h"
#include "config/tariff.h"
#include "sensors/wiring.h"
#include "thermo/cycle/machine_model.h"

#include <filesystem>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

struct MachineConfig {
  MachineModel model;
  bool accept_unattended = false;  // what is learned counts as healthy without a person's word
  std::vector<SafetyLimit> limits;
};

struct PlantConfig {
  std::string site;
  std::string timezone;            // an IANA name that this computer knows
  std::filesystem::path database;  // absolute, or relative to the working folder
  Span commit{60000};              // what a power cut may lose
  std::string listen;              // a loopback address and a port: "127.0.0.1:8470"
  Tariff tariff;
  Wiring wiring;  // points of one machine stand together, in the order of its model's
  std::vector<MachineConfig> machines;
  std::string text;  // the file, as it was read
};

// `name` stands in messages only; a relative database stays relative. All problems at once, in the
// order of the file: what each table says and what they mean together. What is but the consequence
// of another problem is left out.
[[nodiscard]] tl::expected<PlantConfig, Problems> read_plant(std::string_view text,
                                                             std::string_view name);

// From the file's path; a relative database lies beside the file.
[[nodiscard]] tl::expected<PlantConfig, Problems> load_plant(const std::filesystem::path& path);

}  // namespace lostwork
