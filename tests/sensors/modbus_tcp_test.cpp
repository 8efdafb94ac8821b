#include "sensors/modbus_bus.h"
#include "tests/sensors/modbus_server.h"

#include <algorithm>
#include <arpa/inet.h>
#include <chrono>
#include <optional>
#include <poll.h>
#include <stdexcept>
#include <string>
#include <sys/resource.h>
#include <sys/select.h>
#include <sys/socket.h>
#include <unistd.h>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::ElementsAre;
using Steady = std::chrono::steady_clock;

// Long enough for a busy machine to answer in, short enough to be waited for.
constexpr Span timeout{400};

BusOptions options_for(std::uint16_t port) {
  return {
      .id = "plc",
      .kind = BusKind::tcp,
      .tcp = {.host = "127.0.0.1", .port = port},
      .timeout = timeout,
      .pause = Span{                  0             }
  };
}

std::unique_ptr<Bus> bus_to(std::uint16_t port, BusClocks clocks = {}) {
  auto bus = modbus_bus(options_for(port), std::move(clocks));
  if (!bus) {
    throw std::runtime_error{bus.error()};
  }
  return std::move(*bus);
}

BlockRequest holding(std::uint16_t address, std::uint16_t count) {
  return {.unit = 1, .table = Table::holding, .address = address, .count = count};
}

std::vector<std::uint16_t> default_words(std::uint16_t address, std::uint16_t count) {
  std::vector<std::uint16_t> words;
  for (unsigned i = 0; i < count; ++i) {
    words.push_back(ModbusServer::default_word(static_cast<std::uint16_t>(address + i)));
  }
  return words;
}

TEST(ModbusTcp, ReadsRegisters) {
  ModbusServer server;
  const auto bus = bus_to(server.port());
  const BlockAnswer answer = bus->read(holding(100, 125));
  EXPECT_EQ(answer.failure, std::nullopt);
  EXPECT_EQ(answer.words, default_words(100, 125));
}

TEST(ModbusTcp, ReadsBits) {
  ModbusServer server;
  const auto bus = bus_to(server.port());
  const BlockAnswer answer =
      bus->read({.unit = 1, .table = Table::discrete, .address = 0, .count = 5});
  EXPECT_THAT(answer.words, ElementsAre(0, 1, 0, 1, 0));  // 1000 + 7 * address
}

TEST(ModbusTcp, ReadsTheLastAddress) {
  ModbusServer server;
  const auto bus = bus_to(server.port());
  EXPECT_EQ(bus->read(holding(65535, 1)).words, default_words(65535, 1));
}

TEST(ModbusTcp, KeepsOneConnection) {
  ModbusServer server;
  const auto bus = bus_to(server.port());
  for (std::uint16_t i = 0; i < 20; ++i) {
    EXPECT_EQ(bus->read(holding(i, 2)).failure, std::nullopt);
  }
  EXPECT_EQ(server.connections(), 1);
}

TEST(ModbusTcp, TellsAnExceptionAndKeepsTheConnection) {
  ModbusServer server;
  server.set_illegal(50);
  const auto bus = bus_to(server.port());
  const BlockAnswer answer = bus->read(holding(48, 4));
  EXPECT_EQ(answer.failure, BusFailure::exception);
  EXPECT_EQ(answer.exception_code, 2);
  EXPECT_EQ(bus->read(holding(0, 1)).failure, std::nullopt);
  EXPECT_EQ(server.connections(), 1);
}

TEST(ModbusTcp, GivesTheTimeOfItsClock) {
  ModbusServer server;
  const Instant noon{std::chrono::sys_days{std::chrono::year{2024} / 3 / 1} +
                     std::chrono::hours{12}};
  BusClocks clocks;
  clocks.utc = [noon] { return noon; };
  const auto bus = bus_to(server.port(), clocks);
  EXPECT_EQ(bus->read(holding(0, 1)).time, noon);
}

struct FaultCase {
  std::string label;
  Fault fault;
  std::optional<BusFailure> failure;
};

class TcpFault : public testing::TestWithParam<FaultCase> {};

