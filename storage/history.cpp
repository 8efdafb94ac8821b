#include "storage/history.h"

#include "storage/checksum.h"
#include "storage/database.h"
#include "storage/finding_table.h"
#include "storage/journal.h"
#include "storage/key.h"
#include "storage/numbers.h"
#include "storage/sample_block.h"
#include "storage/schema.h"
#include "storage/sums_block.h"
#include "storage/trend.h"
#include "storage/window_table.h"
#include "storage/words.h"

#include <algorithm>
#include <map>
#include <span>
#include <stdexcept>
#include <utility>

namespace lostwork {
namespace {

constexpr std::size_t most_points_of_a_trend = 5000;
constexpr std::size_t most_journal_rows = 5000;

std::int64_t ms(Instant time) {
  return time.time_since_epoch().count();
}

Instant instant(std::int64_t ms) {
  return Instant{Span{ms}};
}

Assessment assessment_of(const Period& period) {
  Assessment out;
  out.time = period.begin;
  out.mode = period.sums.mode;
  out.level = period.sums.level;
  // Whether the last scan was steady is not kept by itself: steady is a minute that wholly was.
  out.steady = period.sums.steady_scans == period.sums.scans;
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const auto quantity = static_cast<Quantity>(i);
    out.values[quantity] = period.sums[quantity].mean();
  }
  return out;
}

std::string_view sums_sql(Span source) {
  if (source == day) {
    return "SELECT key, sums FROM day_sums WHERE key BETWEEN ?1 AND ?2";
  }
  if (source == hour) {
    return "SELECT key, sums FROM hour_sums WHERE key BETWEEN ?1 AND ?2";
  }
  return "SELECT key, sums FROM minute_block WHERE key BETWEEN ?1 AND ?2 ORDER BY key";
}

// Keys of the blocks that can hold something of [from, to): blocks stay within an hour.
struct KeyRange {
  std::int64_t first;
  std::int64_t last;
};
KeyRange blocks_of(std::int64_t machine, Instant from, Instant to) {
  return {.first = key_of(machine, begin_of(hour, clamped(from))),
          .last = key_of(machine, clamped(to - Span{1}))};
}

// The stored scan's readings of these points; `stored` names those that it has.
Scan in_order_of(const std::vector<std::string>& points, const Scan& scan,
                 const std::vector<std::string>& stored) {
  Scan out{.time = scan.time, .readings = {}};
  for (const std::string& point : points) {
    const auto at = std::find(stored.begin(), stored.end(), point);
    const auto place = static_cast<std::size_t>(at - stored.begin());
    out.readings.push_back(place < scan.readings.size()
                               ? scan.readings[place]
                               : Reading{.quality = Quality::timeout, .time = scan.time});
  }
  return out;
}

std::vector<const Scan*> scans_within(const SampleBlock& block, Instant from, Instant to) {
  std::vector<const Scan*> out;
  for (const Scan& scan : block.scans) {
    if (scan.time >= from && scan.time < to) {
      out.push_back(&scan);
    }
  }
  return out;
}

// The readings that these scans have at one place.
void append_readings(std::vector<StoredReading>& out, std::span<const Scan* const> scans,
                     std::size_t place) {
  for (const Scan* scan : scans) {
    if (place < scan->readings.size()) {
      out.push_back({.scan_time = scan->time, .reading = scan->readings[place]});
    }
  }
}

}  // namespace

class History::Implementation {
 public:
  explicit Implementation(const std::string& file) : database{Database::reader(file)} {
    require_version(database, schema_scripts());
  }

  // Calls `take` for every sound block that can hold scans of [from, to) until it says "enough".
  template <class Take>
  void each_sample_block(std::string_view machine, Instant from, Instant to, Take take) {
    const auto number = machine_number(database, machine);
    if (!number || from >= to) {
      return;
    }
    Statement select{
        database, "SELECT key, scans FROM sample_block WHERE key BETWEEN ?1 AND ?2 ORDER BY key"};
    const KeyRange keys = blocks_of(*number, from, to);
    Rows rows{select, keys.first, keys.last};
    while (rows.next()) {
      auto block = decode_samples(rows.integer(0), rows.blob(1));
      if (!block) {
        ++damaged;
      } else if (!take(*block)) {
        return;
      }
    }
  }

  const std::vector<std::string>& points_of(std::uint32_t layout) {
    const auto [at, is_new] = layouts.try_emplace(layout);
    if (is_new) {
      at->second = layout_points(database, layout);
    }
    return at->second;
  }

