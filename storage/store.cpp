#include "storage/store.h"

#include "storage/checksum.h"
#include "storage/database.h"
#include "storage/finding_table.h"
#include "storage/journal.h"
#include "storage/numbers.h"
#include "storage/sample_writer.h"
#include "storage/schema.h"
#include "storage/sha256.h"
#include "storage/sums_writer.h"
#include "storage/waiting.h"
#include "storage/window_table.h"
#include "storage/writer_lock.h"

#include <algorithm>
#include <exception>
#include <span>
#include <stdexcept>
#include <utility>
#include <vector>

namespace lostwork {
namespace {

// The write-ahead log is cut back to this after a checkpoint.
constexpr std::int64_t most_log_bytes = 16 << 20;

Database opened(const StoreOptions& options) {
  Database out = Database::writer(options.file);
  migrate(out, schema_scripts());
  if (out.text("PRAGMA journal_mode = WAL") != "wal") {
    throw std::runtime_error{options.file + ": the folder does not allow a write-ahead log"};
  }
  out.run("PRAGMA journal_size_limit = " + std::to_string(most_log_bytes));
  out.run(options.durability == Durability::power_cut ? "PRAGMA synchronous = FULL"
                                                      : "PRAGMA synchronous = NORMAL");
  out.run("PRAGMA trusted_schema = OFF; PRAGMA cell_size_check = ON");
  return out;
}

std::int64_t ms(Instant time) {
  return time.time_since_epoch().count();
}

std::span<const std::uint8_t> bytes_of(std::string_view text) {
  return {reinterpret_cast<const std::uint8_t*>(text.data()), text.size()};
}

}  // namespace

class Store::Implementation {
 public:
  explicit Implementation(const StoreOptions& options)
      : limits_{.scans = options.waiting_scans, .rows = options.waiting_rows},
        lock_{options.file},
        database_{opened(options)} {}

  WriteResult write(Batch batch) {
    waiting_.take(std::move(batch));
    WriteResult out{.stored = true, .waiting_scans = 0, .given_up = 0, .why = waiting_.refused()};
    if (!waiting_.empty()) {
      try {
        write_all();
        waiting_.clear();
      } catch (const std::exception& error) {
        out.stored = false;
        out.why = error.what();
        forget();
        waiting_.shorten(limits_, out.why);
      }
    }
    out.waiting_scans = waiting_.scans().size();
    out.given_up = waiting_.given_up();
    return out;
  }

  void keep_plant_file(std::string_view text, Instant time) {
    const std::string hash = hexadecimal(sha256(bytes_of(text)));
    Transaction transaction{database_, Transaction::Kind::write};
    const std::string last =
        database_.text("SELECT hash FROM plant_file ORDER BY number DESC LIMIT 1");
    if (last != hash) {
      Statement insert{database_,
                       "INSERT INTO plant_file (time_ms, hash, text) VALUES (?1, ?2, ?3)"};
      insert.run(ms(time), hash, text);
    }
    transaction.commit();
  }

 private:
  void write_all() {
    Transaction transaction{database_, Transaction::Kind::write};
    write_scans();
    for (const WindowRow& row : waiting_.windows()) {
      write_window(insert_window_, numbers_.machine(row.machine), row.window);
    }
    write_findings(database_, waiting_.findings());
    write_journal(database_, waiting_.alarms());
    for (const auto& [machine, state] : waiting_.states()) {
      replace_state_.run(machine, state.version, ms(state.time),
                         std::span<const std::uint8_t>{state.bytes}, crc32c(state.bytes));
    }
    for (const auto& [machine, gap] : waiting_.gaps()) {
      insert_gap_.run(machine, ms(gap.begin), ms(gap.end), static_cast<std::int64_t>(gap.scans),
                      gap.why);
    }
    transaction.commit();
  }

  // By machine and time; of two scans of one machine and time the first one given.
  void write_scans() {
    struct Place {
      std::int64_t machine;
      const ScanRow* row;
    };
    std::vector<Place> places;
    places.reserve(waiting_.scans().size());
    for (const ScanRow& row : waiting_.scans()) {
      places.push_back({.machine = numbers_.machine(row.layout->machine), .row = &row});
    }
    std::stable_sort(places.begin(), places.end(), [](const Place& a, const Place& b) {
      return std::pair{a.machine, a.row->scan.time} < std::pair{b.machine, b.row->scan.time};
    });
    std::vector<const ScanRow*> rows;
    for (std::size_t i = 0; i < places.size(); ++i) {
      if (rows.empty() || rows.back()->scan.time != places[i].row->scan.time) {
        rows.push_back(places[i].row);
      }
      if (i + 1 == places.size() || places[i + 1].machine != places[i].machine) {
        sums_.add(places[i].machine, samples_.write(places[i].machine, rows));
        rows.clear();
      }
    }
    sums_.finish();
  }

  void forget() {
    numbers_.forget();
    samples_.forget();
    sums_.forget();
  }

  WaitingLimits limits_;
  WriterLock lock_;  // before the database: it is let go of last
  Database database_;
  Numbers numbers_{database_};
  SampleWriter samples_{database_, numbers_};
  SumsWriter sums_{database_};
  Statement insert_window_{database_, insert_window_sql};
  Statement replace_state_{database_,
                           "INSERT OR REPLACE INTO machine_state (machine, version, time_ms, "
                           "bytes, checksum) VALUES (?1, ?2, ?3, ?4, ?5)"};
  Statement insert_gap_{database_,
                        "INSERT INTO gap (machine, begin_ms, end_ms, scans, why) "
                        "VALUES (?1, ?2, ?3, ?4, ?5)"};
  Waiting waiting_;
};

Store::Store(const StoreOptions& options)
    : implementation_{std::make_unique<Implementation>(options)} {}

Store::~Store() {
  // Nobody is left to be told of a failure.
  static_cast<void>(implementation_->write({}));
}

WriteResult Store::write(Batch batch) {
  return implementation_->write(std::move(batch));
}

bool Store::keep_plant_file(std::string_view text, Instant time) {
  try {
    implementation_->keep_plant_file(text, time);
    return true;
  } catch (const std::exception&) {
    return false;
  }
}

}  // namespace lostwork
