// The one sentence that the program says of a machine. Pure.
//
// Plain text: whoever puts it into HTML, JSON or a log escapes it there.
#pragma once

#include "daemon/local_time.h"
#include "daemon/plant_view.h"

#include <cstdint>
#include <span>
#include <string>
#include <string_view>

namespace lostwork {

// How a machine is, in one word; the worst that holds, in this order.
enum class Condition : std::uint8_t {
  not_read,         // nothing heard for three scan periods: nothing else is claimed
  danger,           // a safety-relevant alarm is active
  sensor_suspect,   // a sensor does not fit the others: figures cannot be trusted
  sensor_failed,    // a sensor gives no good reading
  drifted,          // needs more power than it should
  alarm,            // any other alarm is active
  too_few_sensors,  // cannot be judged by what it has
  learning,         // not yet known what is normal for it
  watched,          // something may have changed; not confirmed
  off,
  well,
  count
};
[[nodiscard]] std::string_view name(Condition condition);
[[nodiscard]] std::string_view text(Condition condition);  // two or three words: "needs more power"

struct Sentence {
  Condition condition = Condition::not_read;
  std::string text;
};

struct WallClock {
  Instant now{};
  UtcOffset offset;
};

// The one sentence of a machine. `alarms` may hold those of other machines too.
[[nodiscard]] Sentence sentence(const MachineView& machine, std::span<const AlarmView> alarms,
                                const WallClock& clock);

// Longer than this without a good reading, and a machine counts as not read.
[[nodiscard]] Span patience(const MachineView& machine);

}  // namespace lostwork
