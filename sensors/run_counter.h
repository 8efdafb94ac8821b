// Hours run and starts, counted from the power. Pure.
#pragma once

#include "thermo/reading.h"

#include <cstdint>
#include <optional>

namespace lostwork {

struct RunRule {
  double on_W;              // running from here up ...
  double off_W;             // ... until it falls below this, < on_W
  Span longest_gap{60000};  // time between two scans further apart is not counted as run
};

// State: stored and taken up again.
struct RunCount {
  Span run{0};
  std::uint64_t starts = 0;  // seen: a machine that runs at the first scan was started before
  bool running = false;
  std::optional<Instant> last{};  // last good power reading

  friend bool operator==(const RunCount&, const RunCount&) = default;
};

template <class Archive>
void archive(Archive& a, RunCount& count) {
  a(count.run, count.starts, count.running, count.last);
}

// The count after one more power reading. A reading that is not good changes nothing; time that
// does not go on is not counted.
[[nodiscard]] RunCount counted(const RunCount& before, const RunRule& rule, const Reading& power);

}  // namespace lostwork
