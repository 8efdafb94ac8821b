#include "daemon/service.h"

#include <cstdint>
#include <systemd/sd-daemon.h>

namespace lostwork {

void tell_ready() {
  sd_notify(0, "READY=1");
}
void tell_reloading() {
  sd_notify(0, "RELOADING=1");
}
void tell_stopping() {
  sd_notify(0, "STOPPING=1");
}
void tell_alive() {
  sd_notify(0, "WATCHDOG=1");
}

std::optional<std::chrono::microseconds> watchdog_period() {
  std::uint64_t us = 0;
  if (sd_watchdog_enabled(0, &us) <= 0) {
    return std::nullopt;
  }
  return std::chrono::microseconds{us / 2};  // sd_watchdog_enabled(3): half of the interval
}

}  // namespace lostwork
