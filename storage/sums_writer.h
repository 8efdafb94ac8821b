// Keeps minutes, hours and days as scans come in, late ones too.
#pragma once

#include "storage/database.h"
#include "storage/minute_writer.h"
#include "storage/period_writer.h"
#include "storage/rows.h"
#include "storage/words.h"

#include <cstdint>
#include <span>

namespace lostwork {

// All calls within a transaction of the writer's connection.
class SumsWriter {
 public:
  explicit SumsWriter(Database& database);
  // rows: scans of one machine in time order that were not added before.
  void add(std::int64_t machine, std::span<const ScanRow* const> rows);
  void finish();  // at the end of the transaction
  // After a transaction that failed.
  void forget();

 private:
  [[nodiscard]] PeriodSums& open_hour(std::int64_t machine, Instant time);
  [[nodiscard]] PeriodSums& open_day(std::int64_t machine, Instant time);
  [[nodiscard]] PeriodSums day_from_file(std::int64_t machine, Instant begin);

  Words words_;
  MinuteWriter minutes_;
  PeriodWriter hours_;
  PeriodWriter days_;
  Statement hours_of_day_;
};

}  // namespace lostwork
