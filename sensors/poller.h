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
  std::string device{};
  std::uint64_t requests = 0;
  std::uint64_t answers = 0;
  std::uint64_t timeouts = 0;
  std::uint64_t exceptions = 0;
  std::uint64_t malformed = 0;
  std::uint64_t no_connection = 0;
  std::uint8_t last_exception = 0;
  std::optional<Instant> silent_since{};  // no answer since then
};

// Plain object: no thread, no clock, no lock. The bus must outlive it. A reading has the time that
// the bus gives its answer, so `now` and the bus's clock must be the same one.
//
// A block that the device refuses with exception 02 or 03 is halved until the register at fault is
// found; that one is then left out for ten minutes. A device that does not answer is left alone for
// a while that doubles.
class Poller {
 public:
  Poller(const Wiring& wiring, std::string_view bus_id, Bus& bus);

  // One reading for each point of each machine that is due at `now` and wired to this bus, whatever
  // happened on the bus; empty when none is due. A machine is due at the multiples of its period,
  // counted from the epoch. Takes as long as the bus needs; a silent device costs at most one
  // timeout, and none while its pause lasts.
  [[nodiscard]] std::vector<PointReading> poll(Instant now);

  // When the next machine is due: Instant::min() before the first poll, Instant::max() where
  // nothing is wired to this bus.
  [[nodiscard]] Instant next_due() const;

  [[nodiscard]] std::vector<DeviceStatus> status() const;

 private:
  struct Entry {
    std::size_t point = 0;  // index into Wiring::points
    PointSpec spec;
    std::optional<Instant> illegal_until{};  // the device has no such register; asked again then
  };
  // The points of one device that are read together.
  struct Group {
    std::size_t device = 0;
    Span period{};
    Instant due = Instant::min();
    std::vector<Entry> entries{};
    std::vector<RegisterNeed> needs{};  // needs[i] is of entries[i]
    std::vector<Block> blocks{};
  };
  struct Device {
    DeviceOptions options{};
    DeviceStatus status{};
    int failures = 0;  // without an answer, one after the other
    std::optional<Instant> silent_until{};
    Quality silent_as = Quality::timeout;
  };
  struct Sweep;  // one poll of one group

  [[nodiscard]] std::size_t group_for(std::size_t device, Span period);

  Bus& bus_;
  double altitude_m_;
  std::vector<Device> devices_;
  std::vector<Group> groups_;
};

}  // namespace lostwork
