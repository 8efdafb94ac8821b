// The live program: polls, computes, stores, shows; until it is told to end.
#pragma once

#include "config/plant_config.h"
#include "daemon/log.h"
#include "daemon/plant_clock.h"
#include "sensors/bus.h"

#include <chrono>
#include <filesystem>
#include <functional>
#include <memory>
#include <optional>
#include <string>
#include <vector>

namespace lostwork {

struct LoopOptions {
  PlantClock clock;
  bool demonstration = false;
  std::optional<std::chrono::seconds> run_for;  // none: until a signal
  // Read again at SIGHUP; none: SIGHUP changes nothing.
  std::optional<std::filesystem::path> plant_file;
  // Told the page's port once it listens.
  std::function<void(std::uint16_t port)> on_ready;
};

// Returns when SIGTERM or SIGINT came, or the time is over, with everything on disk. Throws
// std::runtime_error with one sentence where it cannot start: the database, the page's address, a
// bus.
void run_loop(const PlantConfig& plant, const LoopOptions& options, Log& log);

}  // namespace lostwork
