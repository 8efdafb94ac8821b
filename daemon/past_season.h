// A simulated season through polling, decoding and the pipeline, without a socket, into a store.
#pragma once

#include "config/plant_config.h"
#include "daemon/pipeline.h"
#include "daemon/progress.h"
#include "sensors/demo_plant/plant.h"
#include "storage/store.h"
#include "thermo/reading.h"

namespace lostwork {

struct SeasonSinks {
  Pipeline& pipeline;
  Store& store;
  Progress& progress;  // a step is a scan of the plant
};

// Runs the plant on to `until` in steps of the machines' scan period, which they share. Throws
// std::runtime_error where the store cannot be written.
void run_past_season(const PlantConfig& config, Plant& plant, Instant until, const SeasonSinks& to);

}  // namespace lostwork
