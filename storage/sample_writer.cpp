#include "storage/sample_writer.h"

#include "storage/key.h"
#include "storage/sample_block.h"

namespace lostwork {

SampleWriter::SampleWriter(Database& database, Numbers& numbers)
    : numbers_{numbers},
      last_key_{database, "SELECT max(key) FROM sample_block WHERE key BETWEEN ?1 AND ?2"},
      hour_blocks_{database, "SELECT key, scans FROM sample_block WHERE key BETWEEN ?1 AND ?2"},
      // A block of the same key can only be a damaged one: times in sound ones were compared.
      insert_{database, "INSERT OR REPLACE INTO sample_block (key, scans) VALUES (?1, ?2)"} {}

std::set<Instant> SampleWriter::times_in_hour(std::int64_t machine, Instant begin) {
  std::set<Instant> out;
  Rows rows{hour_blocks_, key_of(machine, begin), key_of(machine, begin + hour - Span{1})};
  while (rows.next()) {
    if (const auto times = decode_sample_times(rows.integer(0), rows.blob(1))) {
      out.insert(times->begin(), times->end());
    }
  }
  return out;
}

SampleWriter::Machine& SampleWriter::machine(std::int64_t number) {
  const auto [at, first_time] = machines_.try_emplace(number);
  Machine& out = at->second;
  if (!first_time) {
    return out;
  }
  std::optional<Instant> last_begin;
  {
    Rows rows{last_key_, key_of(number, first_storable), key_of(number, last_storable)};
    if (rows.next() && !rows.is_null(0)) {
      last_begin = time_of(rows.integer(0));
    }
  }
  if (last_begin) {
    const std::set<Instant> times = times_in_hour(number, begin_of(hour, *last_begin));
    out.newest = times.empty() ? *last_begin : *times.rbegin();
  }
  return out;
}

bool SampleWriter::is_new(std::int64_t number, Machine& machine, Instant time) {
  if (!machine.newest || time > *machine.newest) {
    machine.newest = time;
    return true;
  }
  const Instant begin = begin_of(hour, time);
  if (machine.late_hour != begin) {
    machine.late_times = times_in_hour(number, begin);
    machine.late_hour = begin;
  }
  return machine.late_times.insert(time).second;
}

void SampleWriter::write_block(std::int64_t machine, std::span<const ScanRow* const> rows) {
  scans_.clear();
  for (const ScanRow* row : rows) {
    scans_.push_back(&row->scan);
  }
  const auto& layout = rows.front()->layout;
  const std::int64_t key = key_of(machine, rows.front()->scan.time);
  blob_.clear();
  encode_samples(scans_, numbers_.layout(layout), layout->points.size(), blob_);
  insert_.run(key, blob_.sealed(key));
}

std::vector<const ScanRow*> SampleWriter::write(std::int64_t number,
                                                std::span<const ScanRow* const> rows) {
  Machine& known = machine(number);
  std::vector<const ScanRow*> out;
  for (const ScanRow* row : rows) {
    if (is_new(number, known, row->scan.time)) {
      out.push_back(row);
    }
  }
  // A later batch must not miss what this one adds to the hour that was looked at.
  known.late_hour.reset();
  std::size_t from = 0;
  for (std::size_t i = 1; i <= out.size(); ++i) {
    const bool ends = i == out.size() || i - from == most_scans_a_block ||
                      out[i]->layout != out[from]->layout ||
                      begin_of(hour, out[i]->scan.time) != begin_of(hour, out[from]->scan.time);
    if (ends) {
      write_block(number, std::span{out}.subspan(from, i - from));
      from = i;
    }
  }
  return out;
}

}  // namespace lostwork