  std::vector<Period> minutes(std::int64_t machine, Instant from, Instant to, std::size_t limit) {
    std::vector<Period> out;
    if (from >= to) {
      return out;
    }
    Statement select{database, sums_sql(minute)};
    const KeyRange keys = blocks_of(machine, from, to);
    Rows rows{select, keys.first, keys.last};
    // One hour more than the limit: its blocks may lie within each other.
    while (out.size() < limit + 60 && rows.next()) {
      const auto block = decode_sums(rows.integer(0), minute, rows.blob(1), words);
      if (!block) {
        ++damaged;
        continue;
      }
      std::copy_if(block->begin(), block->end(), std::back_inserter(out),
                   [&](const Period& p) { return p.begin >= from && p.begin < to; });
    }
    std::sort(out.begin(), out.end(),
              [](const Period& a, const Period& b) { return a.begin < b.begin; });
    out.resize(std::min(out.size(), limit));
    return out;
  }

  std::vector<QuantityPeriod> periods(std::int64_t machine, const BucketPlan& plan,
                                      Quantity quantity) {
    std::vector<QuantityPeriod> out;
    Statement select{database, sums_sql(plan.source)};
    const Instant end = plan.begin + static_cast<std::int64_t>(plan.count) * plan.width;
    const KeyRange keys = blocks_of(machine, plan.begin, end);
    // A day's or an hour's own key lies within the span.
    Rows rows{select, plan.source == minute ? keys.first : key_of(machine, plan.begin), keys.last};
    while (rows.next()) {
      const auto block =
          decode_sums_of(rows.integer(0), plan.source, rows.blob(1), quantity, words);
      if (block) {
        out.insert(out.end(), block->begin(), block->end());
      } else {
        ++damaged;
      }
    }
    return out;
  }

  Database database;
  Words words{database};
  std::map<std::uint32_t, std::vector<std::string>> layouts;
  std::uint64_t damaged = 0;
};

History::History(const std::string& file)
    : implementation_{std::make_unique<Implementation>(file)} {}

History::~History() = default;

std::vector<std::string> History::machines() const {
  return machine_ids(implementation_->database);
}

std::vector<Scan> History::scans(std::string_view machine, const std::vector<std::string>& points,
                                 Instant from, Instant to, std::size_t limit) const {
  const Transaction snapshot{implementation_->database, Transaction::Kind::read};
  std::vector<Scan> out;
  implementation_->each_sample_block(machine, from, to, [&](const SampleBlock& block) {
    const auto& stored = implementation_->points_of(block.layout);
    for (const Scan* scan : scans_within(block, from, to)) {
      out.push_back(in_order_of(points, *scan, stored));
    }
    return out.size() < limit + most_scans_a_block * 60;
  });
  std::stable_sort(out.begin(), out.end(),
                   [](const Scan& a, const Scan& b) { return a.time < b.time; });
  out.resize(std::min(out.size(), limit));
  return out;
}

std::vector<StoredReading> History::samples(std::string_view machine, std::string_view point,
                                            Instant from, Instant to, std::size_t limit) const {
  const Transaction snapshot{implementation_->database, Transaction::Kind::read};
  std::vector<StoredReading> out;
  implementation_->each_sample_block(machine, from, to, [&](const SampleBlock& block) {
    const auto& stored = implementation_->points_of(block.layout);
    const auto place =
        static_cast<std::size_t>(std::find(stored.begin(), stored.end(), point) - stored.begin());
    append_readings(out, scans_within(block, from, to), place);
    return out.size() < limit + most_scans_a_block * 60;
  });
  std::stable_sort(out.begin(), out.end(), [](const StoredReading& a, const StoredReading& b) {
    return a.scan_time < b.scan_time;
  });
  out.resize(std::min(out.size(), limit));
  return out;
}

std::vector<Bucket> History::trend(const TrendRequest& request) const {
  const Instant from = clamped(request.from);
  const Instant to = clamped(request.to);
  if (from >= to || request.max_points < 1) {
    return {};
  }
  const BucketPlan plan = plan_of(from, to, std::min(request.max_points, most_points_of_a_trend));
  std::vector<QuantityPeriod> periods;
  const Transaction snapshot{implementation_->database, Transaction::Kind::read};
  if (const auto machine = machine_number(implementation_->database, request.machine)) {
    periods = implementation_->periods(*machine, plan, request.quantity);
  }
  return buckets_of(plan, periods);
}

