// Where the page may be served.
#pragma once

#include <cstdint>
#include <string>
#include <string_view>

#include <tl/expected.hpp>

namespace lostwork {

struct ListenAddress {
  std::string address;  // numeric: "127.0.0.1", "::1"
  std::uint16_t port = 0;
};

// Takes "127.0.0.1:8470", "[::1]:8470" and "localhost:8470". Only loopback addresses, for there are
// no user accounts: who can open the page can acknowledge alarms. The error says what is
// allowed.
[[nodiscard]] tl::expected<ListenAddress, std::string> listen_address(std::string_view text);

}  // namespace lostwork
