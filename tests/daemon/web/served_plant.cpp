#include "tests/daemon/web/served_plant.h"

#include "tests/daemon/web/made_up_plant.h"

#include <algorithm>
#include <future>
#include <optional>
#include <thread>
#include <type_traits>

#include <boost/asio/executor_work_guard.hpp>
#include <boost/asio/io_context.hpp>
#include <boost/asio/post.hpp>

namespace lostwork {

namespace asio = boost::asio;

class ServedPlant::Implementation {
 public:
  Implementation(const WebLimits& limits, HistorySource history) {
    const WebOptions options{.listen = "127.0.0.1:0", .limits = limits};
    server.emplace(
        io_, options,
        WebServer::Parts{
            .view = view,
            .history = history ? std::move(history) : made_up_trend,
            .acknowledge = [this](std::string_view id,
                                  std::string_view comment) { return acknowledge(id, comment); },
            .log = [this](std::string_view line) { log.emplace_back(line); }});
    thread_ = std::thread{[this] { io_.run(); }};
  }
  ~Implementation() {  // NOLINT(bugprone-exception-escape): it should end the program
    run([this] { server.reset(); });
    work_.reset();
    thread_.join();
  }
  Implementation(const Implementation&) = delete;
  Implementation& operator=(const Implementation&) = delete;

  // Runs it on the server's thread and waits.
  template <class Work>
  std::invoke_result_t<Work> run(Work work) {
    std::packaged_task<std::invoke_result_t<Work>()> task{std::move(work)};
    auto done = task.get_future();
    asio::post(io_, [&task] { task(); });
    return done.get();
  }

  PlantView view = made_up_plant();
  std::vector<std::string> acknowledged;
  std::vector<std::string> log;
  std::optional<WebServer> server;

 private:
  Acknowledgement acknowledge(std::string_view id, std::string_view comment) {
    const auto alarm = std::find_if(view.alarms.begin(), view.alarms.end(),
                                    [id](const AlarmView& a) { return a.alarm.id == id; });
    if (alarm == view.alarms.end()) {
      return Acknowledgement::no_such_alarm;
    }
    if (alarm->alarm.state != AlarmState::active_unacknowledged) {
      return Acknowledgement::already;
    }
    alarm->alarm.state = AlarmState::active_acknowledged;
    alarm->alarm.acknowledged =
        SeenBy{.time = view.time, .user = "local", .comment = std::string{comment}};
    acknowledged.push_back(std::string{id} + ": " + std::string{comment});
    ++view.revision;
    server->changed();
    return Acknowledgement::done;
  }

  asio::io_context io_{1};
  asio::executor_work_guard<asio::io_context::executor_type> work_{io_.get_executor()};
  std::thread thread_;
};

ServedPlant::ServedPlant(const WebLimits& limits, HistorySource history)
    : implementation_{std::make_unique<Implementation>(limits, std::move(history))} {}
ServedPlant::~ServedPlant() = default;

std::uint16_t ServedPlant::port() const {
  return implementation_->server->port();
}

void ServedPlant::change(const std::function<void(PlantView&)>& how) {
  implementation_->run([this, &how] {
    how(implementation_->view);
    ++implementation_->view.revision;
    implementation_->server->changed();
  });
}

std::vector<std::string> ServedPlant::acknowledged() {
  return implementation_->run([this] { return implementation_->acknowledged; });
}

std::vector<std::string> ServedPlant::log() {
  return implementation_->run([this] { return implementation_->log; });
}

}  // namespace lostwork
