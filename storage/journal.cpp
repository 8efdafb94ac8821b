#include "storage/journal.h"

#include "storage/sha256.h"

#include <algorithm>
#include <limits>
#include <span>
#include <string>
#include <string_view>

namespace lostwork {
namespace {

class Hasher {
 public:
  explicit Hasher(std::span<const std::uint8_t> previous)
      : bytes_{previous.begin(), previous.end()} {}
  void operator()(std::int64_t number) {
    for (unsigned byte = 0; byte < 8; ++byte) {
      bytes_.push_back(static_cast<std::uint8_t>(static_cast<std::uint64_t>(number) >> (8 * byte)));
    }
  }
  void operator()(const std::string& text) {
    (*this)(static_cast<std::int64_t>(text.size()));
    bytes_.insert(bytes_.end(), text.begin(), text.end());
  }
  [[nodiscard]] Sha256 result() const { return sha256(bytes_); }

 private:
  std::vector<std::uint8_t> bytes_;
};

Sha256 hash_of(std::span<const std::uint8_t> previous, std::int64_t number, const AlarmRow& row) {
  Hasher hash{previous};
  hash(number);
  hash(row.time.time_since_epoch().count());
  hash(row.utc_offset.count());
  hash(row.machine);
  hash(row.alarm);
  hash(row.kind);
  hash(row.from);
  hash(row.to);
  hash(row.priority);
  hash(row.text);
  hash(row.evidence_json);
  hash(row.user);
  hash(row.comment);
  return hash.result();
}

struct Last {
  std::int64_t number = 0;
  Sha256 hash{};
};

Last last_row(Database& database) {
  Last out;
  Statement select{database, "SELECT number, hash FROM alarm_journal ORDER BY number DESC LIMIT 1"};
  Rows rows{select};
  if (rows.next()) {
    out.number = rows.integer(0);
    const auto blob = rows.blob(1);
    std::copy_n(blob.begin(), std::min(blob.size(), out.hash.size()), out.hash.begin());
  }
  return out;
}

std::uint8_t small(std::int64_t value) {
  return static_cast<std::uint8_t>(value);
}

// The columns in the order of the table, from `number` on.
JournalRow row_of(const Rows& rows) {
  JournalRow out;
  out.number = rows.integer(0);
  out.row.time = Instant{Span{rows.integer(1)}};
  out.row.utc_offset = std::chrono::minutes{rows.integer(2)};
  out.row.machine = rows.text(3);
  out.row.alarm = rows.text(4);
  out.row.kind = small(rows.integer(5));
  out.row.from = small(rows.integer(6));
  out.row.to = small(rows.integer(7));
  out.row.priority = small(rows.integer(8));
  out.row.text = rows.text(9);
  out.row.evidence_json = rows.text(10);
  out.row.user = rows.text(11);
  out.row.comment = rows.text(12);
  return out;
}

bool is_there(Statement& select, const AlarmRow& row) {
  Rows rows{select,        std::int64_t{row.time.time_since_epoch().count()},
            row.machine,   row.alarm,
            int{row.from}, int{row.to},
            row.user,      row.comment};
  return rows.next();
}

}  // namespace

void write_journal(Database& database, const std::vector<AlarmRow>& alarms) {
  if (alarms.empty()) {
    return;
  }
  Last last = last_row(database);
  Statement find{database,
                 "SELECT 1 FROM alarm_journal WHERE time_ms = ?1 AND machine = ?2 AND alarm = ?3 "
                 "AND from_state = ?4 AND to_state = ?5 AND user = ?6 AND comment = ?7"};
  Statement insert{database,
                   "INSERT INTO alarm_journal (number, time_ms, utc_offset_min, machine, alarm, "
                   "kind, from_state, to_state, priority, text, evidence, user, comment, "
                   "previous_hash, hash) "
                   "VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11, ?12, ?13, ?14, ?15)"};
  for (const AlarmRow& row : alarms) {
    if (is_there(find, row)) {
      continue;
    }
    const std::int64_t number = last.number + 1;
    const Sha256 hash = hash_of(last.hash, number, row);
    insert.run(number, std::int64_t{row.time.time_since_epoch().count()},
               std::int64_t{row.utc_offset.count()}, row.machine, row.alarm, int{row.kind},
               int{row.from}, int{row.to}, int{row.priority}, row.text, row.evidence_json, row.user,
               row.comment, std::span<const std::uint8_t>{last.hash},
               std::span<const std::uint8_t>{hash});
    last = {.number = number, .hash = hash};
  }
}

std::vector<JournalRow> read_journal(Database& database, const JournalQuery& query) {
  constexpr std::int64_t most = std::numeric_limits<std::int64_t>::max();
  Statement select{database,
                   "SELECT number, time_ms, utc_offset_min, machine, alarm, kind, from_state, "
                   "to_state, priority, text, evidence, user, comment FROM alarm_journal "
                   "WHERE number < ?1 AND time_ms >= ?2 AND time_ms < ?3 "
                   "AND (?4 OR machine = ?5) ORDER BY number DESC LIMIT ?6"};
  const std::string_view machine = query.machine.value_or("");
  Rows rows{select,
            query.before.value_or(most),
            query.from ? std::int64_t{query.from->time_since_epoch().count()} : -most,
            query.to ? std::int64_t{query.to->time_since_epoch().count()} : most,
            query.machine ? 0 : 1,
            machine,
            static_cast<std::int64_t>(query.limit)};
  std::vector<JournalRow> out;
  while (rows.next()) {
    out.push_back(row_of(rows));
  }
  return out;
}

std::optional<std::int64_t> first_broken_row(Database& database) {
  Statement select{database,
                   "SELECT number, time_ms, utc_offset_min, machine, alarm, kind, from_state, "
                   "to_state, priority, text, evidence, user, comment, previous_hash, hash "
                   "FROM alarm_journal ORDER BY number"};
  Last last;
  Rows rows{select};
  while (rows.next()) {
    const JournalRow read = row_of(rows);
    const Sha256 hash = hash_of(last.hash, last.number + 1, read.row);
    const auto previous = rows.blob(13);
    const auto written = rows.blob(14);
    const bool sound = read.number == last.number + 1 && std::ranges::equal(previous, last.hash) &&
                       std::ranges::equal(written, hash);
    if (!sound) {
      return last.number + 1;
    }
    last = {.number = read.number, .hash = hash};
  }
  // SQLite keeps the highest number ever given.
  const std::int64_t given =
      database.integer("SELECT seq FROM sqlite_sequence WHERE name = 'alarm_journal'");
  return given > last.number ? std::optional{last.number + 1} : std::nullopt;
}

}  // namespace lostwork
