#include "daemon/web/listen_address.h"

#include <charconv>
#include <optional>

#include <boost/asio/ip/address.hpp>

namespace lostwork {
namespace {

tl::unexpected<std::string> refused(std::string_view text, std::string_view allowed) {
  return tl::unexpected{"The page cannot be served at '" + std::string{text} +
                        "': " + std::string{allowed} + '.'};
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
    return refused(text, "it must be an address and a port, like 127.0.0.1:8470");
  }
  std::string host{text.substr(0, colon)};
  if (host == "localhost") {
    host = "127.0.0.1";
  } else if (host.starts_with('[') && host.ends_with(']')) {
    host = host.substr(1, host.size() - 2);
  }
  boost::system::error_code error;
  const auto address = boost::asio::ip::make_address(host, error);
  const bool bare_v6 = text.front() != '[' && host.find(':') != std::string::npos;
  if (error || bare_v6) {
    return refused(text,
                   "it must be a numeric address and a port, like 127.0.0.1:8470 or "
                   "[::1]:8470");
  }
  if (!address.is_loopback()) {
    return refused(text,
                   "until there are user accounts, only an address of this computer itself "
                   "is allowed (127.0.0.1 or [::1])");
  }
  return ListenAddress{.address = address.to_string(), .port = *port};
}

}  // namespace lostwork
