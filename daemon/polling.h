// Reads the plant's buses, each on a thread of its own, and hands out whole scans.
//
// Made on and used from the io_context's thread.
#pragma once

#include "daemon/plant_clock.h"
#include "sensors/bus.h"
#include "sensors/poller.h"
#include "sensors/scan_assembler.h"
#include "sensors/wiring.h"
#include "thermo/reading.h"

#include <cstddef>
#include <functional>
#include <memory>
#include <optional>
#include <string>
#include <vector>

namespace boost::asio {
class io_context;
}  // namespace boost::asio

namespace lostwork {

class Polling {
 public:
  struct Parts {
    Wiring wiring;
    std::vector<std::unique_ptr<Bus>> buses;  // of wiring.buses, in their order
    PlantClock clock;
    // A scan of wiring.machines[machine]; the scans of one machine come in the order of time.
    std::function<void(std::size_t machine, Scan scan)> on_scan;
    // The plant's clock was set back to before the last scan.
    std::function<void(Instant now)> on_clock_back;
  };

  Polling(boost::asio::io_context& io, Parts parts);
  Polling(const Polling&) = delete;
  Polling& operator=(const Polling&) = delete;
  // No scan is handed out any more. Returns at once: a bus that is waiting for an answer ends when
  // it has it, or when its time is over.
  ~Polling();  // NOLINT(bugprone-exception-escape): an Asio timer's cancel() has no error

  // How long the bus that has been in a call for longest has been in it.
  [[nodiscard]] std::chrono::steady_clock::duration longest_call() const;

 private:
  struct Running;
  std::shared_ptr<Running> running_;
};

}  // namespace lostwork
