// A Modbus TCP server on 127.0.0.1 that shows the simulated plant.
//
// One thread of its own answers all clients; plain sockets, since libmodbus' server knows one unit
// id and one client at a time and would link its write functions. The image is handed over under a
// mutex that is held while it is swapped, and while one answer is made.
#pragma once

#include "sensors/demo_plant/registers.h"

#include <cstdint>
#include <memory>

namespace lostwork {

class DemoServer {
 public:
  // Port 0: one that is free. Throws std::system_error where it cannot listen; what() names the
  // port.
  DemoServer(std::uint16_t port, RegisterImage image);
  DemoServer(const DemoServer&) = delete;
  DemoServer& operator=(const DemoServer&) = delete;
  DemoServer(DemoServer&&) = delete;
  DemoServer& operator=(DemoServer&&) = delete;
  // Closes every connection and waits for the thread.
  ~DemoServer();

  [[nodiscard]] std::uint16_t port() const;

  // From any thread. What clients read from now on.
  void show(RegisterImage image);

 private:
  class Loop;
  std::unique_ptr<Loop> loop_;
};

}  // namespace lostwork