TEST_P(TcpFault, IsToldForWhatItIsAndTheNextReadIsRight) {
  ModbusServer server;
  server.set_fault(10, GetParam().fault);
  const auto bus = bus_to(server.port());
  ASSERT_EQ(bus->read(holding(0, 2)).words, default_words(0, 2));
  const BlockAnswer answer = bus->read(holding(10, 2));
  EXPECT_EQ(answer.failure, GetParam().failure);
  EXPECT_EQ(answer.words, GetParam().failure ? std::vector<std::uint16_t>{} : default_words(10, 2));
  EXPECT_EQ(bus->read(holding(20, 2)).words, default_words(20, 2));
  EXPECT_EQ(bus->read(holding(30, 2)).words, default_words(30, 2));
}

INSTANTIATE_TEST_SUITE_P(
    Each, TcpFault,
    testing::Values(FaultCase{"silent", Fault::silent, BusFailure::timeout},
                    FaultCase{"late", Fault::late, BusFailure::timeout},
                    FaultCase{"drip", Fault::drip, BusFailure::timeout},
                    FaultCase{"huge_byte_count", Fault::huge_byte_count, BusFailure::timeout},
                    FaultCase{"cut", Fault::cut, BusFailure::connection},
                    FaultCase{"close", Fault::close, BusFailure::connection},
                    FaultCase{"doubled", Fault::doubled, std::nullopt},
                    FaultCase{"trailing", Fault::trailing, std::nullopt},
                    FaultCase{"garbage", Fault::garbage, BusFailure::malformed},
                    FaultCase{"transaction", Fault::wrong_transaction, BusFailure::malformed},
                    FaultCase{"protocol", Fault::wrong_protocol, BusFailure::malformed},
                    FaultCase{"length", Fault::wrong_length, BusFailure::malformed},
                    FaultCase{"unit", Fault::wrong_unit, BusFailure::malformed},
                    FaultCase{"function", Fault::wrong_function, BusFailure::malformed},
                    FaultCase{"fewer_registers", Fault::fewer_registers, BusFailure::malformed},
                    FaultCase{"busy", Fault::exception_busy, BusFailure::exception},
                    FaultCase{"unknown_exception", Fault::exception_unknown,
                              BusFailure::exception}),
    [](const auto& tested) { return tested.param.label; });

TEST(ModbusTcp, EndsACallInTimeHoweverSlowlyTheAnswerDrips) {
  ModbusServer server;
  server.set_fault(10, Fault::drip);
  const auto bus = bus_to(server.port());
  const auto begun = Steady::now();
  EXPECT_EQ(bus->read(holding(10, 100)).failure, BusFailure::timeout);
  EXPECT_LT(Steady::now() - begun, 3 * timeout);  // what bus.h promises
}

// A port that nobody listens on yet.
class ClosedPort {
 public:
  ClosedPort() : socket_{socket(AF_INET, SOCK_STREAM | SOCK_CLOEXEC, 0)} {
    sockaddr_in address{};
    address.sin_family = AF_INET;
    address.sin_addr.s_addr = htonl(INADDR_LOOPBACK);
    socklen_t size = sizeof address;
    auto* generic = reinterpret_cast<sockaddr*>(&address);
    if (bind(socket_, generic, size) != 0 || getsockname(socket_, generic, &size) != 0) {
      throw std::runtime_error{"no port for the test"};
    }
    port_ = ntohs(address.sin_port);
  }
  ~ClosedPort() { close(socket_); }
  ClosedPort(const ClosedPort&) = delete;
  ClosedPort& operator=(const ClosedPort&) = delete;
  ClosedPort(ClosedPort&&) = delete;
  ClosedPort& operator=(ClosedPort&&) = delete;

  [[nodiscard]] std::uint16_t port() const { return port_; }
  void open() const { listen(socket_, 8); }
  // Whether somebody has tried to connect since it was opened.
  [[nodiscard]] bool tried() const {
    pollfd entry{.fd = socket_, .events = POLLIN, .revents = 0};
    return poll(&entry, 1, 0) > 0;
  }

 private:
  int socket_;
  std::uint16_t port_ = 0;
};

