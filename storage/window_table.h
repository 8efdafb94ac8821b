// Steady windows in the file.
//
// means, layout 1 (columns: columns.h): u8 1, u8 quantities; a column with 1 where there is a mean;
// then, for those that have one, the columns of the bits of mean, u, sd and n_effective.
#pragma once

#include "storage/database.h"
#include "thermo/measure/window.h"
#include "thermo/reading.h"

#include <cstddef>
#include <cstdint>
#include <vector>

namespace lostwork {

// In a transaction. The window that is in the file already stays. A mean that is not finite counts
// as missing. The window's begin is storable (key.h).
void write_window(Statement& insert, std::int64_t machine, const Window& window);
inline constexpr const char* insert_window_sql =
    "INSERT OR IGNORE INTO steady_window (key, end_ms, scans, means) VALUES (?1, ?2, ?3, ?4)";

struct ReadWindows {
  std::vector<Window> windows;
  std::uint64_t damaged = 0;
};
// Those that begin in [from, to), in time order; at most `limit`.
[[nodiscard]] ReadWindows read_windows(Database& database, std::int64_t machine, Instant from,
                                       Instant to, std::size_t limit);

}  // namespace lostwork
