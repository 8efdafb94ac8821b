#include "tests/sensors/modbus_server.h"

#include <algorithm>
#include <arpa/inet.h>
#include <array>
#include <poll.h>
#include <stdexcept>
#include <sys/eventfd.h>
#include <sys/socket.h>
#include <unistd.h>
#include <utility>

namespace lostwork {

struct ModbusServer::Request {
  std::array<std::uint8_t, 12> frame{};

  [[nodiscard]] std::uint8_t function() const { return frame[7]; }
  [[nodiscard]] std::uint16_t address() const { return word(8); }
  [[nodiscard]] std::uint16_t count() const { return word(10); }

 private:
  [[nodiscard]] std::uint16_t word(std::size_t i) const {
    return static_cast<std::uint16_t>((frame[i] << 8U) | frame[i + 1]);
  }
};

namespace {

void send_all(int client, std::span<const std::uint8_t> bytes) {
  // The client may have gone: that is for the next receive to find.
  [[maybe_unused]] const ssize_t sent = send(client, bytes.data(), bytes.size(), MSG_NOSIGNAL);
}

std::uint8_t high(std::size_t word) {
  return static_cast<std::uint8_t>((word >> 8U) & 0xFFU);
}
std::uint8_t low(std::size_t word) {
  return static_cast<std::uint8_t>(word & 0xFFU);
}

}  // namespace

ModbusServer::ModbusServer(std::uint16_t port)
    : listener_{socket(AF_INET, SOCK_STREAM | SOCK_CLOEXEC, 0)}, stop_{eventfd(0, EFD_CLOEXEC)} {
  sockaddr_in address{};
  address.sin_family = AF_INET;
  address.sin_addr.s_addr = htonl(INADDR_LOOPBACK);
  address.sin_port = htons(port);
  const int reuse = 1;
  setsockopt(listener_, SOL_SOCKET, SO_REUSEADDR, &reuse, sizeof reuse);
  socklen_t size = sizeof address;
  auto* generic = reinterpret_cast<sockaddr*>(&address);
  if (bind(listener_, generic, size) != 0 || listen(listener_, 8) != 0 ||
      getsockname(listener_, generic, &size) != 0) {
    throw std::runtime_error{"no port for the test's server"};
  }
  port_ = ntohs(address.sin_port);
  thread_ = std::thread{[this] { serve(); }};
}

ModbusServer::~ModbusServer() {
  eventfd_write(stop_, 1);
  thread_.join();
  close(listener_);
  close(stop_);
}

void ModbusServer::set_fault(std::uint16_t address, Fault fault) {
  const std::lock_guard lock{mutex_};
  faults_[address] = fault;
}

void ModbusServer::set_illegal(std::uint16_t address) {
  const std::lock_guard lock{mutex_};
  illegal_.insert(address);
}

void ModbusServer::set_word(std::uint16_t address, std::uint16_t word) {
  const std::lock_guard lock{mutex_};
  words_[address] = word;
}

std::uint16_t ModbusServer::default_word(std::uint16_t address) {
  return static_cast<std::uint16_t>(1000 + 7 * address);
}

std::set<std::uint8_t> ModbusServer::function_codes() const {
  const std::lock_guard lock{mutex_};
  return function_codes_;
}

void ModbusServer::serve() {
  std::vector<pollfd> watched{
      {    .fd = stop_, .events = POLLIN, .revents = 0},
      {.fd = listener_, .events = POLLIN, .revents = 0}
  };
  while (poll(watched.data(), watched.size(), -1) >= 0 && watched[0].revents == 0) {
    for (std::size_t i = watched.size(); i-- > 2;) {
      if (watched[i].revents != 0 && !serve_one(watched[i].fd)) {
        close(watched[i].fd);
        watched.erase(watched.begin() + static_cast<std::ptrdiff_t>(i));
      }
    }
    if (watched[1].revents != 0) {
      watched.push_back(
          {.fd = accept(listener_, nullptr, nullptr), .events = POLLIN, .revents = 0});
      ++connections_;
    }
  }
  for (std::size_t i = 2; i < watched.size(); ++i) {
    close(watched[i].fd);
  }
}

bool ModbusServer::serve_one(int client) {
  Request request;
  if (recv(client, request.frame.data(), request.frame.size(), MSG_WAITALL) !=
      static_cast<ssize_t>(request.frame.size())) {
    return false;
  }
  {
    const std::lock_guard lock{mutex_};
    function_codes_.insert(request.function());
  }
  return answer(client, request);
}

bool ModbusServer::answer(int client, const Request& request) {
  std::vector<std::uint8_t> frame = right_answer(request);
  Fault fault = Fault::none;
  {
    const std::lock_guard lock{mutex_};
    const auto found = faults_.find(request.address());
    fault = found == faults_.end() ? Fault::none : found->second;
  }
  if (fault == Fault::none) {
    send_all(client, frame);
    return true;
  }
  return answer_wrongly(client, fault, std::move(frame));
}

bool ModbusServer::answer_wrongly(int client, Fault fault, std::vector<std::uint8_t> frame) {
  const auto half = static_cast<std::ptrdiff_t>(frame.size() / 2);
  switch (fault) {
    case Fault::silent: return true;
    case Fault::late: wait_for(client); break;
    case Fault::drip:
      for (const std::uint8_t byte : frame) {
        send_all(client, std::array{byte});
        pollfd entry{.fd = client, .events = POLLIN, .revents = 0};
        if (poll(&entry, 1, 100) != 0) {
          return false;
        }
      }
      return true;
    case Fault::cut:
      frame.erase(frame.begin() + half, frame.end());
      send_all(client, frame);
      return false;
    case Fault::close: return false;
    case Fault::doubled: frame.insert(frame.end(), frame.begin(), frame.begin() + 2 * half); break;
    case Fault::trailing: frame.insert(frame.end(), {1, 2, 3}); break;
    case Fault::garbage: frame.assign(400, 'x'); break;
    case Fault::wrong_transaction: frame[1] ^= 1U; break;
    case Fault::wrong_protocol: frame[3] = 1; break;
    case Fault::wrong_length: frame[5] ^= 2U; break;
    case Fault::wrong_unit: frame[6] ^= 1U; break;
    case Fault::wrong_function: frame[7] ^= 7U; break;
    case Fault::fewer_registers:
      frame[5] = static_cast<std::uint8_t>(frame[5] - 2);
      frame[8] = static_cast<std::uint8_t>(frame[8] - 2);
      frame.resize(frame.size() - 2);
      break;
    case Fault::huge_byte_count: frame[8] = 250; break;
    case Fault::exception_busy:
    case Fault::exception_unknown:
      frame = {frame[0],
               frame[1],
               0,
               0,
               0,
               3,
               frame[6],
               static_cast<std::uint8_t>(frame[7] | 0x80U),
               static_cast<std::uint8_t>(fault == Fault::exception_busy ? 6 : 0x55)};
      break;
    case Fault::none: break;
  }
  send_all(client, frame);
  return true;
}

std::vector<std::uint8_t> ModbusServer::right_answer(const Request& request) {
  const std::lock_guard lock{mutex_};
  std::vector<std::uint16_t> words;
  bool refused = false;
  for (unsigned i = 0; i < request.count(); ++i) {
    const auto address = static_cast<std::uint16_t>(request.address() + i);
    const auto found = words_.find(address);
    words.push_back(found == words_.end() ? default_word(address) : found->second);
    refused = refused || illegal_.contains(address);
  }
  std::vector<std::uint8_t> payload;
  if (request.function() <= 2) {
    payload.resize((words.size() + 7) / 8);
    for (std::size_t i = 0; i < words.size(); ++i) {
      payload[i / 8] = static_cast<std::uint8_t>(payload[i / 8] | ((words[i] & 1U) << (i % 8)));
    }
  } else {
    for (const std::uint16_t word : words) {
      payload.push_back(high(word));
      payload.push_back(low(word));
    }
  }
  const auto& in = request.frame;
  if (refused) {
    return {in[0], in[1], 0, 0, 0, 3, in[6], static_cast<std::uint8_t>(in[7] | 0x80U), 2};
  }
  std::vector<std::uint8_t> frame{in[0],
                                  in[1],
                                  0,
                                  0,
                                  high(payload.size() + 3),
                                  low(payload.size() + 3),
                                  in[6],
                                  in[7],
                                  low(payload.size())};
  frame.insert(frame.end(), payload.begin(), payload.end());
  return frame;
}

void ModbusServer::wait_for(int client) const {
  std::array<pollfd, 2> watched{
      {{.fd = client, .events = POLLIN, .revents = 0},
       {.fd = stop_, .events = POLLIN, .revents = 0}}
  };
  poll(watched.data(), watched.size(), -1);
}

}  // namespace lostwork
