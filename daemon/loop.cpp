#include "daemon/loop.h"

#include "daemon/pipeline.h"
#include "daemon/polling.h"
#include "daemon/service.h"
#include "daemon/view.h"
#include "daemon/web/server.h"
#include "sensors/modbus_bus.h"
#include "storage/history.h"
#include "storage/store.h"

#include <csignal>
#include <memory>
#include <stdexcept>
#include <utility>

#include <boost/asio/as_tuple.hpp>
#include <boost/asio/awaitable.hpp>
#include <boost/asio/co_spawn.hpp>
#include <boost/asio/io_context.hpp>
#include <boost/asio/signal_set.hpp>
#include <boost/asio/steady_timer.hpp>
#include <boost/asio/thread_pool.hpp>
#include <boost/asio/use_awaitable.hpp>

namespace lostwork {
namespace {

namespace asio = boost::asio;
using std::chrono::steady_clock;

// A thread that has been in one call for longer is stuck: the watchdog is left to act.
constexpr std::chrono::seconds stuck_after{30};

std::vector<std::unique_ptr<Bus>> open_buses(const PlantConfig& plant, const PlantClock& clock) {
  std::vector<std::unique_ptr<Bus>> out;
  for (const BusOptions& options : plant.wiring.buses) {
    BusClocks clocks;
    clocks.utc = [clock] { return clock.now(); };
    auto bus = modbus_bus(options, std::move(clocks));
    if (!bus) {
      throw std::runtime_error{"bus " + options.id + ": " + bus.error()};
    }
    out.push_back(std::move(*bus));
  }
  return out;
}

// Questions of the page, answered on the web's history thread; opened there at the first one.
HistorySource history_source(const std::string& file) {
  return [file, history = std::shared_ptr<History>{}](const TrendRequest& request) mutable {
    if (!history) {
      history = std::make_shared<History>(file);
    }
    return history->trend(request);
  };
}

Acknowledgement acknowledgement_of(ActionResult result) {
  switch (result) {
    case ActionResult::done: return Acknowledgement::done;
    case ActionResult::no_such_alarm: return Acknowledgement::no_such_alarm;
    default: return Acknowledgement::already;
  }
}

class Loop {
 public:
  Loop(const PlantConfig& plant, const LoopOptions& options, Log& log)
      : options_{options},
        log_{log},
        plant_{plant},
        store_{{.file = plant.database.string()}},
        pipeline_{plant},
        signals_{io_, SIGINT, SIGTERM, SIGHUP},
        watchdog_{io_},
        end_{io_} {
    for (const std::string& refused : pipeline_.resume(History{plant.database.string()})) {
      log_.line(Severity::warning, refused);
    }
    view_ = plant_view(plant_, pipeline_);
    view_.demonstration = options.demonstration;
    web_ = std::make_unique<WebServer>(io_, WebOptions{.listen = plant.listen, .limits = {}},
                                       web_parts());
    start_polling();
  }

  void run() {
    keep_plant_file();
    spawn(take_signals());
    spawn(feed_watchdog());
    if (options_.run_for) {
      stop_after(*options_.run_for);
    }
    if (options_.on_ready) {
      options_.on_ready(web_->port());
    }
    tell_ready();
    io_.run();
    tell_stopping();
    write_last();
  }

 private:
  void stop_after(steady_clock::duration run_for) {
    end_.expires_after(run_for);
    end_.async_wait([this](const boost::system::error_code& error) {
      if (!error) {
        stop();
      }
    });
  }

  WebServer::Parts web_parts() {
    return {.view = view_,
            .history = history_source(plant_.database.string()),
            .acknowledge = [this](std::string_view alarm,
                                  std::string_view comment) { return acknowledge(alarm, comment); },
            .log = [this](std::string_view text) { log_.fault(text, text, steady_clock::now()); }};
  }  // NOLINT(clang-analyzer-cplusplus.NewDeleteLeaks): std::function keeps the history

  void spawn(asio::awaitable<void> work) {
    const auto report = [](const std::exception_ptr& error) {
      if (error) {
        std::rethrow_exception(error);  // a fault of ours: ends run()
      }
    };
    asio::co_spawn(io_, std::move(work), report);
  }

  void start_polling() {
    Polling::Parts parts{.wiring = plant_.wiring,
                         .buses = open_buses(plant_, options_.clock),
                         .clock = options_.clock,
                         .on_scan = [this](std::size_t m, Scan scan) { take(m, std::move(scan)); },
                         .on_clock_back = [this](Instant now) { clock_back(now); }};
    polling_ = std::make_unique<Polling>(io_, std::move(parts));
  }

  void take(std::size_t machine, Scan scan) {
    const std::string& id = pipeline_.model(machine).machine.id;
    const MachineStep& step = pipeline_.take(machine, std::move(scan));
    if (step.fate != ScanFate::taken) {
      log_.fault(id + " scan", id + ": a scan was passed over: " + std::string{name(step.fate)},
                 steady_clock::now());
    }
    for (const AlarmEvent& event : step.alarms) {
      log_.line(Severity::notice, event.alarm + ": " + std::string{name(event.from)} + " to " +
                                      std::string{name(event.to)} + ": " + event.text);
    }
    show(machine);
    store_if_due();
  }

