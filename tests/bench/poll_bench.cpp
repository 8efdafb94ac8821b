// Polling over Modbus TCP on loopback, decoding and quality included, beside the bare exchange of
// the same frame by plain sockets; and a scan of the plant without sockets and without properties.
#include "config/plant_config.h"
#include "daemon/demo_plant_file.h"
#include "sensors/demo_plant/image_bus.h"
#include "sensors/demo_plant/server.h"
#include "sensors/modbus_bus.h"
#include "sensors/poller.h"
#include "sensors/scan_assembler.h"

#include <arpa/inet.h>
#include <array>
#include <benchmark/benchmark.h>
#include <stdexcept>
#include <sys/socket.h>
#include <unistd.h>

namespace lostwork {
namespace {

PlantConfig demo_plant() {
  return *read_plant(demo_plant_file(), "tern_quay_dairy.toml");
}

int connected(std::uint16_t port) {
  const int fd = socket(AF_INET, SOCK_STREAM, 0);
  sockaddr_in to{};
  to.sin_family = AF_INET;
  to.sin_port = htons(port);
  to.sin_addr.s_addr = htonl(INADDR_LOOPBACK);
  if (connect(fd, reinterpret_cast<const sockaddr*>(&to), sizeof to) != 0) {
    throw std::runtime_error{"no connection to the demo server"};
  }
  return fd;
}

// One request at a time, as the poller asks.
void bare_request(benchmark::State& run) {
  const Plant plant{PlantOptions{}};
  const DemoServer server{0, register_image(plant)};
  const int fd = connected(server.port());
  const RegisterImage image = register_image(plant);
  const std::array<std::uint8_t, 12> request{0, 1, 0, 0, 0, 6, image.devices.front().unit,
                                             3, 0, 0, 0, 1};
  std::array<std::uint8_t, 260> answer{};
  for (auto _ : run) {
    benchmark::DoNotOptimize(send(fd, request.data(), request.size(), 0));
    benchmark::DoNotOptimize(recv(fd, answer.data(), answer.size(), 0));
  }
  close(fd);
}
BENCHMARK(bare_request);

// Per request: all of a scan's requests, divided by their number.
void polled_requests(benchmark::State& run) {
  const Plant plant{PlantOptions{}};
  const DemoServer server{0, register_image(plant)};
  PlantConfig config = demo_plant();
  BusOptions options = config.wiring.buses.front();
  options.tcp = {.host = "127.0.0.1", .port = server.port()};
  options.pause = Span::zero();
  const auto bus = modbus_bus(options);
  Poller poller{config.wiring, options.id, **bus};
  std::uint64_t requests = 0;
  Instant now = plant.time();
  for (auto _ : run) {
    now += Span{60000};
    benchmark::DoNotOptimize(poller.poll(now));
  }
  for (const DeviceStatus& device : poller.status()) {
    requests += device.requests;
  }
  run.SetItemsProcessed(static_cast<std::int64_t>(requests));
}
BENCHMARK(polled_requests);

// Both machines of the plant: decode, judge, assemble.
void scan_without_sockets(benchmark::State& run) {
  const Plant plant{PlantOptions{}};
  const PlantConfig config = demo_plant();
  ImageBus bus{plant};
  Poller poller{config.wiring, config.wiring.buses.front().id, bus};
  std::vector<ScanAssembler> assemblers;
  for (const MachineScan& machine : config.wiring.machines) {
    assemblers.emplace_back(config.wiring, machine.machine);
  }
  Instant now = plant.time();
  for (auto _ : run) {
    now += Span{60000};
    const std::vector<PointReading> readings = poller.poll(now);
    for (ScanAssembler& assembler : assemblers) {
      assembler.take(readings);
      benchmark::DoNotOptimize(assembler.scan(now));
    }
  }
}
BENCHMARK(scan_without_sockets);

}  // namespace
}  // namespace lostwork
