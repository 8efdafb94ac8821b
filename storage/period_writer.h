// Keeps the sums over hours or over days, one row a period, as scans come in.
#pragma once

#include "storage/columns.h"
#include "storage/database.h"
#include "storage/sums_block.h"
#include "storage/words.h"
#include "thermo/reading.h"

#include <cstdint>
#include <map>
#include <string_view>
#include <vector>

namespace lostwork {

// The period in hand of each machine stays in memory, so that going on with it needs no reading.
// All calls within a transaction of the writer's connection.
class PeriodWriter {
 public:
  // select: the sums by key; replace: key and sums.
  PeriodWriter(Database& database, Span length, std::string_view select, std::string_view replace);

  struct Opened {
    PeriodSums& sums;
    bool damaged;  // the file has the period, but its checksum fails: the sums are empty
  };
  // The sums of the period that the time is in, to be added to.
  [[nodiscard]] Opened open(std::int64_t machine, Instant time, Words& words);
  void finish(Words& words);  // writes what was opened
  // After a transaction that failed.
  void forget() { machines_.clear(); }

 private:
  struct Current {
    Period period;
    bool dirty = false;
  };
  // What the file has of the period already. False: that is damaged, the period is as before.
  [[nodiscard]] bool take_up(std::int64_t machine, Period& period, Words& words);
  void write(std::int64_t machine, Current& current, Words& words);
  Span length_;
  Statement select_;
  Statement replace_;
  std::map<std::int64_t, Current> machines_;
  ColumnWriter blob_;
};

}  // namespace lostwork
