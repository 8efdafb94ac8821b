// How a site is wired: what the plant file fills and the pollers run on.
#pragma once

#include "sensors/decode.h"
#include "sensors/point.h"
#include "thermo/reading.h"

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include <tl/expected.hpp>

namespace lostwork {

enum class BusKind : std::uint8_t { tcp, rtu, rtu_over_tcp, count };
enum class Parity : std::uint8_t { none, even, odd, count };

[[nodiscard]] std::string_view name(BusKind kind);
[[nodiscard]] std::optional<BusKind> bus_kind_named(std::string_view name);
[[nodiscard]] std::string_view name(Parity parity);
[[nodiscard]] std::optional<Parity> parity_named(std::string_view name);

struct TcpEndpoint {
  std::string host{};  // a numeric address, so that no name service can hold up a bus
  std::uint16_t port = 502;
};
// "127.0.0.1:1502", "10.0.0.7" (port 502), "[fe80::1]:502"; or a sentence on what is wrong.
[[nodiscard]] tl::expected<TcpEndpoint, std::string> tcp_endpoint(std::string_view text);

struct SerialLine {
  std::string device{};  // "/dev/ttyUSB0"
  int baud = 19200;      // 8E1: the serial-line specification's default
  Parity parity = Parity::even;
  int stop_bits = 1;  // 1 or 2
};

struct BusOptions {
  std::string id{};
  BusKind kind = BusKind::tcp;
  TcpEndpoint tcp{};    // kind tcp
  SerialLine serial{};  // kind rtu
  Span timeout{1000};   // for one request as a whole; keep it below the shortest scan period
  // Least time between an answer and the next request: some devices fall over when hammered. 100 ms
  // is common practice, no source; 0 for none.
  Span pause{100};
  Span retry_first{1000};   // between attempts to connect: doubles from here ...
  Span retry_limit{60000};  // ... to here, each shortened by a random share of up to a quarter
};

// What a bus cannot be run with (a kind that is not supported, a line setting out of range); empty:
// nothing.
[[nodiscard]] std::optional<std::string> fault_of(const BusOptions& options);

struct DeviceOptions {
  std::string id{};
  std::string bus{};
  std::uint8_t unit = 1;  // 1 to 247 on a serial line or behind a gateway; 0 and 255 too on TCP
  Notation addresses = Notation::zero_based;
  std::uint16_t max_registers = 125;  // in one request; some devices allow fewer
  std::uint16_t max_bits = 2000;
  std::uint16_t max_gap = 10;  // unwanted registers read to save a request
  Span silent_first{1000};     // pause for a device that did not answer: doubles from here ...
  Span silent_limit{60000};    // ... to here, while the bus's other devices go on
};

struct MachineScan {
  std::string machine{};
  Span period{10000};
};

struct Wiring {
  double altitude_m = 0.0;
  std::vector<BusOptions> buses{};
  std::vector<DeviceOptions> devices{};
  std::vector<MachineScan> machines{};
  // Of one machine in the order of its MachineModel::points.
  std::vector<PointSpec> points{};
};

// Index into Wiring::points of each point of the machine, in that order.
[[nodiscard]] std::vector<std::size_t> points_of(const Wiring& wiring, std::string_view machine);

}  // namespace lostwork