TEST(ModbusTcp, TriesAgainOnlyWhenThePauseIsOverAndThePauseDoubles) {
  const ClosedPort far_end;
  Steady::time_point now{};
  BusClocks clocks;
  clocks.steady = [&now] { return now; };
  clocks.jitter_seed = 1;
  const auto bus = bus_to(far_end.port(), clocks);
  // First pause 0.75 to 1 s, second 1.5 to 2 s.
  EXPECT_EQ(bus->read(holding(0, 1)).failure, BusFailure::connection);
  now += std::chrono::milliseconds{1001};
  EXPECT_EQ(bus->read(holding(0, 1)).failure, BusFailure::connection);
  far_end.open();
  now += std::chrono::milliseconds{1499};
  EXPECT_EQ(bus->read(holding(0, 1)).failure, BusFailure::connection);
  EXPECT_FALSE(far_end.tried());
  now += std::chrono::milliseconds{502};
  EXPECT_EQ(bus->read(holding(0, 1)).failure, BusFailure::timeout);  // it never answers
  EXPECT_TRUE(far_end.tried());
}

TEST(ModbusTcp, IsPatientWithAnEndThatTakesConnectionsAndClosesThem) {
  ModbusServer server;
  server.set_fault(0, Fault::close);
  Steady::time_point now{};
  BusClocks clocks;
  clocks.steady = [&now] { return now; };
  const auto bus = bus_to(server.port(), clocks);
  for (int i = 0; i < 5; ++i) {
    EXPECT_EQ(bus->read(holding(0, 1)).failure, BusFailure::connection);
  }
  EXPECT_EQ(server.connections(), 1);
  now += std::chrono::seconds{2};
  EXPECT_EQ(bus->read(holding(1, 1)).failure, std::nullopt);
}

TEST(ModbusTcp, ComesBackAfterTheServerWasAway) {
  std::uint16_t port = 0;
  Steady::time_point now{};
  BusClocks clocks;
  clocks.steady = [&now] { return now; };
  std::unique_ptr<Bus> bus;
  {
    ModbusServer server;
    port = server.port();
    bus = bus_to(port, clocks);
    EXPECT_EQ(bus->read(holding(0, 1)).failure, std::nullopt);
  }
  EXPECT_EQ(bus->read(holding(0, 1)).failure, BusFailure::connection);
  const ModbusServer again{port};
  now += std::chrono::seconds{2};
  EXPECT_EQ(bus->read(holding(0, 1)).words, default_words(0, 1));
}

// select() writes out of bounds for a descriptor from FD_SETSIZE on: libmodbus would end the
// program.
TEST(ModbusTcp, FailsToConnectWhereItsDescriptorWouldBeOutOfReach) {
  ModbusServer server;
  const auto bus = bus_to(server.port());
  rlimit limit{};
  getrlimit(RLIMIT_NOFILE, &limit);
  limit.rlim_cur = std::max<rlim_t>(limit.rlim_cur, std::min<rlim_t>(limit.rlim_max, 2048));
  setrlimit(RLIMIT_NOFILE, &limit);
  std::vector<int> taken;
  while (taken.empty() || (taken.back() >= 0 && taken.back() < FD_SETSIZE + 8)) {
    taken.push_back(dup(STDERR_FILENO));
  }
  EXPECT_EQ(bus->read(holding(0, 1)).failure, BusFailure::connection);
  for (const int descriptor : taken) {
    close(descriptor);
  }
}

TEST(ModbusBusOf, RefusesRtuOverTcpInPlainWords) {
  BusOptions options = options_for(502);
  options.kind = BusKind::rtu_over_tcp;
  const auto bus = modbus_bus(options);
  ASSERT_FALSE(bus.has_value());
  EXPECT_THAT(bus.error(), testing::HasSubstr("rtu_over_tcp is not supported yet"));
}

TEST(ModbusBusOf, RefusesATimeoutOutsideItsLimits) {
  BusOptions options = options_for(502);
  options.timeout = Span{0};
  EXPECT_THAT(modbus_bus(options).error(), testing::HasSubstr("timeout 0 ms"));
  options.timeout = Span{60001};
  EXPECT_THAT(modbus_bus(options).error(), testing::HasSubstr("1 to 60000 ms"));
}

}  // namespace
}  // namespace lostwork
