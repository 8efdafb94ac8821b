#include "daemon/web/connection.h"

#include "daemon/on_thread.h"
#include "daemon/web/api_json.h"

#include <array>
#include <chrono>
#include <exception>
#include <string>
#include <string_view>
#include <utility>

#include <boost/asio/redirect_error.hpp>
#include <boost/asio/use_awaitable.hpp>
#include <boost/asio/write.hpp>
#include <boost/beast/http/read.hpp>

namespace lostwork {
namespace {

namespace asio = boost::asio;
namespace http = boost::beast::http;
using boost::system::error_code;

// How long, and how much, is still read after a refusal, so that the client gets to see it.
constexpr std::chrono::seconds drain_time{1};
constexpr std::size_t drain_bytes = std::size_t{256} * 1024;
// Small, so that a client that does not read is noticed after a few events.
constexpr int event_send_buffer = 8192;

auto into(error_code& error) {
  return asio::redirect_error(asio::use_awaitable, error);
}

// None: there is nobody left to answer.
std::optional<Answer> refusal_of(const error_code& error) {
  if (error == http::error::header_limit || error == http::error::buffer_overflow) {
    return problem(431, "The header of the request is too large.");
  }
  if (error == http::error::body_limit) {
    return problem(413, "The body of the request is too large.");
  }
  if (error == http::error::bad_version) {
    return problem(505, "Only HTTP/1.0 and HTTP/1.1 are spoken here.");
  }
  const bool is_http = error.category() == make_error_code(http::error::bad_method).category();
  if (!is_http || error == http::error::end_of_stream || error == http::error::partial_message) {
    return std::nullopt;
  }
  return problem(400, "The request is malformed.");
}

std::string_view view(boost::beast::string_view text) {
  return {text.data(), text.size()};
}

// A job for the history's thread: never throws.
Answer answer_trend(const HistorySource& history, const AskTrend& ask,
                    const std::function<void(std::string)>& complain) {
  try {
    TrendRequest request = ask.request;
    request.machine = ask.machine;
    return text_answer("application/json", trend_json(request, history(request)));
  } catch (const std::exception& failure) {
    complain(failure.what());
  }
  Answer answer = problem(503, "The history cannot be read at the moment.");
  answer.retry_after = "10";
  return answer;
}

}  // namespace

Connection::Connection(asio::ip::tcp::socket socket, std::shared_ptr<WebShared> shared)
    : shared_{std::move(shared)},
      stream_{std::move(socket)},
      buffer_{shared_->limits.header_bytes + shared_->limits.body_bytes},
      change_{stream_.get_executor()},
      pause_{stream_.get_executor()} {
  shared_->open.insert(this);
}

Connection::~Connection() {
  shared_->open.erase(this);
}

void Connection::close() {
  stream_.close();
  change_.cancel();
  pause_.cancel();
}

void Connection::wake() {
  change_.cancel();
}

asio::awaitable<void> Connection::serve() {
  const auto self = shared_from_this();
  Next next = Next::again;
  while (next == Next::again && !shared_->stopped) {
    next = co_await answer_one();
  }
  if (next == Next::events) {
    co_await events();
  }
  stream_.close();
}

// False: close, after the refusal if there is one.
asio::awaitable<bool> Connection::read(Parser& parser) {
  error_code error;
  auto token = into(error);
  if (buffer_.size() == 0) {
    constexpr std::size_t first_bytes = 1024;
    stream_.expires_after(shared_->limits.idle_time);
    const auto room = buffer_.prepare(first_bytes);
    const std::size_t count = co_await stream_.async_read_some(room, token);
    buffer_.commit(count);
  }
  if (!error) {
    stream_.expires_after(shared_->limits.request_time);  // for header and body together
    co_await http::async_read_header(stream_, buffer_, parser, token);
  }
  if (!error && view(parser.get()[http::field::expect]) == "100-continue") {
    const std::string_view go_on = "HTTP/1.1 100 Continue\r\n\r\n";
    const auto bytes = asio::buffer(go_on);
    co_await asio::async_write(stream_, bytes, token);
  }
  if (!error) {
    co_await http::async_read(stream_, buffer_, parser, token);
  }
  if (error) {
    refusal_ = refusal_of(error);
  }
  co_return !error;
}

Action Connection::decide(const Parser::value_type& message) {
  if (message.target().size() > shared_->limits.target_bytes) {
    return problem(414, "The address asked for is too long.");
  }
  if (message.count(http::field::host) != 1 || message.count(http::field::origin) > 1) {
    return problem(400, "The request must say once which host it is for.");
  }
  const Request request{.method = view(message.method_string()),
                        .target = view(message.target()),
                        .host = view(message[http::field::host]),
                        .origin = view(message[http::field::origin]),
                        .fetch_site = view(message["Sec-Fetch-Site"]),
                        .content_type = view(message[http::field::content_type]),
                        .body = message.body()};
  try {
    return shared_->router.route(request);
  } catch (const std::exception& failure) {
    shared_->parts.log(std::string{"web: a request failed: "} + failure.what());
  }
  return problem(500, "The request could not be answered.");
}

Answer Connection::acknowledge(const AskAcknowledge& ask) {
  switch (shared_->parts.acknowledge(ask.alarm, ask.comment)) {
    case Acknowledgement::done: return text_answer("application/json", R"({"acknowledged":true})");
    case Acknowledgement::already:
      return problem(409, "The alarm " + shown_value(ask.alarm) + " is acknowledged already.");
    case Acknowledgement::no_such_alarm: break;
  }
  return problem(404, "There is no alarm " + shown_value(ask.alarm) + '.');
}

asio::awaitable<void> Connection::refuse() {
  const bool written = co_await write(*refusal_, AfterAnswer::close, true);
  if (written) {
    co_await drain();
  }
}

asio::awaitable<Connection::Next> Connection::answer_one() {
  Parser parser;
  parser.header_limit(static_cast<std::uint32_t>(shared_->limits.header_bytes));
  parser.body_limit(shared_->limits.body_bytes);
  refusal_.reset();
  const bool whole = co_await read(parser);
  if (!whole) {
    if (refusal_) {
      co_await refuse();
    }
    co_return Next::close;
  }
  if (shared_->stopped) {
    co_return Next::close;
  }
  const bool is_head = parser.get().method() == http::verb::head;
  AfterAnswer after = parser.get().keep_alive() ? AfterAnswer::keep_alive : AfterAnswer::close;
  Action action = decide(parser.get());
  Answer answer;
  if (auto* ready = std::get_if<Answer>(&action)) {
    answer = std::move(*ready);
  } else if (auto* asked = std::get_if<AskTrend>(&action)) {
    AskTrend ask = std::move(*asked);
    answer = co_await trend(std::move(ask));
  } else if (auto* change = std::get_if<AskAcknowledge>(&action)) {
    answer = acknowledge(*change);
  } else if (is_head) {
    answer.content_type = "text/event-stream";
  } else if (shared_->event_streams < shared_->limits.event_streams) {
    co_return Next::events;
  } else {
    answer = problem(503, "Too many pages are open already.");
    answer.retry_after = "30";
  }
  const bool written = co_await write(std::move(answer), after, !is_head);
  const bool again = written && after == AfterAnswer::keep_alive;
  co_return again ? Next::again : Next::close;
}

asio::awaitable<Answer> Connection::trend(AskTrend ask) {
  Answer answer = problem(503, "Too many questions for the history are waiting.");
  answer.retry_after = "2";
  if (shared_->trends_waiting >= shared_->limits.trends_waiting) {
    co_return answer;
  }
  ++shared_->trends_waiting;
  // The log is of the io_context's thread: a complaint goes there.
  const auto executor = stream_.get_executor();
  const auto log = shared_->parts.log;
  auto complain = [executor, log](const std::string& why) {
    asio::post(executor, [log, why] { log("web: the history cannot be read: " + why); });
  };
  auto job = [ask = std::move(ask), history = shared_->parts.history,
              complain = std::move(complain)] { return answer_trend(history, ask, complain); };
  answer = co_await on_thread(shared_->history_thread, std::move(job));
  --shared_->trends_waiting;
  co_return answer;
}

asio::awaitable<bool> Connection::write(Answer answer, AfterAnswer after, bool body_too) {
  const std::string head = head_of(answer, after);
  const std::string_view body = body_too ? answer.body : std::string_view{};
  const std::array<asio::const_buffer, 2> bytes{asio::buffer(head), asio::buffer(body)};
  error_code error;
  auto token = into(error);
  stream_.expires_after(shared_->limits.write_time);
  co_await asio::async_write(stream_, bytes, token);
  co_return !error;
}

asio::awaitable<bool> Connection::write_text(std::shared_ptr<const std::string> text) {
  error_code error;
  auto token = into(error);
  const auto bytes = asio::buffer(*text);
  stream_.expires_after(shared_->limits.write_time);
  co_await asio::async_write(stream_, bytes, token);
  stream_.expires_never();
  co_return !error;
}

// Lets the client finish what it is sending: a reset would take the refusal away from it.
asio::awaitable<void> Connection::drain() {
  error_code error;
  auto token = into(error);
  stream_.socket().shutdown(asio::ip::tcp::socket::shutdown_send, error);
  stream_.expires_after(drain_time);
  std::array<char, 1024> waste{};
  const auto room = asio::buffer(waste);
  std::size_t count = 0;
  while (!error && count < drain_bytes) {
    count += co_await stream_.async_read_some(room, token);
  }
}

// Until there is something newer than `told`, or the heartbeat is due.
asio::awaitable<void> Connection::wait_for_change(std::uint64_t told) {
  error_code ignored;
  auto token = into(ignored);
  pause_.expires_after(shared_->limits.event_period);
  co_await pause_.async_wait(token);
  if (!shared_->stopped && shared_->parts.view.revision == told) {
    change_.expires_after(shared_->limits.heartbeat);
    co_await change_.async_wait(token);
  }
}

asio::awaitable<void> Connection::events() {
  buffer_.clear();
  buffer_.shrink_to_fit();
  ++shared_->event_streams;
  error_code ignored;
  stream_.socket().set_option(asio::socket_base::send_buffer_size{event_send_buffer}, ignored);
  auto text = std::make_shared<const std::string>(event_stream_head());
  bool alive = co_await write_text(text);
  bool is_news = true;
  while (alive && !shared_->stopped) {
    const std::uint64_t told = shared_->parts.view.revision;
    text = is_news ? shared_->router.event()
                   : std::make_shared<const std::string>("event: alive\ndata: {}\n\n");
    alive = co_await write_text(text);
    if (alive) {
      co_await wait_for_change(told);
    }
    is_news = shared_->parts.view.revision != told;
  }
  --shared_->event_streams;
}

}  // namespace lostwork
