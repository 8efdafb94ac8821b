// Made-up plants, folders and rows for the tests of the store.
#pragma once

#include "storage/database.h"
#include "storage/history.h"
#include "storage/rows.h"
#include "storage/store.h"

#include <cstdint>
#include <filesystem>
#include <memory>
#include <random>
#include <string>
#include <vector>

namespace lostwork {

// A folder of its own, removed with all in it.
class Folder {
 public:
  Folder();
  Folder(const Folder&) = delete;
  Folder& operator=(const Folder&) = delete;
  ~Folder();
  [[nodiscard]] std::string file(const std::string& name = "plant.db") const {
    return (path_ / name).string();
  }
  [[nodiscard]] const std::filesystem::path& path() const { return path_; }

 private:
  std::filesystem::path path_;
};

inline constexpr Instant midnight{Span{1'700'006'400'000}};  // 2023-11-15T00:00:00Z

[[nodiscard]] std::shared_ptr<const MachineLayout> layout_of(const std::string& machine,
                                                             std::size_t points = 3);

// Values, uncertainties, reasons, qualities and reading times drawn from the generator; the same
// sequence gives the same row.
[[nodiscard]] ScanRow random_row(std::mt19937& random,
                                 const std::shared_ptr<const MachineLayout>& layout, Instant time);

// A row in which every quantity is `value` +- 0.5, for sums that can be done in the head.
[[nodiscard]] ScanRow plain_row(const std::shared_ptr<const MachineLayout>& layout, Instant time,
                                double value);

// `count` rows, `step` apart.
[[nodiscard]] std::vector<ScanRow> random_rows(std::mt19937& random,
                                               const std::shared_ptr<const MachineLayout>& layout,
                                               Instant begin, Span step, std::size_t count);

[[nodiscard]] Batch batch_of(std::vector<ScanRow> rows);
[[nodiscard]] StateRow state_of(const std::string& machine, Instant time, std::uint8_t fill);
[[nodiscard]] AlarmRow alarm_at(Instant time, const std::string& alarm);

void expect_same_bits(double a, double b);
void expect_same(const Reading& a, const Reading& b);
void expect_same(const Reason& a, const Reason& b);

// What a failed call says; empty where it does not throw.
template <class Call>
[[nodiscard]] std::string sentence_of(Call call) {
  try {
    call();
  } catch (const std::exception& error) {
    return error.what();
  }
  return {};
}

}  // namespace lostwork
