// A recorded history: rows of readings of a plant's points, oldest first.
#pragma once

#include "daemon/csv.h"
#include "sensors/wiring.h"
#include "thermo/reading.h"

#include <filesystem>
#include <fstream>
#include <memory>
#include <optional>
#include <string>
#include <vector>

#include <tl/expected.hpp>

namespace lostwork {

struct HistoryRow {
  Instant time{};
  std::vector<std::optional<double>> values;  // in the unit of Wiring::points[i]; none: not read
};

// CSV with a header: `time` first (ISO 8601 with Z or an offset, strictly rising), then the ids of
// points. Every point of the wiring that is not a constant needs its column; another column is an
// error. Each error is one sentence: file, line, column, value, what is allowed.
class CsvHistory {
 public:
  // The wiring outlives the history.
  [[nodiscard]] static tl::expected<CsvHistory, std::string> open(const std::filesystem::path& file,
                                                                  const Wiring& wiring);
  CsvHistory(CsvHistory&&) = default;

  // The next row; none at the end.
  [[nodiscard]] tl::expected<std::optional<HistoryRow>, std::string> next();

 private:
  CsvHistory(std::filesystem::path file, const Wiring& wiring);
  [[nodiscard]] std::optional<std::string> read_header();
  [[nodiscard]] std::string place(std::size_t column) const;

  std::filesystem::path file_;
  const Wiring* wiring_;
  std::unique_ptr<std::ifstream> in_;
  CsvReader reader_;
  std::vector<std::size_t> point_of_column_;  // of column i + 1
  std::vector<std::string> header_;
  std::optional<Instant> last_;
};

}  // namespace lostwork
