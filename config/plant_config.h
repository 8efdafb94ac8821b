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
  std::string listen;  // "127.0.0.1:8470"; whether it may be listened on is the server's to say
  Tariff tariff;
  Wiring wiring;  // points of one machine stand together, in the order of its model's
  std::vector<MachineConfig> machines;
  std::string text;  // the file, as it was read
};

// Share of its variance that a point of a pair has in common with the other one, where the file
// does not say how accurate their difference is: engineering judgement, no published figure.
inline constexpr double default_shared_variance = 0.5;

// Everything that the tables mean together: names that must exist, units that fit roles, registers
// that exist. All problems at once, in the order of the file.
[[nodiscard]] tl::expected<PlantConfig, Problems> plant_from(const PlantFile& file);

// From the file's path; a relative database lies beside the file.
[[nodiscard]] tl::expected<PlantConfig, Problems> load_plant(const std::filesystem::path& path);

}  // namespace lostwork
