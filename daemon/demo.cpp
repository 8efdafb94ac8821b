#include "daemon/demo.h"

#include "config/plant_config.h"
#include "daemon/arguments.h"
#include "daemon/demo_plant_file.h"
#include "daemon/local_time.h"
#include "daemon/loop.h"
#include "daemon/past_season.h"
#include "daemon/pipeline.h"
#include "daemon/progress.h"
#include "sensors/demo_plant/fault.h"
#include "sensors/demo_plant/plant.h"
#include "sensors/demo_plant/server.h"
#include "storage/store.h"

#include <array>
#include <chrono>
#include <condition_variable>
#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <mutex>
#include <sstream>
#include <stdexcept>
#include <stop_token>
#include <string>
#include <thread>
#include <utility>

namespace lostwork {
namespace {

// The plant is simulated from here on; so the machines have had a spring to be learned in.
constexpr Instant season_start = std::chrono::sys_days{std::chrono::March / 2 / 2026};
constexpr double standard_days = 126;
constexpr std::string_view standard_fault =
    "condenser_fouling:machine=chiller-1,from=2026-05-04,power=7,days=63";
// Every scan of the season is computed: at one a minute that takes seconds.
constexpr Span demo_scan_period{60000};
constexpr std::chrono::milliseconds plant_tick{100};

constexpr std::array options{
    Option{ "--seconds",       "N",                                  "ends by itself after so long"},
    Option{   "--speed",       "X",       "how many times as fast as the clock the plant runs (60)"},
    Option{    "--days",       "N",                               "length of the past season (126)"},
    Option{    "--seed",       "N",             "another plant of the same kind, other weather (1)"},
    Option{   "--fault",    "TEXT", "instead of the fouling that grows; may be given several times",false, true},
    Option{  "--script",    "FILE",                                "faults from a file, one a line"                                                                    },
    Option{ "--healthy",        "",                                               "no fault at all"},
    Option{  "--listen", "ADDRESS",            "of the page (127.0.0.1:8470); port 0: any free one"         },
    Option{"--database",    "FILE",          "keeps the database there (a temporary one otherwise)"},
};

constexpr CommandLine command{
    .usage = "lostwork demo [options]",
    .purpose =
        "Runs the whole program against the simulated plant of Tern Quay Dairy (an invented site): "
        "first a\n"
        "past season, then live behind a Modbus TCP server on loopback.\n"
        "A fault is KIND:KEY=VALUE,... as in\n"
        "  condenser_fouling:machine=chiller-1,from=2026-05-04,power=7,days=63\n"
        "Every fault has from= and may have to=, the day of the repair. The other keys by kind:\n"
        "  condenser_fouling   machine= and rate=, limit= or power=, days=\n"
        "  low_condenser_flow  machine= and loss=\n"
        "  refrigerant_leak    machine= and rate=, limit=\n"
        "  compressor_wear     machine= and rate=, limit= or power=, days=\n"
        "  sensor_drift        sensor= and rate=, limit=\n"
        "  sensor_broken       sensor=\n"
        "  device_silent       device= and to=, which it needs\n"
        "rate and limit: percent a day and percent (kelvin for sensor_drift); limit= may stay "
        "away.\n"
        "loss: percent of the flow. power, days: grows to so many percent more power in so long.",
    .options = options};

struct DemoOptions {
  PlantOptions plant;
  Instant live_from{};
  double speed = 60.0;
  std::optional<std::chrono::seconds> run_for;
  std::string listen = "127.0.0.1:8470";
  std::optional<std::filesystem::path> database;
};

// The number after an option, or `standard`. Throws std::invalid_argument with the sentence.
double number_or(const Arguments& given, std::string_view option, double standard,
                 const std::pair<double, double>& limits) {
  const auto text = given.value(option);
  if (!text) {
    return standard;
  }
  const auto value = number(option, *text, limits.first, limits.second);
  if (!value) {
    throw std::invalid_argument{value.error()};
  }
  return *value;
}

std::string file_text(const std::filesystem::path& file) {
  std::ifstream in{file};
  std::ostringstream text;
  if (!in || !(text << in.rdbuf())) {
    throw std::invalid_argument{file.string() + ": cannot be read"};
  }
  return text.str();
}

std::vector<PlantFault> faults_of(const Arguments& given) {
  const FaultTargets targets = plant_fault_targets();
  std::vector<PlantFault> out;
  for (const std::string_view text : given.all("--fault")) {
    out.push_back(parse_fault(text, targets));
  }
  if (const auto script = given.value("--script")) {
    const std::filesystem::path file{*script};
    const std::vector<PlantFault> more =
        parse_fault_script(file_text(file), targets, file.string());
    out.insert(out.end(), more.begin(), more.end());
  }
  if (!given.has("--fault") && !given.has("--script") && !given.has("--healthy")) {
    out.push_back(parse_fault(standard_fault, targets));
  }
  return out;
}

// Throws std::invalid_argument with one sentence for bad usage.
DemoOptions demo_options(const Arguments& given) {
  DemoOptions out;
  constexpr double most_seed = 1e15;
  out.plant.seed = static_cast<std::uint64_t>(number_or(given, "--seed", 1, {0, most_seed}));
  out.plant.start = season_start;
  out.plant.faults = faults_of(given);
  const double days = number_or(given, "--days", standard_days, {0, 3660});
  out.live_from = season_start +
                  std::chrono::floor<Span>(std::chrono::duration<double, std::ratio<86400>>{days});
  out.speed = number_or(given, "--speed", out.speed, {1, 600});
  if (given.has("--seconds")) {
    out.run_for =
        std::chrono::seconds{static_cast<std::int64_t>(number_or(given, "--seconds", 0, {1, 1e8}))};
  }
  out.listen = given.value("--listen").value_or(out.listen);
  if (const auto file = given.value("--database")) {
    if (std::filesystem::exists(*file)) {
      throw std::invalid_argument{"--database " + std::string{*file} +
                                  ": exists already; a new file is wanted"};
    }
    out.database = *file;
  }
  return out;
}

// A folder that is gone when the demonstration is over.
class TemporaryFolder {
 public:
  TemporaryFolder() {
    std::string name = (std::filesystem::temp_directory_path() / "lostwork-demo-XXXXXX").string();
    if (mkdtemp(name.data()) == nullptr) {
      throw std::runtime_error{name + ": no temporary folder can be made there"};
    }
    path_ = name;
  }
  TemporaryFolder(const TemporaryFolder&) = delete;
  TemporaryFolder& operator=(const TemporaryFolder&) = delete;
  ~TemporaryFolder() {
    std::error_code ignored;  // nothing can be done about it here
    std::filesystem::remove_all(path_, ignored);
  }
  [[nodiscard]] const std::filesystem::path& path() const { return path_; }