std::vector<Assessment> History::assessments(std::string_view machine, Instant from, Instant to,
                                             std::size_t limit) const {
  const Transaction snapshot{implementation_->database, Transaction::Kind::read};
  std::vector<Assessment> out;
  if (const auto number = machine_number(implementation_->database, machine)) {
    for (const Period& period : implementation_->minutes(*number, from, to, limit)) {
      out.push_back(assessment_of(period));
    }
  }
  return out;
}

std::optional<Assessment> History::last_assessment(std::string_view machine) const {
  const Transaction snapshot{implementation_->database, Transaction::Kind::read};
  const auto number = machine_number(implementation_->database, machine);
  if (!number) {
    return std::nullopt;
  }
  Statement select{implementation_->database,
                   "SELECT max(key) FROM minute_block WHERE key BETWEEN ?1 AND ?2"};
  Rows rows{select, key_of(*number, first_storable), key_of(*number, last_storable)};
  if (!rows.next() || rows.is_null(0)) {
    return std::nullopt;
  }
  const Instant begin = begin_of(hour, time_of(rows.integer(0)));
  const auto periods = implementation_->minutes(*number, begin, begin + hour, 60);
  return periods.empty() ? std::nullopt : std::optional{assessment_of(periods.back())};
}

std::vector<Window> History::windows(std::string_view machine, Instant from, Instant to,
                                     std::size_t limit) const {
  const Transaction snapshot{implementation_->database, Transaction::Kind::read};
  const auto number = machine_number(implementation_->database, machine);
  if (!number) {
    return {};
  }
  ReadWindows read = read_windows(implementation_->database, *number, from, to, limit);
  implementation_->damaged += read.damaged;
  return std::move(read.windows);
}

std::vector<Finding> History::current_findings(std::optional<std::string_view> machine) const {
  const Transaction snapshot{implementation_->database, Transaction::Kind::read};
  return read_current_findings(implementation_->database, machine);
}

std::vector<Finding> History::findings(Instant from, Instant to,
                                       std::optional<std::string_view> machine) const {
  const Transaction snapshot{implementation_->database, Transaction::Kind::read};
  return read_findings(implementation_->database, from, to, machine);
}

std::vector<Finding> History::finding_versions(std::string_view id) const {
  const Transaction snapshot{implementation_->database, Transaction::Kind::read};
  return read_finding_versions(implementation_->database, id);
}

std::vector<JournalRow> History::journal(const JournalQuery& query) const {
  JournalQuery bounded = query;
  bounded.limit = std::clamp<std::size_t>(query.limit, 1, most_journal_rows);
  return read_journal(implementation_->database, bounded);
}

std::optional<std::int64_t> History::first_broken_journal_row() const {
  const Transaction snapshot{implementation_->database, Transaction::Kind::read};
  return first_broken_row(implementation_->database);
}

std::optional<SavedState> History::state(std::string_view machine) const {
  Statement select{
      implementation_->database,
      "SELECT version, time_ms, bytes, checksum FROM machine_state WHERE machine = ?1"};
  Rows rows{select, machine};
  if (!rows.next()) {
    return std::nullopt;
  }
  SavedState out;
  out.version = static_cast<std::uint32_t>(rows.integer(0));
  out.time = instant(rows.integer(1));
  const auto bytes = rows.blob(2);
  out.damaged = crc32c(bytes) != rows.integer(3);
  if (out.damaged) {
    ++implementation_->damaged;
  } else {
    out.bytes.assign(bytes.begin(), bytes.end());
  }
  return out;
}

std::vector<PlantFileVersion> History::plant_files() const {
  Statement select{implementation_->database,
                   "SELECT time_ms, hash, text FROM plant_file ORDER BY number"};
  std::vector<PlantFileVersion> out;
  for (Rows rows{select}; rows.next();) {
    out.push_back({.time = instant(rows.integer(0)), .hash = rows.text(1), .text = rows.text(2)});
  }
  return out;
}

std::vector<StoredGap> History::gaps(Instant from, Instant to) const {
  Statement select{implementation_->database,
                   "SELECT machine, begin_ms, end_ms, scans, why FROM gap "
                   "WHERE end_ms >= ?1 AND begin_ms < ?2 ORDER BY number"};
  std::vector<StoredGap> out;
  for (Rows rows{select, ms(from), ms(to)}; rows.next();) {
    out.push_back({.machine = rows.text(0),
                   .begin = instant(rows.integer(1)),
                   .end = instant(rows.integer(2)),
                   .scans = static_cast<std::uint64_t>(rows.integer(3)),
                   .why = rows.text(4)});
  }
  return out;
}

std::uint64_t History::damaged_rows() const {
  return implementation_->damaged;
}

}  // namespace lostwork
