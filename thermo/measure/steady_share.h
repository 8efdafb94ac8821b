// How much of its running time a machine was steady, and what the rest was lost to.
#pragma once

#include "thermo/cycle/machine_model.h"
#include "thermo/reading.h"

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

// Why a scan is not steady. Stored: the numbers are never changed.
enum class UnsteadyCause : std::uint8_t {
  none = 0,         // steady
  not_running = 1,  // off, starting, stopping, defrost or unknown
  cycling = 2,
  hold_off = 3,  // too soon after a start, a defrost or a change of the mode word
  filling = 4,   // the window is not full yet
  gap = 5,       // samples are missing
  trend = 6,     // a signal goes up or down
  scatter = 7,   // a signal hunts
  count
};

[[nodiscard]] std::string_view text(UnsteadyCause cause);  // "a signal that hunts"

struct SteadyVerdict {
  UnsteadyCause cause = UnsteadyCause::filling;
  // Index into MachineModel::points, for gap, trend and scatter.
  std::optional<std::size_t> point = std::nullopt;
  [[nodiscard]] bool steady() const { return cause == UnsteadyCause::none; }
};

struct SteadyDay {
  std::int64_t day = 0;  // since 1970, UTC
  Span run_time{0};
  Span steady_time{0};
  std::array<Span, static_cast<std::size_t>(UnsteadyCause::count)> lost{};
  std::vector<Span> lost_to;  // one a point: gap, trend and scatter
};

// Of the time that the machine ran within the last seven days on record.
struct SteadyShare {
  Span run_time{0};
  Span steady_time{0};
  UnsteadyCause main_cause = UnsteadyCause::none;  // what most of the rest was lost to
  std::optional<std::size_t> point;                // whose gap, trend or scatter it was most
  // None before the machine ran.
  [[nodiscard]] std::optional<double> share() const;
};
[[nodiscard]] SteadyShare steady_share(const std::vector<SteadyDay>& days);

// "Steady for 3 % of its running time of the last week. Most of the rest was lost to a signal that
// hunts (cold.out.temperature)." Empty before the machine ran.
[[nodiscard]] std::string text(const SteadyShare& share, const MachineModel& model);

// Adds `length` of running before `now`; forgets days older than a week. `points`: of the model.
void count_running(std::vector<SteadyDay>& days, std::size_t points, Instant now, Span length,
                   const SteadyVerdict& verdict);

template <class Archive>
void archive(Archive& a, SteadyDay& s) {
  a(s.day, s.run_time, s.steady_time, s.lost, s.lost_to);
}

}  // namespace lostwork
