#include "daemon/polling.h"

#include <algorithm>

#include <boost/asio/as_tuple.hpp>
#include <boost/asio/awaitable.hpp>
#include <boost/asio/co_spawn.hpp>
#include <boost/asio/detached.hpp>
#include <boost/asio/io_context.hpp>
#include <boost/asio/steady_timer.hpp>
#include <boost/asio/thread_pool.hpp>
#include <boost/asio/use_awaitable.hpp>

namespace lostwork {
namespace {

namespace asio = boost::asio;
using std::chrono::steady_clock;

// A scan waits for its buses until this share of its period is over.
constexpr double patience = 0.8;
// Timers look at the plant's clock at least so often: the host's clock may be set meanwhile.
constexpr std::chrono::seconds longest_sleep{1};

Instant next_multiple(Instant after, Span period) {
  const auto n = after.time_since_epoch() / period;
  return Instant{(n + 1) * period};
}

}  // namespace

// Lives as long as one of its coroutines does.
struct Polling::Running : std::enable_shared_from_this<Running> {
  struct BusRun {
    std::string id;
    std::unique_ptr<Bus> bus;
    std::optional<Poller> poller;
    asio::steady_timer timer;
    std::optional<steady_clock::time_point> in_call;
    std::unique_ptr<asio::thread_pool>
        thread;  // last: joined first, while bus and poller are there
  };
  struct MachineRun {
    ScanAssembler assembler;
    Span period;
    asio::steady_timer timer;
    Instant due{};         // of the next scan
    bool waiting = false;  // for its buses
  };

  Running(asio::io_context& io, Parts given) : parts{std::move(given)}, context{io} {
    for (std::size_t i = 0; i < parts.wiring.buses.size(); ++i) {
      auto bus = std::make_unique<BusRun>(BusRun{.id = parts.wiring.buses[i].id,
                                                 .bus = std::move(parts.buses[i]),
                                                 .poller = {},
                                                 .timer = asio::steady_timer{io},
                                                 .in_call = {},
                                                 .thread = std::make_unique<asio::thread_pool>(1)});
      bus->poller.emplace(parts.wiring, bus->id, *bus->bus);
      buses.push_back(std::move(bus));
    }
    for (const MachineScan& machine : parts.wiring.machines) {
      machines.push_back(std::make_unique<MachineRun>(MachineRun{
          .assembler = ScanAssembler{parts.wiring, machine.machine},
          .period = machine.period,
          .timer = asio::steady_timer{          io                }
      }));
    }
  }

  // False where it was not reached: stopped, or the plant's clock was set back meanwhile.
  asio::awaitable<bool> sleep_until(asio::steady_timer& timer, Instant due) const {
    Instant now = parts.clock.now();
    while (!stopped && now < due) {
      const auto left = parts.clock.until(due);
      timer.expires_after(std::min<steady_clock::duration>(left, longest_sleep));
      const auto [error] = co_await timer.async_wait(asio::as_tuple(asio::use_awaitable));
      static_cast<void>(error);  // the loop's condition decides
      const Instant later = parts.clock.now();
      if (later < now) {
        co_return false;
      }
      now = later;
    }
    co_return !stopped;
  }

  static asio::awaitable<std::vector<PointReading>> poll_here(Poller& poller, Instant now) {
    co_return poller.poll(now);
  }

  asio::awaitable<void> run_bus(BusRun& bus) {
    const auto self = shared_from_this();
    while (!stopped) {
      const Instant due = bus.poller->next_due();
      if (due == Instant::max()) {
        co_return;  // nothing is wired to it
      }
      const bool reached = co_await sleep_until(bus.timer, due);
      if (!reached) {
        bus.poller.emplace(parts.wiring, bus.id, *bus.bus);  // its due times are of another clock
        continue;
      }
      bus.in_call = steady_clock::now();
      auto call = asio::co_spawn(*bus.thread, poll_here(*bus.poller, parts.clock.now()),
                                 asio::use_awaitable);
      const std::vector<PointReading> readings = co_await std::move(call);
      bus.in_call.reset();
      hand_out(readings);
    }
  }

  void hand_out(const std::vector<PointReading>& readings) {
    for (const auto& machine : machines) {
      machine->assembler.take(readings);
      if (machine->waiting && machine->assembler.complete(machine->due)) {
        machine->waiting = false;
        machine->timer.cancel();
      }
    }
  }

  asio::awaitable<void> wait_for_buses(MachineRun& machine, Instant deadline) const {
    machine.waiting = !machine.assembler.complete(machine.due);
    while (!stopped && machine.waiting && parts.clock.now() < deadline) {
      const auto left = parts.clock.until(deadline);
      machine.timer.expires_after(std::min<steady_clock::duration>(left, longest_sleep));
      const auto [error] = co_await machine.timer.async_wait(asio::as_tuple(asio::use_awaitable));
      static_cast<void>(error);
    }
    machine.waiting = false;
  }

  asio::awaitable<void> run_machine(std::size_t index) {
    const auto self = shared_from_this();
    MachineRun& machine = *machines[index];
    const Span wait{static_cast<Span::rep>(patience * static_cast<double>(machine.period.count()))};
    machine.due = next_multiple(parts.clock.now(), machine.period);
    while (!stopped) {
      const bool reached = co_await sleep_until(machine.timer, machine.due);
      if (reached) {
        co_await wait_for_buses(machine, machine.due + wait);
      }
      if (stopped) {
        co_return;
      }
      if (reached) {
        parts.on_scan(index, machine.assembler.scan(machine.due));
      } else {
        parts.on_clock_back(parts.clock.now());
      }
      machine.due = next_multiple(parts.clock.now(), machine.period);
    }
  }

  void start() {
    const auto report = [](const std::exception_ptr& error) {
      if (error) {
        std::rethrow_exception(error);  // ends the io_context's run(): a fault of ours
      }
    };
    for (const auto& bus : buses) {
      asio::co_spawn(context, run_bus(*bus), report);
    }
    for (std::size_t i = 0; i < machines.size(); ++i) {
      asio::co_spawn(context, run_machine(i), report);
    }
  }

  void stop() {
    stopped = true;
    for (const auto& bus : buses) {
      bus->timer.cancel();
    }
    for (const auto& machine : machines) {
      machine->timer.cancel();
    }
  }

  Parts parts;
  asio::io_context& context;
  std::vector<std::unique_ptr<BusRun>> buses;
  std::vector<std::unique_ptr<MachineRun>> machines;
  bool stopped = false;
};

Polling::Polling(boost::asio::io_context& io, Parts parts)
    : running_{std::make_shared<Running>(io, std::move(parts))} {
  running_->start();
}

Polling::~Polling() {  // NOLINT(bugprone-exception-escape): an Asio timer's cancel() has no error
  running_->stop();
}

std::chrono::steady_clock::duration Polling::longest_call() const {
  steady_clock::duration longest{0};
  for (const auto& bus : running_->buses) {
    if (bus->in_call) {
      longest = std::max(longest, steady_clock::now() - *bus->in_call);
    }
  }
  return longest;
}

}  // namespace lostwork
