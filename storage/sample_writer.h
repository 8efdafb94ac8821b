// Writes scans that are not in the file yet.
#pragma once

#include "storage/columns.h"
#include "storage/database.h"
#include "storage/numbers.h"
#include "storage/rows.h"
#include "thermo/reading.h"

#include <cstdint>
#include <map>
#include <optional>
#include <set>
#include <span>
#include <vector>

namespace lostwork {

// All calls within a transaction of the writer's connection.
class SampleWriter {
 public:
  SampleWriter(Database& database, Numbers& numbers);

  // rows: of the machine of this number, in time order, no two of one time. Gives back those that
  // were new, in their order; they are in the file.
  [[nodiscard]] std::vector<const ScanRow*> write(std::int64_t number,
                                                  std::span<const ScanRow* const> rows);
  // After a transaction that failed.
  void forget() { machines_.clear(); }

 private:
  // What is known of a machine's scans without asking the file.
  struct Machine {
    std::optional<Instant> newest;
    // Times in the hour that was asked about last because a scan came late.
    std::optional<Instant> late_hour;
    std::set<Instant> late_times;
  };
  [[nodiscard]] Machine& machine(std::int64_t number);
  [[nodiscard]] std::set<Instant> times_in_hour(std::int64_t machine, Instant begin);
  [[nodiscard]] bool is_new(std::int64_t number, Machine& machine, Instant time);
  void write_block(std::int64_t machine, std::span<const ScanRow* const> rows);

  Numbers& numbers_;
  Statement last_key_;
  Statement hour_blocks_;
  Statement insert_;
  std::map<std::int64_t, Machine> machines_;
  std::vector<const Scan*> scans_;
  ColumnWriter blob_;
};

}  // namespace lostwork
