// What a plant's database holds, read only. Any number of readers beside the one writer; each
// History is for one thread. Every call is one short read of the last committed state.
//
// All calls throw std::runtime_error with one sentence where the file cannot be read. An unknown
// machine, point or span has no rows. Rows whose checksum fails are left out and counted.
#pragma once

#include "storage/alarm_row.h"
#include "thermo/cycle/assessment.h"
#include "thermo/health/finding.h"
#include "thermo/measure/window.h"
#include "thermo/quantity.h"
#include "thermo/reading.h"

#include <cstddef>
#include <cstdint>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

struct TrendRequest {
  std::string_view machine;
  Quantity quantity{};
  Instant from{};
  Instant to{};                  // > from
  std::size_t max_points = 500;  // 1 to 5000
};

// [begin, end). Every bucket of the span is there, the empty ones too.
struct Bucket {
  Instant begin{};
  Instant end{};
  // Mean over the scans; ratios are ratios of sums. u: the mean of the scans' u, for the errors of
  // sensors do not average out. Else the last reason in the bucket; not_read where no scan is.
  Result<Measured> mean;
  double min_SI = 0.0;      // of single scans; only where there is a mean
  double max_SI = 0.0;      // the same
  std::uint64_t count = 0;  // scans with a value
  Span covered{};           // time that these scans stand for: mean rate x covered = energy
};

struct StoredReading {
  Instant scan_time{};
  Reading reading;
};

struct JournalRow {
  std::int64_t number = 0;  // 1, 2, 3 ... in the order of writing
  AlarmRow row;
};

struct JournalQuery {
  std::optional<std::string_view> machine{};  // only of this one; "" = the plant's own
  std::optional<std::int64_t> before{};       // only rows with a smaller number: the next page
  std::optional<Instant> from{};
  std::optional<Instant> to{};  // exclusive
  std::size_t limit = 100;      // 1 to 5000
};

struct SavedState {
  std::uint32_t version = 0;
  Instant time{};
  std::vector<std::uint8_t> bytes;
  bool damaged = false;  // its checksum fails: bytes are empty
};

struct StoredGap {
  std::string machine;
  Instant begin{};
  Instant end{};  // time of the last scan that was given up
  std::uint64_t scans = 0;
  std::string why;
};

struct PlantFileVersion {
  Instant time{};
  std::string hash;  // SHA-256 of the text, 64 hexadecimal digits
  std::string text;
};

class History {
 public:
  explicit History(const std::string& file);
  History(const History&) = delete;
  History& operator=(const History&) = delete;
  ~History();

  [[nodiscard]] std::vector<std::string> machines() const;

  // In time order, [from, to), at most `limit` from the beginning.
  [[nodiscard]] std::vector<StoredReading> samples(std::string_view machine, std::string_view point,
                                                   Instant from, Instant to,
                                                   std::size_t limit = 100000) const;
  // Whole scans with the readings in the order of `points`; a point that a scan does not have is
  // a reading with quality timeout.
  [[nodiscard]] std::vector<Scan> scans(std::string_view machine,
                                        const std::vector<std::string>& points, Instant from,
                                        Instant to, std::size_t limit = 10000) const;

  // Buckets begin at multiples of their width since 1970 UTC; from minutes, hours or days,
  // whichever suits the width.
  [[nodiscard]] std::vector<Bucket> trend(const TrendRequest& request) const;

  // Means over the minutes that begin in [from, to). `time` is the minute's begin; mode and level
  // are those of its last scan; steady where all of its scans were. u has seven digits. Blames live
  // as long as this History.
  [[nodiscard]] std::vector<Assessment> assessments(std::string_view machine, Instant from,
                                                    Instant to, std::size_t limit = 10000) const;
  [[nodiscard]] std::optional<Assessment> last_assessment(std::string_view machine) const;

  // Windows that begin in [from, to), in time order.
  [[nodiscard]] std::vector<Window> windows(std::string_view machine, Instant from, Instant to,
                                            std::size_t limit = 100000) const;

  // The newest version of each finding that is not over; of one machine, or of all. Newest onset
  // first.
  [[nodiscard]] std::vector<Finding> current_findings(
      std::optional<std::string_view> machine = {}) const;
  // The newest version of each finding that was updated in [from, to), those that are over too.
  [[nodiscard]] std::vector<Finding> findings(Instant from, Instant to,
                                              std::optional<std::string_view> machine = {}) const;
  // Every version of one finding, oldest first.
  [[nodiscard]] std::vector<Finding> finding_versions(std::string_view id) const;

  [[nodiscard]] std::vector<JournalRow> journal(const JournalQuery& query) const;  // newest first
  // Checks the chain of hashes over the whole journal: the number of the first row that was
  // altered, or that follows a removed one.
  [[nodiscard]] std::optional<std::int64_t> first_broken_journal_row() const;

  [[nodiscard]] std::optional<SavedState> state(std::string_view machine) const;
  [[nodiscard]] std::vector<PlantFileVersion> plant_files() const;  // oldest first
  [[nodiscard]] std::vector<StoredGap> gaps(Instant from, Instant to) const;

  // Rows left out since this History was opened, because their checksum failed.
  [[nodiscard]] std::uint64_t damaged_rows() const;

 private:
  class Implementation;
  std::unique_ptr<Implementation> implementation_;
};

}  // namespace lostwork
