// A small invented site for tests: Tern Quay Dairy's chiller on one bus.
#pragma once

#include "sensors/bus.h"
#include "sensors/wiring.h"

#include <chrono>
#include <cstdint>
#include <functional>
#include <string>
#include <utility>
#include <vector>

namespace lostwork::test {

// A whole multiple of every period below.
inline constexpr Instant start{std::chrono::sys_days{std::chrono::year{2024} / 3 / 1}};
inline constexpr Span period{10000};

inline PointSpec power_at(const std::string& machine, const std::string& device,
                          std::uint16_t address) {
  PointSpec point;
  point.id = machine + "_" + device + "_" + std::to_string(address);
  point.machine = machine;
  point.role = Role::power;
  point.unit = Unit::kW;
  point.source = FromRegister{.device = device, .at = {.address = address}};
  return point;
}

// Devices "panel" (unit 1) and "meter" (unit 2) on the bus "plc", one machine, no points.
inline Wiring empty_wiring() {
  Wiring wiring;
  wiring.buses.push_back({.id = "plc", .pause = Span{0}});
  wiring.devices.push_back({.id = "panel", .bus = "plc", .unit = 1});
  wiring.devices.push_back({.id = "meter", .bus = "plc", .unit = 2});
  wiring.machines.push_back({.machine = "chiller-1", .period = period});
  return wiring;
}

// A bus that answers by a function, and keeps what it was asked.
class ScriptedBus final : public Bus {
 public:
  using Answer = std::function<BlockAnswer(const BlockRequest&)>;

  explicit ScriptedBus(Answer answer) : answer_{std::move(answer)} {}
  [[nodiscard]] BlockAnswer read(const BlockRequest& request) override {
    asked.push_back(request);
    BlockAnswer answer = answer_(request);
    answer.time = time;
    return answer;
  }

  std::vector<BlockRequest> asked;
  Instant time = start;

 private:
  Answer answer_;
};

// Every register holds its address.
inline BlockAnswer addresses(const BlockRequest& request) {
  BlockAnswer answer;
  for (unsigned i = 0; i < request.count; ++i) {
    answer.words.push_back(static_cast<std::uint16_t>(request.address + i));
  }
  return answer;
}

inline BlockAnswer failing(BusFailure failure, std::uint8_t code = 0) {
  BlockAnswer answer;
  answer.failure = failure;
  answer.exception_code = code;
  return answer;
}

}  // namespace lostwork::test
