// The page and the API over HTTP/1.1, on loopback.
//
// One thread: everything here runs on the io_context's; `view` and `acknowledge` are used on it
// too. History is asked for on a thread of its own, for it reads a database.
#pragma once

#include "daemon/plant_view.h"
#include "storage/history.h"

#include <chrono>
#include <cstddef>
#include <cstdint>
#include <functional>
#include <memory>
#include <string>
#include <string_view>
#include <vector>

namespace boost::asio {
class io_context;
}  // namespace boost::asio

namespace lostwork {

// Answers from the store, on the history thread; History::trend is meant. Throws where the store
// cannot answer: the client gets a 503 without the exception's text, which is logged.
using HistorySource = std::function<std::vector<Bucket>(const TrendRequest&)>;

enum class Acknowledgement : std::uint8_t { done, no_such_alarm, already };
// Called on the loop's thread. The comment may be empty; it has at most 500 bytes of valid UTF-8.
using Acknowledge =
    std::function<Acknowledgement(std::string_view alarm, std::string_view comment)>;

struct WebLimits {
  std::size_t header_bytes = 8192;
  std::size_t body_bytes = 4096;
  std::size_t target_bytes = 2048;
  std::size_t connections = 128;
  std::size_t event_streams = 64;
  std::size_t trends_waiting = 32;                // questions to the store that wait at most
  std::chrono::milliseconds request_time{10000};  // from the first byte to the whole request
  std::chrono::milliseconds idle_time{30000};     // between two requests of a connection
  std::chrono::milliseconds write_time{10000};    // for one answer or one event
  std::chrono::milliseconds event_period{1000};   // shortest time between two events
  std::chrono::milliseconds heartbeat{15000};     // an event stream is never silent for longer
};

struct WebOptions {
  std::string listen = "127.0.0.1:8470";  // a loopback address; port 0: any free one
  WebLimits limits;
};

class WebServer {
 public:
  struct Parts {
    const PlantView& view;  // outlives the server
    HistorySource history;
    Acknowledge acknowledge;
    std::function<void(std::string_view)> log;  // one line for the log
  };

  // Listens at once. Throws std::runtime_error with one sentence: the address is not a loopback
  // one, cannot be read, or is taken.
  WebServer(boost::asio::io_context& io, const WebOptions& options, Parts parts);
  WebServer(const WebServer&) = delete;
  WebServer& operator=(const WebServer&) = delete;
  // Closes everything; the io_context need not run any more.
  ~WebServer();  // NOLINT(bugprone-exception-escape): what Asio could throw here reports no error

  [[nodiscard]] std::uint16_t port() const;
  void changed();  // view.revision was raised: tells the open pages
  void stop();     // closes the port and every connection; pending work then ends

 private:
  class Implementation;
  std::shared_ptr<Implementation> implementation_;
};

}  // namespace lostwork
