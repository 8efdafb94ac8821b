// What the service manager is told (sd_notify protocol); nothing where there is none.
#pragma once

#include <chrono>
#include <optional>

namespace lostwork {

void tell_ready();
void tell_reloading();
void tell_stopping();
void tell_alive();

// How often tell_alive is wanted at least; none: no watchdog.
[[nodiscard]] std::optional<std::chrono::microseconds> watchdog_period();

}  // namespace lostwork