  void show(std::size_t machine) {
    view_.time = options_.clock.now();
    refresh(view_, machine, pipeline_);
    web_->changed();
  }

  void clock_back(Instant now) {
    log_.line(Severity::warning, "the clock was set back; open windows are begun anew");
    pipeline_.set_clock_back(now);
  }

  Acknowledgement acknowledge(std::string_view alarm, std::string_view comment) {
    const ActionResult result = pipeline_.acknowledge(alarm, comment, options_.clock.now());
    for (std::size_t m = 0; m < pipeline_.size(); ++m) {
      show(m);
    }
    store_if_due();
    return acknowledgement_of(result);
  }

  static asio::awaitable<WriteResult> write_here(Store& store, Batch batch) {
    // NOLINTNEXTLINE(clang-analyzer-cplusplus.Move): clang 14 misreads the parameter's copy
    co_return store.write(std::move(batch));
  }

  asio::awaitable<void> write(Batch batch) {
    writing_since_ = steady_clock::now();
    auto call =
        asio::co_spawn(store_thread_, write_here(store_, std::move(batch)), asio::use_awaitable);
    const WriteResult result = co_await std::move(call);
    writing_since_.reset();
    if (!result.stored) {
      log_.fault("store",
                 result.why + "; " + std::to_string(result.waiting_scans) + " scans wait in memory",
                 steady_clock::now());
    }
  }

  // One batch at a time: what comes meanwhile waits in the pipeline.
  void store_if_due() {
    if (!writing_since_ && pipeline_.due()) {
      spawn(write(pipeline_.take_batch()));
    }
  }

  void keep_plant_file() {
    if (!store_.keep_plant_file(plant_.text, options_.clock.now())) {
      log_.line(Severity::warning, "the text of the plant file could not be stored");
    }
  }

  asio::awaitable<void> take_signals() {
    while (!stopped_) {
      const auto [error, signal] =
          co_await signals_.async_wait(asio::as_tuple(asio::use_awaitable));
      if (error) {
        co_return;
      }
      if (signal == SIGHUP) {
        reload();
      } else {
        stop();
      }
    }
  }

  void reload() {
    if (!options_.plant_file) {
      return;
    }
    auto plant = load_plant(*options_.plant_file);
    if (!plant) {
      for (const Problem& problem : plant.error()) {
        log_.line(Severity::error, text(options_.plant_file->string(), problem));
      }
      log_.line(Severity::error, "the plant that was running is kept");
      return;
    }
    try {
      adopt(std::move(*plant));
    } catch (const std::exception& error) {
      log_.line(Severity::error,
                std::string{error.what()} + "; the plant that was running is kept");
    }
  }

  void adopt(PlantConfig plant) {
    auto buses = open_buses(plant, options_.clock);  // throws before anything has changed
    buses.clear();
    tell_reloading();
    if (plant.listen != plant_.listen || plant.database != plant_.database) {
      log_.line(Severity::warning, "web.listen and storage.file take effect at the next start");
      plant.database = plant_.database;
    }
    polling_.reset();
    plant_ = std::move(plant);
    Pipeline next{plant_};
    next.take_over(pipeline_);
    pipeline_ = std::move(next);
    const std::uint64_t revision = view_.revision;
    view_ = plant_view(plant_, pipeline_);
    view_.demonstration = options_.demonstration;
    view_.revision += revision;
    start_polling();
    log_.line(Severity::info, "the plant file was read anew");
    tell_ready();
  }

  [[nodiscard]] bool alive() const {
    const bool storing = !writing_since_ || steady_clock::now() - *writing_since_ < stuck_after;
    return storing && polling_->longest_call() < stuck_after;
  }

  asio::awaitable<void> feed_watchdog() {
    const auto period = watchdog_period();
    while (period && !stopped_) {
      if (alive()) {
        tell_alive();
      }
      watchdog_.expires_after(*period);
      const auto [error] = co_await watchdog_.async_wait(asio::as_tuple(asio::use_awaitable));
      static_cast<void>(error);  // cancelled only by stop()
    }
  }

  void stop() {
    stopped_ = true;
    polling_.reset();
    web_->stop();
    signals_.cancel();
    watchdog_.cancel();
    end_.cancel();
  }

  void write_last() {
    store_thread_.join();
    const WriteResult result = store_.write(pipeline_.take_batch());
    if (!result.stored) {
      throw std::runtime_error{result.why};
    }
  }

  const LoopOptions& options_;
  Log& log_;
  PlantConfig plant_;
  Store store_;
  Pipeline pipeline_;
  PlantView view_;
  asio::io_context io_{1};
  asio::thread_pool store_thread_{1};
  asio::signal_set signals_;
  asio::steady_timer watchdog_;
  asio::steady_timer end_;
  std::unique_ptr<WebServer> web_;
  std::unique_ptr<Polling> polling_;
  std::optional<steady_clock::time_point> writing_since_;
  bool stopped_ = false;
};

}  // namespace

void run_loop(const PlantConfig& plant, const LoopOptions& options, Log& log) {
  Loop loop{plant, options, log};
  loop.run();
}

}  // namespace lostwork
