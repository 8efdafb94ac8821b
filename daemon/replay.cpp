#include "daemon/replay.h"

#include "config/plant_config.h"
#include "daemon/arguments.h"
#include "daemon/csv_history.h"
#include "daemon/pipeline.h"
#include "daemon/progress.h"
#include "daemon/result_csv.h"
#include "storage/history.h"
#include "storage/store.h"

#include <algorithm>
#include <array>
#include <cerrno>
#include <chrono>
#include <filesystem>
#include <fstream>
#include <map>
#include <memory>
#include <optional>
#include <stdexcept>
#include <string>
#include <string_view>
#include <system_error>
#include <utility>

namespace lostwork {
namespace {

constexpr std::array options{
    Option{  "--config", "FILE",                 "the plant file",true},
    Option{   "--input", "FILE", "the history: CSV with time first, then a column for each point",
           true},
    Option{  "--output", "FILE",                     "results as CSV, one row a machine and scan"     },
    Option{"--database", "FILE",
           "a database to add the history to; goes on where an earlier replay ended"     },
};

constexpr CommandLine command{
    .usage = "lostwork replay --config FILE --input FILE [--output FILE] [--database FILE]",
    .purpose =
        "Runs a recorded history through the same computation as the live program, at full speed.\n"
        "Without --output or --database the results go to standard output.",
    .options = options};

// A file that appears under its name only when it is whole.
class WholeFile {
 public:
  explicit WholeFile(std::filesystem::path path)
      : path_{std::move(path)}, part_{path_.string() + ".part"}, out_{part_, std::ios::trunc} {
    if (!out_) {
      throw std::runtime_error{path_.string() +
                               ": cannot be written: " + std::generic_category().message(errno)};
    }
  }
  WholeFile(const WholeFile&) = delete;
  WholeFile& operator=(const WholeFile&) = delete;
  ~WholeFile() {
    std::error_code ignored;  // of a file that is most often gone already
    std::filesystem::remove(part_, ignored);
  }
  std::ostream& stream() { return out_; }
  void finish() {
    out_.close();
    if (!out_) {
      throw std::runtime_error{path_.string() + ": could not be written whole"};
    }
    std::filesystem::rename(part_, path_);
  }

