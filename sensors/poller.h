// Reads the points of one bus. One poller per bus, each on a thread of its own.
#pragma once

#include "sensors/blocks.h"
#include "sensors/bus.h"
#include "sensors/wiring.h"
#include "thermo/reading.h"

#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

struct PointReading {
  std::size_t point = 0;  // index into Wiring::points
  Reading reading;

  friend bool operator==(const PointReading&, const PointReading&) = default;
};

// How a device has answered since the start.
struct DeviceStatus {
  std::string device;
  std::uint64_t requests = 0;
  std::uint64_t answers = 0;
  std::uint64_t timeouts = 0;
  std::uint64_t exceptions = 0;
  std::uint64_t malformed = 0;
  std::uint64_t no_connection = 0;
  std::uint8_t last_exception = 0;
  std::optional<Instant> silent_since;  // no answer since then
};

// Plain object: no thread, no clock, no lock. The bus must outlive it.
class Poller {
 public:
  Poller(const Wiring& wiring, std::string_view bus_id, Bus& bus);

  // One reading for each point of each machine that is due at `now` and wired to this bus, whatever
  // happened on the bus; empty when none is due. A machine is due at the multiples of its period,
  // counted from the epoch. Takes as long as the bus needs; a silent device costs at most one
  // timeout, and none while its pause lasts.
  [[nodiscard]] std::vector<PointReading> poll(Instant now);

  // When the next machine is due; Instant::max() where nothing is wired to this bus.
  [[nodiscard]] Instant next_due() const;

  [[nodiscard]] std::vector<DeviceStatus> status() const;

 private:
  struct Entry {
    std::size_t point;  // index into Wiring::points
    PointSpec spec;
  };
  // The points of one device that are read together.
  struct Group {
    std::size_t device;
    Span period;
    Instant due;
    std::vector<Entry> entries;
    std::vector<RegisterNeed> needs;  // of entries
    std::vector<Block> blocks;
    std::vector<std::optional<Instant>> illegal_until;  // of entries: known bad, asked again then
  };
  struct Device {
    DeviceOptions options;
    DeviceStatus status;
    int silent_polls = 0;
    std::optional<Instant> silent_until;
    Quality silent_as = Quality::timeout;
  };

  Bus& bus_;
  double altitude_m_;
  std::vector<Device> devices_;
  std::vector<Group> groups_;
};

}  // namespace lostwork
