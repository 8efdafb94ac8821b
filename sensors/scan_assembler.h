// Puts the readings of several buses together to the scans of one machine. Pure.
#pragma once

#include "sensors/poller.h"
#include "sensors/wiring.h"
#include "thermo/reading.h"

#include <cstddef>
#include <optional>
#include <span>
#include <string_view>
#include <vector>

namespace lostwork {

class ScanAssembler {
 public:
  ScanAssembler(const Wiring& wiring, std::string_view machine);

  // Readings of other machines' points are passed over. Later ones replace earlier ones.
  void take(std::span<const PointReading> readings);

  // Whether every point that is wired to a bus has a reading of `time` or later that no scan has
  // used yet: the scan at `time` need not wait any longer.
  [[nodiscard]] bool complete(Instant time) const;

  // The scan at `time`: readings in the order of the machine's points. Constant points are good at
  // `time`. A reading enters one scan only and must not be older than a period: instead of a value
  // held from before there is quality timeout, and stale once the last one is older than three
  // periods.
  [[nodiscard]] Scan scan(Instant time);

 private:
  struct Slot {
    std::size_t point;  // index into Wiring::points
    bool wired;
    PointSpec spec;
    bool fresh = false;  // no scan has used `last` yet
    std::optional<Reading> last{};
  };
  [[nodiscard]] Reading current(Slot& slot, Instant time) const;

  double altitude_m_;
  Span period_{MachineScan{}.period};
  std::vector<Slot> slots_;
};

}  // namespace lostwork
