// Scans of one machine as one blob, and back bit for bit.
//
// Pure. Layout 1 (columns: columns.h; integers unsigned, little-endian):
//   u8 1, u16 scans, u16 points, u32 number of the point layout
//   column of scans - 1 time steps in ms: each scan's time less the one before; the first has the
//   key's
//   for each point the columns
//     quality
//     value in SI, the bits of a double; 0 where it is not finite
//     standard uncertainty in SI, the same
//     zigzag of (time of the reading less time of the scan) in ms
// A good reading that is not finite is stored as out of range.
#pragma once

#include "storage/columns.h"
#include "thermo/reading.h"

#include <cstddef>
#include <cstdint>
#include <optional>
#include <span>
#include <vector>

namespace lostwork {

// Bounds the memory that one block takes.
inline constexpr std::size_t most_scans_a_block = 600;
inline constexpr std::size_t most_points = 4000;  // of one machine

// scans: in time order from `first`, the time in the key, all with `points` readings; 1 to
// most_scans_a_block. Writes into `out`, which is empty.
void encode_samples(std::span<const Scan* const> scans, std::uint32_t layout, std::size_t points,
                    ColumnWriter& out);

struct SampleBlock {
  std::uint32_t layout = 0;
  std::vector<Scan> scans;
};
// None: damaged, or of a layout that is not known.
[[nodiscard]] std::optional<SampleBlock> decode_samples(std::int64_t key,
                                                        std::span<const std::uint8_t> blob);
[[nodiscard]] std::optional<std::vector<Instant>> decode_sample_times(
    std::int64_t key, std::span<const std::uint8_t> blob);

}  // namespace lostwork