 private:
  std::filesystem::path path_;
};

PlantConfig demo_config(const DemoOptions& demo, const std::filesystem::path& database) {
  auto config = read_plant(demo_plant_file(), "tern_quay_dairy.toml");
  if (!config) {
    throw std::logic_error{text("tern_quay_dairy.toml", config.error().front())};
  }
  config->database = database;
  config->listen = demo.listen;
  config->text = demo_plant_file();
  for (MachineConfig& machine : config->machines) {
    machine.model.scan_period = demo_scan_period;
  }
  for (MachineScan& machine : config->wiring.machines) {
    machine.period = demo_scan_period;
  }
  return std::move(*config);
}

void past_season(const PlantConfig& config, Plant& plant, const DemoOptions& demo,
                 std::ostream& err) {
  Store store{
      {.file = config.database.string(), .durability = Durability::process}
  };
  Pipeline pipeline{config};
  const auto steps = static_cast<std::size_t>((demo.live_from - plant.time()) / demo_scan_period);
  Progress progress{err, "past season", steps};
  run_past_season(config, plant, demo.live_from,
                  {.pipeline = pipeline, .store = store, .progress = progress});
}

// Runs the plant on by its clock, and shows it to the server.
class LivePlant {
 public:
  LivePlant(Plant plant, PlantClock clock)
      : server_{0, register_image(plant)},
        thread_{[this, clock, moved = std::move(plant)](const std::stop_token& stop) mutable {
          run(std::move(moved), clock, stop);
        }} {}

  [[nodiscard]] std::uint16_t port() const { return server_.port(); }

 private:
  void run(Plant plant, const PlantClock& clock, const std::stop_token& stop) {
    std::mutex mutex;
    std::condition_variable_any wake;
    std::unique_lock lock{mutex};
    while (!wake.wait_for(lock, stop, plant_tick, [&stop] { return stop.stop_requested(); })) {
      const Span behind = clock.now() - plant.time();
      if (behind > Span::zero()) {
        plant.step(behind);
        server_.show(register_image(plant));
      }
    }
  }

  DemoServer server_;
  std::jthread thread_;  // last: ends before the server
};

void run_live(PlantConfig config, Plant plant, const DemoOptions& demo, Log& log) {
  const PlantClock clock{plant.time(), demo.speed};
  const LivePlant live{std::move(plant), clock};
  for (BusOptions& bus : config.wiring.buses) {
    bus.tcp = {.host = "127.0.0.1", .port = live.port()};
    bus.pause = Span::zero();
  }
  LoopOptions loop{.clock = clock,
                   .demonstration = true,
                   .run_for = demo.run_for,
                   .plant_file = {},
                   .on_ready = [&log](std::uint16_t port) {
                     log.line(Severity::info, "The page is at http://127.0.0.1:" +
                                                  std::to_string(port) + "/ (Ctrl-C ends)");
                   }};
  run_loop(config, loop, log);
}

void demonstrate(const DemoOptions& demo, Log& log, std::ostream& err) {
  const TemporaryFolder folder;
  const PlantConfig config = demo_config(demo, demo.database.value_or(folder.path() / "plant.db"));
  Plant plant{demo.plant};
  log.line(Severity::info, "Running a past season of Tern Quay Dairy (an invented site), " +
                               iso_text(demo.plant.start) + " to " + iso_text(demo.live_from) +
                               ".");
  past_season(config, plant, demo, err);
  run_live(config, std::move(plant), demo, log);
}

}  // namespace

int demo_command(std::span<const std::string_view> arguments, std::ostream& out,
                 std::ostream& err) {
  const auto given = begin_command(command, arguments, out, err);
  if (!given) {
    return given.error();
  }
  Log log{err, false};
  try {
    demonstrate(demo_options(*given), log, err);
    return 0;
  } catch (const std::exception& error) {
    err << "lostwork demo: " << error.what() << '\n';
    return 2;
  }
}

}  // namespace lostwork
