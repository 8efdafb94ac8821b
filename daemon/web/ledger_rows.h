// Where the power of one machine goes now, as the rows of a table that adds up.
#pragma once

#include "thermo/quantity.h"

#include <optional>
#include <string_view>
#include <vector>

namespace lostwork {

enum class LedgerPart : std::uint8_t {
  needed,       // the reversible power: no machine can do with less
  lost,         // destroyed within the machine
  casing,       // work value of the heat that leaves through the casing
  unaccounted,  // what the sensors disagree about
};
[[nodiscard]] std::string_view name(LedgerPart part);

struct LedgerRow {
  Quantity quantity{};
  LedgerPart part{};
  std::string_view text;     // "condenser"
  Result<Measured> power_W;  // may be negative for casing and unaccounted
  // Of the input power, 0..1. Its u is that of the efficiency for the needed part; elsewhere the
  // sum of the two parts' shares of it, which no correlation can exceed (JCGM 100:2008, 5.2.2).
  std::optional<Measured> share;
  std::string_view note = {};  // what must be known to read the figure: a sentence; mostly empty
};

struct LedgerTable {
  std::vector<LedgerRow> rows;
  Result<Measured> input_W;  // the total
  bool split = false;        // the lost work is told by component, not in one row
  bool complete = false;     // every row has a value, and they add up to the input
};

// The components' rows where all of them have a value, else one row for the lost work together.
// Without a sensor at the evaporator's outlet the lines are part of the evaporator (ledger.h), and
// have no row. Without the temperature around the casing its heat counts as nothing (ledger.h).
[[nodiscard]] LedgerTable ledger_table(const QuantityValues& values,
                                       bool casing_surroundings_known);

}  // namespace lostwork
