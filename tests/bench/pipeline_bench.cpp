// A history of one machine through everything: assessment, steady windows, baseline, drift,
// storing. One iteration is a simulated week of one-minute scans; a year takes 52.18 of them.
#include "daemon/pipeline.h"
#include "sensors/demo_plant/plant_scan.h"
#include "storage/store.h"

#include <benchmark/benchmark.h>
#include <filesystem>
#include <vector>

namespace lostwork {
namespace {

constexpr int week = 7 * 24 * 60;

std::vector<Scan> recorded_week() {
  Plant plant{PlantOptions{}};
  std::vector<Scan> out;
  for (int i = 0; i < week; ++i) {
    plant.step(Span{60000});
    out.push_back(plant_scan(plant, PlantMachine::chiller));
  }
  return out;
}

PlantConfig one_chiller() {
  PlantConfig config;
  config.timezone = "UTC";
  MachineConfig& machine = config.machines.emplace_back();
  machine.model = plant_machine_model(PlantMachine::chiller);
  machine.model.scan_period = Span{60000};
  return config;
}

void a_week_through_everything(benchmark::State& run) {
  const std::vector<Scan> scans = recorded_week();
  const std::filesystem::path file = std::filesystem::temp_directory_path() / "lostwork_bench.db";
  for (auto _ : run) {
    run.PauseTiming();
    std::filesystem::remove(file);
    run.ResumeTiming();
    Store store{
        {.file = file.string(), .durability = Durability::process}
    };
    Pipeline pipeline{one_chiller()};
    for (const Scan& scan : scans) {
      pipeline.take(0, scan);
    }
    store.write(pipeline.take_batch());
  }
  std::filesystem::remove(file);
  run.SetItemsProcessed(run.iterations() * week);
}
BENCHMARK(a_week_through_everything)->Unit(benchmark::kMillisecond);

}  // namespace
}  // namespace lostwork
