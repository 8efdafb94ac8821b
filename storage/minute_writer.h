// Keeps the sums over minutes as scans come in: whole minutes of one hour go into one block, the
// minute in hand into a row of its own.
#pragma once

#include "storage/columns.h"
#include "storage/database.h"
#include "storage/rows.h"
#include "storage/sums_block.h"
#include "storage/words.h"
#include "thermo/reading.h"

#include <cstddef>
#include <cstdint>
#include <map>
#include <optional>
#include <vector>

namespace lostwork {

// All calls within a transaction of the writer's connection.
class MinuteWriter {
 public:
  explicit MinuteWriter(Database& database, Words& words);

  // number: of the machine, as in the file. Scans of one machine in time order; then finish()
  // before the next machine's.
  void add(std::int64_t number, const ScanRow& row);
  void finish(std::int64_t number);
  // Of the minutes in that hour that are in the file.
  [[nodiscard]] PeriodSums hour_from_file(std::int64_t machine, Instant begin);
  // After a transaction that failed.
  void forget();

 private:
  // The minute that scans go into now, with the block that it is in.
  struct Hand {
    std::vector<Period> block;
    std::size_t index = 0;
    bool in_file = false;  // under the key of the block's first minute
    bool dirty = false;
  };
  struct Machine {
    std::optional<Instant> newest;  // minute, in the file or in hand
    std::optional<Hand> hand;
  };
  [[nodiscard]] Machine& machine(std::int64_t number);
  [[nodiscard]] std::optional<Instant> newest_in_file(std::int64_t number);
  [[nodiscard]] std::optional<Hand> found(std::int64_t machine, Instant minute_begin);
  void take_in_hand(std::int64_t number, Machine& machine, Instant minute_begin);
  void put_away(std::int64_t number, const Hand& hand);
  void write_block(std::int64_t machine, const std::vector<Period>& block);
  void write_waiting(std::int64_t machine);

  Words& words_;
  Statement last_key_;
  Statement hour_blocks_;  // newest first
  Statement replace_;
  std::map<std::int64_t, Machine> machines_;
  std::vector<Period> waiting_;  // whole new minutes of one machine and hour, rising
  ColumnWriter blob_;
};

}  // namespace lostwork
