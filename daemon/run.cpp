#include "daemon/run.h"

#include "config/plant_config.h"
#include "daemon/arguments.h"
#include "daemon/loop.h"
#include "daemon/version.h"

#include <array>
#include <cstdlib>
#include <filesystem>
#include <string>

namespace lostwork {
namespace {

constexpr std::array options{
    Option{ "--config", "FILE", "the plant file; read again at SIGHUP", true},
    Option{"--seconds",    "N",         "ends by itself after so long"     },
};

constexpr CommandLine command{.usage = "lostwork run --config FILE",
                              .purpose =
                                  "Monitors the machines of a plant file until SIGTERM or Ctrl-C. "
                                  "It only reads: nothing is ever\n"
                                  "written to the plant.",
                              .options = options};

}  // namespace

int run_command(std::span<const std::string_view> arguments, std::ostream& out, std::ostream& err) {
  const auto given = begin_command(command, arguments, out, err);
  if (!given) {
    return given.error();
  }
  LoopOptions loop;
  if (const auto text = given->value("--seconds")) {
    constexpr double a_year = 366.0 * 86400.0;
    const auto seconds = number("--seconds", *text, 1.0, a_year);
    if (!seconds) {
      err << "lostwork run: " << seconds.error() << '\n';
      return 2;
    }
    loop.run_for = std::chrono::seconds{static_cast<std::int64_t>(*seconds)};
  }
  loop.plant_file = std::filesystem::path{*given->value("--config")};
  const auto plant = load_plant(*loop.plant_file);
  if (!plant) {
    tell(err, loop.plant_file->string(), plant.error());
    return 2;
  }
  // NOLINTNEXTLINE(concurrency-mt-unsafe): before any thread, and nothing here sets the environment
  Log log{err, std::getenv("JOURNAL_STREAM") != nullptr};
  loop.on_ready = [&log](std::uint16_t port) {
    log.line(Severity::info, "lostwork " + std::string{version} +
                                 ": the page is at http://127.0.0.1:" + std::to_string(port) + "/");
  };
  try {
    run_loop(*plant, loop, log);
    return 0;
  } catch (const std::exception& error) {
    log.line(Severity::error, error.what());
    return 2;
  }
}

}  // namespace lostwork
