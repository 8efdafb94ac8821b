#include "storage/minute_writer.h"

#include "storage/key.h"

#include <algorithm>
#include <utility>

namespace lostwork {

MinuteWriter::MinuteWriter(Database& database, Words& words)
    : words_{words},
      last_key_{database, "SELECT max(key) FROM minute_block WHERE key BETWEEN ?1 AND ?2"},
      hour_blocks_{database,
                   "SELECT key, sums FROM minute_block WHERE key BETWEEN ?1 AND ?2 "
                   "ORDER BY key DESC"},
      replace_{database, "INSERT OR REPLACE INTO minute_block (key, sums) VALUES (?1, ?2)"} {}

MinuteWriter::Machine& MinuteWriter::machine(std::int64_t number) {
  const auto [at, first_time] = machines_.try_emplace(number);
  if (first_time) {
    at->second.newest = newest_in_file(number);
  }
  return at->second;
}

std::optional<Instant> MinuteWriter::newest_in_file(std::int64_t number) {
  std::optional<Instant> newest;
  {
    Rows rows{last_key_, key_of(number, first_storable), key_of(number, last_storable)};
    if (rows.next() && !rows.is_null(0)) {
      newest = time_of(rows.integer(0));
    }
  }
  if (!newest) {
    return std::nullopt;
  }
  // Blocks of one hour may lie within each other.
  const Instant begin = begin_of(hour, *newest);
  Rows rows{hour_blocks_, key_of(number, begin), key_of(number, begin + hour - Span{1})};
  while (rows.next()) {
    if (const auto begins = decode_sums_begins(rows.integer(0), minute, rows.blob(1))) {
      newest = std::max(*newest, begins->back());
    }
  }
  return newest;
}

std::optional<MinuteWriter::Hand> MinuteWriter::found(std::int64_t machine, Instant minute_begin) {
  Rows rows{hour_blocks_, key_of(machine, begin_of(hour, minute_begin)),
            key_of(machine, minute_begin)};
  while (rows.next()) {
    const std::int64_t key = rows.integer(0);
    const auto begins = decode_sums_begins(key, minute, rows.blob(1));
    const auto place = begins ? std::find(begins->begin(), begins->end(), minute_begin)
                              : std::vector<Instant>::const_iterator{};
    if (!begins || place == begins->end()) {
      continue;
    }
    auto block = decode_sums(key, minute, rows.blob(1), words_);
    if (block) {
      return Hand{.block = std::move(*block),
                  .index = static_cast<std::size_t>(place - begins->begin()),
                  .in_file = true,
                  .dirty = false};
    }
  }
  return std::nullopt;
}

void MinuteWriter::take_in_hand(std::int64_t number, Machine& machine, Instant minute_begin) {
  if (machine.hand) {
    put_away(number, *machine.hand);
    machine.hand.reset();
  }
  if (machine.newest && minute_begin <= *machine.newest) {
    machine.hand = found(number, minute_begin);
  }
  if (!machine.hand) {
    machine.hand = Hand{.block = {Period{.begin = minute_begin, .sums = {}}}};
  }
  machine.newest = std::max(machine.newest.value_or(minute_begin), minute_begin);
}

void MinuteWriter::add(std::int64_t number, const ScanRow& row) {
  Machine& known = machine(number);
  const Instant minute_begin = begin_of(minute, row.scan.time);
  const auto in_hand = [&known, minute_begin] {
    const auto at =
        std::find_if(known.hand->block.begin(), known.hand->block.end(),
                     [minute_begin](const Period& period) { return period.begin == minute_begin; });
    known.hand->index = static_cast<std::size_t>(at - known.hand->block.begin());
    return at != known.hand->block.end();
  };
  if (!known.hand || !in_hand()) {
    take_in_hand(number, known, minute_begin);
  }
  lostwork::add(known.hand->block[known.hand->index].sums, row.assessment, row.covers);
  known.hand->dirty = true;
}

void MinuteWriter::put_away(std::int64_t number, const Hand& hand) {
  if (hand.in_file) {
    if (hand.dirty) {
      write_block(number, hand.block);
    }
    return;
  }
  const Period& period = hand.block.front();
  if (!waiting_.empty() && begin_of(hour, waiting_.front().begin) != begin_of(hour, period.begin)) {
    write_waiting(number);
  }
  waiting_.push_back(period);
}

void MinuteWriter::write_block(std::int64_t machine, const std::vector<Period>& block) {
  const std::int64_t key = key_of(machine, block.front().begin);
  blob_.clear();
  encode_sums(block, minute, words_, blob_);
  replace_.run(key, blob_.sealed(key));
}

void MinuteWriter::write_waiting(std::int64_t machine) {
  if (!waiting_.empty()) {
    write_block(machine, waiting_);
    waiting_.clear();
  }
}

void MinuteWriter::finish(std::int64_t number) {
  write_waiting(number);
  Machine& known = machine(number);
  if (known.hand && known.hand->dirty) {
    write_block(number, known.hand->block);
    known.hand->in_file = true;
    known.hand->dirty = false;
  }
}

PeriodSums MinuteWriter::hour_from_file(std::int64_t machine, Instant begin) {
  PeriodSums out;
  Rows rows{hour_blocks_, key_of(machine, begin), key_of(machine, begin + hour - Span{1})};
  while (rows.next()) {
    const auto block = decode_sums(rows.integer(0), minute, rows.blob(1), words_);
    if (!block) {
      continue;
    }
    for (const Period& period : *block) {
      lostwork::add(out, period.sums);
    }
  }
  return out;
}

void MinuteWriter::forget() {
  machines_.clear();
  waiting_.clear();
}

}  // namespace lostwork
