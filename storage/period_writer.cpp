#include "storage/period_writer.h"

#include "storage/key.h"

#include <optional>
#include <span>

namespace lostwork {

PeriodWriter::PeriodWriter(Database& database, Span length, std::string_view select,
                           std::string_view replace)
    : length_{length}, select_{database, select}, replace_{database, replace} {}

PeriodWriter::Opened PeriodWriter::open(std::int64_t machine, Instant time, Words& words) {
  Current& current = machines_[machine];
  const Instant begin = begin_of(length_, time);
  bool damaged = false;
  if (current.period.sums.scans == 0 || current.period.begin != begin) {
    write(machine, current, words);
    current.period = {.begin = begin, .sums = {}};
    damaged = !take_up(machine, current.period, words);
  }
  current.dirty = true;
  return {.sums = current.period.sums, .damaged = damaged};
}

bool PeriodWriter::take_up(std::int64_t machine, Period& period, Words& words) {
  const std::int64_t key = key_of(machine, period.begin);
  Rows rows{select_, key};
  if (!rows.next()) {
    return true;
  }
  const auto read = decode_sums(key, length_, rows.blob(0), words);
  if (read) {
    period = read->front();
  }
  return read.has_value();
}

void PeriodWriter::write(std::int64_t machine, Current& current, Words& words) {
  if (!current.dirty) {
    return;
  }
  const std::int64_t key = key_of(machine, current.period.begin);
  blob_.clear();
  encode_sums(std::span{&current.period, 1}, length_, words, blob_);
  replace_.run(key, blob_.sealed(key));
  current.dirty = false;
}

void PeriodWriter::finish(Words& words) {
  for (auto& [machine, current] : machines_) {
    write(machine, current, words);
  }
}

}  // namespace lostwork
