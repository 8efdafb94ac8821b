#include "config/listen_address.h"

#include <arpa/inet.h>
#include <array>
#include <charconv>
#include <optional>

namespace lostwork {
namespace {

struct NumericAddress {
  std::string text;  // as it is usually written
  bool loopback;
};

std::optional<NumericAddress> numeric_address(const std::string& host) {
  std::array<char, INET6_ADDRSTRLEN> text{};
  in_addr four{};
  if (inet_pton(AF_INET, host.c_str(), &four) == 1) {
    inet_ntop(AF_INET, &four, text.data(), text.size());
    return NumericAddress{.text = text.data(), .loopback = ntohl(four.s_addr) >> 24U == 127U};
  }
  in6_addr six{};
  if (inet_pton(AF_INET6, host.c_str(), &six) == 1) {
    inet_ntop(AF_INET6, &six, text.data(), text.size());
    return NumericAddress{.text = text.data(), .loopback = IN6_IS_ADDR_LOOPBACK(&six) != 0};
  }
  return std::nullopt;
}

std::optional<std::uint16_t> port_of(std::string_view text) {
  std::uint16_t port = 0;
  const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), port);
  const bool whole = error == std::errc{} && end == text.data() + text.size();
  return whole ? std::optional{port} : std::nullopt;
}

}  // namespace

tl::expected<ListenAddress, std::string> listen_address(std::string_view text) {
  const std::size_t colon = text.rfind(':');
  const auto port =
      colon == std::string_view::npos ? std::nullopt : port_of(text.substr(colon + 1));
  if (!port) {
    return tl::unexpected<std::string>{"an address and a port, as 127.0.0.1:8470"};
  }
  std::string host{text.substr(0, colon)};
  if (host == "localhost") {
    host = "127.0.0.1";
  } else if (host.starts_with('[') && host.ends_with(']')) {
    host = host.substr(1, host.size() - 2);
  }
  const auto address = numeric_address(host);
  const bool bare_v6 = text.front() != '[' && host.find(':') != std::string::npos;
  if (!address || bare_v6) {
    return tl::unexpected<std::string>{
        "a numeric address and a port, as 127.0.0.1:8470 or [::1]:8470"};
  }
  if (!address->loopback) {
    return tl::unexpected<std::string>{
        "an address of this computer itself (127.0.0.1 or [::1]) until there are user accounts"};
  }
  return ListenAddress{.address = address->text, .port = *port};
}

}  // namespace lostwork
