// Storing scans beside plain rows of the same samples, and asking for trends.
//
// A scan has 14 readings and every quantity; the plain rows hold the readings alone.
#include "storage/database.h"
#include "storage/history.h"
#include "storage/store.h"

#include <benchmark/benchmark.h>
#include <cmath>
#include <cstddef>
#include <cstdint>
#include <filesystem>
#include <memory>
#include <random>
#include <string>
#include <vector>

namespace lostwork {
namespace {

constexpr std::size_t points = 14;
constexpr std::size_t scans_a_day = 1440;
constexpr Span step{60000};
constexpr Instant begin{Span{1'700'006'400'000}};  // 2023-11-15T00:00:00Z

std::string file() {
  return (std::filesystem::temp_directory_path() / "lostwork_storage_bench.db").string();
}

void remove_file() {
  for (const char* suffix : {"", "-wal", "-shm", "-writer"}) {
    std::filesystem::remove(file() + suffix);
  }
}

// Readings in steps of 0.1 K, as sensors give them; quantities with noise in every bit.
std::vector<ScanRow> rows_of_days(std::size_t days) {
  std::mt19937 random{1};
  std::uniform_real_distribution<double> noise{0.0, 1.0};
  auto layout = std::make_shared<MachineLayout>();
  layout->machine = "chiller-1";
  for (std::size_t i = 0; i < points; ++i) {
    layout->points.push_back("point_" + std::to_string(i));
  }
  std::vector<ScanRow> out(days * scans_a_day);
  for (std::size_t i = 0; i < out.size(); ++i) {
    ScanRow& row = out[i];
    row.layout = layout;
    row.covers = step;
    row.scan.time = begin + static_cast<std::int64_t>(i) * step;
    row.assessment.time = row.scan.time;
    for (std::size_t point = 0; point < points; ++point) {
      row.scan.readings.push_back({.value_SI = 273.15 + 0.1 * std::round(100.0 * noise(random)),
                                   .u_SI = 0.0866,
                                   .quality = Quality::good,
                                   .time = row.scan.time});
    }
    for (std::size_t q = 0; q < quantity_count; ++q) {
      row.assessment.values[static_cast<Quantity>(q)] =
          Measured{.value = 1000.0 * noise(random), .u = noise(random)};
    }
  }
  return out;
}

// One transaction a day, as import() does.
void plain_rows(benchmark::State& run) {
  const std::vector<ScanRow> rows = rows_of_days(7);
  for (auto _ : run) {
    run.PauseTiming();
    remove_file();
    run.ResumeTiming();
    Database database = Database::writer(file());
    database.run(
        "PRAGMA journal_mode = WAL; PRAGMA synchronous = NORMAL;"
        "CREATE TABLE sample (point INTEGER, time_ms INTEGER, value REAL, "
        "PRIMARY KEY (point, time_ms)) WITHOUT ROWID");
    Statement insert{database, "INSERT INTO sample VALUES (?1, ?2, ?3)"};
    for (std::size_t at = 0; at < rows.size(); at += scans_a_day) {
      Transaction transaction{database, Transaction::Kind::write};
      for (std::size_t i = at; i < at + scans_a_day; ++i) {
        for (std::size_t point = 0; point < points; ++point) {
          insert.run(static_cast<std::int64_t>(point), rows[i].scan.time.time_since_epoch().count(),
                     rows[i].scan.readings[point].value_SI);
        }
      }
      transaction.commit();
    }
  }
  remove_file();
  run.SetItemsProcessed(run.iterations() * static_cast<std::int64_t>(rows.size() * points));
}
BENCHMARK(plain_rows)->Unit(benchmark::kMillisecond)->UseRealTime();

void store_days(Store& store, const std::vector<ScanRow>& rows) {
  for (std::size_t at = 0; at < rows.size(); at += scans_a_day) {
    Batch batch;
    const auto first = rows.begin() + static_cast<std::ptrdiff_t>(at);
    batch.scans.assign(first, first + scans_a_day);
    store.write(std::move(batch));
  }
}

// goals.md P11: samples a second, to be compared with plain_rows; all quantities are stored too.
void import(benchmark::State& run) {
  const std::vector<ScanRow> rows = rows_of_days(7);
  for (auto _ : run) {
    run.PauseTiming();
    remove_file();
    run.ResumeTiming();
    Store store{
        {.file = file(), .durability = Durability::process}
    };
    store_days(store, rows);
  }
  run.SetItemsProcessed(run.iterations() * static_cast<std::int64_t>(rows.size() * points));
  run.counters["bytes_a_scan"] =
      static_cast<double>(std::filesystem::file_size(file())) / static_cast<double>(rows.size());
  remove_file();
}
BENCHMARK(import)->Unit(benchmark::kMillisecond)->UseRealTime();

// goals.md P15 and P16: one quantity of one machine.
void trend(benchmark::State& run, std::chrono::hours span, std::size_t buckets) {
  remove_file();
  {
    Store store{
        {.file = file(), .durability = Durability::process}
    };
    store_days(store, rows_of_days(30));
  }
  const History history{file()};
  for (auto _ : run) {
    benchmark::DoNotOptimize(history.trend({.machine = "chiller-1",
                                            .quantity = Quantity::power,
                                            .from = begin,
                                            .to = begin + span,
                                            .max_points = buckets}));
  }
  remove_file();
}
BENCHMARK_CAPTURE(trend, month_by_hour, std::chrono::hours{720}, 720)
    ->Unit(benchmark::kMillisecond);
BENCHMARK_CAPTURE(trend, day_in_a_thousand, std::chrono::hours{24}, 1000)
    ->Unit(benchmark::kMillisecond);

}  // namespace
}  // namespace lostwork
