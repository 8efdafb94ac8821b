#include "storage/sums_writer.h"

#include "storage/key.h"
#include "storage/sums_block.h"

namespace lostwork {

SumsWriter::SumsWriter(Database& database)
    : words_{database},
      minutes_{database, words_},
      hours_{database, hour, "SELECT sums FROM hour_sums WHERE key = ?1",
             "INSERT OR REPLACE INTO hour_sums (key, sums) VALUES (?1, ?2)"},
      days_{database, day, "SELECT sums FROM day_sums WHERE key = ?1",
            "INSERT OR REPLACE INTO day_sums (key, sums) VALUES (?1, ?2)"},
      hours_of_day_{database, "SELECT key, sums FROM hour_sums WHERE key BETWEEN ?1 AND ?2"} {}

// A damaged row is made again from the finer ones. They hold all earlier scans but none of this
// transaction: the day is opened before its hours, and an hour before its minutes.
PeriodSums& SumsWriter::open_hour(std::int64_t machine, Instant time) {
  const PeriodWriter::Opened opened = hours_.open(machine, time, words_);
  if (opened.damaged) {
    opened.sums = minutes_.hour_from_file(machine, begin_of(hour, time));
  }
  return opened.sums;
}

PeriodSums SumsWriter::day_from_file(std::int64_t machine, Instant begin) {
  PeriodSums out;
  Rows rows{hours_of_day_, key_of(machine, begin), key_of(machine, begin + day - Span{1})};
  while (rows.next()) {
    const std::int64_t key = rows.integer(0);
    const auto read = decode_sums(key, hour, rows.blob(1), words_);
    lostwork::add(out, read ? read->front().sums : minutes_.hour_from_file(machine, time_of(key)));
  }
  return out;
}

PeriodSums& SumsWriter::open_day(std::int64_t machine, Instant time) {
  const PeriodWriter::Opened opened = days_.open(machine, time, words_);
  if (opened.damaged) {
    opened.sums = day_from_file(machine, begin_of(day, time));
  }
  return opened.sums;
}

void SumsWriter::add(std::int64_t machine, std::span<const ScanRow* const> rows) {
  for (const ScanRow* row : rows) {
    lostwork::add(open_day(machine, row->scan.time), row->assessment, row->covers);
    lostwork::add(open_hour(machine, row->scan.time), row->assessment, row->covers);
    minutes_.add(machine, *row);
  }
  minutes_.finish(machine);
}

void SumsWriter::finish() {
  hours_.finish(words_);
  days_.finish(words_);
}

void SumsWriter::forget() {
  words_.forget();
  minutes_.forget();
  hours_.forget();
  days_.forget();
}

}  // namespace lostwork
