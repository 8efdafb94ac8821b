#include "sensors/demo_plant/server.h"

#include "sensors/demo_plant/reply.h"

#include <arpa/inet.h>
#include <array>
#include <atomic>
#include <cerrno>
#include <mutex>
#include <netinet/in.h>
#include <netinet/tcp.h>
#include <poll.h>
#include <span>
#include <string>
#include <sys/eventfd.h>
#include <sys/socket.h>
#include <system_error>
#include <thread>
#include <unistd.h>
#include <utility>
#include <vector>

namespace lostwork {
namespace {

constexpr std::size_t most_clients = 32;

// Owns one file descriptor.
class Descriptor {
 public:
  explicit Descriptor(int fd) : fd_{fd} {}
  Descriptor(Descriptor&& other) noexcept : fd_{std::exchange(other.fd_, -1)} {}
  Descriptor& operator=(Descriptor&& other) noexcept {
    std::swap(fd_, other.fd_);
    return *this;
  }
  Descriptor(const Descriptor&) = delete;
  Descriptor& operator=(const Descriptor&) = delete;
  ~Descriptor() {
    if (fd_ >= 0) {
      ::close(fd_);
    }
  }
  [[nodiscard]] int get() const { return fd_; }

 private:
  int fd_;
};

[[noreturn]] void fail(std::uint16_t port, const char* what) {
  throw std::system_error{
      errno, std::generic_category(),
      "simulated plant: cannot " + std::string{what} + " 127.0.0.1:" + std::to_string(port)};
}

Descriptor listening(std::uint16_t port) {
  Descriptor socket{::socket(AF_INET, SOCK_STREAM | SOCK_NONBLOCK | SOCK_CLOEXEC, 0)};
  if (socket.get() < 0) {
    fail(port, "open a socket for");
  }
  const int on = 1;
  ::setsockopt(socket.get(), SOL_SOCKET, SO_REUSEADDR, &on, sizeof on);
  sockaddr_in address{};
  address.sin_family = AF_INET;
  address.sin_port = htons(port);
  address.sin_addr.s_addr = htonl(INADDR_LOOPBACK);
  // The sockets' interface wants its general address type.
  if (::bind(socket.get(), reinterpret_cast<const sockaddr*>(&address), sizeof address) != 0) {
    fail(port, "use");
  }
  if (::listen(socket.get(), static_cast<int>(most_clients)) != 0) {
    fail(port, "listen at");
  }
  return socket;
}

std::uint16_t port_of(const Descriptor& socket) {
  sockaddr_in address{};
  socklen_t size = sizeof address;
  if (::getsockname(socket.get(), reinterpret_cast<sockaddr*>(&address), &size) != 0) {
    fail(0, "ask for the port of");
  }
  return ntohs(address.sin_port);
}

struct Client {
  Descriptor socket;
  std::vector<std::uint8_t> received;
};

}  // namespace

class DemoServer::Loop {
 public:
  Loop(std::uint16_t port, RegisterImage image)
      : listener_{listening(port)},
        wake_{::eventfd(0, EFD_NONBLOCK | EFD_CLOEXEC)},
        port_{port_of(listener_)},
        image_{std::move(image)} {
    if (wake_.get() < 0) {
      fail(port_, "prepare");
    }
    thread_ = std::thread{[this] { run(); }};
  }
  Loop(const Loop&) = delete;
  Loop& operator=(const Loop&) = delete;
  Loop(Loop&&) = delete;
  Loop& operator=(Loop&&) = delete;
  ~Loop() {
    stopping_ = true;
    ::eventfd_write(wake_.get(), 1);
    thread_.join();
  }

  [[nodiscard]] std::uint16_t port() const { return port_; }

  void show(RegisterImage image) {
    const std::lock_guard lock{mutex_};
    std::swap(image_, image);
  }

 private:
  void run() {
    while (!stopping_) {
      std::vector<pollfd> waiting{
          {    .fd = wake_.get(), .events = POLLIN, .revents = 0},
          {.fd = listener_.get(), .events = POLLIN, .revents = 0}
      };
      for (const Client& client : clients_) {
        waiting.push_back({.fd = client.socket.get(), .events = POLLIN, .revents = 0});
      }
      if (::poll(waiting.data(), waiting.size(), -1) < 0) {
        continue;  // interrupted
      }
      serve_all(std::span{waiting}.subspan(2));
      if (waiting[1].revents != 0) {
        accept_one();
      }
    }
  }

  // The clients' polls in their order.
  void serve_all(std::span<const pollfd> polled) {
    std::vector<Client> kept;
    for (std::size_t i = 0; i < clients_.size(); ++i) {
      if (polled[i].revents == 0 || serve(clients_[i])) {
        kept.push_back(std::move(clients_[i]));
      }
    }
    clients_ = std::move(kept);
  }

  void accept_one() {
    Descriptor socket{::accept4(listener_.get(), nullptr, nullptr, SOCK_NONBLOCK | SOCK_CLOEXEC)};
    if (socket.get() < 0 || clients_.size() >= most_clients) {
      return;
    }
    const int on = 1;
    ::setsockopt(socket.get(), IPPROTO_TCP, TCP_NODELAY, &on, sizeof on);
    clients_.push_back({.socket = std::move(socket), .received = {}});
  }

  // False: the connection is over.
  bool serve(Client& client) {
    std::array<std::uint8_t, 1024> bytes{};
    const ssize_t count = ::recv(client.socket.get(), bytes.data(), bytes.size(), 0);
    if (count <= 0) {
      return count < 0 && (errno == EAGAIN || errno == EINTR);
    }
    client.received.insert(client.received.end(), bytes.begin(), bytes.begin() + count);
    for (;;) {
      const auto length = frame_length(client.received);
      if (!length) {
        return false;
      }
      if (*length == 0) {
        return true;
      }
      if (!respond(client, *length)) {
        return false;
      }
      client.received.erase(client.received.begin(),
                            client.received.begin() + static_cast<std::ptrdiff_t>(*length));
    }
  }

  bool respond(const Client& client, std::size_t length) {
    std::vector<std::uint8_t> bytes;
    {
      const std::lock_guard lock{mutex_};
      bytes = reply(image_, std::span{client.received}.first(length));
    }
    // An answer is far smaller than a socket's buffer: one that does not fit is not being read.
    return bytes.empty() || ::send(client.socket.get(), bytes.data(), bytes.size(), MSG_NOSIGNAL) ==
                                static_cast<ssize_t>(bytes.size());
  }

  Descriptor listener_;
  Descriptor wake_;
  std::uint16_t port_;
  std::mutex mutex_;
  RegisterImage image_;  // guarded by mutex_
  std::atomic<bool> stopping_ = false;
  std::vector<Client> clients_;  // the thread's own
  std::thread thread_;           // last: it uses all of the above
};

DemoServer::DemoServer(std::uint16_t port, RegisterImage image)
    : loop_{std::make_unique<Loop>(port, std::move(image))} {}

DemoServer::~DemoServer() = default;

std::uint16_t DemoServer::port() const {
  return loop_->port();
}

void DemoServer::show(RegisterImage image) {
  loop_->show(std::move(image));
}

}  // namespace lostwork
