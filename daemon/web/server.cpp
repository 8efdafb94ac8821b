#include "daemon/web/server.h"

#include "config/listen_address.h"
#include "daemon/web/connection.h"

#include <exception>
#include <stdexcept>
#include <utility>

#include <boost/asio/co_spawn.hpp>
#include <boost/asio/io_context.hpp>
#include <boost/asio/redirect_error.hpp>
#include <boost/asio/use_awaitable.hpp>

namespace lostwork {
namespace {

namespace asio = boost::asio;
using asio::ip::tcp;
using boost::system::error_code;

// After a failed accept, most likely for want of descriptors.
constexpr std::chrono::milliseconds accept_pause{100};

UtcOffset offset_of(const PlantView& view, const std::function<void(std::string_view)>& log) {
  if (auto offset = utc_offset_of(view.timezone)) {
    return *offset;
  }
  log("web: there is no time zone '" + view.timezone + "' here; times are shown in UTC");
  return [](Instant /*time*/) { return std::chrono::seconds{0}; };
}

}  // namespace

class WebServer::Implementation : public std::enable_shared_from_this<Implementation> {
 public:
  Implementation(asio::io_context& io, const WebOptions& options, Parts parts)
      : acceptor_{io}, pause_{io} {
    const auto where = listen_address(options.listen);
    if (!where) {
      throw std::runtime_error{"The page cannot be served at '" + options.listen +
                               "': allowed is " + where.error() + '.'};
    }
    open({asio::ip::make_address(where->address), where->port}, options.listen);
    port_ = acceptor_.local_endpoint().port();
    Router router{parts.view, offset_of(parts.view, parts.log),
                  allowed_hosts(where->address, port_)};
    shared_ = std::make_shared<WebShared>(options.limits, std::move(parts), std::move(router));
  }

  void start() { asio::co_spawn(acceptor_.get_executor(), accept(), report()); }
  [[nodiscard]] std::uint16_t port() const { return port_; }

  void changed() {
    for (Connection* connection : shared_->open) {
      connection->wake();
    }
  }

  void stop() {
    shared_->stopped = true;
    error_code ignored;
    acceptor_.close(ignored);
    pause_.cancel();
    for (Connection* connection : shared_->open) {
      connection->close();
    }
  }

  void finish() {
    stop();
    shared_->history_thread.join();
  }

 private:
  void open(const tcp::endpoint& endpoint, const std::string& listen) {
    error_code error;
    acceptor_.open(endpoint.protocol(), error);
    if (!error) {
      acceptor_.set_option(asio::socket_base::reuse_address{true}, error);
    }
    if (!error) {
      acceptor_.bind(endpoint, error);
    }
    if (!error) {
      acceptor_.listen(asio::socket_base::max_listen_connections, error);
    }
    if (error) {
      throw std::runtime_error{"The page cannot be served at '" + listen + "': " +
                               (error == asio::error::address_in_use
                                    ? "another program listens there already"
                                    : error.message()) +
                               '.'};
    }
  }

  // For a coroutine that nobody waits for: its exception is logged, not lost.
  [[nodiscard]] std::function<void(std::exception_ptr)> report() const {
    return [log = shared_->parts.log](const std::exception_ptr& failure) {
      if (!failure) {
        return;
      }
      try {
        std::rethrow_exception(failure);
      } catch (const std::exception& what) {
        log(std::string{"web: a connection failed: "} + what.what());
      }
    };
  }

  void serve(tcp::socket socket) {
    if (shared_->open.size() >= shared_->limits.connections) {
      return;  // closes it
    }
    error_code ignored;
    socket.set_option(tcp::no_delay{true}, ignored);
    const auto executor = socket.get_executor();
    const auto connection = std::make_shared<Connection>(std::move(socket), shared_);
    asio::co_spawn(executor, connection->serve(), report());
  }

  asio::awaitable<void> accept() {
    const auto self = shared_from_this();
    error_code error;
    auto token = asio::redirect_error(asio::use_awaitable, error);
    while (!shared_->stopped) {
      tcp::socket socket = co_await acceptor_.async_accept(token);
      if (!error) {
        serve(std::move(socket));
      } else if (!shared_->stopped) {
        pause_.expires_after(accept_pause);
        co_await pause_.async_wait(token);
      }
    }
  }

  tcp::acceptor acceptor_;
  asio::steady_timer pause_;
  std::uint16_t port_ = 0;
  std::shared_ptr<WebShared> shared_;
};

WebServer::WebServer(asio::io_context& io, const WebOptions& options, Parts parts)
    : implementation_{std::make_shared<Implementation>(io, options, std::move(parts))} {
  implementation_->start();
}

// NOLINTNEXTLINE(bugprone-exception-escape): what Asio could throw here reports no error
WebServer::~WebServer() {
  implementation_->finish();
}

std::uint16_t WebServer::port() const {
  return implementation_->port();
}
void WebServer::changed() {
  implementation_->changed();
}
void WebServer::stop() {
  implementation_->stop();
}

}  // namespace lostwork
