// One connection of a client, from accept to close. Inside of the server; only its two sources
// include this.
#pragma once

#include "daemon/web/router.h"
#include "daemon/web/server.h"

#include <cstdint>
#include <memory>
#include <optional>
#include <set>

#include <boost/asio/awaitable.hpp>
#include <boost/asio/ip/tcp.hpp>
#include <boost/asio/steady_timer.hpp>
#include <boost/asio/thread_pool.hpp>
#include <boost/beast/core/flat_buffer.hpp>
#include <boost/beast/core/tcp_stream.hpp>
#include <boost/beast/http/parser.hpp>
#include <boost/beast/http/string_body.hpp>

namespace lostwork {

class Connection;

// What all connections use; of the io_context's thread alone, but for the history's job.
struct WebShared {
  WebShared(const WebLimits& web_limits, WebServer::Parts web_parts, Router web_router)
      : limits{web_limits}, parts{std::move(web_parts)}, router{std::move(web_router)} {}

  WebLimits limits;
  WebServer::Parts parts;
  Router router;
  boost::asio::thread_pool history_thread{1};
  std::set<Connection*> open;
  std::size_t event_streams = 0;
  std::size_t trends_waiting = 0;
  bool stopped = false;
};

class Connection : public std::enable_shared_from_this<Connection> {
 public:
  Connection(boost::asio::ip::tcp::socket socket, std::shared_ptr<WebShared> shared);
  Connection(const Connection&) = delete;
  Connection& operator=(const Connection&) = delete;
  ~Connection();

  // Until the client goes, is too slow, or close() is called.
  boost::asio::awaitable<void> serve();
  void close();
  void wake();  // something changed: matters to an event stream

 private:
  enum class Next : std::uint8_t { close, again, events };
  using Parser = boost::beast::http::request_parser<boost::beast::http::string_body>;

  boost::asio::awaitable<Next> answer_one();
  boost::asio::awaitable<bool> read(Parser& parser);
  boost::asio::awaitable<Answer> trend(AskTrend ask);
  boost::asio::awaitable<bool> write(Answer answer, AfterAnswer after, bool body_too);
  boost::asio::awaitable<bool> write_text(std::shared_ptr<const std::string> text);
  boost::asio::awaitable<void> events();
  boost::asio::awaitable<void> wait_for_change(std::uint64_t told);
  boost::asio::awaitable<void> refuse();  // with refusal_
  boost::asio::awaitable<void> drain();
  [[nodiscard]] Action decide(const Parser::value_type& message);
  [[nodiscard]] Answer acknowledge(const AskAcknowledge& ask);

  std::shared_ptr<WebShared> shared_;
  boost::beast::tcp_stream stream_;
  boost::beast::flat_buffer buffer_;
  std::optional<Answer> refusal_;     // of a request that could not be read
  boost::asio::steady_timer change_;  // cancelled by wake()
  boost::asio::steady_timer pause_;   // between two events; cancelled by close() alone
};

}  // namespace lostwork
