#include "tests/daemon/web/web_client.h"

#include <algorithm>
#include <array>
#include <cctype>
#include <sstream>

#include <boost/asio/buffer.hpp>
#include <boost/asio/io_context.hpp>
#include <boost/asio/ip/tcp.hpp>
#include <boost/asio/read.hpp>
#include <boost/asio/write.hpp>

namespace lostwork {

namespace asio = boost::asio;

class WebClient::Implementation {
 public:
  explicit Implementation(std::uint16_t port) : socket{io} {
    socket.connect({asio::ip::address_v4::loopback(), port});
  }

  // False: the end.
  bool read_more() {
    std::array<char, 4096> piece{};
    boost::system::error_code error;
    const std::size_t count = socket.read_some(asio::buffer(piece), error);
    come.append(piece.data(), count);
    return !error;
  }

  asio::io_context io;
  asio::ip::tcp::socket socket;
  std::string come;  // and not taken yet
};

WebClient::WebClient(std::uint16_t port)
    : implementation_{std::make_unique<Implementation>(port)} {}
WebClient::~WebClient() = default;

void WebClient::send(std::string_view bytes) {
  boost::system::error_code closed;
  asio::write(implementation_->socket, asio::buffer(bytes), closed);
}

WebReply WebClient::reply(bool to_head) {
  std::string& come = implementation_->come;
  if (!wait_for("\r\n\r\n")) {
    return {};
  }
  WebReply reply;
  std::istringstream head{come.substr(0, come.find("\r\n\r\n") + 2)};
  come.erase(0, come.find("\r\n\r\n") + 4);
  std::string line;
  std::getline(head, line);
  reply.status = std::stoi(line.substr(line.find(' ')));
  while (std::getline(head, line)) {
    const std::size_t colon = line.find(':');
    std::string name = line.substr(0, colon);
    std::transform(name.begin(), name.end(), name.begin(),
                   [](unsigned char c) { return static_cast<char>(std::tolower(c)); });
    const std::size_t begin = std::min(line.find_first_not_of(' ', colon + 1), line.size() - 1);
    reply.fields[name] = line.substr(begin, line.size() - begin - 1);
  }
  const bool has_body = !to_head && reply.fields.contains("content-length");
  const std::size_t length = has_body ? std::stoul(reply.fields["content-length"]) : 0;
  while (come.size() < length && implementation_->read_more()) {
  }
  reply.body = come.substr(0, length);
  come.erase(0, length);
  return reply;
}

bool WebClient::wait_for(std::string_view text) {
  bool open = true;
  while (implementation_->come.find(text) == std::string::npos) {
    if (!open) {
      return false;
    }
    open = implementation_->read_more();
  }
  return true;
}

std::size_t WebClient::read_to_end() {
  while (implementation_->read_more()) {
  }
  return implementation_->come.size();
}

std::string get_request(std::uint16_t port, std::string_view target, std::string_view more_fields) {
  return "GET " + std::string{target} + " HTTP/1.1\r\nHost: 127.0.0.1:" + std::to_string(port) +
         "\r\n" + std::string{more_fields} + "\r\n";
}

std::string post_request(std::uint16_t port, std::string_view target, std::string_view body,
                         std::string_view more_fields) {
  return "POST " + std::string{target} + " HTTP/1.1\r\nHost: 127.0.0.1:" + std::to_string(port) +
         "\r\nContent-Type: application/json\r\nContent-Length: " + std::to_string(body.size()) +
         "\r\n" + std::string{more_fields} + "\r\n" + std::string{body};
}

WebReply ask(std::uint16_t port, std::string_view request) {
  WebClient client{port};
  client.send(request);
  return client.reply();
}

}  // namespace lostwork
