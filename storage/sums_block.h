// Sums of one machine over some minutes, or over one hour or day, as one blob, and back exactly.
//
// Pure but for the words that reasons blame. Layout 1 (columns: columns.h):
//   u8 1, u8 single (1: every period has exactly one scan), u16 periods, u8 quantities
//   columns, one number a period:
//     begin in units of the period, less the one before; the first less the key's
//     newest scan less begin, in ms; mode; level; time covered in ms; steady scans;
//     unless single: scans
//   for each quantity, in the order of its number:
//     u8 0: missing in all periods; 1: in none; 2: in some, then a column with 1 where there is a
//     value
//     columns, one number for each period with a value:
//       single: the value's bits; the bits of u as a float
//       else: bits of sum, u_sum, min, max; count; for a ratio the bits of weight
//     columns, one number for each period without: code of the reason; number of the word that it
//     blames; 1 where it has a figure; the figure's bits, else 0
#pragma once

#include "storage/columns.h"
#include "storage/sums.h"
#include "storage/words.h"
#include "thermo/quantity.h"
#include "thermo/reading.h"

#include <cstddef>
#include <cstdint>
#include <optional>
#include <span>
#include <vector>

namespace lostwork {

struct Period {
  Instant begin{};
  PeriodSums sums;  // of at least one scan
};

inline constexpr std::size_t most_periods_a_block = 60;

// periods: rising, multiples of `length`; the first one's begin is the time in the key; 1 to
// most_periods_a_block. Writes into `out`, which is empty.
void encode_sums(std::span<const Period> periods, Span length, Words& words, ColumnWriter& out);

// None: damaged, or of a layout that is not known.
[[nodiscard]] std::optional<std::vector<Period>> decode_sums(std::int64_t key, Span length,
                                                             std::span<const std::uint8_t> blob,
                                                             Words& words);
[[nodiscard]] std::optional<std::vector<Instant>> decode_sums_begins(
    std::int64_t key, Span length, std::span<const std::uint8_t> blob);

// What a trend needs: one quantity only.
struct QuantityPeriod {
  Instant begin{};
  std::uint32_t scans = 0;
  std::uint64_t covered_ms = 0;
  QuantitySums sums;
};
[[nodiscard]] std::optional<std::vector<QuantityPeriod>> decode_sums_of(
    std::int64_t key, Span length, std::span<const std::uint8_t> blob, Quantity quantity,
    Words& words);

}  // namespace lostwork
