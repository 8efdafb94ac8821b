#include "daemon/past_season.h"

#include "sensors/demo_plant/image_bus.h"
#include "sensors/poller.h"
#include "sensors/scan_assembler.h"

#include <stdexcept>
#include <utility>
#include <vector>

namespace lostwork {
namespace {

// Handed over together: keeps memory small and the store's transactions few.
constexpr std::size_t scans_a_batch = 10000;

void store_batch(const SeasonSinks& to) {
  const WriteResult result = to.store.write(to.pipeline.take_batch());
  if (!result.stored) {
    throw std::runtime_error{result.why};
  }
}

void hand_out(const std::vector<PointReading>& readings, std::vector<ScanAssembler>& to) {
  for (ScanAssembler& assembler : to) {
    assembler.take(readings);
  }
}

}  // namespace

void run_past_season(const PlantConfig& config, Plant& plant, Instant until,
                     const SeasonSinks& to) {
  ImageBus bus{plant};
  std::vector<Poller> pollers;
  for (const BusOptions& options : config.wiring.buses) {
    pollers.emplace_back(config.wiring, options.id, bus);
  }
  std::vector<ScanAssembler> assemblers;
  for (const MachineScan& machine : config.wiring.machines) {
    assemblers.emplace_back(config.wiring, machine.machine);
  }
  const Span period = config.wiring.machines.front().period;
  std::size_t waiting = 0;
  while (plant.time() < until) {
    plant.step(period - plant.time().time_since_epoch() % period);  // to the next scan's time
    bus.show(plant);
    for (Poller& poller : pollers) {
      hand_out(poller.poll(plant.time()), assemblers);
    }
    for (std::size_t m = 0; m < assemblers.size(); ++m) {
      to.pipeline.take(m, assemblers[m].scan(plant.time()));
    }
    waiting += assemblers.size();
    if (waiting >= scans_a_batch) {
      store_batch(to);
      waiting = 0;
    }
    to.progress.step();
  }
  store_batch(to);
}

}  // namespace lostwork
