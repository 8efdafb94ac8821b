#include "sensors/wiring.h"

#include "sensors/names.h"
#include "sensors/sentence.h"

#include <algorithm>
#include <arpa/inet.h>
#include <array>
#include <charconv>
#include <cstddef>
#include <system_error>

namespace lostwork {
namespace {

constexpr std::array<std::string_view, 3> kind_names{"tcp", "rtu", "rtu_over_tcp"};
constexpr std::array<std::string_view, 3> parity_names{"none", "even", "odd"};

bool is_numeric_address(const std::string& host) {
  in_addr four{};
  in6_addr six{};
  return inet_pton(AF_INET, host.c_str(), &four) == 1 ||
         inet_pton(AF_INET6, host.c_str(), &six) == 1;
}

struct HostAndPort {
  std::string_view host;
  std::optional<std::string_view> port;
};

HostAndPort halves(std::string_view text) {
  const std::size_t bracket = text.find(']');
  const bool six = text.starts_with('[') && bracket != std::string_view::npos;
  const std::size_t colon = text.find(':', six ? bracket : 0);
  const std::string_view host =
      six ? text.substr(1, bracket - 1) : text.substr(0, std::min(colon, text.size()));
  if (colon == std::string_view::npos) {
    return {.host = host, .port = std::nullopt};
  }
  return {.host = host, .port = text.substr(colon + 1)};
}

std::optional<std::uint16_t> port_number(std::string_view text) {
  std::uint16_t port = 0;
  const char* const end = text.data() + text.size();
  const auto [at, error] = std::from_chars(text.data(), end, port);
  if (error != std::errc{} || at != end || port == 0) {
    return std::nullopt;
  }
  return port;
}

constexpr std::array bauds{1200, 2400, 4800, 9600, 19200, 38400, 57600, 115200};

std::optional<std::string> fault_of_line(const SerialLine& line) {
  if (line.device.empty()) {
    return "the serial line has no device: write one such as /dev/ttyUSB0";
  }
  if (std::find(bauds.begin(), bauds.end(), line.baud) == bauds.end()) {
    return sentence({"baud ", std::to_string(line.baud),
                     ": 1200, 2400, 4800, 9600, 19200, 38400, 57600 or 115200"});
  }
  if (line.stop_bits != 1 && line.stop_bits != 2) {
    return sentence({"stop bits ", std::to_string(line.stop_bits), ": 1 or 2"});
  }
  return std::nullopt;
}

}  // namespace

std::string_view name(BusKind kind) {
  return kind_names.at(static_cast<std::size_t>(kind));
}
std::optional<BusKind> bus_kind_named(std::string_view name) {
  return enumerator_named<BusKind>(kind_names, name);
}
std::string_view name(Parity parity) {
  return parity_names.at(static_cast<std::size_t>(parity));
}
std::optional<Parity> parity_named(std::string_view name) {
  return enumerator_named<Parity>(parity_names, name);
}

tl::expected<TcpEndpoint, std::string> tcp_endpoint(std::string_view text) {
  const HostAndPort parts = halves(text);
  TcpEndpoint endpoint{.host = std::string{parts.host}};
  if (!is_numeric_address(endpoint.host)) {
    return tl::unexpected{
        sentence({"'", text,
                  "' is no numeric address: write 192.0.2.7:502 or [2001:db8::7]:502; a name would "
                  "need a name service, which can hold up the reading"})};
  }
  if (parts.port) {
    const std::optional<std::uint16_t> port = port_number(*parts.port);
    if (!port) {
      return tl::unexpected{
          sentence({"port '", *parts.port, "' in '", text, "': a whole number from 1 to 65535"})};
    }
    endpoint.port = *port;
  }
  return endpoint;
}

std::optional<std::string> fault_of(const BusOptions& options) {
  if (options.kind == BusKind::rtu_over_tcp) {
    return "kind rtu_over_tcp is not supported yet: set the gateway to Modbus TCP and use tcp";
  }
  if (options.timeout < Span{1} || options.timeout > Span{60000}) {
    return sentence({"timeout ", std::to_string(options.timeout.count()), " ms: 1 to 60000 ms"});
  }
  return options.kind == BusKind::rtu ? fault_of_line(options.serial) : std::nullopt;
}

std::vector<std::size_t> points_of(const Wiring& wiring, std::string_view machine) {
  std::vector<std::size_t> found;
  for (std::size_t i = 0; i < wiring.points.size(); ++i) {
    if (wiring.points[i].machine == machine) {
      found.push_back(i);
    }
  }
  return found;
}

}  // namespace lostwork