 private:
  std::filesystem::path path_;
  std::filesystem::path part_;
  std::ofstream out_;
};

struct Rows {
  std::size_t count = 0;
  std::map<Span, std::size_t> spacings;  // how often each occurs
};

// Reads the file once from end to end: what rows it has, or its first error.
tl::expected<Rows, std::string> counted_rows(const std::filesystem::path& input,
                                             const Wiring& wiring) {
  auto history = CsvHistory::open(input, wiring);
  if (!history) {
    return tl::unexpected{history.error()};
  }
  std::optional<Instant> last;
  for (Rows rows;; ++rows.count) {
    const auto row = history->next();
    if (!row) {
      return tl::unexpected{row.error()};
    }
    if (!*row) {
      return rows;
    }
    if (last) {
      ++rows.spacings[(*row)->time - *last];
    }
    last = (*row)->time;
  }
}

// Steadiness is judged by the samples that are due: with rows further apart than the scan period
// hardly any interval is steady, and nothing is learned; beyond 75 s ten minutes hold too few
// samples whatever the period (thermo/measure/steady.h).
constexpr double longest_steady_s = 75.0;

void warn_of_spacing(const PlantConfig& plant, const Rows& rows, std::ostream& err) {
  const auto usual =
      std::max_element(rows.spacings.begin(), rows.spacings.end(),
                       [](const auto& a, const auto& b) { return a.second < b.second; });
  if (usual == rows.spacings.end()) {
    return;
  }
  const double usual_s = std::chrono::duration<double>(usual->first).count();
  for (const MachineConfig& machine : plant.machines) {
    const double scan_s = std::chrono::duration<double>(machine.model.scan_period).count();
    if (usual_s <= 1.2 * scan_s) {
      continue;
    }
    err << "lostwork replay: note: the rows are " << usual_s << " s apart, but " << machine.model.id
        << " has scan_s = " << scan_s;
    if (usual_s > longest_steady_s) {
      err << "; rows more than " << longest_steady_s
          << " s apart are too few to tell a steady interval, so nothing is learned from them\n";
    } else {
      err << "; enter scan_s = " << usual_s
          << " for this history, or steady intervals will be missed\n";
    }
  }
}

Scan scan_of(const HistoryRow& row, const Wiring& wiring, const std::vector<std::size_t>& points) {
  Scan scan{.time = row.time, .readings = {}};
  scan.readings.reserve(points.size());
  for (const std::size_t i : points) {
    const PointSpec& point = wiring.points[i];
    const auto* constant = std::get_if<Constant>(&point.source);
    const std::optional<double> value =
        constant != nullptr ? std::optional{constant->value} : row.values[i];
    scan.readings.push_back(value ? reading_of(point, *value, wiring.altitude_m, row.time)
                                  : missing(Quality::timeout, row.time));
  }
  return scan;
}

struct Sinks {
  std::ostream* results = nullptr;  // none: not wanted
  Store* store = nullptr;
};

void store_batch(const Sinks& sinks, Batch batch) {
  if (sinks.store == nullptr) {
    return;
  }
  const WriteResult result = sinks.store->write(std::move(batch));
  if (!result.stored) {
    throw std::runtime_error{result.why};
  }
}

void write_result(const Sinks& sinks, std::string_view machine, const MachineStep& step) {
  if (sinks.results != nullptr && step.fate == ScanFate::taken) {
    write_result_row(*sinks.results, machine, step.assessment);
  }
}

// Handing over seldom costs little memory and saves most of the states' bytes.
constexpr std::size_t scans_a_batch = 20000;

void run_through(const PlantConfig& plant, CsvHistory& history, Pipeline& pipeline,
                 const Sinks& sinks, Progress& progress) {
  std::vector<std::vector<std::size_t>> points;
  for (const MachineConfig& machine : plant.machines) {
    points.push_back(points_of(plant.wiring, machine.model.id));
  }
  std::size_t waiting = 0;
  for (auto row = history.next().value(); row; row = history.next().value()) {
    for (std::size_t m = 0; m < pipeline.size(); ++m) {
      const MachineStep& step = pipeline.take(m, scan_of(*row, plant.wiring, points[m]));
      write_result(sinks, plant.machines[m].model.id, step);
    }
    waiting += pipeline.size();
    if (waiting >= scans_a_batch) {
      store_batch(sinks, pipeline.take_batch());
      waiting = 0;
    }
    progress.step();
  }
  store_batch(sinks, pipeline.take_batch());
}

int replay(const Arguments& given, const PlantConfig& plant, std::ostream& out, std::ostream& err) {
  const std::filesystem::path input{*given.value("--input")};
  const auto rows = counted_rows(input, plant.wiring);
  if (!rows) {
    err << "lostwork replay: " << rows.error() << '\n';
    return 2;
  }
  auto history = CsvHistory::open(input, plant.wiring);
  if (!history) {
    err << "lostwork replay: " << history.error() << '\n';
    return 2;
  }
  Pipeline pipeline{plant};
  std::unique_ptr<Store> store;
  if (const auto database = given.value("--database")) {
    store = std::make_unique<Store>(
        StoreOptions{.file = std::string{*database}, .durability = Durability::process});
    for (const std::string& refused : pipeline.resume(History{std::string{*database}})) {
      err << "lostwork replay: " << refused << '\n';
    }
  }
  std::optional<WholeFile> file;
  if (const auto output = given.value("--output")) {
    file.emplace(*output);
  }
  std::ostream* results = file ? &file->stream() : (store ? nullptr : &out);
  if (results != nullptr) {
    write_result_header(*results);
  }
  warn_of_spacing(plant, *rows, err);
  Progress progress{err, "replay", rows->count};
  run_through(plant, *history, pipeline, {.results = results, .store = store.get()}, progress);
  if (file) {
    file->finish();
  }
  return 0;
}

}  // namespace

int replay_command(std::span<const std::string_view> arguments, std::ostream& out,
                   std::ostream& err) {
  const auto given = begin_command(command, arguments, out, err);
  if (!given) {
    return given.error();
  }
  const std::filesystem::path config{*given->value("--config")};
  const auto plant = load_plant(config);
  if (!plant) {
    tell(err, config.string(), plant.error());
    return 2;
  }
  try {
    return replay(*given, *plant, out, err);
  } catch (const std::exception& error) {
    err << "lostwork replay: " << error.what() << '\n';
    return 2;
  }
}

}  // namespace lostwork
